import {
  add,
  type Cyclotomic,
  gcd,
  isZero,
  lcm,
  modulo,
  multiply,
  type Rational,
  rational,
  safe,
} from "../numbers/index.js";

/** One term `coefficient · e^{2πi·turns}`. */
export interface UnityTerm {
  readonly turns: Rational;
  readonly coefficient: Rational;
}

/** A cyclotomic number times `e^{2πi·turns}` as terms. */
export function unityTerms({ order, denominator, coefficients }: Cyclotomic, turns: Rational): UnityTerm[] {
  return coefficients.flatMap((coefficient, exponent) =>
    coefficient === 0
      ? []
      : [{ turns: add(turns, rational(exponent, order)), coefficient: rational(coefficient, denominator) }],
  );
}

export function scaledTerms(factor: Rational, terms: readonly UnityTerm[]): UnityTerm[] {
  if (isZero(factor)) return [];
  return terms.map(({ turns, coefficient }) => ({ turns, coefficient: multiply(factor, coefficient) }));
}

/** Exponent modulo the order, and integer coefficient. */
type Sparse = ReadonlyMap<number, number>;

/**
 * Whether a rational combination of roots of unity is exactly 0, for any order: coordinates with four decimals give roots
 * of order 10 000, for which a dense basis would be out of reach. With p² | N the numbers 1, ζ_N, …, ζ_N^{p−1} are
 * independent over Q(ζ_{N/p}); with p ‖ N the p-th roots of unity have the one relation that their sum is 0 (L. C.
 * Washington, Introduction to Cyclotomic Fields, 1997, chapter 2).
 */
export function sumVanishes(terms: readonly UnityTerm[]): boolean {
  let order = 1;
  let denominator = 1;
  for (const { turns, coefficient } of terms) {
    order = lcm(order, turns[1]);
    denominator = lcm(denominator, coefficient[1]);
  }
  const sparse = new Map<number, number>();
  for (const { turns, coefficient } of terms) {
    const exponent = modulo(turns[0] * (order / turns[1]), order);
    const value = safe(coefficient[0] * (denominator / coefficient[1]));
    sparse.set(exponent, safe((sparse.get(exponent) ?? 0) + value));
  }
  return isZeroSum(sparse, order);
}

function isZeroSum(all: Sparse, order: number): boolean {
  const terms = new Map([...all].filter(([, coefficient]) => coefficient !== 0));
  if (terms.size === 0) return true;
  const common = [...terms.keys()].reduce((divisor, exponent) => gcd(divisor, exponent), order);
  if (common > 1)
    return isZeroSum(new Map([...terms].map(([exponent, value]) => [exponent / common, value])), order / common);
  if (order === 1 || terms.size === 1) return false;
  const prime = smallestPrime(order);
  const smaller = order / prime;
  const parts = smaller % prime === 0 ? byRemainder(terms, prime) : byPrimePart(terms, prime, smaller);
  if (smaller % prime === 0) return parts.every((part) => isZeroSum(part, smaller));
  // Σ ζ_p^x X_x = 0 exactly when all X_x, x = 0 … p − 1, are equal; one that does not occur is 0.
  const present = parts.filter(({ size }) => size > 0);
  if (present.length < prime) return present.every((part) => isZeroSum(part, smaller));
  const [first, ...rest] = present;
  return rest.every((part) => isZeroSum(difference(part, first as Sparse), smaller));
}

function smallestPrime(n: number): number {
  for (let prime = 2; prime * prime <= n; prime++) if (n % prime === 0) return prime;
  return n;
}

/** `ζ_N^e = ζ_N^r ζ_{N/p}^{(e − r)/p}`, r = e mod p. */
function byRemainder(terms: Sparse, prime: number): Sparse[] {
  const parts = Array.from({ length: prime }, () => new Map<number, number>());
  for (const [exponent, value] of terms) {
    const rest = exponent % prime;
    parts[rest]?.set((exponent - rest) / prime, value);
  }
  return parts;
}

/** `e/N = x/p + y/(N/p)` modulo 1. */
function byPrimePart(terms: Sparse, prime: number, smaller: number): Map<number, number>[] {
  const parts = new Map<number, Map<number, number>>();
  const inverse = inverseModulo(smaller, prime);
  const other = smaller === 1 ? 0 : inverseModulo(prime, smaller);
  for (const [exponent, value] of terms) {
    const x = modulo((exponent % prime) * inverse, prime);
    const y = smaller === 1 ? 0 : modulo(safe((exponent % smaller) * other), smaller);
    const part = parts.get(x) ?? new Map<number, number>();
    parts.set(x, part.set(y, value));
  }
  return [...parts.values()];
}

function difference(a: Sparse, b: Sparse): Sparse {
  const result = new Map(a);
  for (const [exponent, value] of b) result.set(exponent, safe((result.get(exponent) ?? 0) - value));
  return result;
}

function inverseModulo(value: number, modulus: number): number {
  let [r0, r1, s0, s1] = [modulus, modulo(value, modulus), 0, 1];
  while (r1 !== 0) {
    const quotient = Math.floor(r0 / r1);
    [r0, r1, s0, s1] = [r1, r0 - quotient * r1, s1, s0 - quotient * s1];
  }
  return modulo(s0, modulus);
}
