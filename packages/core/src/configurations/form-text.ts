import {
  add,
  type Cyclotomic,
  cyclotomicToComplex,
  cyclotomicToRational,
  divide,
  formatCyclotomic,
  isCyclotomicZero,
  isZero,
  lcm,
  liftCyclotomic,
  multiply,
  multiplyCyclotomic,
  type Rational,
  rational,
  reduceOrder,
  splitSquare,
  subtract,
  toNumber,
} from "../numbers/index.js";

/** Letters of free amplitudes, u v w first; digits where the alphabet runs out. */
const amplitudeLetters = ["u", "v", "w", "p", "q", "r", "s", "t", "f", "g", "h", "k", "l", "m", "n"];
const directionLetters = ["a", "b", "c", "d", "e", "f", "g", "h", "j", "k", "l", "m", "n", "o", "p", "q"];

export function amplitudeLetter(index: number): string {
  return lettered(amplitudeLetters, index);
}

export function directionLetter(index: number): string {
  return lettered(directionLetters, index);
}

function lettered(letters: readonly string[], index: number): string {
  const round = Math.floor(index / letters.length);
  return `${letters[index % letters.length]}${round === 0 ? "" : round}`;
}

/** `u`, `-u/2`, `√3·u/2`, `u+2v`, `0` for a sum of real exact multiples of letters. */
export function sumText(terms: readonly { readonly factor: Cyclotomic; readonly letter: string }[]): string {
  let text = "";
  for (const { factor, letter } of terms) {
    if (isCyclotomicZero(factor)) continue;
    const term = termText(factor, letter);
    text += text !== "" && !term.startsWith("-") ? `+${term}` : term;
  }
  return text === "" ? "0" : text;
}

function termText(factor: Cyclotomic, letter: string): string {
  const number = realText(factor);
  const plain = /^(-?)(\d*)(?:\/(\d+))?$/.exec(number);
  if (plain) return `${plain[1]}${plain[2] === "1" ? "" : plain[2]}${letter}${plain[3] ? `/${plain[3]}` : ""}`;
  if (/^-?\d+\.\d+$/.test(number)) return `${number}${letter}`;
  const root = /^(-?)(\d*√\d+)(?:\/(\d+))?$/.exec(number);
  if (root) return `${root[1]}${root[2]}·${letter}${root[3] ? `/${root[3]}` : ""}`;
  return number.startsWith("-(") || number.startsWith("(") ? `${number}·${letter}` : `(${number})·${letter}`;
}

/** Characters of an exact number that still reads well; longer ones are written as decimals. */
const longestExact = 12;

function decimalText(value: number): string {
  return String(Number(value.toFixed(6)));
}

/** A real exact number: `-1/2`, `√3/2`, `(1+√2)`, `(3-√5)/2`, else as the room `numbers` writes it. */
function realText(value: Cyclotomic): string {
  if (cyclotomicToRational(value) !== null) return formatCyclotomic(value);
  const quadratic = asQuadratic(value);
  if (quadratic === null) {
    const exact = formatCyclotomic(value);
    return exact.length <= longestExact ? exact : decimalText(cyclotomicToComplex(value)[0]);
  }
  const { plain, factor, radicand, denominator } = quadratic;
  const below = denominator === 1 ? "" : `/${denominator}`;
  const size = Math.abs(factor) === 1 ? "" : Math.abs(factor);
  if (plain === 0) return `${factor < 0 ? "-" : ""}${size}√${radicand}${below}`;
  // The sign of the whole goes in front, so that what stands in brackets is positive.
  const sign = cyclotomicToComplex(value)[0] < 0 ? -1 : 1;
  const root = `${size}√${radicand}`;
  const inner =
    sign * plain < 0 ? `${root}-${Math.abs(plain)}` : `${Math.abs(plain)}${sign * factor < 0 ? "-" : "+"}${root}`;
  return `${sign < 0 ? "-" : ""}(${inner})${below}`;
}

interface Quadratic {
  readonly plain: number;
  readonly factor: number;
  readonly radicand: number;
  readonly denominator: number;
}

/** x = (plain + factor·√radicand)/denominator from `x² = p x + q` with rational p and q, null where there are none. */
function asQuadratic(value: Cyclotomic): Quadratic | null {
  const x = reduceOrder(value);
  const square = liftCyclotomic(multiplyCyclotomic(x, x), x.order);
  const at = x.coefficients.findIndex((entry, exponent) => exponent > 0 && entry !== 0);
  const share = (of: Cyclotomic, exponent: number): Rational =>
    rational(of.coefficients[exponent] as number, of.denominator);
  if (at < 0) return null;
  const p = divide(share(square, at), share(x, at));
  const rest = x.coefficients.map((_, exponent) => subtract(share(square, exponent), multiply(p, share(x, exponent))));
  if (rest.some((entry, exponent) => exponent > 0 && !isZero(entry))) return null;
  const half = multiply([1, 2], p);
  const discriminant = add(multiply(half, half), rest[0] as Rational);
  const { inside, outside } = splitSquare(discriminant[0] * discriminant[1]);
  if (discriminant[0] <= 0 || inside === 1) return null;
  const root: Rational = rational(outside, discriminant[1]);
  const sign = cyclotomicToComplex(x)[0] > toNumber(half) ? 1 : -1;
  const denominator = lcm(half[1], root[1]);
  return {
    plain: half[0] * (denominator / half[1]),
    factor: sign * root[0] * (denominator / root[1]),
    radicand: inside,
    denominator,
  };
}
