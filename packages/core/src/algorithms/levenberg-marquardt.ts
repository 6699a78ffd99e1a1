import { choleskyFactor, choleskySolve } from "./cholesky.js";
import type { WeightedResiduals } from "./gauss-newton.js";

export interface LeastSquaresMinimum {
  readonly parameters: Float64Array;
  /** Sum of the squared residuals. */
  readonly chiSquared: number;
  readonly iterations: number;
}

const mostIterations = 200;
const leastDamping = 1e-12;
const mostDamping = 1e12;

/**
 * Damped non-linear least squares (K. Levenberg, Q. Appl. Math. 2 (1944) 164; D. W. Marquardt, J. Soc. Ind. Appl. Math. 11
 * (1963) 431): unlike Gauss–Newton it also works where the observations do not fix every parameter. Parameters should be
 * of one scale.
 * Same convention as `gaussNewton`: residuals are observed − calculated, the Jacobian is that of the calculated values.
 *
 * @param options.enough stop when the sum of squares is at most this
 */
export function levenbergMarquardt(
  start: ArrayLike<number>,
  model: (parameters: Float64Array) => WeightedResiduals,
  options: { readonly enough?: number } = {},
): LeastSquaresMinimum {
  const size = start.length;
  let parameters = Float64Array.from(start);
  let current = model(parameters);
  let chiSquared = squares(current.residuals);
  let damping = 1e-3;
  let iterations = 0;
  while (iterations < mostIterations && chiSquared > (options.enough ?? 0) && damping < mostDamping) {
    iterations += 1;
    const step = dampedStep(current, size, damping);
    const trial = step && parameters.map((entry, index) => entry + (step[index] as number));
    const next = trial && model(trial);
    const value = next ? squares(next.residuals) : Number.POSITIVE_INFINITY;
    if (trial && next && value < chiSquared) {
      const gain = chiSquared - value;
      [parameters, current] = [trial, next];
      damping = Math.max(leastDamping, damping / 10);
      if (gain <= 1e-14 * chiSquared) break;
      chiSquared = value;
    } else damping *= 10;
  }
  return { parameters, chiSquared, iterations };
}

function squares(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

function dampedStep({ residuals, jacobian }: WeightedResiduals, size: number, damping: number): Float64Array | null {
  const normal = new Float64Array(size * size);
  const right = new Float64Array(size);
  for (let row = 0; row < residuals.length; row++)
    for (let a = 0; a < size; a++) {
      const entry = jacobian[row * size + a] as number;
      if (entry === 0) continue;
      right[a] = (right[a] as number) + entry * (residuals[row] as number);
      for (let b = 0; b < size; b++)
        normal[a * size + b] = (normal[a * size + b] as number) + entry * (jacobian[row * size + b] as number);
    }
  let largest = 0;
  for (let a = 0; a < size; a++) largest = Math.max(largest, normal[a * size + a] as number);
  // The same for all, after Levenberg: a share of each diagonal would send weakly determined parameters far away.
  for (let a = 0; a < size; a++) normal[a * size + a] = (normal[a * size + a] as number) + damping * largest;
  const factor = choleskyFactor(normal, size, 1e-16);
  return factor && choleskySolve(factor, right);
}
