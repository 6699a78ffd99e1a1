import { fail, KvaneError } from "../../errors/index.js";
import {
  type Cell,
  checkCellAgainstGroup,
  type GroupAssumption,
  groupFromSetting,
  type ParsedGroup,
  parseGroupWithNotes,
  type SpaceGroup,
  tabulatedSettings,
} from "../../spacegroups/index.js";
import { type BlockReader, firstText } from "./block-reader.js";
import type { CifText } from "./document.js";
import { sameGroup } from "./group-text.js";
import { readingValue } from "./places.js";

/** What a CIF can say of its symmetry besides operators, in the order in which it is believed. */
export type SymbolKind = "Hall symbol" | "Hermann–Mauguin symbol" | "number";

/** A value and the data name it stands under. */
export type NamedText = CifText & { readonly name: string };

/** A statement of the symmetry, not yet read. */
export interface SymbolStatement {
  readonly kind: SymbolKind;
  readonly value: NamedText;
  /** Whether the symbol or a code beside it names axes and origin. */
  readonly coded: boolean;
  readonly read: () => ParsedGroup;
}

/**
 * The statements of a block. The cell decides between settings that one symbol stands for, hexagonal and rhombohedral
 * axes above all, where only one of them fits it.
 */
export function symbolStatements(reader: BlockReader, cell: Cell | null): SymbolStatement[] {
  const statements: SymbolStatement[] = [];
  const code = firstText(reader, "_space_group_IT_coordinate_system_code");
  const add = (kind: SymbolKind, value: NamedText, coded: boolean, read: (value: CifText) => ParsedGroup): void => {
    statements.push({ kind, value, coded, read: () => readingValue(reader, value, () => read(value)) });
  };
  for (const value of differing(reader, hallNames)) add("Hall symbol", value, true, ({ text }) => readHall(tidy(text)));
  // A symbol with a code says more than the same one without: it is believed first.
  const symbols = differing(reader, symbolNames);
  const withCodeFirst = [...symbols.filter(hasCode), ...symbols.filter((value) => !hasCode(value))];
  for (const value of withCodeFirst)
    add("Hermann–Mauguin symbol", value, hasCode(value) || code !== null, ({ text }) =>
      withCode(plainSymbol(text), code, cell),
    );
  for (const value of differing(reader, numberNames))
    add("number", value, code !== null, ({ text }) => withCode(text.trim(), code, cell));
  return statements;
}

const hallPrefix = "hall:";

/** The group of a Hall symbol; columns in problems count from the start of the symbol. */
function readHall(symbol: string): ParsedGroup {
  try {
    return parseGroupWithNotes(hallPrefix + symbol);
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(
      error.problems.map((one) => {
        const { column } = one.where;
        return { ...one, where: { ...one.where, column: column && Math.max(1, column - hallPrefix.length) } };
      }),
    );
  }
}

const hallNames = ["_space_group_name_Hall", "_symmetry_space_group_name_Hall"];
const symbolNames = [
  "_space_group_name_H-M_alt",
  "_symmetry_space_group_name_H-M",
  "_space_group_name_H-M_full",
  "_space_group_name_H-M",
];
const numberNames = ["_space_group_IT_number", "_symmetry_Int_Tables_number"];

/** What the older and newer names of one item say, equal texts once. */
function differing(reader: BlockReader, names: readonly string[]): NamedText[] {
  const found = new Map<string, NamedText>();
  for (const name of names) {
    const value = firstText(reader, name);
    const key = value && tidy(value.text).toLowerCase();
    if (value && key !== null && !found.has(key)) found.set(key, { ...value, name });
  }
  return [...found.values()];
}

function hasCode({ text }: CifText): boolean {
  return text.includes(":");
}

/** Blanks and line ends as single blanks. */
function tidy(text: string): string {
  return text.trim().replace(/\s+/g, " ");
}

/** How files say the setting in words or by a letter behind the symbol, and the code for it. */
const settingWords: readonly (readonly [RegExp, string])[] = [
  [/\s*\(?\s*origin(?:\s*choice|\s*at)?\s*([12])\s*\)?$/i, ":$1"],
  [/\s*\(?\s*hexagonal(?:\s*(?:axes|setting))?\s*\)?$/i, ":H"],
  [/\s*\(?\s*rhombohedral(?:\s*(?:axes|setting))?\s*\)?$/i, ":R"],
  // No other symbol ends in a capital.
  [/(\S)([HRSZ])$/, "$1 $2"],
];

/**
 * A Hermann–Mauguin symbol as CIFs have it: `P2(1)/c` is how programs without subscripts wrote `P2_1/c`, some files put
 * the number or words for the setting behind the symbol.
 */
