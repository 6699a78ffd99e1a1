/** Complex matrices in plain floats for the validators; nothing here comes from the code under test. */
export interface ComplexMatrix {
  readonly rows: number;
  readonly columns: number;
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

export type Complex = readonly [number, number];

export function zeroMatrix(rows: number, columns: number): ComplexMatrix {
  return { rows, columns, real: new Float64Array(rows * columns), imaginary: new Float64Array(rows * columns) };
}

export function unitMatrix(size: number): ComplexMatrix {
  const unit = zeroMatrix(size, size);
  for (let index = 0; index < size; index++) unit.real[index * size + index] = 1;
  return unit;
}

/** e^{2πi·turns} times the matrix. */
export function turned(matrix: ComplexMatrix, turns: number): ComplexMatrix {
  const cosine = Math.cos(2 * Math.PI * turns);
  const sine = Math.sin(2 * Math.PI * turns);
  return {
    ...matrix,
    real: matrix.real.map((value, index) => cosine * value - sine * (matrix.imaginary[index] as number)),
    imaginary: matrix.imaginary.map((value, index) => cosine * value + sine * (matrix.real[index] as number)),
  };
}

/** A real factor times the matrix. */
export function scaled(matrix: ComplexMatrix, factor: number): ComplexMatrix {
  return {
    ...matrix,
    real: matrix.real.map((value) => factor * value),
    imaginary: matrix.imaginary.map((value) => factor * value),
  };
}

export function product(a: ComplexMatrix, b: ComplexMatrix): ComplexMatrix {
  const result = zeroMatrix(a.rows, b.columns);
  for (let row = 0; row < a.rows; row++)
    for (let inner = 0; inner < a.columns; inner++) {
      const re = a.real[row * a.columns + inner] as number;
      const im = a.imaginary[row * a.columns + inner] as number;
      if (re === 0 && im === 0) continue;
      for (let column = 0; column < b.columns; column++) {
        const from = inner * b.columns + column;
        const to = row * b.columns + column;
        const otherRe = b.real[from] as number;
        const otherIm = b.imaginary[from] as number;
        result.real[to] = (result.real[to] as number) + re * otherRe - im * otherIm;
        result.imaginary[to] = (result.imaginary[to] as number) + re * otherIm + im * otherRe;
      }
    }
  return result;
}

export function conjugate(matrix: ComplexMatrix): ComplexMatrix {
  return { ...matrix, imaginary: matrix.imaginary.map((value) => -value) };
}

export function adjoint(matrix: ComplexMatrix): ComplexMatrix {
  const result = zeroMatrix(matrix.columns, matrix.rows);
  for (let row = 0; row < matrix.rows; row++)
    for (let column = 0; column < matrix.columns; column++) {
      result.real[column * matrix.rows + row] = matrix.real[row * matrix.columns + column] as number;
      result.imaginary[column * matrix.rows + row] = -(matrix.imaginary[row * matrix.columns + column] as number);
    }
  return result;
}

export function trace(matrix: ComplexMatrix): Complex {
  let re = 0;
  let im = 0;
  for (let index = 0; index < matrix.rows; index++) {
    re += matrix.real[index * matrix.columns + index] as number;
    im += matrix.imaginary[index * matrix.columns + index] as number;
  }
  return [re, im];
}

/** The largest difference of two entries; NaN counts as infinite. */
export function distance(a: ComplexMatrix, b: ComplexMatrix): number {
  let largest = a.rows === b.rows && a.columns === b.columns ? 0 : Number.POSITIVE_INFINITY;
  for (let index = 0; index < a.real.length; index++) {
    const size = Math.hypot(
      (a.real[index] as number) - (b.real[index] as number),
      (a.imaginary[index] as number) - (b.imaginary[index] as number),
    );
    if (!(size <= largest)) largest = Number.isNaN(size) ? Number.POSITIVE_INFINITY : size;
  }
  return largest;
}

/** Rank by elimination with full row pivoting; rows are scaled to length 1 first, a pivot below 1e-7 counts as zero. */
export function rank(matrix: ComplexMatrix): number {
  const { rows, columns } = matrix;
  const re: Float64Array[] = Array.from({ length: rows }, (_, row) =>
    matrix.real.slice(row * columns, (row + 1) * columns),
  );
  const im: Float64Array[] = Array.from({ length: rows }, (_, row) =>
    matrix.imaginary.slice(row * columns, (row + 1) * columns),
  );
  for (let row = 0; row < rows; row++) scaleRow(re[row] as Float64Array, im[row] as Float64Array);
  let top = 0;
  for (let column = 0; column < columns && top < rows; column++) {
    const pivot = largestBelow(re, im, column, top);
    if (pivot < 0) continue;
    [re[top], re[pivot]] = [re[pivot] as Float64Array, re[top] as Float64Array];
    [im[top], im[pivot]] = [im[pivot] as Float64Array, im[top] as Float64Array];
    for (let row = top + 1; row < rows; row++) clear(re, im, column, top, row);
    top += 1;
  }
  return top;
}

function scaleRow(re: Float64Array, im: Float64Array): void {
  let sum = 0;
  for (let index = 0; index < re.length; index++) sum += (re[index] as number) ** 2 + (im[index] as number) ** 2;
  const factor = sum > 0 ? 1 / Math.sqrt(sum) : 1;
  for (let index = 0; index < re.length; index++) {
    re[index] = (re[index] as number) * factor;
    im[index] = (im[index] as number) * factor;
  }
}

function largestBelow(re: readonly Float64Array[], im: readonly Float64Array[], column: number, top: number): number {
  let best = 1e-7;
  let pivot = -1;
  for (let row = top; row < re.length; row++) {
    const size = Math.hypot(re[row]?.[column] as number, im[row]?.[column] as number);
    if (size > best) {
      best = size;
      pivot = row;
    }
  }
  return pivot;
}

function clear(
  re: readonly Float64Array[],
  im: readonly Float64Array[],
  column: number,
  top: number,
  row: number,
): void {
  const pivotRe = re[top] as Float64Array;
  const pivotIm = im[top] as Float64Array;
  const rowRe = re[row] as Float64Array;
  const rowIm = im[row] as Float64Array;
  const norm = (pivotRe[column] as number) ** 2 + (pivotIm[column] as number) ** 2;
  const a = rowRe[column] as number;
  const b = rowIm[column] as number;
  if (a === 0 && b === 0) return;
  const factorRe = (a * (pivotRe[column] as number) + b * (pivotIm[column] as number)) / norm;
  const factorIm = (b * (pivotRe[column] as number) - a * (pivotIm[column] as number)) / norm;
  for (let index = column; index < rowRe.length; index++) {
    const x = pivotRe[index] as number;
    const y = pivotIm[index] as number;
    rowRe[index] = (rowRe[index] as number) - factorRe * x + factorIm * y;
    rowIm[index] = (rowIm[index] as number) - factorRe * y - factorIm * x;
  }
}
