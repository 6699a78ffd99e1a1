import { choleskyFactor, choleskyLogDeterminant } from "../algorithms/index.js";
import type { TunedSet } from "./tuned-set.js";

/**
 * −ln V, the charge for having tuned the letters of k, at least 0, in closed form (Laplace's method):
 * `ln V = min(0, (d/2) ln 2π − ½ ln det(A + prior) − ln W − ln m)`, with A the normal matrix of the matched peaks and
 * `prior = 2π W^(−2/d)` in an orthonormal basis of the set, W its volume and m the images of k that coincide.
 *
 * Corrections refined with k (zero shift, scale of the cell) are further dimensions, each with W the width of its range.
 *
 * @param jacobian rows `∂calculated/∂parameter / s` of the matched observations, letters first, then corrections
 * @param ranges widths of the ranges of the corrections
 */
export function tuningCharge(set: TunedSet, jacobian: Float64Array, ranges: readonly number[] = []): number {
  const { coincidentImages } = set;
  const dimension = set.dimension + ranges.length;
  if (dimension === 0) return 0;
  const gram = new Float64Array(dimension * dimension);
  const priors = new Float64Array(dimension * dimension);
  const ofSet = 2 * Math.PI * set.volume ** (-2 / set.dimension);
  for (let a = 0; a < set.dimension; a++)
    for (let b = 0; b < set.dimension; b++) {
      gram[a * dimension + b] = set.gram[a * set.dimension + b] as number;
      priors[a * dimension + b] = ofSet * (gram[a * dimension + b] as number);
    }
  ranges.forEach((range, index) => {
    const at = (set.dimension + index) * (dimension + 1);
    gram[at] = 1;
    priors[at] = (2 * Math.PI) / (range * range);
  });
  const volume = ranges.reduce((product, range) => product * range, set.dimension === 0 ? 1 : set.volume);
  // det in an orthonormal basis = det(Jᵀ J + prior · G) / det G with the Gram matrix G of the letters.
  const matrix = priors.slice();
  for (let row = 0; row < jacobian.length; row += dimension)
    for (let a = 0; a < dimension; a++)
      for (let b = 0; b < dimension; b++)
        matrix[a * dimension + b] =
          (matrix[a * dimension + b] as number) + (jacobian[row + a] as number) * (jacobian[row + b] as number);
  const logDeterminant = logDeterminantOf(matrix, dimension) - logDeterminantOf(gram, dimension);
  const logVolume =
    (dimension / 2) * Math.log(2 * Math.PI) - logDeterminant / 2 - Math.log(volume) - Math.log(coincidentImages);
  return Math.max(0, -logVolume);
}

function logDeterminantOf(matrix: Float64Array, size: number): number {
  // The prior may be far smaller than the normal matrix, yet it is exact: no pivot is too small.
  const factor = choleskyFactor(matrix, size, 0);
  if (factor === null) throw new Error("a matrix that is positive definite by construction came out otherwise");
  return choleskyLogDeterminant(factor, size);
}
