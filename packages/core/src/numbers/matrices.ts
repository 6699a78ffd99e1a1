import { fail } from "../errors/index.js";
import { lcm, safe } from "./integers.js";
import { add, divide, isZero, multiply, negate, one, type Rational, rational, subtract, zero } from "./rationals.js";

/** Three exact numbers: a column of coordinates or a row of reciprocal components, as the name at the use says. */
export type RationalVector = readonly [Rational, Rational, Rational];

/** An exact 3 × 3 matrix as three rows. */
export type RationalMatrix = readonly [RationalVector, RationalVector, RationalVector];

/** A 3 × 3 integer matrix as nine numbers, row by row. */
export type IntegerMatrix = readonly number[];

export const identityMatrix: RationalMatrix = [
  [one, zero, zero],
  [zero, one, zero],
  [zero, zero, one],
];

export const zeroVector: RationalVector = [zero, zero, zero];

export function vectorOf(first: Rational, second: Rational, third: Rational): RationalVector {
  return [first, second, third];
}

export function mapVector(
  vector: RationalVector,
  change: (entry: Rational, index: number) => Rational,
): RationalVector {
  return [change(vector[0], 0), change(vector[1], 1), change(vector[2], 2)];
}

export function addVectors(a: RationalVector, b: RationalVector): RationalVector {
  return [add(a[0], b[0]), add(a[1], b[1]), add(a[2], b[2])];
}

export function subtractVectors(a: RationalVector, b: RationalVector): RationalVector {
  return [subtract(a[0], b[0]), subtract(a[1], b[1]), subtract(a[2], b[2])];
}

export function negateVector(a: RationalVector): RationalVector {
  return [negate(a[0]), negate(a[1]), negate(a[2])];
}

export function dot(a: RationalVector, b: RationalVector): Rational {
  return add(add(multiply(a[0], b[0]), multiply(a[1], b[1])), multiply(a[2], b[2]));
}

export function transpose(m: RationalMatrix): RationalMatrix {
  return [
    [m[0][0], m[1][0], m[2][0]],
    [m[0][1], m[1][1], m[2][1]],
    [m[0][2], m[1][2], m[2][2]],
  ];
}

/** Matrix times column. */
export function timesColumn(m: RationalMatrix, column: RationalVector): RationalVector {
  return [dot(m[0], column), dot(m[1], column), dot(m[2], column)];
}

/** Row times matrix. */
export function rowTimes(row: RationalVector, m: RationalMatrix): RationalVector {
  return timesColumn(transpose(m), row);
}

export function multiplyMatrices(a: RationalMatrix, b: RationalMatrix): RationalMatrix {
  const columns = transpose(b);
  return [timesColumn(columns, a[0]), timesColumn(columns, a[1]), timesColumn(columns, a[2])];
}

export function determinant(m: RationalMatrix): Rational {
  return dot(m[0], cross(m[1], m[2]));
}

export function cross(a: RationalVector, b: RationalVector): RationalVector {
  return [
    subtract(multiply(a[1], b[2]), multiply(a[2], b[1])),
    subtract(multiply(a[2], b[0]), multiply(a[0], b[2])),
    subtract(multiply(a[0], b[1]), multiply(a[1], b[0])),
  ];
}

/** The inverse; throws `singular-basis` when the determinant is zero. */
export function invert(m: RationalMatrix): RationalMatrix {
  const det = determinant(m);
  if (isZero(det)) fail("singular-basis", "the matrix of a change of basis has determinant 0");
  const rows: RationalMatrix = [cross(m[1], m[2]), cross(m[2], m[0]), cross(m[0], m[1])];
  return transpose(rows.map((row) => mapVector(row, (entry) => divide(entry, det))) as unknown as RationalMatrix);
}

/** The matrix `entries / denominator`. */
export function matrixFrom(entries: IntegerMatrix, denominator = 1): RationalMatrix {
  const at = (index: number): Rational => rational(entries[index] as number, denominator);
  return [
    [at(0), at(1), at(2)],
    [at(3), at(4), at(5)],
    [at(6), at(7), at(8)],
  ];
}

/** The vector `entries / denominator`. */
export function vectorFrom(entries: readonly number[], denominator = 1): RationalVector {
  const at = (index: number): Rational => rational(entries[index] as number, denominator);
  return [at(0), at(1), at(2)];
}

/** Integers over the least common denominator: `values[i] = numerators[i] / denominator`. */
export function overCommonDenominator(values: readonly Rational[]): { numerators: number[]; denominator: number } {
  const denominator = values.reduce((common, value) => lcm(common, value[1]), 1);
  return { numerators: values.map((value) => safe(value[0] * (denominator / value[1]))), denominator };
}

/** Product of two integer matrices. */
export function multiplyIntegerMatrices(a: IntegerMatrix, b: IntegerMatrix): number[] {
  const product = new Array<number>(9);
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++)
      product[3 * row + column] =
        (a[3 * row] as number) * (b[column] as number) +
        (a[3 * row + 1] as number) * (b[3 + column] as number) +
        (a[3 * row + 2] as number) * (b[6 + column] as number) +
        0;
  return product;
}

export function integerDeterminant(m: IntegerMatrix): number {
  const [a, b, c, d, e, f, g, h, i] = m as [number, number, number, number, number, number, number, number, number];
  return a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
}

/** adj(M) with `M adj(M) = det M`. */
export function adjugate(m: IntegerMatrix): number[] {
  const [a, b, c, d, e, f, g, h, i] = m as [number, number, number, number, number, number, number, number, number];
  return [
    e * i - f * h,
    c * h - b * i,
    b * f - c * e,
    f * g - d * i,
    a * i - c * g,
    c * d - a * f,
    d * h - e * g,
    b * g - a * h,
    a * e - b * d,
  ];
}

/** The inverse of an integer matrix of determinant ±1, again integer. */
export function invertUnimodular(m: IntegerMatrix): number[] {
  const det = integerDeterminant(m);
  if (det !== 1 && det !== -1) fail("singular-basis", `an integer matrix of determinant ${det} has no integer inverse`);
  return adjugate(m).map((entry) => entry * det + 0);
}

export function transposeIntegers(m: IntegerMatrix): number[] {
  return [0, 3, 6, 1, 4, 7, 2, 5, 8].map((index) => m[index] as number);
}

/** Scalar product of two integer triples. */
export function dotIntegers(a: readonly number[], b: readonly number[]): number {
  return safe(
    (a[0] as number) * (b[0] as number) + (a[1] as number) * (b[1] as number) + (a[2] as number) * (b[2] as number) + 0,
  );
}
