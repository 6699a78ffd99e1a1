import { fail, placed } from "../errors/index.js";
import {
  addVectors,
  axisNames,
  determinant,
  formatForm,
  formatRational,
  identityMatrix,
  invert,
  isZero,
  multiplyMatrices,
  negateVector,
  parseRational,
  parseThreeForms,
  type RationalVector,
  timesColumn,
  transpose,
  zero,
  zeroVector,
} from "../numbers/index.js";
import { formsToMatrix } from "./triplets.js";
import type { BasisChange } from "./types.js";

/** The change that leaves axes and origin as they are. */
export const identityChange: BasisChange = { matrix: identityMatrix, shift: zeroVector };

/** How it is written. */
export const identityChangeText = "a,b,c;0,0,0";

/**
 * Reads a change of basis in the letters of International Tables A: `a,b,2c;0,0,1/4`, with or without brackets; the
 * new axes in terms of the old ones, then the new origin in old coordinates (zero when left out).
 *
 * @param column place of the first character, for errors
 * @throws `syntax` with the column, `singular-basis`
 */
export function parseBasisChange(text: string, column = 1): BasisChange {
  const opening = /^\s*\(/.exec(text);
  const closing = opening ? /\)\s*$/.exec(text) : null;
  const start = opening && closing ? opening[0].length : 0;
  const inner = closing ? text.slice(start, closing.index) : text;
  const parts = inner.split(";");
  if (parts.length > 2)
    fail("syntax", `\`${text.trim()}\` has more than one \`;\``, {
      where: { column: column + start },
      expected: "three axes, `;`, three numbers, for example a,b,2c;0,0,1/4",
      found: text.trim(),
    });
  const axes = parts[0] as string;
  const { matrix: rows, constants } = formsToMatrix(parseThreeForms(axes, axisNames, column + start));
  if (!constants.every(isZero))
    fail("syntax", `an axis of \`${axes}\` has a term without a, b or c`, {
      where: { column: column + start },
      expected: "axes in terms of a, b, c; a shift of the origin stands behind `;`",
      found: axes.trim(),
    });
  const shift = parts[1] === undefined ? zeroVector : parseShift(parts[1], column + start + axes.length + 1);
  if (isZero(determinant(rows)))
    fail("singular-basis", `the axes \`${axes.trim()}\` do not span space`, {
      where: { column: column + start },
      expected: "three linearly independent axes",
      found: axes.trim(),
    });
  return { matrix: transpose(rows), shift };
}

function parseShift(text: string, column: number): RationalVector {
  const parts = text.split(",");
  const refuse = (at: number, found: string): never =>
    fail("syntax", `cannot read the shift of origin \`${text.trim()}\``, {
      where: { column: at },
      expected: "three numbers separated by commas, for example 0,0,1/4",
      found: found.trim() === "" ? "nothing" : found.trim(),
    });
  if (parts.length !== 3) refuse(column, text);
  let start = column;
  const values = parts.map((part) => {
    const value = placed({ column: start }, () => parseRational(part.replaceAll("\u2212", "-")));
    if (value === null) return refuse(start + (part.length - part.trimStart().length), part);
    start += part.length + 1;
    return value;
  });
  return [values[0] ?? zero, values[1] ?? zero, values[2] ?? zero];
}

/** `a,b,2c;0,0,1/4`: the axes are the columns of P. */
export function formatBasisChange(change: BasisChange): string {
  const axes = transpose(change.matrix).map((column) =>
    formatForm({ coefficients: column, constant: zero }, axisNames),
  );
  return `${axes.join(",")};${change.shift.map(formatRational).join(",")}`;
}

/** `first`, then `second` in the axes that `first` leads to: `P = P₁P₂`, `p = p₁ + P₁p₂`. */
export function composeBasisChanges(first: BasisChange, second: BasisChange): BasisChange {
  return {
    matrix: multiplyMatrices(first.matrix, second.matrix),
    shift: addVectors(first.shift, timesColumn(first.matrix, second.shift)),
  };
}

/** The way back: `P⁻¹`, `−P⁻¹p`. Throws `singular-basis`. */
export function invertBasisChange(change: BasisChange): BasisChange {
  const matrix = invert(change.matrix);
  return { matrix, shift: negateVector(timesColumn(matrix, change.shift)) };
}
