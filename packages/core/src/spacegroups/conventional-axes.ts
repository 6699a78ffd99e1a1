import {
  gcdOf,
  hermiteNormalForm,
  type IntegerMatrix,
  integerDeterminant,
  transposeIntegers,
} from "../numbers/index.js";
import { rotationType } from "./point-groups.js";
import { timesIntegers } from "./primitive-elements.js";
import type { SpaceGroup } from "./types.js";

type Column = readonly number[];

export type CrystalSystem = "triclinic" | "monoclinic" | "orthorhombic" | "tetragonal" | "hexagonal" | "cubic";

/** Trigonal classes are told with the hexagonal ones: both have hexagonal axes. */
export function crystalSystem(pointGroup: string): CrystalSystem {
  if (["1", "-1"].includes(pointGroup)) return "triclinic";
  if (["2", "m", "2/m"].includes(pointGroup)) return "monoclinic";
  if (["222", "mm2", "mmm"].includes(pointGroup)) return "orthorhombic";
  if (["23", "m-3", "432", "-43m", "m-3m"].includes(pointGroup)) return "cubic";
  return /^-?[36]/.test(pointGroup) ? "hexagonal" : "tetragonal";
}

/**
 * Axes that fit the rotations of a group, as columns in the primitive basis, right-handed: the shortest lattice vectors
 * along the axes of rotation, the unique axis as b (monoclinic) or c (tetragonal, hexagonal), the others in the plane
 * that its rotation keeps (R. W. Grosse-Kunstleve, Acta Cryst. A55 (1999) 383, section 3). Which of the equivalent axes
 * is which is left open.
 *
 * @param metric of the primitive basis, only to keep free choices short: nine numbers, invariant under the rotations
 */
export function fittingAxes({ primitive, pointGroup }: SpaceGroup, metric: readonly number[]): IntegerMatrix {
  const proper = primitive.rotations.map(properPart);
  const ofOrder = (order: number): IntegerMatrix[] => proper.filter((rotation) => rotationType(rotation) === order);
  switch (crystalSystem(pointGroup)) {
    case "triclinic":
      return rightHanded(reducedBasis(metric));
    case "monoclinic": {
      const rotation = ofOrder(2)[0] as IntegerMatrix;
      const [a, c] = planeBasis(rotation, metric);
      return rightHanded([a, axisOf(rotation), c]);
    }
    case "orthorhombic":
      return rightHanded(distinctAxes(ofOrder(2)));
    case "cubic": {
      const fourfold = ofOrder(4);
      return rightHanded(distinctAxes(fourfold.length > 0 ? fourfold : ofOrder(2)));
    }
    default: {
      const fourfold = ofOrder(4);
      const rotation = (fourfold.length > 0 ? fourfold : ofOrder(3))[0] as IntegerMatrix;
      const [shortest] = planeBasis(rotation, metric);
      return rightHanded([shortest, timesIntegers(rotation, shortest), axisOf(rotation)]);
    }
  }
}

/** det(R) R. */
function properPart(rotation: IntegerMatrix): IntegerMatrix {
  const determinant = integerDeterminant(rotation);
  return rotation.map((entry) => determinant * entry + 0);
}

/** Columns to a matrix, the last turned round where they are left-handed. */
function rightHanded(columns: readonly Column[]): IntegerMatrix {
  const matrix = transposeIntegers(columns.flat());
  return integerDeterminant(matrix) > 0 ? matrix : matrix.map((entry, index) => (index % 3 === 2 ? 0 - entry : entry));
}

/** The three different directions among the axes of the rotations. */
function distinctAxes(rotations: readonly IntegerMatrix[]): readonly Column[] {
  return [...new Map(rotations.map((rotation) => [axisOf(rotation).join(), axisOf(rotation)])).values()];
}

/** The shortest lattice vector along the axis of a proper rotation other than 1; its first non-zero entry positive. */
function axisOf(rotation: IntegerMatrix): Column {
  const m = rotation.map((entry, index) => (index % 4 === 0 ? entry - 1 : entry));
  const rows = [m.slice(0, 3), m.slice(3, 6), m.slice(6, 9)] as [Column, Column, Column];
  for (const [p, q] of [
    [rows[0], rows[1]],
    [rows[0], rows[2]],
    [rows[1], rows[2]],
  ] as const) {
    const normal = cross(p, q);
    const divisor = gcdOf(normal);
    if (divisor === 0) continue;
    const sign = (normal.find((entry) => entry !== 0) as number) < 0 ? -divisor : divisor;
    return normal.map((entry) => entry / sign + 0);
  }
  throw new RangeError("the identity has no axis");
}

/** A short basis of the lattice vectors in the plane that the rotation keeps: `h·x = 0` with `h R = h`. */
function planeBasis(rotation: IntegerMatrix, metric: readonly number[]): readonly [Column, Column] {
  const normal = axisOf(transposeIntegers(rotation));
  const rows = [0, 1, 2].map((index) => [normal[index] as number, ...[0, 1, 2].map((column) => +(index === column))]);
  const [first, second] = hermiteNormalForm(rows, 4)
    .filter((row) => row[0] === 0)
    .map((row) => row.slice(1)) as unknown as [Column, Column];
  const [a, b] = shortened([first, second], metric);
  return product(a as Column, a as Column, metric) <= product(b as Column, b as Column, metric)
    ? [a as Column, b as Column]
    : [b as Column, a as Column];
}

/** A short basis of the whole lattice. */
function reducedBasis(metric: readonly number[]): readonly Column[] {
  return shortened(
    [
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ],
    metric,
  );
}

/** Subtracts multiples of one basis vector from another as long as one becomes shorter (Gauss; pairwise in space). */
function shortened(basis: readonly Column[], metric: readonly number[]): readonly Column[] {
  const work = basis.map((vector) => [...vector]);
  for (let again = true; again; ) {
    again = false;
    for (const [index, vector] of work.entries())
      for (const [other, step] of work.entries()) {
        if (index === other) continue;
        const factor = Math.round(product(vector, step, metric) / product(step, step, metric));
        const next = vector.map((entry, axis) => entry - factor * (step[axis] as number));
        if (factor === 0 || product(next, next, metric) >= product(vector, vector, metric)) continue;
        vector.splice(0, 3, ...next);
        again = true;
      }
  }
  return work;
}

function product(a: Column, b: Column, metric: readonly number[]): number {
  let sum = 0;
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++)
      sum += (a[row] as number) * (metric[3 * row + column] as number) * (b[column] as number);
  return sum;
}

function cross(a: Column, b: Column): number[] {
  const [x, y, z] = a as [number, number, number];
  const [u, v, w] = b as [number, number, number];
  return [y * w - z * v, z * u - x * w, x * v - y * u];
}
