import { type LittleGroup, littleGroup, type WaveVector } from "../kvectors/index.js";
import { dotIntegers, gcd, type IntegerMatrix, lcm, modulo, multiplyIntegerMatrices, safe } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { type PrimitiveOperator, primitiveOperator } from "./primitive-operators.js";

/**
 * The little co-group of k as an abstract finite group with the factor system of its projective representations:
 * `Δ(g) Δ(h) = e^{2πi·factor(g,h)/order} Δ(gh)`, factor = H_g · t_h with `H = kR − k` (docs/conventions.md, Moments and
 * phases). Elements are numbered 0 … n − 1 in the little group's operator order; 0 is the identity.
 *
 * Translations are taken about the origin `p = (1/n) Σ t`, the mean over the co-group. There `t + (R − 1)p` lies in
 * (1/n)L (the averaging argument for the vanishing of the cohomology of a finite group), so whatever origin the user
 * has, the factors are roots of unity whose order divides that of the group.
 */
export interface LittleCoGroup {
  readonly littleGroup: LittleGroup;
  readonly size: number;
  /** `product[g * size + h]` is the number of gh. */
  readonly product: readonly number[];
  readonly inverse: readonly number[];
  /** Factors in units of 1/`factorOrder` turn, `factor[g * size + h]`. */
  readonly factor: readonly number[];
  readonly factorOrder: number;
  /** The mean origin p, primitive coordinates over `originDenominator`. */
  readonly origin: readonly [number, number, number];
  readonly originDenominator: number;
  /** The elements about the mean origin, translations over `originDenominator`. */
  readonly elements: readonly PrimitiveOperator[];
  /** Any operator of the group, by index, in the same way. */
  readonly aboutOrigin: (operator: number) => PrimitiveOperator;
}

export function littleCoGroup(group: SpaceGroup, k: WaveVector): LittleCoGroup {
  const little = littleGroup(group, k);
  const { rotations, translations, denominator } = group.primitive;
  const size = little.operators.length;
  const product = productTable(little.operators.map((operator) => rotations[operator] as IntegerMatrix));
  const inverse = Array.from({ length: size }, (_, g) => product.indexOf(0, g * size) - g * size);
  const origin = [0, 1, 2].map((axis) =>
    little.operators.reduce((sum, operator) => sum + (translations[operator]?.[axis] as number), 0),
  ) as [number, number, number];
  const originDenominator = safe(denominator * size);
  const aboutOrigin = (operator: number): PrimitiveOperator =>
    movedOrigin(primitiveOperator(group, operator), size, origin);
  const elements = little.operators.map(aboutOrigin);
  const factor = new Array<number>(size * size);
  for (let g = 0; g < size; g++)
    for (let h = 0; h < size; h++)
      factor[g * size + h] = modulo(
        dotIntegers(little.shifts[g] as readonly number[], elements[h]?.translation as readonly number[]),
        originDenominator,
      );
  return {
    littleGroup: little,
    size,
    product,
    inverse,
    ...reduced(factor, originDenominator),
    origin,
    originDenominator,
    elements,
    aboutOrigin,
  };
}

/** `product[g * size + h]`, the number of gh: a few columns are multiplied out, `g(hs) = (gh)s` gives the others. */
function productTable(rotations: readonly IntegerMatrix[]): number[] {
  const size = rotations.length;
  const numberOf = new Map(rotations.map((rotation, element) => [rotation.join(), element]));
  const product = new Array<number>(size * size);
  const column = (h: number, entry: (g: number) => number): void => {
    for (let g = 0; g < size; g++) product[g * size + h] = entry(g);
  };
  column(0, (g) => g);
  const known = new Set([0]);
  const generators: number[] = [];
  for (const [generator, matrix] of rotations.entries()) {
    if (known.has(generator)) continue;
    column(
      generator,
      (g) => numberOf.get(multiplyIntegerMatrices(rotations[g] as IntegerMatrix, matrix).join()) as number,
    );
    known.add(generator);
    generators.push(generator);
    for (const h of known)
      for (const s of generators) {
        const next = product[h * size + s] as number;
        if (known.has(next)) continue;
        column(next, (g) => product[(product[g * size + h] as number) * size + s] as number);
        known.add(next);
      }
  }
  return product;
}

/** `{R | t + (R − 1) p}` over `denominator · size`, t being given over `denominator`. */
function movedOrigin(
  { rotation, translation }: PrimitiveOperator,
  size: number,
  origin: readonly number[],
): PrimitiveOperator {
  const at = (row: number): number =>
    safe(
      size * (translation[row] as number) +
        dotIntegers(rotation.slice(3 * row, 3 * row + 3), origin) -
        (origin[row] as number),
    );
  return { rotation, translation: [at(0), at(1), at(2)] };
}

/** The factors over their smallest common denominator. */
function reduced(factor: readonly number[], denominator: number): { factor: number[]; factorOrder: number } {
  const factorOrder = factor.reduce((order, entry) => lcm(order, denominator / gcd(entry, denominator)), 1);
  return { factor: factor.map((entry) => entry / (denominator / factorOrder)), factorOrder };
}
