import { note, type ProblemList } from "./problem-list.js";
import type { Field, Row } from "./table-rows.js";

/** What a column of a temperature scan holds. */
export type ScanRole = "temperature" | "intensity" | "k" | "uncertainty";

/** A column of a temperature scan. */
export interface ScanColumn {
  readonly name: string;
  readonly role: ScanRole;
  /** For uncertainties: index of the column that they belong to; null for other columns. */
  readonly of: number | null;
  /** Whether uncertainties were told by a name that is only like that of their column, such as `s1` for `I1`. */
  readonly guessed: boolean;
}

const temperatureName = /^(t|temp|temperature)(\s*[/([]\s*k\s*[)\]]?)?$/i;
const kName = /^(k|k[xyz]|[uvw])(\s*[/([].*)?$/i;
const word = "su|s\\.u\\.|sigma|sig|σ|error|err|esd|std|sd|unc|uncertainty|±|\\+-|\\+/-";
/** `su`, `err_I1`, `σ(I1)`, `su 2`, and `su2` without a separator. */
const wordFirst = new RegExp(`^(?:${word})(?:[\\s([_.-]+(.*)|(\\d+))?$`, "i");
/** `I1 su`, `I1_err`. */
const wordLast = new RegExp(`^(.*?)[\\s_.-]+(?:${word})$`, "i");
/** A word or a letter that goes straight on with a name: `sigmaI1`, `sI1`, `s1`. */
const attached = new RegExp(`^(?:${word}|[sedσδΔ])(.*)$`, "i");
/** The same at the end: `I1err`. */
const attachedLast = new RegExp(`^(.+?)(?:${word})$`, "i");

/**
 * The columns that a header names: T, then quantities. A column called su (or sigma, error, esd, …) holds the
 * uncertainties of the quantity that its name goes on with, else of the one before it; `s1`, `e1`, `d1`, `sI1` do where a
 * quantity is called so, and `s` or `e` behind one.
 */
export function scanColumns(row: Row, problems: ProblemList): ScanColumn[] {
  const fields = row.separator === " " ? joinedBrackets(row.fields) : row.fields;
  const temperature = fields.findIndex(({ text }) => temperatureName.test(text));
  const columns: ScanColumn[] = [];
  fields.forEach((field, index) => {
    columns.push(
      index === temperature ? plain(field.text, "temperature") : columnOf(field, columns, row.line, problems),
    );
  });
  if (temperature < 0)
    note(problems, "invalid-scan", "no column of the header is the temperature", {
      where: { line: row.line, column: row.fields[0]?.column ?? 1 },
      expected: "a column called T",
      found: row.text.trim(),
      remedy: "call the column of temperatures T; they are in K",
    });
  noteRepeated(fields, columns, row.line, problems);
  return columns;
}

/** Whether a column holds what is fitted. */
export function holdsValues({ role }: ScanColumn): boolean {
  return role === "intensity" || role === "k";
}

function plain(name: string, role: ScanRole): ScanColumn {
  return { name, role, of: null, guessed: false };
}

function columnOf({ text, column }: Field, before: readonly ScanColumn[], line: number, problems: ProblemList) {
  const named = uncertaintyOf(text, before);
  if (named === null) return plain(text, kName.test(text) ? "k" : "intensity");
  if (named.of === null)
    note(problems, "invalid-scan", `\`${text}\` stands before any column of values`, {
      where: { line, column },
      expected: "uncertainties behind the column that they belong to",
      found: text,
      remedy: "put the column behind that of its values: T, peak1, su",
    });
  else if (before.some(({ of }) => of === named.of))
    note(problems, "invalid-scan", `\`${text}\` are second uncertainties of ${before[named.of]?.name ?? ""}`, {
      where: { line, column },
      expected: "one column of uncertainties for each column of values",
      found: text,
      remedy: "put every column of uncertainties behind its own values, or name both: I1 I2 su_I1 su_I2",
    });
  return { name: text, role: "uncertainty", ...named } as const;
}

/** Which earlier column a name speaks of, or null where it is no name of uncertainties. */
function uncertaintyOf(text: string, before: readonly ScanColumn[]): Pick<ScanColumn, "of" | "guessed"> | null {
  const [first, last] = [wordFirst.exec(text), wordLast.exec(text)];
  if (first !== null || last !== null) {
    const rest = first?.[1] ?? first?.[2] ?? last?.[1] ?? "";
    return { of: columnCalled(rest, before) ?? lastQuantity(before), guessed: false };
  }
  if (/^[se]$/i.test(text)) {
    const of = lastQuantity(before);
    return of === null || before.some((one) => one.of === of) ? null : { of, guessed: true };
  }
  for (const rest of [attached.exec(text)?.[1], attachedLast.exec(text)?.[1]]) {
    const of = rest === undefined || rest === "" ? null : columnCalled(rest, before);
    if (of !== null) return { of, guessed: true };
  }
  return null;
}

/** The quantity of that name, or the temperature; for a bare number the quantity whose name ends in it. */
function columnCalled(given: string, before: readonly ScanColumn[]): number | null {
  const name = given
    .replace(/[)\]]$/, "")
    .trim()
    .toLowerCase();
  if (name === "") return null;
  const found = before.findIndex(
    (one) =>
      (one.role !== "uncertainty" && one.name.toLowerCase() === name) ||
      (holdsValues(one) && /^\d+$/.test(name) && /(?<![\d./-])\d+$/.exec(one.name)?.[0] === name),
  );
  return found < 0 ? null : found;
}

function lastQuantity(columns: readonly ScanColumn[]): number | null {
  const found = columns.map(holdsValues).lastIndexOf(true);
  return found < 0 ? null : found;
}

function noteRepeated(fields: readonly Field[], columns: readonly ScanColumn[], line: number, problems: ProblemList) {
  const names = columns.filter(({ role }) => role !== "uncertainty").map(({ name }) => name);
  const twice = names.find((name, index) => names.indexOf(name) !== index);
  if (twice === undefined) return;
  note(problems, "invalid-scan", `two columns are called ${twice}`, {
    where: { line, column: fields.filter(({ text }) => text === twice).at(-1)?.column ?? 1 },
    expected: "a name of its own for each column",
    found: twice,
    remedy: "number the peaks; every column of uncertainties may be called su, behind its peak",
  });
}

/** `(0 1/2 1)` is one name though blanks separate the columns. */
function joinedBrackets(fields: readonly Field[]): Field[] {
  const joined: { text: string; column: number }[] = [];
  let open = false;
  for (const { text, column } of fields) {
    const last = joined.at(-1);
    if (open && last) last.text += ` ${text}`;
    else joined.push({ text, column });
    const whole = joined.at(-1)?.text ?? "";
    open = (whole.match(/[([]/g) ?? []).length > (whole.match(/[)\]]/g) ?? []).length;
  }
  return joined;
}
