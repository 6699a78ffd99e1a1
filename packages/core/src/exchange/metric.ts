import { choleskyFactor, choleskyInverse } from "../algorithms/index.js";

/** The inverse of a positive definite matrix given row by row. */
export function invertSymmetric(matrix: readonly number[]): number[] {
  const size = Math.round(Math.sqrt(matrix.length));
  const factor = choleskyFactor(matrix, size);
  if (factor === null) throw new Error("a metric is not positive definite");
  return [...choleskyInverse(factor, size)];
}
