/** Eigenvalues and eigenvectors (as rows) of a symmetric matrix. */
export interface SymmetricEigen {
  readonly values: Float64Array;
  readonly vectors: readonly Float64Array[];
}

const mostSweeps = 60;

/** Jacobi's method of plane rotations (G. H. Golub & C. F. Van Loan, Matrix Computations, section 8.5). */
export function symmetricEigen(matrix: ArrayLike<number>, size: number): SymmetricEigen {
  const a = Float64Array.from(matrix);
  const vectors = Array.from({ length: size }, (_, row) =>
    Float64Array.from({ length: size }, (__, at) => Number(row === at)),
  );
  const entry = (row: number, column: number): number => a[row * size + column] as number;
  for (let sweep = 0; sweep < mostSweeps; sweep++) {
    let off = 0;
    let all = 0;
    for (let row = 0; row < size; row++)
      for (let column = 0; column < size; column++) {
        all += entry(row, column) ** 2;
        if (row !== column) off += entry(row, column) ** 2;
      }
    if (off <= 1e-30 * all) break;
    for (let p = 0; p < size; p++) for (let q = p + 1; q < size; q++) rotate(a, vectors, size, p, q);
  }
  return { values: Float64Array.from({ length: size }, (_, index) => entry(index, index)), vectors };
}

/** Makes the entry (p, q) zero. */
function rotate(a: Float64Array, vectors: readonly Float64Array[], size: number, p: number, q: number): void {
  const apq = a[p * size + q] as number;
  if (apq === 0) return;
  const ratio = ((a[q * size + q] as number) - (a[p * size + p] as number)) / (2 * apq);
  const tangent = (ratio >= 0 ? 1 : -1) / (Math.abs(ratio) + Math.hypot(ratio, 1));
  const cosine = 1 / Math.hypot(tangent, 1);
  const sine = tangent * cosine;
  const turn = (values: Float64Array, first: number, second: number): void => {
    const [x, y] = [values[first] as number, values[second] as number];
    values[first] = cosine * x - sine * y;
    values[second] = sine * x + cosine * y;
  };
  for (let row = 0; row < size; row++) turn(a, row * size + p, row * size + q);
  for (let column = 0; column < size; column++) turn(a, p * size + column, q * size + column);
  const [first, second] = [vectors[p] as Float64Array, vectors[q] as Float64Array];
  for (let index = 0; index < size; index++) {
    const [x, y] = [first[index] as number, second[index] as number];
    first[index] = cosine * x - sine * y;
    second[index] = sine * x + cosine * y;
  }
}
