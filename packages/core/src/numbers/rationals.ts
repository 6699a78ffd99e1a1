import { fail } from "../errors/index.js";
import { gcd, modulo, safe } from "./integers.js";

/** An exact fraction `[numerator, denominator]`: reduced safe integers, denominator above 0, zero is `[0, 1]`. */
export type Rational = readonly [number, number];

export const zero: Rational = [0, 1];
export const one: Rational = [1, 1];

/** The reduced fraction `numerator / denominator`. Throws `number-overflow` or, for denominator 0, `invalid-number`. */
export function rational(numerator: number, denominator = 1): Rational {
  if (denominator === 0) fail("invalid-number", "a fraction has the denominator 0");
  safe(numerator);
  if (denominator === 1) return [numerator + 0, 1];
  safe(denominator);
  const divisor = gcd(numerator, denominator) * (denominator < 0 ? -1 : 1);
  return [numerator / divisor + 0, denominator / divisor];
}

export function add(a: Rational, b: Rational): Rational {
  if (a[0] === 0) return b;
  if (b[0] === 0) return a;
  if (a[1] === b[1]) return rational(safe(a[0] + b[0]), a[1]);
  const divisor = gcd(a[1], b[1]);
  const left = safe(a[0] * (b[1] / divisor));
  const right = safe(b[0] * (a[1] / divisor));
  return rational(safe(left + right), safe(a[1] * (b[1] / divisor)));
}

export function negate(a: Rational): Rational {
  return [0 - a[0], a[1]];
}

export function subtract(a: Rational, b: Rational): Rational {
  return b[0] === 0 ? a : add(a, negate(b));
}

export function multiply(a: Rational, b: Rational): Rational {
  if (a[0] === 0 || b[0] === 0) return zero;
  if (a[0] === 1 && a[1] === 1) return b;
  if (b[0] === 1 && b[1] === 1) return a;
  if (a[1] === 1 && b[1] === 1) return [safe(a[0] * b[0]), 1];
  // Crossing out first keeps the products as small as the result allows.
  const first = gcd(a[0], b[1]);
  const second = gcd(b[0], a[1]);
  return rational(safe((a[0] / first) * (b[0] / second)), safe((a[1] / second) * (b[1] / first)));
}

export function divide(a: Rational, b: Rational): Rational {
  if (b[0] === 0) fail("invalid-number", "an exact division by 0");
  return multiply(a, b[0] < 0 ? [-b[1], -b[0]] : [b[1], b[0]]);
}

export function equal(a: Rational, b: Rational): boolean {
  return a[0] === b[0] && a[1] === b[1];
}

/** Negative, zero or positive as `a` is below, equal to or above `b`. */
export function compare(a: Rational, b: Rational): number {
  return subtract(a, b)[0];
}

export function isZero(a: Rational): boolean {
  return a[0] === 0;
}

export function isInteger(a: Rational): boolean {
  return a[1] === 1;
}

/** The fraction modulo 1, in [0, 1). */
export function fractionalPart(a: Rational): Rational {
  return [modulo(a[0], a[1]), a[1]];
}

/** The largest integer not above `a`. */
export function floor(a: Rational): number {
  return Math.floor(a[0] / a[1]);
}

export function toNumber(a: Rational): number {
  return a[0] / a[1];
}

/** `"0"`, `"-1"`, `"2/3"`. */
export function formatRational(a: Rational): string {
  return a[1] === 1 ? String(a[0]) : `${a[0]}/${a[1]}`;
}

const integerText = /^[+-]?\d+$/;
const fractionText = /^([+-]?\d+)\/(\d+)$/;
const decimalText = /^([+-]?)(\d*)\.(\d*)$/;

/**
 * The exact value of an integer, a fraction or a decimal as it is written (`0.25` is 1/4, `0.3333` is 3333/10000),
 * or null when the text is none of them. Never goes through a float.
 */
export function parseRational(text: string): Rational | null {
  const trimmed = text.trim();
  if (integerText.test(trimmed)) return rational(Number(trimmed));
  const fraction = fractionText.exec(trimmed);
  if (fraction) {
    const denominator = Number(fraction[2]);
    return denominator === 0 ? null : rational(Number(fraction[1]), denominator);
  }
  const decimal = decimalText.exec(trimmed);
  if (!decimal || (decimal[2] === "" && decimal[3] === "")) return null;
  const digits = decimal[3] ?? "";
  const scale = 10 ** digits.length;
  return rational(safe(Number(`${decimal[1]}${decimal[2]}${digits}`)), safe(scale));
}
