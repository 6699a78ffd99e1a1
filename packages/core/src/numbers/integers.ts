import { fail } from "../errors/index.js";

/** `value` itself when it is a safe integer; otherwise a `number-overflow` error, never a rounding. */
export function safe(value: number): number {
  if (!Number.isSafeInteger(value)) fail("number-overflow", "an exact number grew beyond the safe range of 2^53");
  return value;
}

/** Greatest common divisor, at least 0; `gcd(0, 0) = 0`. */
export function gcd(a: number, b: number): number {
  let x = Math.abs(a);
  let y = Math.abs(b);
  while (y !== 0) {
    const rest = x % y;
    x = y;
    y = rest;
  }
  return x;
}

/** Least common multiple of two integers, at least 0. */
export function lcm(a: number, b: number): number {
  return a === 0 || b === 0 ? 0 : safe((Math.abs(a) / gcd(a, b)) * Math.abs(b));
}

/** The remainder in `[0, modulus)`, also for negative `value`; never −0. */
export function modulo(value: number, modulus: number): number {
  const rest = value % modulus;
  return rest < 0 ? rest + modulus : rest + 0;
}

/** `n = outside² inside` of a positive integer, with `inside` free of squares: √n is `outside √inside`. */
export function splitSquare(n: number): { readonly inside: number; readonly outside: number } {
  let inside = n;
  let outside = 1;
  for (let factor = 2; factor * factor <= inside; factor++)
    while (inside % (factor * factor) === 0) {
      inside /= factor * factor;
      outside *= factor;
    }
  return { inside, outside };
}
