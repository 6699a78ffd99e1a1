import { fail, KvaneError } from "../errors/index.js";
import { isConstantForm, type LinearForm, parameterNames, parseThreeForms } from "../numbers/index.js";

/** A wave vector as it was written, before a group decides what a decimal stands for. */
export interface WrittenWaveVector {
  readonly components: readonly [LinearForm, LinearForm, LinearForm];
  /** Per component: written as a decimal that is no fraction of denominator 1 to 4, hence measured. */
  readonly measured: readonly [boolean, boolean, boolean];
  readonly text: string;
}

/** A decimal is exact only when, as written, it equals a fraction of at most this denominator (0.5, 0.25, 0.75). */
const largestExactDecimalDenominator = 4;

/**
 * Reads `K`: three components separated by commas, each a fraction, a decimal, or a linear form in u, v, w.
 * Throws `invalid-k` with the column and what was expected.
 *
 * @param column column of the first character, counted from 1
 */
export function parseWaveVector(text: string, column = 1): WrittenWaveVector {
  // Brackets around the three components are how people write a vector; they carry no meaning.
  const bracketed = /^\s*[([](.*)[)\]]\s*$/.exec(text);
  const inner = bracketed ? (bracketed[1] as string) : text;
  const offset = bracketed ? text.indexOf(inner) : 0;
  let components: [LinearForm, LinearForm, LinearForm];
  try {
    components = parseThreeForms(inner, parameterNames, column + offset);
  } catch (error) {
    return refuse(text, error);
  }
  const parts = inner.split(",");
  const measured = components.map((form, index) => isMeasured(form, parts[index] as string)) as [
    boolean,
    boolean,
    boolean,
  ];
  if (measured.some(Boolean) && !components.every(isConstantForm))
    fail("invalid-k", `the wave vector \`${text}\` mixes a measured decimal with open letters`, {
      where: { column },
      expected: "fractions beside letters, as in 1/3,1/3,u",
      found: text,
      remedy: "write the decimal as a fraction, or give a number for every component",
    });
  return { components, measured, text };
}

function isMeasured(form: LinearForm, part: string): boolean {
  return part.includes(".") && form.constant[1] > largestExactDecimalDenominator;
}

function refuse(text: string, error: unknown): never {
  if (!(error instanceof KvaneError)) throw error;
  const [first] = error.problems;
  if (!first) throw error;
  fail("invalid-k", `\`${text}\` is not a wave vector: ${first.message}`, {
    where: { column: first.where.column },
    expected: first.expected ?? "three components such as 0,1/2,0",
    found: first.found ?? text,
    remedy: "give three fractions, decimals or forms in u, v, w, separated by commas",
  });
}
