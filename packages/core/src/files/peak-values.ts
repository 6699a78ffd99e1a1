import { whyNoNumber } from "../errors/index.js";
import { parseRational, toNumber } from "../numbers/index.js";
import { readNumber } from "./number-text.js";
import { type Column, type ColumnRole, hasColumnName } from "./peak-header.js";
import { note, type ProblemList } from "./problem-list.js";
import { decimalCommaOf, type Field, type Row } from "./table-rows.js";

/** A number of a row with its place; `uncertainty` is that of the brackets in 3.214(12). */
export interface PeakValue {
  readonly value: number;
  readonly uncertainty: number | null;
  readonly field: Field;
}

/** The numbers of a row by column, in the units of their kind. */
export type PeakCells = { readonly [role in ColumnRole]?: PeakValue };

/**
 * Reads the numbers of a row into their columns. Every cell that is no number, is missing or is too many is noted;
 * null comes back when there is one.
 */
export function readCells(
  row: Row,
  columns: readonly Column[],
  headed: boolean,
  problems: ProblemList,
): PeakCells | null {
  const before = problems.listed.length + problems.more;
  const comma = decimalCommaOf(row);
  if (comma) {
    noteDecimalComma(row, comma, problems);
    return null;
  }
  if (!readNumber(row.fields[0]?.text ?? "") && hasColumnName(row)) {
    note(problems, "invalid-peak", "a second header stands among the peaks", {
      where: { line: row.line, column: row.fields[0]?.column ?? 1 },
      expected: "one header at the top, and one kind of position in a list",
      found: row.text.trim(),
      remedy: "put lists of different kinds into different files",
    });
    return null;
  }
  const cells: { [role in ColumnRole]?: PeakValue } = {};
  row.fields.forEach((field, index) => {
    const column = columns[index];
    if (!column) {
      if (index === columns.length) noteTooMany(row, field, columns, headed, problems);
      return;
    }
    const value = readCell(row, field, column.role, headed, problems);
    if (value) cells[column.role] = scaled(value, column.factor ?? 1);
  });
  for (const { role } of columns.slice(row.fields.length)) {
    if (isPosition(role)) noteMissing(row, role, endOf(row), problems);
  }
  return problems.listed.length + problems.more > before ? null : cells;
}

function readCell(row: Row, field: Field, role: ColumnRole, headed: boolean, problems: ProblemList): PeakValue | null {
  if (field.text === "") {
    if (isPosition(role)) noteMissing(row, role, field.column, problems);
    else if (row.separator === "\t" && !headed) {
      note(problems, "invalid-peak", "an empty cell stands between two tabs", {
        where: { line: row.line, column: field.column },
        expected: `the ${role}, or one tab between two columns`,
        found: "nothing",
        remedy: "write a header that names the columns, or take the second tab away",
      });
    }
    return null;
  }
  const index = role === "h" || role === "k" || role === "l";
  const number = readNumber(field.text) ?? (index ? readFraction(field.text) : null);
  if (number) return { value: number.value, uncertainty: number.uncertainty, field };
  const message = whyNoNumber(field.text, `is no number for the ${role}`);
  note(problems, "invalid-peak", `\`${field.text}\` ${message}`, {
    where: { line: row.line, column: field.column },
    expected: index ? "a number or a fraction such as 1/2" : "a number such as 24.31",
    found: field.text,
    remedy: /\S\s+\S/.test(field.text)
      ? "separate all values of a row in one way"
      : "correct the value; what is no data goes behind #",
  });
  return null;
}

function readFraction(text: string): { readonly value: number; readonly uncertainty: null } | null {
  if (!/^[+-]?\d{1,9}\/\d{1,9}$/.test(text)) return null;
  const fraction = parseRational(text);
  return fraction && { value: toNumber(fraction), uncertainty: null };
}

function scaled(value: PeakValue, factor: number): PeakValue {
  if (factor === 1) return value;
  return {
    ...value,
    value: value.value * factor,
    uncertainty: value.uncertainty === null ? null : value.uncertainty * factor,
  };
}

export function isPosition(role: ColumnRole): boolean {
  return role === "position" || role === "h" || role === "k" || role === "l";
}

function endOf(row: Row): number {
  const last = row.fields.at(-1);
  return (last?.column ?? 1) + (last?.text.length ?? 0);
}

function noteMissing(row: Row, role: ColumnRole, column: number, problems: ProblemList): void {
  note(problems, "invalid-peak", `the row has no ${role}`, {
    where: { line: row.line, column },
    expected: `a number for the ${role}`,
    found: "nothing",
    remedy: "fill the value in, or remove the row",
  });
}

function noteTooMany(row: Row, field: Field, columns: readonly Column[], headed: boolean, problems: ProblemList): void {
  const indices = !headed && columns.length === 3;
  note(problems, "invalid-peak", `the row has ${row.fields.length} values where ${columns.length} are expected`, {
    where: { line: row.line, column: field.column },
    expected: columns.map(({ role }) => role).join(", "),
    found: field.text,
    remedy: indices
      ? "write a header that names the columns, such as: h k l intensity intensity-su"
      : headed
        ? "name every column in the header; a decimal comma must be a point"
        : "put notes behind #",
  });
}

/** Notes that a number has a decimal comma. */
export function noteDecimalComma(row: Row, field: Field, problems: ProblemList): void {
  note(problems, "invalid-peak", `\`${field.text}\` looks like a number with a decimal comma`, {
    where: { line: row.line, column: field.column },
    expected: "decimal points",
    found: field.text,
    remedy: "write 3.14 for 3,14; whole numbers that commas separate need a blank behind the comma",
  });
}
