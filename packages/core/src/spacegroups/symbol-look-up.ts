import { editDistance, fail } from "../errors/index.js";
import { type SettingRow, settingsOfNumber, settingTable } from "./settings.js";
import { comparableSymbol, isWrittenAs, symbolLetters } from "./symbol-text.js";
import { displaySymbol, symbolWithCode } from "./symbols.js";
import type { GroupAssumption } from "./types.js";

/** A row of the table and what had to be assumed to come to it. */
export interface FoundSetting {
  readonly row: SettingRow;
  readonly assumed: readonly GroupAssumption[];
}

/** In which of its forms a row's symbol was found; earlier ones win. */
const forms = ["symbol", "former symbol", "symbol without the ones", "symbol without the bar"] as const;
type Form = (typeof forms)[number];

/**
 * The tabulated setting of a Hermann–Mauguin symbol with or without a setting code behind `:`; null when the symbol is
 * in no table.
 *
 * @throws `unknown-group` for a code that the symbol has not, `ambiguous-group` when a code is needed
 */
export function findSymbol(text: string, column = 1): FoundSetting | null {
  const colon = text.indexOf(":");
  const written = colon < 0 ? text : text.slice(0, colon);
  const code = colon < 0 ? null : text.slice(colon + 1).trim();
  const found = matchingRows(written);
  if (found === null) return code === null ? findWithLetter(written, column) : null;
  if (code !== null) return { row: rowWithCode(found, code, written, column + colon + 1), assumed: formNote(found) };
  const { row, note } = preferredRow(found, written, column);
  return { row, assumed: [...formNote({ ...found, rows: [row] }), ...note] };
}

/** The standard setting of a table number, or the one that a code behind `:` names. Throws `unknown-group`. */
export function findNumber(number: number, code: string | null, column = 1): FoundSetting {
  const rows = settingsOfNumber(number);
  if (rows.length === 0)
    fail("unknown-group", `there is no space group number ${number}`, {
      where: { column },
      expected: "a number from 1 to 230",
      found: String(number),
    });
  if (code !== null) return { row: rowWithCode({ rows, form: "symbol" }, code, String(number), column), assumed: [] };
  const row = rows.find((one) => one.standard) as SettingRow;
  return { row, assumed: row.choice === "" ? [] : [settingNote(row, `number ${number}`)] };
}

interface Match {
  readonly rows: readonly SettingRow[];
  readonly form: Form;
}

function matchingRows(written: string): Match | null {
  const symbol = comparableSymbol(written);
  const entries = (symbolsByLetters().get(symbol.letters) ?? []).filter(({ table }) => isWrittenAs(symbol, table));
  const form = forms.find((one) => entries.some((entry) => entry.form === one));
  if (form === undefined) return null;
  const rows = entries.filter((entry) => entry.form === form).map((entry) => entry.row);
  return { rows: [...new Set(rows)], form };
}

interface SymbolEntry {
  readonly row: SettingRow;
  readonly form: Form;
  readonly table: string;
}

let index: ReadonlyMap<string, readonly SymbolEntry[]> | null = null;

/** Every symbol of every row by its letters, made at the first look-up by symbol. */
function symbolsByLetters(): ReadonlyMap<string, readonly SymbolEntry[]> {
  if (index !== null) return index;
  const made = new Map<string, SymbolEntry[]>();
  for (const row of settingTable())
    for (const form of forms)
      for (const table of writings(row, form)) {
        const letters = symbolLetters(table);
        const known = made.get(letters);
        if (known) known.push({ row, form, table });
        else made.set(letters, [{ row, form, table }]);
      }
  index = made;
  return made;
}

/** The symbols that a row goes by in one form. */
function writings(row: SettingRow, form: Form): readonly string[] {
  if (form === "symbol") return [row.short, row.full];
  if (form === "former symbol") return row.former === "" ? [] : [row.former];
  if (form === "symbol without the ones")
    return row.number >= 3 && row.number <= 15 ? [row.full.replaceAll(" 1", "")] : [];
  // Until 1983 International Tables wrote m3 for m-3 in the cubic symbols with inversion.
  return row.number >= 200 && row.short.includes("-3") ? [row.short.replace("-3", "3")] : [];
}

function formNote({ rows, form }: Match): GroupAssumption[] {
  const row = rows[0] as SettingRow;
  if (form === "former symbol" || form === "symbol without the bar")
    return [{ what: "symbol", value: displaySymbol(row), because: "the symbol given is an older one of this setting" }];
  return [];
}

