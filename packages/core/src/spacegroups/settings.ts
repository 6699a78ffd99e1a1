import { settingRows } from "./generated/settings.js";
import type { TabulatedSetting } from "./types.js";

/** A row of the table with what look-ups need besides the public fields. */
export interface SettingRow extends TabulatedSetting {
  /** The symbol before the letter e for double glide planes, or "". */
  readonly former: string;
  readonly fingerprint: string;
}

let lines: readonly string[] | null = null;
let rows: readonly SettingRow[] | null = null;

/** The rows as text: splitting is cheap, so that a look-up by number or fingerprint takes apart only what it needs. */
function settingLines(): readonly string[] {
  lines ??= settingRows.split("\n");
  return lines;
}

function readRow(line: string): SettingRow {
  const [number, hall, short, full, choice, standard, former, fingerprint] = line.split("|") as [
    string,
    string,
    string,
    string,
    string,
    string,
    string,
    string,
  ];
  return { number: Number(number), hall, short, full, choice, standard: standard === "*", former, fingerprint };
}

/** All rows, in the order of the table. */
export function settingTable(): readonly SettingRow[] {
  rows ??= settingLines().map(readRow);
  return rows;
}

export function settingsOfNumber(number: number): readonly SettingRow[] {
  return settingLines()
    .filter((line) => line.startsWith(`${number}|`))
    .map(readRow);
}

export function settingsOfFingerprint(fingerprint: string): readonly SettingRow[] {
  return settingLines()
    .filter((line) => line.endsWith(`|${fingerprint}`))
    .map(readRow);
}

/** The 530 tabulated settings (International Tables B, table A1.4.2.7), in the order of the table. */
export function tabulatedSettings(): readonly TabulatedSetting[] {
  return settingTable().map(({ number, hall, short, full, choice, standard }) => ({
    number,
    hall,
    short,
    full,
    choice,
    standard,
  }));
}
