import { fail } from "../errors/index.js";
import { cyclotomicField, unitsModulo } from "./cyclotomic-field.js";
import type { Field } from "./echelon.js";
import { gcd, lcm, modulo, safe } from "./integers.js";
import { type Rational, rational } from "./rationals.js";

/**
 * An exact number of Q(ζ_N), ζ_N = e^{2πi/N}: `(Σ coefficients[e] ζ_N^e) / denominator` with φ(N) integer
 * coefficients. For a given N the form is unique (lowest terms, denominator above 0).
 */
export interface Cyclotomic {
  readonly order: number;
  readonly denominator: number;
  readonly coefficients: readonly number[];
}

export const cyclotomicZero: Cyclotomic = { order: 1, denominator: 1, coefficients: [0] };
export const cyclotomicOne: Cyclotomic = { order: 1, denominator: 1, coefficients: [1] };
const cyclotomicMinusOne: Cyclotomic = { order: 1, denominator: 1, coefficients: [-1] };

export function cyclotomicFromRational([numerator, denominator]: Rational): Cyclotomic {
  return { order: 1, denominator, coefficients: [numerator] };
}

/** e^{2πi·turns}, turns an exact fraction. */
export function rootOfUnity([numerator, denominator]: Rational): Cyclotomic {
  if (denominator === 1) return cyclotomicOne;
  if (denominator === 2) return cyclotomicMinusOne;
  const field = cyclotomicField(denominator);
  return { order: denominator, denominator: 1, coefficients: field.powers[modulo(numerator, denominator)] as number[] };
}

export function isCyclotomicZero(a: Cyclotomic): boolean {
  const { coefficients } = a;
  for (let index = 0; index < coefficients.length; index++) if (coefficients[index] !== 0) return false;
  return true;
}

/** Lowest terms. */
function normalized(order: number, coefficients: number[], denominator: number): Cyclotomic {
  let divisor = denominator;
  for (let index = 0; index < coefficients.length && divisor !== 1; index++)
    divisor = gcd(divisor, coefficients[index] as number);
  for (let index = 0; index < coefficients.length; index++)
    coefficients[index] = safe(coefficients[index] as number) / divisor + 0;
  return { order, coefficients, denominator: safe(denominator) / divisor };
}

/** The same number written in Q(ζ_M), M a multiple of its order. */
export function liftCyclotomic(a: Cyclotomic, order: number): Cyclotomic {
  if (a.order === order) return a;
  const field = cyclotomicField(order);
  const step = order / a.order;
  const coefficients = new Array<number>(field.degree).fill(0);
  a.coefficients.forEach((coefficient, exponent) => {
    if (coefficient !== 0) addScaled(coefficients, field.powers[exponent * step] as number[], coefficient);
  });
  return { order, denominator: a.denominator, coefficients };
}

function addScaled(target: number[], source: readonly number[], factor: number): void {
  for (let index = 0; index < target.length; index++)
    target[index] = (target[index] as number) + factor * (source[index] as number);
}

function combine(a: Cyclotomic, b: Cyclotomic, sign: 1 | -1): Cyclotomic {
  const order = a.order === b.order ? a.order : lcm(a.order, b.order);
  const left = liftCyclotomic(a, order);
  const right = liftCyclotomic(b, order);
  const denominator = lcm(left.denominator, right.denominator);
  const leftFactor = denominator / left.denominator;
  const rightFactor = (sign * denominator) / right.denominator;
  const coefficients = left.coefficients.map(
    (entry, index) => leftFactor * entry + rightFactor * (right.coefficients[index] as number),
  );
  return normalized(order, coefficients, denominator);
}

export function addCyclotomic(a: Cyclotomic, b: Cyclotomic): Cyclotomic {
  if (isCyclotomicZero(a)) return b;
  if (isCyclotomicZero(b)) return a;
  return combine(a, b, 1);
}

export function subtractCyclotomic(a: Cyclotomic, b: Cyclotomic): Cyclotomic {
  if (isCyclotomicZero(b)) return a;
  return combine(a, b, -1);
}

export function negateCyclotomic(a: Cyclotomic): Cyclotomic {
  return { ...a, coefficients: a.coefficients.map((entry) => 0 - entry) };
}

export function multiplyCyclotomic(a: Cyclotomic, b: Cyclotomic): Cyclotomic {
  if (isCyclotomicZero(a) || isCyclotomicZero(b)) return cyclotomicZero;
  if (a.order === 1) return timesFraction(b, a);
  if (b.order === 1) return timesFraction(a, b);
  const order = lcm(a.order, b.order);
  const left = liftCyclotomic(a, order);
  const right = liftCyclotomic(b, order);
  const field = cyclotomicField(order);
  const coefficients = new Array<number>(field.degree).fill(0);
  left.coefficients.forEach((x, i) => {
    if (x === 0) return;
    right.coefficients.forEach((y, j) => {
      if (y !== 0) addScaled(coefficients, field.powers[(i + j) % order] as number[], x * y);
    });
  });
  return normalized(order, coefficients, safe(left.denominator * right.denominator));
}

