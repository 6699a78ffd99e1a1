import { choleskyFactor, choleskyInverse, choleskySolve } from "./cholesky.js";

/** Residuals already divided by their standard uncertainties, and their derivatives. */
export interface WeightedResiduals {
  /** `(observed − calculated) / s`, one per observation. */
  readonly residuals: Float64Array;
  /** `∂calculated/∂parameter / s`, row by row: observations × parameters. */
  readonly jacobian: Float64Array;
}

export interface LeastSquares {
  readonly parameters: Float64Array;
  /** Inverse normal matrix, parameters × parameters, not scaled by χ². */
  readonly covariance: Float64Array;
  readonly chiSquared: number;
  readonly iterations: number;
  readonly converged: boolean;
}

const mostIterations = 50;
const mostHalvings = 20;
/** A step below this share of every standard uncertainty changes nothing that could be reported. */
const stepShare = 1e-8;

/**
 * Weighted non-linear least squares by Gauss–Newton with step halving, so that χ² never rises (Å. Björck, Numerical
 * Methods for Least Squares Problems, 1996, section 9.2). Null when the observations do not fix the parameters: the
 * normal matrix is singular at the start.
 */
export function gaussNewton(
  start: ArrayLike<number>,
  model: (parameters: Float64Array) => WeightedResiduals,
): LeastSquares | null {
  const size = start.length;
  let parameters = Float64Array.from(start);
  let current = model(parameters);
  let chiSquared = sumOfSquares(current.residuals);
  let factor = choleskyFactor(normalMatrix(current, size), size);
  if (factor === null) return null;
  let iterations = 0;
  let converged = false;
  while (!converged && iterations < mostIterations) {
    iterations += 1;
    const step = choleskySolve(factor, gradient(current, size));
    const covariance = choleskyInverse(factor, size);
    converged = step.every(
      (entry, index) => Math.abs(entry) <= stepShare * Math.sqrt(covariance[index * size + index] as number),
    );
    const taken = converged ? null : shorten(parameters, step, chiSquared, model);
    // No shorter step lowers χ² either: rounding is all that is left.
    if (taken === null) {
      converged = true;
      break;
    }
    ({ parameters, current, chiSquared } = taken);
    const next = choleskyFactor(normalMatrix(current, size), size);
    if (next === null) break;
    factor = next;
  }
  return { parameters, covariance: choleskyInverse(factor, size), chiSquared, iterations, converged };
}

function shorten(
  parameters: Float64Array<ArrayBuffer>,
  step: Float64Array,
  chiSquared: number,
  model: (parameters: Float64Array) => WeightedResiduals,
): { parameters: Float64Array<ArrayBuffer>; current: WeightedResiduals; chiSquared: number } | null {
  for (let halving = 0, share = 1; halving < mostHalvings; halving++, share /= 2) {
    const trial = parameters.map((entry, index) => entry + share * (step[index] as number));
    const current = model(trial);
    const value = sumOfSquares(current.residuals);
    if (value < chiSquared) return { parameters: trial, current, chiSquared: value };
  }
  return null;
}

function sumOfSquares(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value * value, 0);
}

/** Jᵀ J. */
function normalMatrix({ residuals, jacobian }: WeightedResiduals, size: number): Float64Array {
  const matrix = new Float64Array(size * size);
  for (let observation = 0; observation < residuals.length; observation++)
    for (let a = 0; a < size; a++)
      for (let b = 0; b < size; b++)
        matrix[a * size + b] =
          (matrix[a * size + b] as number) +
          (jacobian[observation * size + a] as number) * (jacobian[observation * size + b] as number);
  return matrix;
}

/** Jᵀ r. */
function gradient({ residuals, jacobian }: WeightedResiduals, size: number): Float64Array {
  const sum = new Float64Array(size);
  residuals.forEach((residual, observation) => {
    for (let a = 0; a < size; a++)
      sum[a] = (sum[a] as number) + residual * (jacobian[observation * size + a] as number);
  });
  return sum;
}
