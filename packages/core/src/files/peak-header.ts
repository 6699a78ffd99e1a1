import { isTooLarge } from "../errors/index.js";
import type { PeakKind } from "../search/index.js";
import { readNumber } from "./number-text.js";
import { plainName, readPeakKind } from "./peak-kind.js";
import { unitFactor, unitNames } from "./peak-units.js";
import { note, type ProblemList } from "./problem-list.js";
import { decimalCommaOf, type Field, type Row } from "./table-rows.js";

/** What a column holds. */
export type ColumnRole =
  | "position"
  | "uncertainty"
  | "h"
  | "k"
  | "l"
  | "intensity"
  | "intensity uncertainty"
  | "polarization";

export interface Column {
  readonly role: ColumnRole;
  /** To the unit of the kind; null where the header names no unit. */
  readonly factor: number | null;
}

export interface Header {
  readonly line: number;
  /** Column (from 1) of the name that tells the kind, for messages. */
  readonly column: number;
  /** Null when the position is called just `position`. */
  readonly kind: PeakKind | null;
  readonly columns: readonly Column[];
}

const uncertaintyNames = ["su", "uncertainty", "sigma", "sig", "σ", "error", "esd"];
const polarizationNames = ["polarization", "polarisation"];
const intensityNames = ["intensity", "int", "i", "area", "counts"];
const uncertaintyName = /^(su|uncertainty|sigma|sig|σ|error|esd)(?:\((.+)\))?$/;

/** What a message about an unknown column expects. */
const columnWords =
  "d, q, two-theta or h k l, then su (uncertainty), intensity, intensity-su, in any order and with units in brackets";

/**
 * Whether the first row names the columns: its first cell is no number and some cell is a known name, or no cell at
 * all is a number. A row with a slip of the pen in a number stays data.
 */
export function isHeader(row: Row): boolean {
  if (readNumber(row.fields[0]?.text ?? "")) return false;
  // `3,10;0,01` is a row with decimal commas, which are refused as such.
  if (decimalCommaOf(row) !== null && !hasColumnName(row)) return false;
  return (
    hasColumnName(row) || !row.fields.some(({ text }) => readNumber(text) || noNumber.test(text) || isTooLarge(text))
  );
}

/** What programs print in the place of a number that they could not work out. */
const noNumber = /^(nan|[+-]?inf(inity)?)$/i;

/** Whether some cell of the row is a name that a header may have. */
export function hasColumnName(row: Row): boolean {
  return row.fields.some((field) => nameOf(field.text) !== null);
}

/** Reads the names of a header row; problems go to `problems`, and then null comes back. */
export function readHeader(row: Row, option: PeakKind | null, problems: ProblemList): Header | null {
  const fields = row.separator === " " ? withUnits(row.fields) : row.fields;
  const before = problems.listed.length + problems.more;
  const names = fields.map((field) => ({ field, ...splitUnit(field.text) }));
  const kinds = names.flatMap(({ field, name }) => {
    const kind = positionKind(name);
    return kind ? [{ field, kind }] : [];
  });
  const [first] = kinds;
  const other = kinds.find(({ kind }) => kind !== first?.kind);
  if (first && other) {
    note(problems, "invalid-peak", `the list mixes two kinds of position, ${first.kind} and ${other.kind}`, {
      where: { line: row.line, column: other.field.column },
      expected: "one kind of position in a list",
      found: other.field.text,
      remedy: "keep one of the columns; the other follows from it",
    });
    return null;
  }
  const kind = first?.kind ?? option;
  let previous: ColumnRole | null = null;
  const columns = names.map(({ field, name, unit }) => {
    const role = columnRole(name, previous);
    if (role === null) unknownColumn(row, field, problems);
    previous = role;
    const measured = role !== null && ["position", "uncertainty", "h", "k", "l"].includes(role);
    const factor = unit !== null && kind !== null && measured ? readUnit(row, field, kind, unit, problems) : null;
    return { role: role ?? "position", factor };
  });
  const roles = columns.map(({ role }) => role);
  if (problems.listed.length + problems.more === before) checkColumns(row, fields, roles, problems);
  if (problems.listed.length + problems.more > before) return null;
  return { line: row.line, column: first?.field.column ?? fields[0]?.column ?? 1, kind: first?.kind ?? null, columns };
}

