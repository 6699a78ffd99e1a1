import { gcdOf, type IntegerMatrix, integerDeterminant } from "../numbers/index.js";
import { rotationType } from "./point-groups.js";

/**
 * The key that puts the operators of a group into their fixed order. It is read off the rotation alone, so the order
 * depends on the set of operators and not on how the group was given:
 *
 * 1. proper operators before improper ones;
 * 2. by the order of the proper part: 1, 2, 3, 4, 6;
 * 3. by its axis: short axes first, among equals c before b before a;
 * 4. the sense of rotation: positive about the axis first.
 *
 * Two operators of one point group never have the same key. It comes out as in International Tables A for most groups
 * of low symmetry (`x,y,z`, then 2 along c, b, a, then -1 and the planes in the same order).
 *
 * @param rotation integer matrix in the primitive basis, from which type and determinant are taken
 * @param settingRotation the same operator's numerators in the axes of the setting
 */
export function operatorKey(rotation: IntegerMatrix, settingRotation: IntegerMatrix, denominator: number): number[] {
  const determinant = integerDeterminant(rotation);
  const order = Math.abs(rotationType(rotation) ?? 0);
  const proper = settingRotation.map((entry) => determinant * entry);
  const axis = rotationAxis(proper, denominator);
  const length = axis[0] ** 2 + axis[1] ** 2 + axis[2] ** 2;
  return [-determinant, order, length, -axis[2], -axis[1], -axis[0], -rotationSense(proper, axis)];
}

export function compareKeys(a: readonly number[], b: readonly number[]): number {
  for (let index = 0; index < a.length; index++) {
    const difference = (a[index] as number) - (b[index] as number);
    if (difference !== 0) return difference;
  }
  return 0;
}

type Axis = readonly [number, number, number];

/** The axis of a proper rotation as coprime integers, first non-zero one positive; zero for the identity. */
function rotationAxis(proper: IntegerMatrix, denominator: number): Axis {
  const shifted = proper.map((entry, index) => (index % 4 === 0 ? entry - denominator : entry));
  const rows = [0, 3, 6].map((start) => shifted.slice(start, start + 3) as unknown as Axis);
  // W − 1 has rank two, so that some two of its rows span the plane which the axis is normal to.
  for (const [first, second] of [
    [0, 1],
    [0, 2],
    [1, 2],
  ] as const) {
    const found = crossProduct(rows[first] as Axis, rows[second] as Axis);
    if (found.some((entry) => entry !== 0)) return coprime(found);
  }
  return [0, 0, 0];
}

/** +1, −1, or 0 where both senses are the same rotation: the sign of det(u, v, W v) for some v off the axis u. */
function rotationSense(proper: IntegerMatrix, axis: Axis): number {
  for (const v of [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ] as const) {
    const image = [0, 3, 6].map(
      (start) =>
        (proper[start] as number) * v[0] + (proper[start + 1] as number) * v[1] + (proper[start + 2] as number) * v[2],
    ) as unknown as Axis;
    const normal = crossProduct(v, image);
    const sense = axis[0] * normal[0] + axis[1] * normal[1] + axis[2] * normal[2];
    if (sense !== 0) return Math.sign(sense);
  }
  return 0;
}

function crossProduct(a: Axis, b: Axis): Axis {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

function coprime(axis: Axis): Axis {
  const divisor = gcdOf(axis);
  const lead = axis.find((entry) => entry !== 0) ?? 1;
  const scale = divisor * Math.sign(lead);
  return [axis[0] / scale + 0, axis[1] / scale + 0, axis[2] / scale + 0];
}
