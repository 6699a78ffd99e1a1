import { fail } from "../errors/index.js";
import {
  addForms,
  constantForm,
  type LinearForm,
  scaleForm,
  type VariableNames,
  variableForm,
  zeroForm,
} from "./linear-forms.js";
import { divide, multiply, one, parseRational, type Rational, rational } from "./rationals.js";

/**
 * Reads a linear form such as `-x+1/2`, `1/2 + x`, `0.25`, `2u`, `2*u/3`, `X - Y`. Blanks are allowed anywhere between
 * tokens, letters in either case. Decimals are taken as the exact fraction that is written.
 *
 * Throws `syntax` with the column (counted from `column`, that of the first character) and what was expected.
 */
export function parseForm(text: string, names: VariableNames, column = 1): LinearForm {
  const reader = { text, position: 0 };
  let sum = zeroForm;
  let first = true;
  skipBlanks(reader);
  while (reader.position < text.length) {
    const sign = readSign(reader);
    if (sign === null && !first) refuse(reader, column, "`+` or `-` between terms");
    const term = readTerm(reader, names, column);
    sum = addForms(sum, sign === -1 ? scaleForm([-1, 1], term) : term);
    first = false;
    skipBlanks(reader);
  }
  if (first) refuse(reader, column, `a number or one of ${names.join(", ")}`);
  return sum;
}

interface Reader {
  readonly text: string;
  position: number;
}

function skipBlanks(reader: Reader): void {
  while (/\s/.test(reader.text[reader.position] ?? "")) reader.position += 1;
}

function readSign(reader: Reader): 1 | -1 | null {
  const character = reader.text[reader.position];
  // U+2212 is what word processors and web pages make of a minus sign.
  if (character !== "+" && character !== "-" && character !== "\u2212") return null;
  reader.position += 1;
  skipBlanks(reader);
  return character === "+" ? 1 : -1;
}

/** number, number·variable, variable, each with an optional `/ integer` behind it. */
function readTerm(reader: Reader, names: VariableNames, column: number): LinearForm {
  let coefficient = readNumber(reader);
  const hadNumber = coefficient !== null;
  skipBlanks(reader);
  if (hadNumber && reader.text[reader.position] === "*") {
    reader.position += 1;
    skipBlanks(reader);
  }
  const letter = (reader.text[reader.position] ?? "").toLowerCase();
  const variable = names.findIndex((name) => name === letter && letter !== "");
  if (variable >= 0) reader.position += 1;
  else if (!hadNumber) refuse(reader, column, `a number or one of ${names.join(", ")}`);
  coefficient = coefficient ?? one;
  skipBlanks(reader);
  if (reader.text[reader.position] === "/") {
    reader.position += 1;
    skipBlanks(reader);
    const at = reader.position;
    const divisor = readNumber(reader);
    if (divisor === null || divisor[0] === 0) {
      reader.position = at;
      refuse(reader, column, "a number other than 0 behind `/`");
    } else coefficient = divide(coefficient, divisor);
  }
  return variable < 0 ? constantForm(coefficient) : scaleForm(coefficient, variableForm(variable));
}

/** Digits with an optional point; `1/2` in front of a variable is read as one number. */
function readNumber(reader: Reader): Rational | null {
  const found = /^(\d+\.?\d*|\.\d+)/.exec(reader.text.slice(reader.position));
  if (!found) return null;
  const whole = parseRational(found[0]);
  if (whole === null) return null;
  reader.position += found[0].length;
  const fraction = /^\s*\/\s*(\d+)/.exec(reader.text.slice(reader.position));
  if (!fraction || Number(fraction[1]) === 0) return whole;
  reader.position += fraction[0].length;
  return multiply(whole, rational(1, Number(fraction[1])));
}

function refuse(reader: Reader, column: number, expected: string): never {
  const found = reader.text[reader.position];
  fail(
    "syntax",
    `cannot read \`${reader.text}\`: ${found === undefined ? "it ends too early" : `unexpected \`${found}\``}`,
    {
      where: { column: column + reader.position },
      expected,
      found: found ?? "end of the text",
    },
  );
}

/** Splits at commas that separate the three components of a triplet, k or position; throws `syntax` unless three. */
export function parseThreeForms(text: string, names: VariableNames, column = 1): [LinearForm, LinearForm, LinearForm] {
  const parts = text.split(",");
  if (parts.length !== 3)
    fail("syntax", `\`${text}\` has ${parts.length} component${parts.length === 1 ? "" : "s"} instead of three`, {
      where: { column },
      expected: "three components separated by commas",
      found: text,
    });
  let start = column;
  const forms = parts.map((part) => {
    const form = parseForm(part, names, start);
    start += part.length + 1;
    return form;
  });
  return forms as [LinearForm, LinearForm, LinearForm];
}
