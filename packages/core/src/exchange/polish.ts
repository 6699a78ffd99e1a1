import type { LowestBranch } from "./interaction.js";

/** Where a descent ended. */
export interface Descent {
  readonly x: Float64Array;
  readonly value: number;
}

const mostSteps = 120;
const mostHalvings = 40;
const mostTidyings = 200;

/**
 * Goes down from a point: quasi-Newton steps with the update of Broyden, Fletcher, Goldfarb and Shanno (J. Nocedal & S. J.
 * Wright, Numerical Optimization, 2006, chapter 6), then a search along the axes with shrinking steps, which also ends
 * well where two eigenvalues meet and the slope jumps.
 *
 * @param size length that counts as a long way, Å⁻¹
 */
export function descend(
  branch: (x: ArrayLike<number>) => LowestBranch,
  start: ArrayLike<number>,
  size: number,
  scale: number,
): Descent {
  const rank = start.length;
  let x = Float64Array.from(start);
  let here = branch(x);
  let inverse = scaledUnit(rank, (size * size) / (40 * scale));
  for (let step = 0; step < mostSteps; step++) {
    const slope = here.slope;
    const gradient = Math.hypot(...slope);
    if (gradient * size <= 1e-13 * scale) break;
    let direction = times(inverse, slope, rank).map((entry) => -entry);
    if (inner(direction, slope) >= 0) {
      inverse = scaledUnit(rank, (size * size) / (40 * scale));
      direction = slope.map((entry) => (-entry * size * size) / (40 * scale));
    }
    const length = Math.hypot(...direction);
    if (length > size / 4) direction = direction.map((entry) => (entry * size) / (4 * length));
    const taken = lineStep(branch, x, here, direction);
    if (taken === null) break;
    const moved = taken.x.map((entry, axis) => entry - (x[axis] as number));
    const change = taken.here.slope.map((entry, axis) => entry - (slope[axis] as number));
    inverse = updated(inverse, moved, change, rank);
    ({ x, here } = taken);
  }
  return tidied(branch, x, here.value, size, scale);
}

function lineStep(
  branch: (x: ArrayLike<number>) => LowestBranch,
  x: Float64Array,
  here: LowestBranch,
  direction: Float64Array,
): { x: Float64Array<ArrayBuffer>; here: LowestBranch } | null {
  const fall = inner(direction, here.slope);
  for (let halving = 0, share = 1; halving < mostHalvings; halving++, share /= 2) {
    const trial = x.map((entry, axis) => entry + share * (direction[axis] as number));
    const next = branch(trial);
    if (next.value <= here.value + 1e-4 * share * fall && next.value < here.value)
      return { x: trial as Float64Array<ArrayBuffer>, here: next };
    // Below rounding the values tell nothing; a slope that shrinks does.
    if (
      Math.abs(next.value - here.value) <= 1e-14 * Math.abs(here.value) &&
      Math.hypot(...next.slope) < 0.5 * Math.hypot(...here.slope)
    )
      return { x: trial as Float64Array<ArrayBuffer>, here: next };
  }
  return null;
}

/** Steps along the axes, halved when none leads down: little is left to do where the slope was smooth. */
function tidied(
  branch: (x: ArrayLike<number>) => LowestBranch,
  from: Float64Array,
  at: number,
  size: number,
  scale: number,
): Descent {
  let x = from;
  let value = at;
  let left = mostTidyings;
  for (let step = 1e-4 * size; step > 1e-9 * size && left > 0; step /= 4) {
    let moved = false;
    for (let axis = 0; axis < x.length; axis++)
      for (const sign of [1, -1]) {
        const trial = x.slice();
        trial[axis] = (trial[axis] as number) + sign * step;
        const next = branch(trial).value;
        // Rounding must not push a point off the place where the slope vanished.
        if (next < value - 1e-13 * scale) {
          [x, value] = [trial, next];
          moved = true;
        }
      }
    left -= 1;
    if (moved) step *= 4;
  }
  return { x, value };
}

function scaledUnit(rank: number, factor: number): Float64Array {
  return Float64Array.from({ length: rank * rank }, (_, at) => (Math.floor(at / rank) === at % rank ? factor : 0));
}

function inner(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, entry, axis) => sum + entry * (b[axis] as number), 0);
}

function times(matrix: Float64Array, vector: Float64Array, rank: number): Float64Array {
  return vector.map((_, row) =>
    vector.reduce((sum, entry, column) => sum + (matrix[row * rank + column] as number) * entry, 0),
  );
}

/** The inverse Hessian after a step s with change of slope y (Nocedal & Wright, equation 6.17). */
function updated(inverse: Float64Array, s: Float64Array, y: Float64Array, rank: number): Float64Array {
  const sy = inner(s, y);
  if (!(sy > 1e-12 * Math.hypot(...s) * Math.hypot(...y))) return inverse;
  const hy = times(inverse, y, rank);
  const factor = (1 + inner(y, hy) / sy) / sy;
  return inverse.map((entry, at) => {
    const [row, column] = [Math.floor(at / rank), at % rank];
    const [sr, sc] = [s[row] as number, s[column] as number];
    return entry + factor * sr * sc - ((hy[row] as number) * sc + sr * (hy[column] as number)) / sy;
  });
}
