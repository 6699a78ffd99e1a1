import { dotIntegers, type IntegerMatrix } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { crossProduct } from "./flats.js";
import type { IntegerForm } from "./integer-form.js";
import { reciprocalDifference, rotateForm } from "./integer-form.js";

/** A matrix of the point group extended by −1, acting on primitive rows, `κ → κ M`. */
export interface ActingRotation {
  /** `±R`. */
  readonly matrix: IntegerMatrix;
  /** Whether the matrix belongs to the point group itself. */
  readonly own: boolean;
}

/** The point group extended by −1: its own rotations in the group's order, then what −1 adds. */
export function extendedPointGroup(group: SpaceGroup): readonly ActingRotation[] {
  const own = group.primitive.rotations.map((matrix) => ({ matrix, own: true }));
  const isInversion = (rotation: IntegerMatrix): boolean =>
    rotation.every((entry, index) => entry === (index % 4 === 0 ? -1 : 0));
  if (group.primitive.rotations.some(isInversion)) return own;
  return [...own, ...own.map(({ matrix }) => ({ matrix: matrix.map((entry) => 0 - entry), own: false }))];
}

/** Those that leave a form fixed modulo L*, for all values of its letters. */
export function fixingForm(acting: readonly ActingRotation[], form: IntegerForm): readonly ActingRotation[] {
  return acting.filter(({ matrix }) => reciprocalDifference(rotateForm(form, matrix), form) !== null);
}

/** Dimension of the rows that a group of matrices leaves fixed: its mean is the projection on them, so the mean trace. */
export function fixedDimension(group: readonly ActingRotation[]): 0 | 1 | 2 | 3 {
  const traces = group.reduce(
    (sum, { matrix }) => sum + (matrix[0] as number) + (matrix[4] as number) + (matrix[8] as number),
    0,
  );
  return (traces / group.length) as 0 | 1 | 2 | 3;
}

/**
 * Independent rows that span what some matrices leave fixed. A row d is fixed when `d · c = 0` for every column c of
 * every `M − 1`, so two independent columns give a line and one gives a plane.
 */
export function fixedRows(matrices: readonly ActingRotation[]): readonly (readonly number[])[] {
  let first: readonly number[] | null = null;
  let line: readonly number[] | null = null;
  for (const { matrix } of matrices)
    for (let column = 0; column < 3; column++) {
      const moved = [0, 1, 2].map((row) => (matrix[3 * row + column] as number) - (row === column ? 1 : 0));
      if (line !== null && dotIntegers(line, moved) !== 0) return [];
      if (first === null) first = moved.some((entry) => entry !== 0) ? moved : null;
      else if (line === null) {
        const normal = crossProduct(first, moved);
        line = normal.some((entry) => entry !== 0) ? normal : null;
      }
    }
  if (line !== null) return [line];
  if (first === null) return unitRows;
  const normal = first;
  const axis = normal.findIndex((entry) => entry !== 0);
  return unitRows.filter((_, index) => index !== axis).map((unit) => crossProduct(normal, unit));
}

const unitRows: readonly (readonly number[])[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];
