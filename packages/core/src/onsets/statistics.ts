/** Probability that χ² with `degrees` of freedom exceeds a value: Q(degrees/2, χ²/2). */
export function chiSquaredTail(value: number, degrees: number): number {
  if (degrees <= 0) return 1;
  if (!(value > 0)) return 1;
  return upperGamma(degrees / 2, value / 2);
}

/** Regularized upper incomplete gamma function by series and continued fraction (Abramowitz & Stegun 6.5.29, 6.5.31). */
function upperGamma(a: number, x: number): number {
  const front = Math.exp(-x + a * Math.log(x) - logGamma(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let n = 1; n < 500 && Math.abs(term) > 1e-15 * sum; n++) {
      term *= x / (a + n);
      sum += term;
    }
    return Math.min(1, Math.max(0, 1 - front * sum));
  }
  // Lentz's evaluation of the continued fraction.
  let b = x + 1 - a;
  let c = 1e300;
  let d = 1 / b;
  let h = d;
  for (let n = 1; n < 500; n++) {
    const factor = -n * (n - a);
    b += 2;
    d = 1 / (factor * d + b);
    c = b + factor / c;
    const change = c * d;
    h *= change;
    if (Math.abs(change - 1) < 1e-15) break;
  }
  return Math.min(1, Math.max(0, front * h));
}

/** ln Γ(x) for x > 0 by Stirling's series after shifting x above 10 (Abramowitz & Stegun 6.1.41). */
function logGamma(x: number): number {
  let shift = 0;
  let y = x;
  while (y < 10) {
    shift += Math.log(y);
    y += 1;
  }
  const series = 1 / (12 * y) - 1 / (360 * y ** 3) + 1 / (1260 * y ** 5) - 1 / (1680 * y ** 7);
  return (y - 0.5) * Math.log(y) - y + Math.log(2 * Math.PI) / 2 + series - shift;
}

export interface Polynomial {
  readonly coefficients: readonly number[];
  /** Standard uncertainties for the given weights. */
  readonly su: readonly number[];
  readonly chiSquared: number;
}

/** Weighted least squares by a polynomial in x (shifted by the caller so that x is of order one). */
export function fitPolynomial(
  x: readonly number[],
  y: readonly number[],
  su: readonly number[],
  degree: number,
): Polynomial {
  const size = degree + 1;
  const normal = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  const right = new Array<number>(size).fill(0);
  x.forEach((one, index) => {
    const weight = 1 / (su[index] as number) ** 2;
    const powers = Array.from({ length: size }, (_, n) => one ** n);
    for (let a = 0; a < size; a++) {
      right[a] = (right[a] as number) + weight * (powers[a] as number) * (y[index] as number);
      const row = normal[a] as number[];
      for (let b = 0; b < size; b++)
        row[b] = (row[b] as number) + weight * (powers[a] as number) * (powers[b] as number);
    }
  });
  const inverse = invert(normal);
  const coefficients = inverse.map((row) => row.reduce((sum, entry, b) => sum + entry * (right[b] as number), 0));
  const chiSquared = x.reduce((sum, one, index) => {
    const calculated = coefficients.reduce((total, entry, n) => total + entry * one ** n, 0);
    return sum + (((y[index] as number) - calculated) / (su[index] as number)) ** 2;
  }, 0);
  return { coefficients, su: inverse.map((row, n) => Math.sqrt(row[n] as number)), chiSquared };
}

/** Gauss–Jordan with row exchanges; for the few parameters of a polynomial. */
function invert(matrix: readonly (readonly number[])[]): number[][] {
  const size = matrix.length;
  const work = matrix.map((row, r) => [...row, ...row.map((_, c) => (r === c ? 1 : 0))]);
  for (let column = 0; column < size; column++) {
    let pivot = column;
    for (let row = column + 1; row < size; row++)
      if (Math.abs(work[row]?.[column] as number) > Math.abs(work[pivot]?.[column] as number)) pivot = row;
    [work[column], work[pivot]] = [work[pivot] as number[], work[column] as number[]];
    const top = work[column] as number[];
    const divisor = top[column] as number;
    for (let c = 0; c < 2 * size; c++) top[c] = (top[c] as number) / divisor;
    for (let row = 0; row < size; row++) {
      if (row === column) continue;
      const current = work[row] as number[];
      const factor = current[column] as number;
      for (let c = 0; c < 2 * size; c++) current[c] = (current[c] as number) - factor * (top[c] as number);
    }
  }
  return work.map((row) => row.slice(size));
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1
    ? (sorted[middle] as number)
    : ((sorted[middle - 1] as number) + (sorted[middle] as number)) / 2;
}

/** Standard deviation of the noise of a smooth series from its second differences: that of white noise has variance 6 σ². */
export function noiseOf(values: readonly number[]): number {
  const seconds = values.slice(2).map((entry, n) => entry - 2 * (values[n + 1] as number) + (values[n] as number));
  if (seconds.length === 0) return 0;
  // The median of |x| of a Gaussian is 0.6745 σ: a kink at one place does not count.
  return median(seconds.map(Math.abs)) / 0.6745 / Math.sqrt(6);
}
