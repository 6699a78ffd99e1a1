/**
 * Cholesky factor of a symmetric positive definite matrix: lower triangular `L` with `L Lᵀ = matrix`, both n × n row by
 * row. Null when the matrix is not positive definite to working precision, that is when a pivot falls below
 * `pivotShare` of its diagonal entry (G. H. Golub & C. F. Van Loan, Matrix Computations, section 4.2).
 */
export function choleskyFactor(matrix: ArrayLike<number>, size: number, pivotShare = 1e-12): Float64Array | null {
  const factor = new Float64Array(size * size);
  for (let row = 0; row < size; row++) {
    for (let column = 0; column <= row; column++) {
      let rest = matrix[row * size + column] as number;
      for (let k = 0; k < column; k++)
        rest -= (factor[row * size + k] as number) * (factor[column * size + k] as number);
      if (column < row) {
        factor[row * size + column] = rest / (factor[column * size + column] as number);
        continue;
      }
      const diagonal = matrix[row * size + row] as number;
      if (!(rest > pivotShare * diagonal) || !(diagonal > 0)) return null;
      factor[row * size + row] = Math.sqrt(rest);
    }
  }
  return factor;
}

/** The solution x of `L Lᵀ x = right`. */
export function choleskySolve(factor: Float64Array, right: ArrayLike<number>): Float64Array {
  const size = right.length;
  const x = Float64Array.from(right);
  for (let row = 0; row < size; row++) {
    for (let k = 0; k < row; k++) x[row] = (x[row] as number) - (factor[row * size + k] as number) * (x[k] as number);
    x[row] = (x[row] as number) / (factor[row * size + row] as number);
  }
  for (let row = size - 1; row >= 0; row--) {
    for (let k = row + 1; k < size; k++)
      x[row] = (x[row] as number) - (factor[k * size + row] as number) * (x[k] as number);
    x[row] = (x[row] as number) / (factor[row * size + row] as number);
  }
  return x;
}

/** The inverse of `L Lᵀ`, n × n row by row. */
export function choleskyInverse(factor: Float64Array, size: number): Float64Array {
  const inverse = new Float64Array(size * size);
  for (let column = 0; column < size; column++) {
    const unit = new Float64Array(size);
    unit[column] = 1;
    choleskySolve(factor, unit).forEach((entry, row) => {
      inverse[row * size + column] = entry;
    });
  }
  return inverse;
}

/** ln det of `L Lᵀ`. */
export function choleskyLogDeterminant(factor: Float64Array, size: number): number {
  let sum = 0;
  for (let row = 0; row < size; row++) sum += 2 * Math.log(factor[row * size + row] as number);
  return sum;
}
