import type { WaveVector } from "@kvane/core/kvectors";
import type { SpaceGroup } from "@kvane/core/spacegroups";

/**
 * Space-group operators in plain floats, written from docs/conventions.md and used by the validators in place of
 * everything that core computes: composition, reduction modulo the lattice, the action on k. Only the list of
 * operators and the lattice basis are read from the record.
 */
export interface FloatOperator {
  /** R, row by row. */
  readonly rotation: readonly number[];
  readonly translation: readonly number[];
}

export interface FloatGroup {
  readonly operators: readonly FloatOperator[];
  /** Basis vectors of the translation lattice. */
  readonly basis: readonly (readonly number[])[];
  /** Rows of the matrix that turns a vector into its coordinates in `basis`. */
  readonly dual: readonly (readonly number[])[];
}

/** An operator as `{1|shift}` times number `index` of the list. */
export interface Reduced {
  readonly index: number;
  readonly shift: readonly number[];
}

const tolerance = 1e-6;

export function floatGroup(group: SpaceGroup): FloatGroup {
  const basis = group.lattice.vectors.map((vector) => vector.map((entry) => entry / group.lattice.denominator));
  return {
    operators: group.operators.map((operator) => ({
      rotation: operator.rotation.map((entry) => entry / operator.rotationDenominator),
      translation: operator.translation.map((entry) => entry / operator.translationDenominator),
    })),
    basis,
    dual: dualBasis(basis),
  };
}

function dualBasis(basis: readonly (readonly number[])[]): number[][] {
  const [a, b, c] = basis as [number[], number[], number[]];
  const volume = inner(a, crossProduct(b, c));
  return [crossProduct(b, c), crossProduct(c, a), crossProduct(a, b)].map((row) => row.map((entry) => entry / volume));
}

function crossProduct(a: readonly number[], b: readonly number[]): number[] {
  const [a1, a2, a3] = a as [number, number, number];
  const [b1, b2, b3] = b as [number, number, number];
  return [a2 * b3 - a3 * b2, a3 * b1 - a1 * b3, a1 * b2 - a2 * b1];
}

export function inner(a: readonly number[], b: readonly number[]): number {
  return (
    (a[0] as number) * (b[0] as number) + (a[1] as number) * (b[1] as number) + (a[2] as number) * (b[2] as number)
  );
}

/** R x on a column. */
export function turnColumn(rotation: readonly number[], x: readonly number[]): number[] {
  return [0, 3, 6].map(
    (row) =>
      (rotation[row] as number) * (x[0] as number) +
      (rotation[row + 1] as number) * (x[1] as number) +
      (rotation[row + 2] as number) * (x[2] as number),
  );
}

/** k R on a row. */
export function turnRow(k: readonly number[], rotation: readonly number[]): number[] {
  return [0, 1, 2].map(
    (column) =>
      (k[0] as number) * (rotation[column] as number) +
      (k[1] as number) * (rotation[3 + column] as number) +
      (k[2] as number) * (rotation[6 + column] as number),
  );
}

export function plus(a: readonly number[], b: readonly number[]): number[] {
  return a.map((entry, index) => entry + (b[index] as number));
}

export function minus(a: readonly number[], b: readonly number[]): number[] {
  return a.map((entry, index) => entry - (b[index] as number));
}

export function determinantOf(rotation: readonly number[]): number {
  return inner(rotation.slice(0, 3), crossProduct(rotation.slice(3, 6), rotation.slice(6, 9)));
}

/** R x + t. */
export function apply(operator: FloatOperator, x: readonly number[]): number[] {
  return plus(turnColumn(operator.rotation, x), operator.translation);
}

/** `{R₁|t₁}{R₂|t₂} = {R₁R₂ | R₁t₂ + t₁}`. */
export function compose(first: FloatOperator, second: FloatOperator): FloatOperator {
  const rotation = [0, 3, 6].flatMap((row) => turnRow(first.rotation.slice(row, row + 3), second.rotation));
  return { rotation, translation: apply(first, second.translation) };
}

export function inverse(operator: FloatOperator): FloatOperator {
  const rows = [0, 3, 6].map((row) => operator.rotation.slice(row, row + 3));
  const columns = dualBasis(rows);
  // The dual of the rows of R holds the columns of R⁻¹.
  const rotation = [0, 1, 2].flatMap((row) => columns.map((column) => column[row] as number));
  return { rotation, translation: turnColumn(rotation, operator.translation).map((entry) => -entry) };
}

/** Whole-number coordinates of a lattice vector in the basis, or null when x is no lattice vector. */
export function latticeCoordinates(group: FloatGroup, x: readonly number[]): number[] | null {
  const coordinates = group.dual.map((row) => inner(row, x));
  const rounded = coordinates.map((value) => Math.round(value) + 0);
  return coordinates.every((value, index) => Math.abs(value - (rounded[index] as number)) < tolerance) ? rounded : null;
}

/** The operator modulo lattice translations; throws when it is not in the group. */
export function reduce(group: FloatGroup, operator: FloatOperator): Reduced {
  for (let index = 0; index < group.operators.length; index++) {
    const candidate = group.operators[index] as FloatOperator;
    if (candidate.rotation.some((entry, at) => Math.abs(entry - (operator.rotation[at] as number)) > tolerance))
      continue;
    const shift = minus(operator.translation, candidate.translation);
    if (latticeCoordinates(group, shift) !== null) return { index, shift };
  }
  throw new Error(`an operator is not in the group: ${JSON.stringify(operator)}`);
}

/** H·T integer for every T of the lattice. */
export function isReciprocalVector(group: FloatGroup, row: readonly number[]): boolean {
  return group.basis.every((vector) => {
    const turns = inner(row, vector);
    return Math.abs(turns - Math.round(turns)) < tolerance;
  });
}

/**
 * Values put in for u, v, w. The components alone decide symmetry, so whatever is said must hold at any values; these
 * are used in place of measured ones, since nothing special is near them.
 */
export const letterValues: readonly number[] = [0.137_241, 0.311_073, 0.076_519];

/** The components as floats. */
export function componentsOf(k: WaveVector): number[] {
  return k.components.map((form) =>
    form.coefficients.reduce(
      (sum, [top, bottom], index) => (top === 0 ? sum : sum + (top / bottom) * (letterValues[index] as number)),
      form.constant[0] / form.constant[1],
    ),
  );
}

/** Operators with `k R⁻¹ ≡ sign·k` modulo L*, by index. */
export function operatorsTaking(group: FloatGroup, k: readonly number[], sign: 1 | -1): number[] {
  return group.operators.flatMap((operator, index) => {
    const image = turnRow(k, inverse(operator).rotation);
    const difference = image.map((entry, at) => entry - sign * (k[at] as number));
    return isReciprocalVector(group, difference) ? [index] : [];
  });
}

/** Number of distinct k R⁻¹ modulo L*. */
export function countArms(group: FloatGroup, k: readonly number[]): number {
  const arms: number[][] = [];
  for (const operator of group.operators) {
    const image = turnRow(k, inverse(operator).rotation);
    if (!arms.some((arm) => isReciprocalVector(group, minus(arm, image)))) arms.push(image);
  }
  return arms.length;
}
