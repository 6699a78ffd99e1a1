import { fail, placed } from "../errors/index.js";
import {
  add,
  divide,
  formatRational,
  isZero,
  multiply,
  parseRational,
  type Rational,
  type RationalMatrix,
  rational,
  zero,
} from "../numbers/index.js";
import { operatorFrom, rotationOf, translationOf } from "../spacegroups/index.js";
import type { SuperspaceOperator } from "./superspace.js";

const example = "x1,x2,-x3,-x4+1/2,-1";

/** Coefficients of x1 to x4 and a constant. */
type Form = readonly [Rational, Rational, Rational, Rational, Rational];

/**
 * The text of an operator as in `_space_group_symop_magn_ssg_operation.algebraic` of the magnetic dictionary:
 * `x1,x2,-x3,-x4+1/2,-1`; terms of H are written out in the fourth place, `-x3+x4+1/4`. `parseSuperspace` reads it back.
 */
export function formatSuperspace({ operator, timeReversal, epsilon, shift, delta }: SuperspaceOperator): string {
  const translation = translationOf(operator);
  const rows = rotationOf(operator).map((row, index) => formatForm([...row, zero, translation[index] as Rational]));
  return [...rows, formatForm([...shift, rational(epsilon), delta]), timeReversal === 1 ? "+1" : "-1"].join(",");
}

function formatForm(form: Form): string {
  const terms = form.flatMap((entry, index) => {
    if (isZero(entry)) return [];
    const size: Rational = [Math.abs(entry[0]), entry[1]];
    const sign = entry[0] < 0 ? "-" : "+";
    if (index === 4) return [sign + formatRational(size)];
    return [`${sign}${size[0] === 1 ? "" : size[0]}x${index + 1}${size[1] === 1 ? "" : `/${size[1]}`}`];
  });
  return terms.length === 0 ? "0" : terms.join("").replace(/^\+/, "");
}

/**
 * Reads an operator of a superspace of four dimensions: four forms in x1 to x4 and the time reversal, `+1` where it is
 * left out. The first three must not hold x4, the fourth must hold it with 1 or −1.
 *
 * @param column place of the first character, for errors
 * @throws `syntax` with the column
 */
export function parseSuperspace(text: string, column = 1): SuperspaceOperator {
  const parts = text.split(",");
  if (parts.length < 4 || parts.length > 5)
    refuse(column, `\`${text.trim()}\` has ${parts.length} components instead of five`, text);
  let start = column;
  const columns = parts.map((part) => {
    const own = start;
    start += part.length + 1;
    return own;
  });
  const forms = parts.slice(0, 4).map((part, index) => parseForm(part, columns[index] as number));
  forms.slice(0, 3).forEach((form, index) => {
    if (!isZero(form[3]))
      refuse(columns[index] as number, "a coordinate in space does not depend on x4", parts[index] as string);
  });
  const [first, second, third, fourth] = forms as [Form, Form, Form, Form];
  if (fourth[3][1] !== 1 || Math.abs(fourth[3][0]) !== 1)
    refuse(columns[3] as number, "the fourth coordinate must hold x4 or -x4", parts[3] as string);
  const reversal = (parts[4] ?? "1").trim().replace("\u2212", "-");
  if (!/^[+-]?1$/.test(reversal))
    refuse(columns[4] as number, `\`${reversal}\` is no time reversal`, parts[4] as string);
  const matrix = [first, second, third].map(([x, y, z]) => [x, y, z]) as unknown as RationalMatrix;
  return {
    operator: operatorFrom(matrix, [first[4], second[4], third[4]]),
    timeReversal: reversal === "-1" ? -1 : 1,
    epsilon: fourth[3][0] === 1 ? 1 : -1,
    shift: [fourth[0], fourth[1], fourth[2]],
    delta: fourth[4],
  };
}

/** A sum of terms such as `-x3`, `2x1`, `x2/2`, `1/4`, `0.25`. */
function parseForm(text: string, column: number): Form {
  const form: Rational[] = [zero, zero, zero, zero, zero];
  const term = /\s*([+\-\u2212]?)\s*(\d+(?:\.\d*)?(?:\/\d+)?|\.\d+)?\s*\*?\s*(?:[xX]([1-4])\s*(?:\/\s*(\d+))?)?\s*/y;
  let position = 0;
  while (position < text.length || position === 0) {
    term.lastIndex = position;
    const [whole, sign, number, variable, divisor] = term.exec(text) as RegExpExecArray;
    if ((number === undefined && variable === undefined) || (position > 0 && sign === ""))
      refuse(column + position, `cannot read \`${text.trim()}\``, text.slice(position));
    const size = placed({ column: column + position }, () => parseRational(number ?? "1"));
    if (size === null || divisor === "0") return refuse(column + position, `cannot read \`${text.trim()}\``, whole);
    const factor = multiply(
      rational(sign === "" || sign === "+" ? 1 : -1),
      divide(size, rational(Number(divisor ?? 1))),
    );
    const place = variable === undefined ? 4 : Number(variable) - 1;
    form[place] = add(form[place] as Rational, factor);
    position += whole.length;
  }
  return form as unknown as Form;
}

function refuse(column: number, message: string, found: string): never {
  return fail("syntax", message, {
    where: { column },
    expected: `an operator of superspace, for example ${example}`,
    found: found.trim() === "" ? "nothing" : found.trim(),
  });
}
