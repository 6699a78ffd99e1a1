import type { Complex } from "./complex.js";

interface Reader {
  readonly text: string;
  readonly letters: Letters;
  position: number;
}

/** Values of letters; a name is a letter with further letters, digits, primes or underscores behind it. */
export type Letters = Readonly<Record<string, Complex>>;

/**
 * The value of an exact number as kvane prints it (`-1/2`, `√3·e^{iπ/6}/2`, `(1+i)/2`, `e^{2πi·(u/2+1/3)}`), read from
 * the meaning of the signs alone: sums, products written with `·` or side by side, division by an integer, roots, powers
 * of e, `*` behind a letter for its conjugate. Throws on a name without a value and on anything that cannot be read to the end.
 */
export function evaluateText(text: string, letters: Letters = {}): Complex {
  const reader: Reader = { text, letters: { ...letters, i: [0, 1], "π": [Math.PI, 0] }, position: 0 };
  const value = readSum(reader);
  if (reader.position !== text.length) throw new Error(`cannot read on at ${reader.position} in ${text}`);
  return value;
}

/** Letters u, v, w with real values. */
export function parameters(values: readonly number[]): Letters {
  return Object.fromEntries(["u", "v", "w"].map((name, at) => [name, [values[at] ?? Number.NaN, 0] as const]));
}

function readSum(reader: Reader): Complex {
  let sum: Complex = [0, 0];
  let first = true;
  for (;;) {
    const sign = reader.text[reader.position];
    if (sign === "+" || sign === "-") reader.position += 1;
    else if (!first) return sum;
    const term = readProduct(reader);
    sum = sign === "-" ? [sum[0] - term[0], sum[1] - term[1]] : [sum[0] + term[0], sum[1] + term[1]];
    first = false;
  }
}

function readProduct(reader: Reader): Complex {
  let result = readFactor(reader);
  if (result === null) throw new Error(`expected a number at ${reader.position} in ${reader.text}`);
  for (;;) {
    const next = reader.text[reader.position];
    if (next === "/") {
      reader.position += 1;
      const divisor = Number(readDigits(reader));
      result = [result[0] / divisor, result[1] / divisor];
      continue;
    }
    if (next === "·") reader.position += 1;
    const negative = next === "·" && reader.text[reader.position] === "-";
    if (negative) reader.position += 1;
    const factor = readFactor(reader);
    if (factor === null && (negative || next === "·"))
      throw new Error(`expected a number at ${reader.position} in ${reader.text}`);
    if (factor === null) return result;
    result = times(negative ? [-result[0], -result[1]] : result, factor);
  }
}

function times([a, b]: Complex, [c, d]: Complex): Complex {
  return [a * c - b * d, a * d + b * c];
}

function readFactor(reader: Reader): Complex | null {
  const { text } = reader;
  const character = text[reader.position];
  if (character === undefined) return null;
  if (/\d/.test(character)) return [Number(readDigits(reader)), 0];
  if (character === "√") {
    reader.position += 1;
    return [Math.sqrt(Number(readDigits(reader))), 0];
  }
  if (character === "(") return readInside(reader, 1, ")");
  if (text.startsWith("e^{", reader.position)) {
    const [re, im] = readInside(reader, 3, "}");
    return [Math.exp(re) * Math.cos(im), Math.exp(re) * Math.sin(im)];
  }
  // The longest name comes first: `iπ` is i times π, `kx` and `c12_` are one name each.
  const name = /^[a-zξ][a-z0-9_']*/.exec(text.slice(reader.position))?.[0] ?? character;
  for (let length = name.length; length > 0; length--) {
    const letter = reader.letters[name.slice(0, length)];
    if (letter === undefined) continue;
    reader.position += length;
    if (text[reader.position] !== "*") return letter;
    reader.position += 1;
    return [letter[0], -letter[1]];
  }
  return null;
}

function readInside(reader: Reader, opening: number, closing: string): Complex {
  reader.position += opening;
  const value = readSum(reader);
  if (reader.text[reader.position] !== closing)
    throw new Error(`expected ${closing} at ${reader.position} in ${reader.text}`);
  reader.position += 1;
  return value;
}

function readDigits(reader: Reader): string {
  const digits = /^\d+(?:\.\d+)?/.exec(reader.text.slice(reader.position))?.[0];
  if (digits === undefined) throw new Error(`expected digits at ${reader.position} in ${reader.text}`);
  reader.position += digits.length;
  return digits;
}
