import { divide, isZero, multiply, one, type Rational, subtract } from "./rationals.js";

/**
 * The arithmetic that the exact reduced echelon form needs, so that one elimination serves fractions and cyclotomic
 * numbers alike.
 */
export interface Field<T> {
  isZero(value: T): boolean;
  subtract(a: T, b: T): T;
  multiply(a: T, b: T): T;
  invert(value: T): T;
}

export const rationalField: Field<Rational> = {
  isZero,
  subtract,
  multiply,
  invert: (value) => divide(one, value),
};

/**
 * Reduced row echelon form of `rows` (all of one length): leading entries 1, zero above and below them, zero rows left
 * out, pivots from left to right. The form depends only on the row space.
 */
export function reducedEchelon<T>(rows: readonly (readonly T[])[], field: Field<T>): { rows: T[][]; pivots: number[] } {
  const work = rows.map((row) => [...row]);
  const pivots: number[] = [];
  const width = work[0]?.length ?? 0;
  let top = 0;
  for (let column = 0; column < width && top < work.length; column++) {
    const found = work.findIndex((row, index) => index >= top && !field.isZero(row[column] as T));
    if (found < 0) continue;
    const pivotRow = work[found] as T[];
    work[found] = work[top] as T[];
    const lead = pivotRow[column] as T;
    const inverse = field.invert(lead);
    const scaled = pivotRow.map((entry) => (field.isZero(entry) ? entry : field.multiply(entry, inverse)));
    work[top] = scaled;
    for (let index = 0; index < work.length; index++) {
      const row = work[index] as T[];
      const factor = row[column] as T;
      if (index === top || field.isZero(factor)) continue;
      work[index] = row.map((entry, position) => {
        const step = scaled[position] as T;
        return field.isZero(step) ? entry : field.subtract(entry, field.multiply(factor, step));
      });
    }
    pivots.push(column);
    top += 1;
  }
  return { rows: work.slice(0, top), pivots };
}

/**
 * A basis of `{x : rows · x = 0}` from the reduced echelon form, one vector per free column with a 1 there.
 * `zero` and `one` are the field's.
 */
export function nullSpace<T>(rows: readonly (readonly T[])[], width: number, field: Field<T>, zero: T, one: T): T[][] {
  const { rows: reduced, pivots } = reducedEchelon(rows, field);
  const basis: T[][] = [];
  for (let free = 0; free < width; free++) {
    if (pivots.includes(free)) continue;
    const vector = new Array<T>(width).fill(zero);
    vector[free] = one;
    pivots.forEach((pivot, index) => {
      vector[pivot] = field.subtract(zero, (reduced[index] as T[])[free] as T);
    });
    basis.push(vector);
  }
  return basis;
}
