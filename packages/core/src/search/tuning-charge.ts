import { choleskyFactor, choleskyLogDeterminant } from "../algorithms/index.js";
import type { TunedSet } from "./tuned-set.js";

/**
 * −ln V, the charge for having tuned the letters of k, at least 0, in closed form (Laplace's method):
 * `ln V = min(0, (d/2) ln 2π − ½ ln det(A + prior) − ln W − ln m)`, with A the normal matrix of the matched peaks and
 * `prior = 2π W^(−2/d)` in an orthonormal basis of the set, W its volume and m the images of k that coincide.
 *
 * @param jacobian rows `∂calculated/∂letter / s` of the matched observations
 */
export function tuningCharge(set: TunedSet, jacobian: Float64Array): number {
  const { dimension, gram, volume, coincidentImages } = set;
  if (dimension === 0) return 0;
  const prior = 2 * Math.PI * volume ** (-2 / dimension);
  // det in an orthonormal basis = det(Jᵀ J + prior · G) / det G with the Gram matrix G of the letters.
  const matrix = gram.map((entry) => prior * entry);
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
