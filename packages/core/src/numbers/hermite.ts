import { gcd, modulo, safe } from "./integers.js";

/**
 * Hermite normal form of the lattice spanned by integer `rows` (each of `width` numbers): upper triangular rows with
 * positive pivots, entries above a pivot reduced into [0, pivot). The form depends only on the lattice
 * (H. Cohen, A Course in Computational Algebraic Number Theory, 1993, section 2.4.2, written by rows).
 */
export function hermiteNormalForm(rows: readonly (readonly number[])[], width: number): number[][] {
  let work = rows.map((row) => [...row]).filter((row) => row.some((entry) => entry !== 0));
  const result: number[][] = [];
  for (let column = 0; column < width; column++) {
    // Euclid on the column until one row is left with a non-zero entry.
    for (;;) {
      const active = work.filter((row) => row[column] !== 0);
      if (active.length <= 1) break;
      active.sort((a, b) => Math.abs(a[column] as number) - Math.abs(b[column] as number));
      const smallest = active[0] as number[];
      for (const row of active.slice(1)) {
        const quotient = Math.trunc((row[column] as number) / (smallest[column] as number));
        for (let index = 0; index < width; index++)
          row[index] = safe((row[index] as number) - quotient * (smallest[index] as number));
      }
    }
    const pivotRow = work.find((row) => row[column] !== 0);
    if (!pivotRow) continue;
    work = work.filter((row) => row !== pivotRow && row.some((entry) => entry !== 0));
    const sign = (pivotRow[column] as number) < 0 ? -1 : 1;
    const positive = pivotRow.map((entry) => sign * entry + 0);
    const pivot = positive[column] as number;
    for (const row of result) {
      const quotient = Math.floor((row[column] as number) / pivot);
      for (let index = 0; index < width; index++)
        row[index] = safe((row[index] as number) - quotient * (positive[index] as number));
    }
    result.push(positive);
  }
  return result;
}

/** The representative of an integer row vector modulo the lattice of a Hermite normal form, pivots in [0, pivot). */
export function reduceModulo(vector: readonly number[], hermite: readonly (readonly number[])[]): number[] {
  const rest = [...vector];
  for (const row of hermite) {
    const column = row.findIndex((entry) => entry !== 0);
    const pivot = row[column] as number;
    const quotient = ((rest[column] as number) - modulo(rest[column] as number, pivot)) / pivot;
    if (quotient === 0) continue;
    for (let index = 0; index < rest.length; index++)
      rest[index] = safe((rest[index] as number) - quotient * (row[index] as number));
  }
  return rest;
}

/** Greatest common divisor of a list; 0 for an empty or all-zero list. */
export function gcdOf(values: readonly number[]): number {
  return values.reduce((common, value) => gcd(common, value), 0);
}
