/** One cell of a row, with the column (from 1) of its first character in the source line. */
export interface Field {
  readonly text: string;
  readonly column: number;
}

export type Separator = "," | ";" | "\t" | " ";

/** A line that holds something besides a comment. */
export interface Row {
  /** From 1. */
  readonly line: number;
  readonly fields: readonly Field[];
  readonly separator: Separator;
  /** The line without its comment. */
  readonly text: string;
}

/**
 * The rows of a text with `\n` line ends. A row is separated by semicolons if it has one, else by commas, else by tabs,
 * else by blanks. `#` and `!` start a comment; rows of separators alone (spreadsheets write them) are left out, and so
 * are empty fields at the end of a row.
 */
export function readRows(text: string): Row[] {
  const rows: Row[] = [];
  text.split("\n").forEach((whole, index) => {
    const comment = whole.search(/[#!]/);
    const content = comment < 0 ? whole : whole.slice(0, comment);
    if (content.trim() === "") return;
    const separator = separatorOf(content);
    const fields = separator === " " ? splitAtBlanks(content) : splitAt(content, separator);
    while (fields.at(-1)?.text === "") fields.pop();
    if (fields.length > 0) rows.push({ line: index + 1, fields, separator, text: content });
  });
  return rows;
}

function separatorOf(line: string): Separator {
  if (line.includes(";")) return ";";
  if (line.includes(",")) return ",";
  return line.trim().includes("\t") ? "\t" : " ";
}

function splitAtBlanks(line: string): Field[] {
  return [...line.matchAll(/\S+/g)].map((found) => unquoted(found[0], found.index + 1));
}

function splitAt(line: string, separator: Separator): Field[] {
  let start = 0;
  return line.split(separator).map((part) => {
    const leading = part.length - part.trimStart().length;
    const field = unquoted(part.trim(), start + leading + 1);
    start += part.length + 1;
    return field;
  });
}

/** Spreadsheets put names, sometimes numbers, between double quotes. */
function unquoted(text: string, column: number): Field {
  const quoted = /^"(.*)"$/.exec(text);
  return quoted ? { text: (quoted[1] ?? "").trim(), column: column + 1 } : { text, column };
}

const decimalComma = /^[+-]?\d*,\d+$/;

/**
 * A number with a decimal comma in a row where the comma cannot be the separator, or null. `3,14;0,02` and
 * `3,14 0,02` have one; `3,14` alone does not tell.
 */
export function decimalCommaOf(row: Row): Field | null {
  if (row.separator === ";") return row.fields.find((field) => decimalComma.test(field.text)) ?? null;
  if (row.separator !== "," || !/(?:^|\s)[+-]?\d*,\d+(?:\s|$)/.test(row.text)) return null;
  const parts = splitAtBlanks(row.text);
  return parts.length > 1 ? (parts.find((part) => decimalComma.test(part.text)) ?? null) : null;
}

/**
 * Whether every row looks like whole numbers between commas, `3,14` or `3,14,0,02`: then a decimal comma is likelier
 * than a list of peaks without a single decimal.
 */
export function looksLikeDecimalCommas(rows: readonly Row[]): boolean {
  return rows.every(
    (row) => row.separator === "," && row.fields.length > 1 && /^[\s+-]*\d+(?:,\d+)+\s*$/.test(row.text),
  );
}