function rowWithCode(found: Match, code: string, written: string, column: number): SettingRow {
  const wanted = code.toLowerCase();
  const own = found.rows.filter((row) => row.choice.toLowerCase() === wanted);
  if (own.length > 0) return own[0] as SettingRow;
  // The symbol of the standard setting stands for the type, so that `Pnma:cab` is the cab setting of number 62.
  const standard = found.rows.find((row) => row.standard);
  const family = standard ? settingsOfNumber(standard.number) : [];
  const other = family.find((row) => row.choice.toLowerCase() === wanted);
  if (other) return other;
  const known = [...new Set((family.length > 0 ? family : found.rows).map((row) => row.choice))].filter(Boolean);
  return fail("unknown-group", `\`${written.trim()}\` has no setting \`${code}\``, {
    where: { column },
    expected: known.length > 0 ? `one of the codes ${known.join(", ")}` : "no code: there is one setting only",
    found: code,
  });
}

/** The row that a symbol without a code stands for. */
function preferredRow({ rows, form }: Match, written: string, column: number) {
  const only = rows[0] as SettingRow;
  if (rows.length === 1) return { row: only, note: [] };
  const symbol = `the symbol ${written.trim()}`;
  const standard = rows.find((row) => row.standard);
  if (standard) return { row: standard, note: [settingNote(standard, symbol)] };
  const candidates = form === "symbol without the ones" ? usualAxis(rows) : secondOrigin(rows);
  if (candidates.length === 1) {
    const row = candidates[0] as SettingRow;
    return { row, note: [settingNote(row, symbol)] };
  }
  return fail("ambiguous-group", `\`${written.trim()}\` stands for ${rows.length} tabulated settings`, {
    where: { column },
    expected: `one of ${rows.map((row) => symbolWithCode(row)).join(", ")}`,
    found: written.trim(),
    remedy: "add the setting code, or give the Hall symbol",
  });
}

/** Unique axis b before c before a, as the trade reads monoclinic symbols without their ones. */
function usualAxis(rows: readonly SettingRow[]): readonly SettingRow[] {
  for (const axis of ["b", "c", "a"]) {
    const own = rows.filter((row) => row.choice.replace("-", "").startsWith(axis));
    if (own.length > 0) return own;
  }
  return rows;
}

/** Of two rows that differ by the origin alone, the one with the inversion centre at the origin, as in the standard. */
function secondOrigin(rows: readonly SettingRow[]): readonly SettingRow[] {
  const origins = new Set(rows.map((row) => row.choice.slice(1)));
  return origins.size === 1 ? rows.filter((row) => row.choice.startsWith("2")) : rows;
}

const axesOfLetter: Readonly<Record<string, string>> = { h: "H", r: "R", s: "1", z: "2" };

/** `R -3 m H`, `F d -3 m Z`: the letter behind a blank that structure databases write for axes or origin. */
function findWithLetter(text: string, column: number): FoundSetting | null {
  const letter = /\s([HRSZ])\s*$/i.exec(text);
  const found = letter ? matchingRows(text.slice(0, letter.index)) : null;
  const code = axesOfLetter[letter?.[1]?.toLowerCase() ?? ""];
  if (!letter || found === null || !found.rows.some((row) => row.choice === code)) return null;
  return findSymbol(`${text.slice(0, letter.index)}:${code}`, column);
}

function settingNote(row: SettingRow, given: string): GroupAssumption {
  return {
    what: "setting of the space group",
    value: `${symbolWithCode(row)} (Hall symbol ${row.hall})`,
    because: `${given} leaves it open; taken is ${meaningOf(row)}`,
  };
}

function meaningOf(row: SettingRow): string {
  if (row.choice === "H") return "the setting with hexagonal axes";
  const axis = /^(-?[abc])([123]?)$/.exec(row.choice);
  if (axis) return `unique axis ${axis[1]}${axis[2] ? `, cell choice ${axis[2]}` : ""}`;
  if (row.choice.startsWith("2")) return "origin choice 2, with the inversion centre at the origin";
  return row.standard ? "the standard setting" : `the setting ${row.choice}`;
}

/** Up to three tabulated symbols that are spelt most like `text`, nearest first. */
export function nearestSymbols(text: string): readonly string[] {
  const { letters } = comparableSymbol(text);
  const best = new Map<string, number>();
  for (const row of settingTable())
    for (const symbol of [row.short, row.full.replaceAll(" 1", "")]) {
      const distance = editDistance(letters, comparableSymbol(symbol).letters);
      const name = displaySymbol(row);
      if (distance <= 2) best.set(name, Math.min(distance, best.get(name) ?? distance));
    }
  return [...best]
    .sort((a, b) => a[1] - b[1])
    .slice(0, 3)
    .map(([symbol]) => symbol);
}
