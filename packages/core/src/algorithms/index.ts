/**
 * Numerical methods and the manners of long work; no physics. Cancel and progress for whoever started the work,
 * positive definite systems, non-linear least squares. Sources: Golub & Van Loan, Matrix Computations; Björck,
 * Numerical Methods for Least Squares Problems (1996).
 */
export { breathe, breathMilliseconds } from "./breathe.js";
export { choleskyFactor, choleskyInverse, choleskyLogDeterminant, choleskySolve } from "./cholesky.js";
export { gaussNewton, type LeastSquares, type WeightedResiduals } from "./gauss-newton.js";
export type { CancelSignal, WorkHost } from "./work-host.js";
