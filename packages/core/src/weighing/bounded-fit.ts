import { choleskyFactor, choleskySolve, type WeightedResiduals } from "../algorithms/index.js";

/** Where a parameter may lie; infinite where it is free. */
export interface Bounds {
  readonly lower: ArrayLike<number>;
  readonly upper: ArrayLike<number>;
}

export interface BoundedFit {
  readonly parameters: Float64Array;
  readonly chiSquared: number;
  readonly iterations: number;
  readonly converged: boolean;
}

/** How long a fit goes on. */
export interface FitPatience {
  readonly iterations: number;
  /** A step that lowers χ² by less than this share of it, or of the number of data, is the last. */
  readonly restShare: number;
}

/** To look where a start leads, and to settle in a minimum. */
export const quickPatience: FitPatience = { iterations: 60, restShare: 1e-7 };
export const thoroughPatience: FitPatience = { iterations: 1000, restShare: 1e-12 };

const largestDamping = 1e12;

/**
 * Weighted non-linear least squares in a box: Levenberg–Marquardt steps in the parameters that no bound holds back, cut at
 * the bounds, taken when χ² falls. Directions that the data do not see stay where they are, so that a singular problem
 * is no failure (J. Nocedal & S. J. Wright, Numerical Optimization, 2006, sections 10.3 and 16.7).
 *
 * @param model residuals `(observed − calculated)/s` and `∂calculated/∂parameter / s`
 */
export function boundedFit(
  start: ArrayLike<number>,
  bounds: Bounds,
  model: (parameters: Float64Array) => WeightedResiduals,
  { iterations: mostIterations, restShare }: FitPatience = thoroughPatience,
): BoundedFit {
  const size = start.length;
  let parameters = clipped(Float64Array.from(start), bounds);
  let current = model(parameters);
  let chiSquared = sumOfSquares(current.residuals);
  let damping = 1e-3;
  let iterations = 0;
  let converged = false;
  while (!converged && iterations < mostIterations) {
    iterations += 1;
    const { normal, gradient } = normalEquations(current, size);
    const free = Array.from({ length: size }, (_, index) => index).filter((index) => {
      const value = parameters[index] as number;
      const push = gradient[index] as number;
      return !(
        (value <= (bounds.lower[index] as number) && push < 0) ||
        (value >= (bounds.upper[index] as number) && push > 0)
      );
    });
    let taken = false;
    while (!taken && damping < largestDamping) {
      const trial = clipped(stepped(parameters, free, normal, gradient, damping, size), bounds);
      const next = model(trial);
      const value = sumOfSquares(next.residuals);
      if (value < chiSquared) {
        taken = true;
        converged = chiSquared - value <= restShare * Math.max(chiSquared, current.residuals.length);
        [parameters, current, chiSquared] = [trial, next, value];
        damping = Math.max(1e-12, damping / 8);
      } else damping *= 6;
    }
    if (!taken) converged = true;
  }
  return { parameters, chiSquared, iterations, converged };
}

function clipped(parameters: Float64Array<ArrayBuffer>, { lower, upper }: Bounds): Float64Array<ArrayBuffer> {
  return parameters.map((value, index) => Math.min(upper[index] as number, Math.max(lower[index] as number, value)));
}

/** `(JᵀJ + λ (diagonal + floor)) step = Jᵀr` on the free parameters. */
function stepped(
  parameters: Float64Array,
  free: readonly number[],
  normal: Float64Array,
  gradient: Float64Array,
  damping: number,
  size: number,
): Float64Array<ArrayBuffer> {
  const count = free.length;
  let largest = 0;
  for (const index of free) largest = Math.max(largest, normal[index * size + index] as number);
  const matrix = new Float64Array(count * count);
  const right = new Float64Array(count);
  for (let a = 0; a < count; a++) {
    const row = free[a] as number;
    right[a] = gradient[row] as number;
    for (let b = 0; b < count; b++) matrix[a * count + b] = normal[row * size + (free[b] as number)] as number;
    const diagonal = matrix[a * count + a] as number;
    matrix[a * count + a] = diagonal + damping * Math.max(diagonal, 1e-6 * largest) + Number.MIN_VALUE;
  }
  const trial = Float64Array.from(parameters);
  const factor = choleskyFactor(matrix, count, 1e-15);
  if (factor === null) return trial;
  const step = choleskySolve(factor, right);
  for (let a = 0; a < count; a++) {
    const index = free[a] as number;
    trial[index] = (trial[index] as number) + (step[a] as number);
  }
  return trial;
}

export function sumOfSquares(values: Float64Array): number {
  let sum = 0;
  for (let index = 0; index < values.length; index++) sum += (values[index] as number) ** 2;
  return sum;
}

/** JᵀJ and Jᵀr. */
export function normalEquations(
  { residuals, jacobian }: WeightedResiduals,
  size: number,
): { readonly normal: Float64Array; readonly gradient: Float64Array } {
  const normal = new Float64Array(size * size);
  const gradient = new Float64Array(size);
  for (let observation = 0; observation < residuals.length; observation++) {
    const start = observation * size;
    const residual = residuals[observation] as number;
    for (let a = 0; a < size; a++) {
      const left = jacobian[start + a] as number;
      if (left === 0) continue;
      gradient[a] = (gradient[a] as number) + left * residual;
      for (let b = 0; b <= a; b++)
        normal[a * size + b] = (normal[a * size + b] as number) + left * (jacobian[start + b] as number);
    }
  }
  for (let a = 0; a < size; a++) for (let b = 0; b < a; b++) normal[b * size + a] = normal[a * size + b] as number;
  return { normal, gradient };
}
