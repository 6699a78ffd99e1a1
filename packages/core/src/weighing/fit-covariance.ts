import type { WeightedResiduals } from "../algorithms/index.js";
import { normalEquations } from "./bounded-fit.js";
import { symmetricEigen } from "./symmetric-eigen.js";

/** What the data say of the parameters at a minimum. */
export interface FitCovariance {
  /** Pseudo-inverse of the normal matrix, size × size. */
  readonly matrix: Float64Array;
  /** Directions (unit rows, in parameters scaled to one sensitivity) that the data do not see. */
  readonly unseen: readonly Float64Array[];
  /** Number of directions that they see. */
  readonly rank: number;
}

/** Share of the largest eigenvalue of the scaled normal matrix below which a direction is not seen. */
const unseenShare = 1e-9;

/**
 * Covariance by eigenvectors of the normal matrix scaled to a unit diagonal; directions without curvature are left out of
 * it and listed.
 *
 * @param scaleOf size of a typical step of each parameter, so that μB and fractions compare
 */
export function fitCovariance(rows: WeightedResiduals, size: number, scaleOf: ArrayLike<number>): FitCovariance {
  const { normal } = normalEquations(rows, size);
  const scaled = Float64Array.from(normal, (entry, at) => {
    const [row, column] = [Math.floor(at / size), at % size];
    return entry * (scaleOf[row] as number) * (scaleOf[column] as number);
  });
  const { values, vectors } = symmetricEigen(scaled, size);
  const largest = values.reduce((most, value) => Math.max(most, value), 0);
  const matrix = new Float64Array(size * size);
  const unseen: Float64Array[] = [];
  values.forEach((value, index) => {
    const vector = vectors[index] as Float64Array;
    if (!(value > unseenShare * largest)) {
      unseen.push(vector);
      return;
    }
    for (let row = 0; row < size; row++)
      for (let column = 0; column < size; column++) {
        const [left, right] = [
          (vector[row] as number) * (scaleOf[row] as number),
          (vector[column] as number) * (scaleOf[column] as number),
        ];
        matrix[row * size + column] = (matrix[row * size + column] as number) + (left * right) / value;
      }
  });
  return { matrix, unseen, rank: size - unseen.length };
}

/** Standard uncertainty of a quantity with this gradient. */
export function propagated({ matrix }: FitCovariance, gradient: ArrayLike<number>): number {
  const size = gradient.length;
  let sum = 0;
  for (let row = 0; row < size; row++)
    for (let column = 0; column < size; column++)
      sum += (gradient[row] as number) * (matrix[row * size + column] as number) * (gradient[column] as number);
  return Math.sqrt(Math.max(0, sum));
}