function timesFraction(a: Cyclotomic, { coefficients, denominator }: Cyclotomic): Cyclotomic {
  const factor = coefficients[0] as number;
  if (factor === 1 && denominator === 1) return a;
  return normalized(
    a.order,
    a.coefficients.map((entry) => factor * entry),
    safe(denominator * a.denominator),
  );
}

/** Applies ζ → ζ^residue; residue −1 is complex conjugation. */
function galois(a: Cyclotomic, residue: number): Cyclotomic {
  if (a.order <= 2) return a;
  const field = cyclotomicField(a.order);
  const coefficients = new Array<number>(field.degree).fill(0);
  a.coefficients.forEach((coefficient, exponent) => {
    if (coefficient !== 0)
      addScaled(coefficients, field.powers[modulo(exponent * residue, a.order)] as number[], coefficient);
  });
  return { order: a.order, denominator: a.denominator, coefficients };
}

export function conjugateCyclotomic(a: Cyclotomic): Cyclotomic {
  return galois(a, -1);
}

function isFraction({ coefficients }: Cyclotomic): boolean {
  for (let index = 1; index < coefficients.length; index++) if (coefficients[index] !== 0) return false;
  return true;
}

/** The value as a fraction when it is one, else null. */
export function cyclotomicToRational(a: Cyclotomic): Rational | null {
  return isFraction(a) ? rational(a.coefficients[0] as number, a.denominator) : null;
}

/** 1/a through the product of all Galois conjugates, whose product with `a` is the rational norm. */
export function invertCyclotomic(a: Cyclotomic): Cyclotomic {
  if (isCyclotomicZero(a)) fail("invalid-number", "an exact division by 0");
  if (a.order === 1) return cyclotomicFromRational(rational(a.denominator, a.coefficients[0] as number));
  let cofactor = conjugateCyclotomic(a);
  let norm = cyclotomicToRational(multiplyCyclotomic(a, cofactor));
  if (norm === null) {
    const reduced = reduceOrder(a);
    cofactor = unitsModulo(reduced.order)
      .filter((residue) => residue !== 1)
      .reduce((product, residue) => multiplyCyclotomic(product, galois(reduced, residue)), cyclotomicOne);
    norm = cyclotomicToRational(multiplyCyclotomic(reduced, cofactor));
  }
  if (norm === null) throw new Error("the norm of a cyclotomic number came out irrational");
  return multiplyCyclotomic(cofactor, cyclotomicFromRational(rational(norm[1], norm[0])));
}

export function divideCyclotomic(a: Cyclotomic, b: Cyclotomic): Cyclotomic {
  return multiplyCyclotomic(a, invertCyclotomic(b));
}

export function equalCyclotomic(a: Cyclotomic, b: Cyclotomic): boolean {
  // In one field the form is unique.
  if (a.order === b.order)
    return a.denominator === b.denominator && a.coefficients.every((entry, index) => entry === b.coefficients[index]);
  return isCyclotomicZero(subtractCyclotomic(a, b));
}

/** The same number in the smallest field Q(ζ_M), M dividing its order, that holds it. */
export function reduceOrder(a: Cyclotomic): Cyclotomic {
  let current = a;
  for (let prime = 2; prime <= current.order; prime++) {
    while (current.order % prime === 0) {
      if (isFraction(current)) return normalized(1, [current.coefficients[0] as number], current.denominator);
      const smaller = inSubfield(current, prime);
      if (smaller === null) break;
      current = smaller;
    }
  }
  return current;
}

/** `a` written in Q(ζ_M), M its order divided by a prime, or null when it is not in that field. */
function inSubfield(a: Cyclotomic, prime: number): Cyclotomic | null {
  const order = a.order / prime;
  const { coefficients, denominator } = a;
  if (order % prime === 0) {
    // φ(N) = p φ(M), so that the powers of ζ_M = ζ_N^p are those powers of ζ_N in the basis that p divides.
    if (coefficients.some((entry, exponent) => entry !== 0 && exponent % prime !== 0)) return null;
    return { order, coefficients: coefficients.filter((_, exponent) => exponent % prime === 0), denominator };
  }
  if (!isFixedOver(a, order)) return null;
  const columns = Array.from(
    { length: cyclotomicField(order).degree },
    (_, exponent) => cyclotomicField(a.order).powers[exponent * prime] as number[],
  );
  return solveIntegerSystem(a, order, columns);
}

