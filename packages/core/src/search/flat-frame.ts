import { usedParameters, type WaveVector } from "../kvectors/index.js";
import { type RationalVector, toNumber } from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";

/**
 * The flat of a kind of k with Cartesian coordinates: `κ(t) = origin + Σ_a t_a axes_a` in the dual of the primitive
 * basis, where L* is Z³. The axes are orthonormal in the metric, so that t is in Å⁻¹ (r.l.u. for h k l).
 */
export interface FlatFrame {
  readonly form: WaveVector;
  readonly dimension: number;
  /** A point of the flat that no symmetry leaves in place. */
  readonly origin: readonly [number, number, number];
  readonly axes: readonly (readonly [number, number, number])[];
  /** Metric of the dual of the primitive basis, nine numbers. */
  readonly metric: readonly number[];
  /** Letters at the origin. */
  readonly originLetters: readonly number[];
  /** dimension × dimension row by row: ∂letter_i/∂t_a. */
  readonly lettersFromAxes: Float64Array;
}

/** Letters of the origin: no simple fractions, nor near one another, so that no operator leaves it in place. */
const genericLetters = [0.2360679775, 0.1428148067, 0.0737205808] as const;

export function flatFrame(group: SpaceGroup, form: WaveVector, metric: readonly number[]): FlatFrame {
  const letters = usedParameters(form);
  const rowOf = (part: (component: WaveVector["components"][0]) => RationalVector[0]): [number, number, number] =>
    numbers(toPrimitiveRow(group.lattice, form.components.map(part) as unknown as RationalVector));
  const base = rowOf((component) => component.constant);
  const directions = letters.map((letter) => rowOf((component) => component.coefficients[letter as 0 | 1 | 2]));
  const dimension = directions.length;
  const axes: [number, number, number][] = [];
  // Gram and Schmidt: direction_i = Σ_a lower[i][a] axis_a.
  const lower = new Float64Array(dimension * dimension);
  directions.forEach((direction, i) => {
    let rest = direction;
    axes.forEach((axis, a) => {
      const share = inner(metric, direction, axis);
      lower[i * dimension + a] = share;
      rest = added(rest, axis, -share);
    });
    const length = Math.sqrt(inner(metric, rest, rest));
    lower[i * dimension + i] = length;
    axes.push([rest[0] / length, rest[1] / length, rest[2] / length]);
  });
  const originLetters = genericLetters.slice(0, dimension);
  return {
    form,
    dimension,
    origin: originLetters.reduce((point, value, i) => added(point, directions[i] as Triple, value), base),
    axes,
    metric,
    originLetters,
    lettersFromAxes: transposedInverse(lower, dimension),
  };
}

export type Triple = readonly [number, number, number];

/** `κ(t)`. */
export function pointAt(frame: FlatFrame, t: ArrayLike<number>): [number, number, number] {
  return frame.axes.reduce<[number, number, number]>(
    (point, axis, a) => added(point, axis, t[a] as number),
    [...frame.origin],
  );
}

/** Values of the letters at t. */
export function lettersAt(frame: FlatFrame, t: ArrayLike<number>): number[] {
  const { dimension, lettersFromAxes } = frame;
  return frame.originLetters.map((value, i) => {
    let sum = value;
    for (let a = 0; a < dimension; a++) sum += (lettersFromAxes[i * dimension + a] as number) * (t[a] as number);
    return sum;
  });
}

/** Coordinates along the axes of a vector, and the squared length of what is left across. */
export function alongAxes(frame: FlatFrame, vector: Triple): { along: number[]; across: number } {
  const along = frame.axes.map((axis) => inner(frame.metric, vector, axis));
  const across = inner(frame.metric, vector, vector) - along.reduce((sum, entry) => sum + entry * entry, 0);
  return { along, across: Math.max(0, across) };
}

export function inner(metric: readonly number[], a: Triple, b: Triple): number {
  let sum = 0;
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) sum += (a[i] as number) * (metric[3 * i + j] as number) * (b[j] as number);
  return sum;
}

function added(a: Triple, b: Triple, share: number): [number, number, number] {
  return [a[0] + share * b[0], a[1] + share * b[1], a[2] + share * b[2]];
}

function numbers(row: RationalVector): [number, number, number] {
  return [toNumber(row[0]), toNumber(row[1]), toNumber(row[2])];
}

/** t = lettersᵀ · lower, so ∂letter_i/∂t_a is the transposed inverse of the lower triangle. */
function transposedInverse(lower: Float64Array, size: number): Float64Array {
  const result = new Float64Array(size * size);
  for (let a = 0; a < size; a++) {
    // Row a of lower⁻¹, by substitution from its diagonal down.
    for (let column = a; column >= 0; column--) {
      let sum = column === a ? 1 : 0;
      for (let k = column + 1; k <= a; k++)
        sum -= (result[k * size + a] as number) * (lower[k * size + column] as number);
      result[column * size + a] = sum / (lower[column * size + column] as number);
    }
  }
  return result;
}
