import { gcd, modulo } from "./integers.js";

/**
 * What arithmetic in Q(ζ_N), ζ_N = e^{2πi/N}, needs: every power of ζ_N in the basis 1, ζ, …, ζ^{φ(N)−1}
 * (L. C. Washington, Introduction to Cyclotomic Fields, 1997, theorem 2.5). Made on first use and kept, since it
 * depends on N alone.
 */
export interface CyclotomicField {
  readonly order: number;
  readonly degree: number;
  /** `powers[e]` are the φ(N) integer coefficients of ζ^e, e = 0 … N − 1. */
  readonly powers: readonly (readonly number[])[];
}

const fields = new Map<number, CyclotomicField>();

export function cyclotomicField(order: number): CyclotomicField {
  const known = fields.get(order);
  if (known) return known;
  const polynomial = cyclotomicPolynomial(order);
  const degree = polynomial.length - 1;
  const powers: number[][] = [];
  let current: number[] = Array.from({ length: degree }, (_, index) => (index === 0 ? 1 : 0));
  for (let exponent = 0; exponent < order; exponent++) {
    powers.push(current);
    // ζ·current, with ζ^degree replaced by −(lower terms of the polynomial).
    const lead = current[degree - 1] as number;
    const before = current;
    current = before.map(
      (_, index) => (index === 0 ? 0 : (before[index - 1] as number)) - lead * (polynomial[index] as number) + 0,
    );
  }
  const field = { order, degree, powers };
  fields.set(order, field);
  return field;
}

/** Φ_N, coefficients from the constant term up: (x^N − 1) divided by Φ_d of all proper divisors d. */
function cyclotomicPolynomial(order: number): number[] {
  let dividend: number[] = Array.from({ length: order + 1 }, (_, index) =>
    index === 0 ? -1 : index === order ? 1 : 0,
  );
  for (let divisor = 1; divisor < order; divisor++)
    if (order % divisor === 0) dividend = divideMonic(dividend, cyclotomicPolynomial(divisor));
  return dividend;
}

function divideMonic(dividend: readonly number[], divisor: readonly number[]): number[] {
  const rest = [...dividend];
  const degree = divisor.length - 1;
  const quotient = new Array<number>(rest.length - degree).fill(0);
  for (let shift = quotient.length - 1; shift >= 0; shift--) {
    const factor = rest[shift + degree] as number;
    quotient[shift] = factor;
    for (let index = 0; index <= degree; index++)
      rest[shift + index] = (rest[shift + index] as number) - factor * (divisor[index] as number);
  }
  return quotient;
}

/** The residues prime to N: the Galois group of Q(ζ_N) acts by ζ → ζ^r. */
export function unitsModulo(order: number): number[] {
  const units: number[] = [];
  for (let residue = 1; residue <= order; residue++) if (gcd(residue, order) === 1) units.push(modulo(residue, order));
  return units;
}