/** In a row separated by blanks, `2theta (deg)` is one name with its unit. */
function withUnits(fields: readonly Field[]): Field[] {
  const joined: Field[] = [];
  for (const field of fields) {
    const last = joined.at(-1);
    if (last && /^[([]/.test(field.text)) joined[joined.length - 1] = { ...last, text: `${last.text} ${field.text}` };
    else joined.push(field);
  }
  return joined;
}

/** `d (Å)`, `d [Å]`, `d/Å` into name and unit; `sigma(I)` is a name. */
function splitUnit(text: string): { readonly name: string; readonly unit: string | null } {
  const whole = plainName(text);
  if (columnRole(whole, null) !== null) return { name: whole, unit: null };
  const found = /^([^([/]+)(?:[([](.*)[)\]]|\/(.+))$/.exec(text.trim());
  if (!found) return { name: whole, unit: null };
  return { name: plainName(found[1] ?? ""), unit: (found[2] ?? found[3] ?? "").trim() };
}

function nameOf(text: string): ColumnRole | null {
  return columnRole(splitUnit(text).name, null);
}

function positionKind(name: string): PeakKind | null {
  if (name === "h" || name === "k" || name === "l") return "hkl";
  const kind = readPeakKind(name);
  return kind === "hkl" ? null : kind;
}

function columnRole(name: string, previous: ColumnRole | null): ColumnRole | null {
  if (name === "h" || name === "k" || name === "l") return name;
  if (name === "position" || name === "pos" || positionKind(name)) return "position";
  if (intensityNames.includes(name)) return "intensity";
  if (polarizationNames.includes(name)) return "polarization";
  const uncertainty = uncertaintyName.exec(name);
  if (uncertainty) {
    const of = uncertainty[2];
    if (of === undefined) return previous === "intensity" ? "intensity uncertainty" : "uncertainty";
    if (intensityNames.includes(of)) return "intensity uncertainty";
    return of === "hkl" || positionKind(of) ? "uncertainty" : null;
  }
  const ofIntensity = intensityNames.some((i) => uncertaintyNames.some((su) => name === i + su || name === su + i));
  return ofIntensity ? "intensity uncertainty" : null;
}

function unknownColumn(row: Row, field: Field, problems: ProblemList): void {
  note(problems, "invalid-peak", `\`${field.text}\` is no known name of a column`, {
    where: { line: row.line, column: field.column },
    expected: columnWords,
    found: field.text,
    remedy: "rename the column, or remove it",
  });
}

function readUnit(row: Row, field: Field, kind: PeakKind, unit: string, problems: ProblemList): number | null {
  const factor = unitFactor(kind, unit);
  if (factor === null) {
    note(problems, "invalid-peak", `\`${unit}\` is no unit for ${kind}`, {
      where: { line: row.line, column: field.column },
      expected: unitNames(kind),
      found: unit,
      remedy: "convert the column, or correct the unit",
    });
  }
  return factor;
}

/** Every name once, a position among them, h k l complete. */
function checkColumns(row: Row, fields: readonly Field[], roles: readonly ColumnRole[], problems: ProblemList): void {
  roles.forEach((role, index) => {
    if (roles.indexOf(role) === index) return;
    note(problems, "invalid-peak", `the header names the ${role} twice`, {
      where: { line: row.line, column: fields[index]?.column ?? 1 },
      expected: columnWords,
      found: fields[index]?.text ?? "",
      remedy: "rename or remove one of the two columns",
    });
  });
  const indices = roles.filter((role) => role === "h" || role === "k" || role === "l").length;
  if (roles.includes("position") ? indices === 0 : indices === 3) return;
  note(
    problems,
    "invalid-peak",
    indices > 0 ? "the header does not name all of h, k, l" : "the header names no position",
    {
      where: { line: row.line, column: fields[0]?.column ?? 1 },
      expected: columnWords,
      found: fields.map(({ text }) => text).join(", "),
      remedy: "name every column of the list",
    },
  );
}
