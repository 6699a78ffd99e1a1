import { fail } from "../errors/index.js";
import {
  type IntegerMatrix,
  integerDeterminant,
  invert,
  lcm,
  multiplyIntegerMatrices,
  multiplyMatrices,
  overCommonDenominator,
  type Rational,
  safe,
  timesColumn,
} from "../numbers/index.js";
import { latticeMatrix } from "./lattices.js";
import { rotationOf, translationOf } from "./operators.js";
import type { Lattice, SymmetryOperator } from "./types.js";

/** An operator in the primitive basis of L: integer rotation, translation as numerators over a common denominator. */
export interface PrimitiveElement {
  readonly rotation: IntegerMatrix;
  readonly translation: IntegerMatrix;
}

/**
 * Operators in the primitive basis, exact and not reduced. `rotation` is null where the operator does not map L to
 * itself, that is where the matrix is not an integer one of determinant ±1.
 */
export function toPrimitiveElements(
  lattice: Lattice,
  operators: readonly SymmetryOperator[],
): { elements: { rotation: IntegerMatrix | null; translation: IntegerMatrix }[]; denominator: number } {
  const basis = latticeMatrix(lattice);
  const inverse = invert(basis);
  const exact = operators.map((operator) => ({
    rotation: multiplyMatrices(multiplyMatrices(inverse, rotationOf(operator)), basis).flat(),
    translation: timesColumn(inverse, translationOf(operator)),
  }));
  const denominator = exact.reduce(
    (common, { translation }) => lcm(common, overCommonDenominator(translation).denominator),
    1,
  );
  const elements = exact.map(({ rotation, translation }) => ({
    rotation: unimodular(rotation),
    translation: translation.map(([numerator, own]) => (numerator * denominator) / own),
  }));
  return { elements, denominator };
}

/** Products of three such numbers stay below 2^53, so that integer products of rotations are exact. */
const largestEntry = 2 ** 17;

function unimodular(entries: readonly Rational[]): IntegerMatrix | null {
  if (entries.some((entry) => entry[1] !== 1)) return null;
  const integers = entries.map((entry) => entry[0]);
  if (integers.some((entry) => Math.abs(entry) > largestEntry))
    fail("number-overflow", "the axes are so oblique that products of rotations leave the range of exact integers");
  return Math.abs(integerDeterminant(integers)) === 1 ? integers : null;
}

/** The product `a b`, translation not reduced: `{R₁R₂ | R₁t₂ + t₁}`. */
export function composeElements(a: PrimitiveElement, b: PrimitiveElement): PrimitiveElement {
  const moved = timesIntegers(a.rotation, b.translation);
  return {
    rotation: multiplyIntegerMatrices(a.rotation, b.rotation),
    translation: moved.map((entry, index) => entry + (a.translation[index] as number)),
  };
}

/** Integer matrix times integer column. */
export function timesIntegers(matrix: IntegerMatrix, column: readonly number[]): number[] {
  return [0, 3, 6].map((start) =>
    safe(
      (matrix[start] as number) * (column[0] as number) +
        (matrix[start + 1] as number) * (column[1] as number) +
        (matrix[start + 2] as number) * (column[2] as number),
    ),
  );
}
