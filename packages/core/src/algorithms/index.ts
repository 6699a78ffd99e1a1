/**
 * Numerical methods and the manners of long work; no physics. Cancel and progress for whoever started the work,
 * positive definite and Hermitian matrices, least squares, branch and bound over boxes, convex cells. Sources: Golub & Van
 * Loan, Matrix Computations; Björck, Numerical Methods for Least Squares Problems (1996); Hansen & Walster, Global
 * Optimization Using Interval Analysis (2004).
 */
export { type BoxProblem, type BoxSearch, boxSearch, mostLevels } from "./box-search.js";
export { breathe, breathMilliseconds } from "./breathe.js";
export { choleskyFactor, choleskyInverse, choleskyLogDeterminant, choleskySolve } from "./cholesky.js";
export { type DirichletCell, dirichletCell, type PointImage } from "./dirichlet-cell.js";
export { gaussNewton, type LeastSquares, type WeightedResiduals } from "./gauss-newton.js";
export { goldenSection } from "./golden-section.js";
export type { HalfSpace } from "./half-spaces.js";
export {
  type HermitianEigen,
  type HermitianMatrix,
  hermitianAbove,
  hermitianEigen,
  hermitianMatrix,
} from "./hermitian.js";
export { type LeastSquaresMinimum, levenbergMarquardt } from "./levenberg-marquardt.js";
export type { CancelSignal, WorkHost } from "./work-host.js";