/** Whether every Galois map ζ → ζ^r with r ≡ 1 mod M leaves `a` alone; it is in Q(ζ_M), M = order, exactly then. */
function isFixedOver(a: Cyclotomic, order: number): boolean {
  for (let residue = 1 + order; residue < a.order; residue += order)
    if (gcd(residue, a.order) === 1 && !equalCyclotomic(galois(a, residue), a)) return false;
  return true;
}

/** Gaussian elimination over the rationals of the small integer system Σ x_e column_e = a. */
function solveIntegerSystem(a: Cyclotomic, order: number, columns: readonly (readonly number[])[]): Cyclotomic | null {
  const height = a.coefficients.length;
  const width = columns.length;
  const rows = Array.from({ length: height }, (_, row) => [
    ...columns.map((column) => column[row] as number),
    a.coefficients[row] as number,
  ]);
  let top = 0;
  for (let column = 0; column < width; column++) {
    const found = rows.findIndex((row, index) => index >= top && row[column] !== 0);
    if (found < 0) return null;
    [rows[top], rows[found]] = [rows[found] as number[], rows[top] as number[]];
    const pivotRow = rows[top] as number[];
    for (let index = 0; index < height; index++) {
      const row = rows[index] as number[];
      if (index === top || row[column] === 0) continue;
      const factor = row[column] as number;
      const lead = pivotRow[column] as number;
      const mixed = row.map((entry, position) => safe(lead * entry - factor * (pivotRow[position] as number)));
      const divisor = mixed.reduce((common, entry) => gcd(common, entry), 0) || 1;
      rows[index] = mixed.map((entry) => entry / divisor);
    }
    top += 1;
  }
  if (rows.slice(top).some((row) => row[width] !== 0)) return null;
  const denominators = rows.slice(0, width).map((row, index) => rational(row[width] as number, row[index] as number));
  const common = denominators.reduce((value, entry) => lcm(value, entry[1]), 1);
  return normalized(
    order,
    denominators.map((entry) => entry[0] * (common / entry[1])),
    safe(a.denominator * common),
  );
}

/** √n for a positive integer n, from Gauss sums: √2 = ζ₈ + ζ₈⁻¹, √p = Σ (j/p) ζ_p^j, divided by i where p ≡ 3 mod 4. */
export function squareRootOf(n: number): Cyclotomic {
  let rest = n;
  let result = cyclotomicOne;
  for (let prime = 2; rest > 1; prime++) {
    while (rest % (prime * prime) === 0) {
      rest /= prime * prime;
      result = multiplyCyclotomic(result, cyclotomicFromRational([prime, 1]));
    }
    if (rest % prime !== 0) continue;
    rest /= prime;
    result = multiplyCyclotomic(result, squareRootOfPrime(prime));
  }
  return result;
}

function squareRootOfPrime(prime: number): Cyclotomic {
  if (prime === 2) return addCyclotomic(rootOfUnity([1, 8]), rootOfUnity([-1, 8]));
  const squares = new Set(Array.from({ length: prime - 1 }, (_, index) => modulo((index + 1) ** 2, prime)));
  let sum = cyclotomicZero;
  for (let exponent = 1; exponent < prime; exponent++) {
    const root = rootOfUnity([exponent, prime]);
    sum = squares.has(exponent) ? addCyclotomic(sum, root) : subtractCyclotomic(sum, root);
  }
  return prime % 4 === 1 ? sum : multiplyCyclotomic(sum, rootOfUnity([-1, 4]));
}

/** e^{2πi·turns} as floats, exact at multiples of an eighth and twelfth where the value is 0, ±1/2 or ±1. */
export function unitComplex(turns: number): [number, number] {
  return [cosineOfTurns(turns), cosineOfTurns(turns - 0.25)];
}

function cosineOfTurns(turns: number): number {
  const reduced = Math.abs(turns - Math.round(turns));
  if (reduced === 0.25) return 0;
  // Beyond a quarter the mirror image keeps cos(π/2 + x) = −cos(π/2 − x) exact.
  return reduced > 0.25 ? -Math.cos(2 * Math.PI * (0.5 - reduced)) : Math.cos(2 * Math.PI * reduced);
}

/** The value as `[real, imaginary]` floats. */
export function cyclotomicToComplex(a: Cyclotomic): [number, number] {
  let real = 0;
  let imaginary = 0;
  a.coefficients.forEach((coefficient, exponent) => {
    if (coefficient === 0) return;
    const [cosine, sine] = unitComplex(exponent / a.order);
    real += coefficient * cosine;
    imaginary += coefficient * sine;
  });
  return [real / a.denominator, imaginary / a.denominator];
}

export const cyclotomicNumbers: Field<Cyclotomic> = {
  isZero: isCyclotomicZero,
  subtract: subtractCyclotomic,
  multiply: multiplyCyclotomic,
  invert: invertCyclotomic,
};
