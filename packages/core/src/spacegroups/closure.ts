import { fail } from "../errors/index.js";
import {
  formatRational,
  type IntegerMatrix,
  modulo,
  multiplyIntegerMatrices,
  type RationalVector,
  rational,
  vectorFrom,
} from "../numbers/index.js";
import { fromPrimitiveColumn } from "./lattices.js";
import { identityOperator, sameIntegers } from "./operators.js";
import { rotationType } from "./point-groups.js";
import { composeElements, type PrimitiveElement, toPrimitiveElements } from "./primitive-elements.js";
import { formatTriplet } from "./triplets.js";
import type { Lattice, SymmetryOperator } from "./types.js";

/** Largest point group of a crystal: m-3m. */
const largestPointGroup = 48;

interface Reached extends PrimitiveElement {
  /** Indices of the given operators whose product this is, for messages. */
  readonly word: readonly number[];
}

/**
 * All operators modulo L that the given ones generate, in the primitive basis, by the plain coset algorithm: right
 * multiplication of every element reached by every generator needed. Where two products have one rotation, their translations
 * must agree modulo L; nothing is added to L silently.
 *
 * @param columns where each operator stands in the user's text, for errors
 * @throws `not-a-group`, naming the operator or the product at fault
 */
export function closeOperators(
  lattice: Lattice,
  operators: readonly SymmetryOperator[],
  columns?: readonly number[],
): { elements: readonly PrimitiveElement[]; denominator: number } {
  const { elements, denominator } = toPrimitiveElements(lattice, operators);
  const report = (word: readonly number[], problem: string, remedy: string): never =>
    refuse(operators, word, columns, problem, remedy);
  const generators = elements.map(({ rotation, translation }, index): Reached => {
    if (rotation === null)
      return report(
        [index],
        "does not map the translation lattice to itself",
        "the matrix must take every lattice vector (centring vectors too) to a lattice vector, and back",
      );
    if (!hasFiniteOrder(rotation))
      return report([index], "has no power that is a translation", "rotations of a crystal have order 1, 2, 3, 4 or 6");
    return { rotation, translation, word: [index] };
  });
  return { elements: multiplyOut(lattice, generators, denominator, report), denominator };
}

/**
 * Takes the given operators one after the other: one whose rotation is reached already is only compared, so that a
 * complete list costs little more than its generators.
 */
function multiplyOut(
  lattice: Lattice,
  given: readonly Reached[],
  denominator: number,
  report: (word: readonly number[], problem: string, remedy: string) => never,
): readonly PrimitiveElement[] {
  const identity: Reached = { rotation: identityOperator.rotation, translation: [0, 0, 0], word: [] };
  const reached = new Map<string, Reached>([[identity.rotation.join(), identity]]);
  const generators: Reached[] = [];
  // True when the element is new; its translation must be the known one otherwise.
  const reach = (element: Reached): boolean => {
    const key = element.rotation.join();
    const translation = element.translation.map((entry) => modulo(entry, denominator));
    const known = reached.get(key);
    if (known === undefined) {
      if (reached.size === largestPointGroup || !hasFiniteOrder(element.rotation))
        report(element.word, "leads to infinitely many rotations", "the matrices together fit no crystal class");
      reached.set(key, { ...element, translation });
      return true;
    }
    if (known.translation.every((entry, index) => entry === translation[index])) return false;
    const extra = translation.map((entry, index) => entry - (known.translation[index] as number));
    const vector = fromPrimitiveColumn(lattice, vectorFrom(extra, denominator));
    const other = known.word.length === 0 ? "is" : `differs from ${listed(known.word)} by`;
    return report(
      element.word,
      `${other} the translation ${tuple(vector)}, which is no lattice vector`,
      centringRemedy(vector),
    );
  };
  for (const operator of given) {
    if (!reach(operator)) continue;
    generators.push(operator);
    for (const element of reached.values())
      for (const generator of generators)
        reach({ ...composeElements(element, generator), word: [...element.word, ...generator.word] });
  }
  return [...reached.values()].map(({ rotation, translation }) => ({ rotation, translation }));
}

/** True when the matrix is that of a rotation of a crystal: its type's power is the identity. */
function hasFiniteOrder(rotation: IntegerMatrix): boolean {
  const type = rotationType(rotation);
  if (type === null) return false;
  const square = multiplyIntegerMatrices(rotation, rotation);
  let power: IntegerMatrix = square;
  // An improper operator of odd order n needs 2n steps; squares serve all orders alike.
  for (let step = 1; step < Math.abs(type); step++) power = multiplyIntegerMatrices(power, square);
  return sameIntegers(power, identityOperator.rotation);
}

function refuse(
  operators: readonly SymmetryOperator[],
  word: readonly number[],
  columns: readonly number[] | undefined,
  problem: string,
  remedy: string,
): never {
  const culprit = word[word.length - 1] as number;
  const triplet = formatTriplet(operators[culprit] as SymmetryOperator);
  const subject =
    word.length === 1
      ? `operator ${culprit + 1} (${triplet})`
      : `the product ${listed(word)} of the operators given (${culprit + 1} is ${triplet})`;
  const column = columns?.[culprit];
  fail("not-a-group", `${subject} ${problem}`, {
    ...(column === undefined ? {} : { where: { column } }),
    expected: "operators that generate a space group on the lattice given",
    found: triplet,
    remedy,
  });
}

/** `2·3·2`: the operators multiplied, counted from 1. */
function listed(word: readonly number[]): string {
  return word.map((index) => index + 1).join("·");
}

function tuple(vector: RationalVector): string {
  return `(${vector.map(formatRational).join(",")})`;
}

function centringRemedy(vector: RationalVector): string {
  const terms = vector.map((entry, index) => {
    const rest = rational(modulo(entry[0], entry[1]), entry[1]);
    return `${"xyz"[index]}${rest[0] === 0 ? "" : `+${formatRational(rest)}`}`;
  });
  return `if it is meant as a centring, list ${terms.join(",")} among the operators; else correct the translation parts`;
}
