/** A complex Hermitian matrix, row by row: real and imaginary parts, `size × size` each. */
export interface HermitianMatrix {
  readonly size: number;
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** Eigenvalues in rising order; column `n` of the vectors (row by row, unit length) belongs to `values[n]`. */
export interface HermitianEigen {
  readonly values: Float64Array;
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

export function hermitianMatrix(size: number): HermitianMatrix {
  return { size, real: new Float64Array(size * size), imaginary: new Float64Array(size * size) };
}

const mostSweeps = 60;

/**
 * All eigenvalues and eigenvectors by cyclic Jacobi rotations (G. H. Golub & C. F. Van Loan, Matrix Computations,
 * section 8.5, with the phase of each pivot taken out first). Meant for the few atoms of a cell; accurate to rounding
 * also where eigenvalues coincide.
 */
export function hermitianEigen(matrix: HermitianMatrix): HermitianEigen {
  const { size } = matrix;
  const re = matrix.real.slice();
  const im = matrix.imaginary.slice();
  const vr = new Float64Array(size * size);
  const vi = new Float64Array(size * size);
  for (let n = 0; n < size; n++) vr[n * size + n] = 1;
  const scale = Math.hypot(...re, ...im);
  for (let sweep = 0; sweep < mostSweeps; sweep++) {
    let off = 0;
    for (let p = 0; p < size; p++)
      for (let q = p + 1; q < size; q++) {
        const size2 = (re[p * size + q] as number) ** 2 + (im[p * size + q] as number) ** 2;
        off += size2;
        if (size2 > 0) rotate(re, im, vr, vi, size, p, q, Math.sqrt(size2));
      }
    if (off <= (1e-16 * scale) ** 2) break;
  }
  return inOrder(re, vr, vi, size);
}

/** One rotation that makes the entry (p, q) zero: `A → G† A G`, `V → V G`. */
function rotate(
  re: Float64Array,
  im: Float64Array,
  vr: Float64Array,
  vi: Float64Array,
  size: number,
  p: number,
  q: number,
  modulus: number,
): void {
  const [phaseRe, phaseIm] = [(re[p * size + q] as number) / modulus, (im[p * size + q] as number) / modulus];
  const theta = ((re[q * size + q] as number) - (re[p * size + p] as number)) / (2 * modulus);
  const tangent = (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.hypot(1, theta));
  const cosine = 1 / Math.hypot(1, tangent);
  const sine = tangent * cosine;
  // Columns: p' = c p − s e^{−iφ} q, q' = s e^{iφ} p + c q.
  const columns = (a: Float64Array, b: Float64Array): void => {
    for (let row = 0; row < size; row++) {
      const at = row * size;
      const [pr, pi, qr, qi] = [a[at + p], b[at + p], a[at + q], b[at + q]] as [number, number, number, number];
      a[at + p] = cosine * pr - sine * (phaseRe * qr + phaseIm * qi);
      b[at + p] = cosine * pi - sine * (phaseRe * qi - phaseIm * qr);
      a[at + q] = sine * (phaseRe * pr - phaseIm * pi) + cosine * qr;
      b[at + q] = sine * (phaseRe * pi + phaseIm * pr) + cosine * qi;
    }
  };
  columns(re, im);
  columns(vr, vi);
  for (let column = 0; column < size; column++) {
    const [first, second] = [p * size + column, q * size + column];
    const [pr, pi, qr, qi] = [re[first], im[first], re[second], im[second]] as [number, number, number, number];
    re[first] = cosine * pr - sine * (phaseRe * qr - phaseIm * qi);
    im[first] = cosine * pi - sine * (phaseRe * qi + phaseIm * qr);
    re[second] = sine * (phaseRe * pr + phaseIm * pi) + cosine * qr;
    im[second] = sine * (phaseRe * pi - phaseIm * pr) + cosine * qi;
  }
  re[p * size + q] = re[q * size + p] = im[p * size + q] = im[q * size + p] = 0;
  im[p * size + p] = im[q * size + q] = 0;
}

function inOrder(re: Float64Array, vr: Float64Array, vi: Float64Array, size: number): HermitianEigen {
  const order = Array.from({ length: size }, (_, n) => n).sort(
    (a, b) => (re[a * size + a] as number) - (re[b * size + b] as number) || a - b,
  );
  const real = new Float64Array(size * size);
  const imaginary = new Float64Array(size * size);
  order.forEach((from, to) => {
    for (let row = 0; row < size; row++) {
      real[row * size + to] = vr[row * size + from] as number;
      imaginary[row * size + to] = vi[row * size + from] as number;
    }
  });
  return { values: Float64Array.from(order, (n) => re[n * size + n] as number), real, imaginary };
}

/**
 * Whether `matrix − shift·1` is positive definite, by Cholesky's factors of a copy in `work` (as large as the matrix):
 * by Sylvester's law exactly when every eigenvalue lies above `shift`, up to rounding.
 */
export function hermitianAbove(matrix: HermitianMatrix, shift: number, work: HermitianMatrix): boolean {
  const { size, real, imaginary } = matrix;
  const [re, im] = [work.real, work.imaginary];
  for (let row = 0; row < size; row++)
    for (let column = 0; column <= row; column++) {
      let sumRe = real[row * size + column] as number;
      let sumIm = imaginary[row * size + column] as number;
      for (let k = 0; k < column; k++) {
        const [ar, ai] = [re[row * size + k] as number, im[row * size + k] as number];
        const [br, bi] = [re[column * size + k] as number, im[column * size + k] as number];
        sumRe -= ar * br + ai * bi;
        sumIm -= ai * br - ar * bi;
      }
      if (column < row) {
        const pivot = re[column * size + column] as number;
        re[row * size + column] = sumRe / pivot;
        im[row * size + column] = sumIm / pivot;
        continue;
      }
      const rest = sumRe - shift;
      if (!(rest > 0)) return false;
      re[row * size + row] = Math.sqrt(rest);
      im[row * size + row] = 0;
    }
  return true;
}
