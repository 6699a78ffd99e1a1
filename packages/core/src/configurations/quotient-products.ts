import { multiplyIntegerMatrices } from "../numbers/index.js";
import {
  elementAt,
  elementIndex,
  operatorOf,
  type ParentQuotient,
  timesColumnIntegers,
  translationNumber,
} from "./parent-quotient.js";

/** Multiplies elements of the quotient by number: `{R₁|t₁ + T₁}{R₂|t₂ + T₂}`, right factor first. */
export function quotientProducts(quotient: ParentQuotient): (left: number, right: number) => number {
  const { rotations, translations, denominator } = quotient.group.primitive;
  const { operators } = quotient.selection;
  const places = new Map(operators.map((operator, place) => [(rotations[operator] ?? []).join(), place]));
  const pairs = new Map<number, { place: number; shift: readonly number[] }>();
  const pair = (first: number, second: number) => {
    const key = first * operators.length + second;
    const known = pairs.get(key);
    if (known !== undefined) return known;
    const [a, b] = [operators[first] as number, operators[second] as number];
    const rotation = rotations[a] as readonly number[];
    const product = multiplyIntegerMatrices(rotation, rotations[b] as readonly number[]).map((entry) => entry + 0);
    const place = places.get(product.join()) as number;
    const moved = timesColumnIntegers(rotation, translations[b] as readonly number[]);
    const own = translations[operators[place] as number] as readonly number[];
    const shift = moved.map(
      (entry, axis) =>
        (entry + ((translations[a] as readonly number[])[axis] as number) - (own[axis] as number)) / denominator,
    );
    const made = { place, shift };
    pairs.set(key, made);
    return made;
  };
  return (left, right) => {
    const [a, b] = [elementAt(quotient, left), elementAt(quotient, right)];
    const { place, shift } = pair(a.place, b.place);
    const rotation = rotations[operatorOf(quotient, a)] as readonly number[];
    const moved = timesColumnIntegers(rotation, quotient.translations[b.translation] as readonly number[]);
    const own = quotient.translations[a.translation] as readonly number[];
    const sum = moved.map((entry, axis) => entry + (own[axis] as number) + (shift[axis] as number));
    return elementIndex(quotient, {
      place,
      translation: translationNumber(quotient, sum),
      timeReversal: (a.timeReversal * b.timeReversal) as 1 | -1,
    });
  };
}

/** A few of the elements of a subgroup that generate it. */
export function generatorsOfSubgroup(
  elements: readonly number[],
  product: (left: number, right: number) => number,
): number[] {
  const generators: number[] = [];
  const reached = new Set<number>([0]);
  for (const element of elements) {
    if (reached.has(element)) continue;
    generators.push(element);
    const queue = [...reached];
    for (let next = queue.pop(); next !== undefined; next = queue.pop())
      for (const generator of generators) {
        const target = product(next, generator);
        if (reached.has(target)) continue;
        reached.add(target);
        queue.push(target);
      }
  }
  return generators;
}
