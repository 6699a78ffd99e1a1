import { type Cyclotomic, gcd, isConstantForm, lcm, modulo, type Phase, type PhasedNumber } from "../numbers/index.js";

/**
 * Arithmetic modulo one prime p ≡ 1 (mod N). The roots of unity of order N exist modulo p, so matrices with entries in
 * Q(ζ_N) reduce to matrices of residues and every group relation stays true. Since p divides no group order here,
 * dimensions of fixed spaces are the same modulo p as they are exactly (Maschke; Serre, Linear Representations of
 * Finite Groups, 1977, section 15.5): what a fixed space is, which elements fix it and which fixed spaces a group maps
 * on each other is decided exactly by residues, at the speed of machine integers.
 */
export interface ModularField {
  readonly prime: number;
  readonly order: number;
  /** ζ_N^e for e = 0 … N − 1. */
  readonly roots: Float64Array;
}

/** Products of two residues stay below 2^53. */
const smallestPrime = 2 ** 25;

/** The field for numbers of Q(ζ_order); `skip` takes a later prime, where the first one proved unlucky. */
export function modularField(order: number, skip = 0): ModularField {
  let left = skip;
  for (let prime = order * Math.ceil(smallestPrime / order) + 1; ; prime += order) {
    if (!isPrime(prime)) continue;
    if (left > 0) left -= 1;
    else return { prime, order, roots: rootTable(order, prime) };
  }
}

function isPrime(n: number): boolean {
  if (n % 2 === 0) return false;
  for (let divisor = 3; divisor * divisor <= n; divisor += 2) if (n % divisor === 0) return false;
  return true;
}

function rootTable(order: number, prime: number): Float64Array {
  const divisors = primeDivisors(order);
  for (let base = 2; ; base++) {
    const root = power(base, (prime - 1) / order, prime);
    if (divisors.some((divisor) => power(root, order / divisor, prime) === 1)) continue;
    const table = new Float64Array(order);
    let value = 1;
    for (let exponent = 0; exponent < order; exponent++) {
      table[exponent] = value;
      value = (value * root) % prime;
    }
    return table;
  }
}

function primeDivisors(n: number): number[] {
  const found: number[] = [];
  let rest = n;
  for (let divisor = 2; rest > 1; divisor++) {
    if (rest % divisor !== 0) continue;
    found.push(divisor);
    while (rest % divisor === 0) rest /= divisor;
  }
  return found;
}

export function power(base: number, exponent: number, prime: number): number {
  let result = 1;
  let square = base % prime;
  for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = (result * square) % prime;
    square = (square * square) % prime;
  }
  return result;
}

export function inverseModulo(value: number, prime: number): number {
  return power(value, prime - 2, prime);
}

/** e^{2πi·turns} for a constant phase whose denominator divides the order. */
export function rootModulo(field: ModularField, [numerator, denominator]: readonly [number, number]): number {
  return field.roots[modulo(numerator, denominator) * (field.order / denominator)] as number;
}

/** The residue of an exact number. */
export function residue(field: ModularField, value: Cyclotomic): number {
  const { prime, roots, order } = field;
  const step = order / value.order;
  let sum = 0;
  value.coefficients.forEach((coefficient, exponent) => {
    if (coefficient !== 0) sum = (sum + modulo(coefficient, prime) * (roots[exponent * step] as number)) % prime;
  });
  return value.denominator === 1 ? sum : (sum * inverseModulo(modulo(value.denominator, prime), prime)) % prime;
}

export function phasedResidue(field: ModularField, value: PhasedNumber): number {
  const factor = residue(field, value.factor);
  return factor === 0 ? 0 : (factor * rootModulo(field, constantTurns(value.phase))) % field.prime;
}

/** The turns of a phase without letters. */
export function constantTurns(phase: Phase): readonly [number, number] {
  if (!isConstantForm(phase)) throw new Error("a phase with an open parameter has no residue");
  return phase.constant;
}

/** The smallest order whose field holds all given orders and denominators of phases; 4 and 3 always. */
export function commonOrder(orders: Iterable<number>): number {
  let order = 12;
  for (const entry of orders) order = gcd(order, entry) === entry ? order : lcm(order, entry);
  return order;
}
