import { fail } from "../errors/index.js";

/** What stands between brackets behind a group, and the column of its first character. */
export interface Brackets {
  readonly inner: string;
  readonly column: number;
}

/** The text of a group taken apart. */
export interface GroupText {
  readonly head: string;
  /** Column of the head's first character. */
  readonly column: number;
  readonly hallOperator: Brackets | null;
  readonly basisChange: Brackets | null;
}

/**
 * Takes the brackets off the end of a group's text: Hall's operator (letters x, y, z or integers alone), then the
 * change of basis (letters a, b, c). Throws `syntax` for mixed letters, brackets out of order or left open.
 */
export function takeBrackets(text: string): GroupText {
  let rest = text.trimEnd();
  let hallOperator: Brackets | null = null;
  let basisChange: Brackets | null = null;
  while (rest.endsWith(")")) {
    const start = rest.lastIndexOf("(");
    if (start < 0) refuse(rest.length, "`(` before `)`", ")");
    const brackets = { inner: rest.slice(start + 1, -1), column: start + 2 };
    if (kindOf(brackets) === "axes") {
      if (hallOperator || basisChange) refuse(brackets.column - 1, "one change of basis, behind Hall's operator", "(");
      basisChange = brackets;
    } else {
      if (hallOperator) refuse(brackets.column - 1, "one operator of Hall", "(");
      hallOperator = brackets;
    }
    rest = rest.slice(0, start).trimEnd();
  }
  const open = rest.search(/[()]/);
  if (open >= 0) refuse(open + 1, "brackets that are closed and stand at the end", rest[open] as string);
  const head = rest.trimStart();
  return { head, column: rest.length - head.length + 1, hallOperator, basisChange };
}

function kindOf({ inner, column }: Brackets): "axes" | "coordinates" {
  const axes = inner.search(/[abc]/i);
  const coordinates = inner.search(/[xyz]/i);
  if (axes >= 0 && coordinates >= 0)
    refuse(
      column + Math.max(axes, coordinates),
      "letters a, b, c (new axes) or x, y, z (Hall's operator), not both",
      inner,
    );
  return axes >= 0 || inner.includes(";") ? "axes" : "coordinates";
}

function refuse(column: number, expected: string, found: string): never {
  fail("syntax", "cannot read the change of basis", { where: { column }, expected, found });
}
