import {
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicFromRational,
  cyclotomicToRational,
  equalCyclotomic,
  invertCyclotomic,
  multiplyCyclotomic,
  reduceOrder,
  rootOfUnity,
  squareRootOf,
} from "./cyclotomics.js";
import { gcd, modulo, splitSquare } from "./integers.js";
import { formatRational, multiply, type Rational, rational } from "./rationals.js";

/**
 * An exact number as people write it: `-1/2`, `i`, `(1+i)/2`, `e^{iπ/3}`, `√3·e^{iπ/6}/2`, else a sum of roots of
 * unity over a common denominator.
 */
export function formatCyclotomic(value: Cyclotomic): string {
  const reduced = reduceOrder(value);
  const fraction = cyclotomicToRational(reduced);
  if (fraction !== null) return formatRational(fraction);
  return formatGaussian(reduced) ?? formatPolar(reduced) ?? formatSum(reduced);
}

/** `a+bi` with fractions a, b, over their common denominator. */
function formatGaussian(value: Cyclotomic): string | null {
  if (value.order !== 4) return null;
  const [real, imaginary] = value.coefficients as [number, number];
  const imaginaryText = `${imaginary < 0 ? "-" : real !== 0 ? "+" : ""}${Math.abs(imaginary) === 1 ? "" : Math.abs(imaginary)}i`;
  const denominator = value.denominator === 1 ? "" : `/${value.denominator}`;
  if (real === 0) return `${imaginaryText}${denominator}`;
  return denominator === "" ? `${real}${imaginaryText}` : `(${real}${imaginaryText})${denominator}`;
}

/** `√n·e^{iφ}/m` when the modulus is the root of a fraction and the rest a root of unity. */
function formatPolar(value: Cyclotomic): string | null {
  const squared = cyclotomicToRational(multiplyCyclotomic(value, conjugateCyclotomic(value)));
  if (squared === null) return null;
  // √(p/q) = √(pq)/q keeps the denominator rational.
  const split = squareRootWithin(squared[0] * squared[1], value.order);
  if (split === null) return null;
  const { inside, outside } = split;
  const factor = rational(outside, squared[1]);
  const turns = rootTurns(
    reduceOrder(multiplyCyclotomic(value, invertCyclotomic(scaled(squareRootOf(inside), factor)))),
  );
  if (turns === null) return null;
  const head =
    inside === 1 ? (factor[0] === 1 ? "" : String(factor[0])) : `${factor[0] === 1 ? "" : factor[0]}√${inside}`;
  const tail = factor[1] === 1 ? "" : `/${factor[1]}`;
  const phase = formatTurns(turns);
  if (phase === "1") return `${head === "" ? "1" : head}${tail}`;
  if (phase === "-1") return `-${head === "" ? "1" : head}${tail}`;
  if (phase === "i" || phase === "-i") return `${phase === "-i" ? "-" : ""}${head}${head === "" ? "" : "·"}i${tail}`;
  return `${head}${head === "" ? "" : "·"}${phase}${tail}`;
}

/**
 * `n = outside² inside` without squares in `inside`, or null where √n times a root of unity cannot have that order: its
 * square would hold the root of unity's, so √n would lie in the field of order 4 · `order`, and then the odd primes of
 * `inside` divide `order` (conductor of a quadratic field; Washington, 1997, chapter 3). Fields beyond that are never made:
 * the axes of some settings give integers of many digits here. Null also for integers beyond 2^53.
 */
function squareRootWithin(n: number, order: number): { readonly inside: number; readonly outside: number } | null {
  if (!Number.isSafeInteger(n)) return null;
  let shared = 1;
  let rest = n;
  for (let common = gcd(rest, 2 * order); common > 1; common = gcd(rest, common)) {
    shared *= common;
    rest /= common;
  }
  const root = Math.round(Math.sqrt(rest));
  if (root * root !== rest) return null;
  const { inside, outside } = splitSquare(shared);
  return { inside, outside: outside * root };
}

function scaled(value: Cyclotomic, factor: Rational): Cyclotomic {
  return multiplyCyclotomic(value, cyclotomicFromRational(factor));
}

/** The turns in (−1/2, 1/2] when `value` is a root of unity, else null. */
export function rootTurns(value: Cyclotomic): Rational | null {
  const reduced = reduceOrder(value);
  if (reduced.denominator !== 1) return null;
  // An odd order holds the roots of twice that order too.
  const order = reduced.order % 2 === 0 ? reduced.order : 2 * reduced.order;
  for (let exponent = 0; exponent < order; exponent++) {
    const turns = rational(exponent, order);
    if (equalCyclotomic(reduced, rootOfUnity(turns))) return centredTurns(turns);
  }
  return null;
}

/** Turns moved by whole turns into (−1/2, 1/2]. */
export function centredTurns(turns: Rational): Rational {
  const numerator = modulo(turns[0], turns[1]);
  return rational(2 * numerator > turns[1] ? numerator - turns[1] : numerator, turns[1]);
}

/** `1`, `-1`, `i`, `-i`, `e^{iπ/3}`, `e^{2πi/3}`, `e^{-3πi/4}`. */
export function formatTurns(turns: Rational): string {
  const [numerator, denominator] = multiply([2, 1], centredTurns(turns));
  if (numerator === 0) return "1";
  if (denominator === 1) return "-1";
  if (denominator === 2) return numerator === 1 ? "i" : "-i";
  const sign = numerator < 0 ? "-" : "";
  const size = Math.abs(numerator);
  return size === 1 ? `e^{${sign}iπ/${denominator}}` : `e^{${sign}${size}πi/${denominator}}`;
}

function formatSum(value: Cyclotomic): string {
  let text = "";
  value.coefficients.forEach((coefficient, exponent) => {
    if (coefficient === 0) return;
    const phase = formatTurns(rational(exponent, value.order));
    const negative = coefficient < 0 !== phase.startsWith("-");
    const bare = phase.replace(/^-/, "");
    const size = Math.abs(coefficient);
    const term = bare === "1" ? String(size) : `${size === 1 ? "" : `${size}·`}${bare}`;
    text += `${negative ? "-" : text === "" ? "" : "+"}${term}`;
  });
  if (value.denominator === 1) return text;
  return `(${text})/${value.denominator}`;
}