function plainSymbol(text: string): string {
  const symbol = tidy(text).replace(/\s*\(?\bNo\.?\s*\d+\)?$|\s+\(\d{1,3}\)$/i, "");
  return settingWords
    .reduce((one, [pattern, code]) => one.replace(pattern, code), symbol)
    .replace(/(\d)\((\d)\)/g, "$1_$2");
}

/** Codes of axes that International Tables leave away are written out in the dictionary: `1abc`, `2abc`, `abc`. */
function settingCode(code: string): string {
  return code.trim().replace(/abc$/, "");
}

function withCode(symbol: string, code: CifText | null, cell: Cell | null): ParsedGroup {
  const written = code === null || symbol.includes(":") ? "" : settingCode(code.text);
  if (written !== "") {
    try {
      return parseGroupWithNotes(`${symbol}:${written}`);
    } catch (error) {
      // The code may belong to another edition of the tables; the symbol by itself is read then.
      if (!(error instanceof KvaneError)) throw error;
    }
  }
  refuseTripleCell(symbol);
  const parsed = parseGroupWithNotes(symbol);
  refuseHallReading(parsed, symbol);
  return cell && parsed.assumed.some(({ what }) => what === "setting of the space group")
    ? (settingThatFits(parsed, cell) ?? parsed)
    : parsed;
}

/**
 * `H 3` is in no table. Files of proteins mean R 3 with hexagonal axes, older tables a tripled hexagonal cell: which one
 * must be said.
 */
function refuseTripleCell(symbol: string): void {
  if (!/^H\s*-?3/i.test(symbol)) return;
  const rest = symbol
    .slice(1)
    .replace(/\s*:.*$/, "")
    .trim();
  fail("ambiguous-group", `\`${symbol}\` is in no table of Hermann–Mauguin symbols`, {
    where: { column: 1 },
    expected: "a Hermann–Mauguin symbol",
    found: symbol,
    remedy: `write R ${rest}:H if H stands for R with hexagonal axes, as in files of proteins; or add the operators`,
  });
}

/**
 * `P 3 2` is no Hermann–Mauguin symbol with a blank too many, but a Hall symbol of another group than `P 32`; `P 2 2`
 * is Hall's alone. Where a Hermann–Mauguin symbol is due, neither is taken.
 */
function refuseHallReading({ group, assumed }: ParsedGroup, symbol: string): void {
  const noted = assumed.some(({ what, value }) => what === "reading of the symbol" && value.startsWith("Hall"));
  if (!noted && !isHallAlone(group, symbol)) return;
  fail("ambiguous-group", `\`${symbol}\` is no Hermann–Mauguin symbol`, {
    where: { column: 1 },
    expected: "a Hermann–Mauguin symbol",
    found: symbol,
    remedy: "correct the symbol and its blanks, write a Hall symbol under _space_group_name_Hall, or add the operators",
  });
}

/** Whether a text is the Hall symbol of the group that it was read as, and the letters of no tabulated symbol. */
function isHallAlone(group: SpaceGroup, symbol: string): boolean {
  const letters = (text: string): string => text.replace(/[\s_]/g, "").toLowerCase();
  const own = letters(symbol);
  if (tabulatedSettings().some(({ short, full }) => letters(short) === own || letters(full) === own)) return false;
  try {
    return sameGroup(parseGroupWithNotes(`hall:${symbol}`).group, group);
  } catch (error) {
    if (error instanceof KvaneError) return false;
    throw error;
  }
}

/** Another setting of the same symbol, where the one taken does not fit the cell and that one does. */
function settingThatFits(parsed: ParsedGroup, cell: Cell): ParsedGroup | null {
  if (fits(parsed, cell)) return null;
  const { number, hall } = parsed.group.name;
  const own = tabulatedSettings().find((row) => row.hall === hall);
  for (const row of tabulatedSettings()) {
    if (row.number !== number || row === own || (row.short !== own?.short && row.full !== own?.full)) continue;
    const group = groupFromSetting(row);
    const note: GroupAssumption = {
      what: "setting of the space group",
      value: `${group.name.hermannMauguin}${row.choice === "" ? "" : `:${row.choice}`} (Hall symbol ${row.hall})`,
      because: "the symbol leaves it open, and the cell fits this one",
    };
    if (fits({ group }, cell)) return { group, assumed: [note] };
  }
  return null;
}

function fits({ group }: Pick<ParsedGroup, "group">, cell: Cell): boolean {
  try {
    checkCellAgainstGroup(cell, group);
    return true;
  } catch (error) {
    if (error instanceof KvaneError) return false;
    throw error;
  }
}
