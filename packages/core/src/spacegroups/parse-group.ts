import { fail, KvaneError } from "../errors/index.js";
import { determinant } from "../numbers/index.js";
import { formatBasisChange, parseBasisChange } from "./basis-changes.js";
import { groupOnLattice, unnamed } from "./build-group.js";
import { changeBasis } from "./change-basis.js";
import { groupFromHallText, sameOperators } from "./fingerprints.js";
import { type Brackets, takeBrackets } from "./group-brackets.js";
import { groupFromHall, parseHallOperator } from "./hall-groups.js";
import { parseHallSymbol } from "./hall-symbols.js";
import { groupFromSetting, nameOfSetting, settingWithOperators } from "./name-groups.js";
import { findNumber, findSymbol, nearestSymbols } from "./symbol-look-up.js";
import { parseTripletList } from "./triplet-lists.js";
import type { GroupAssumption, SpaceGroup } from "./types.js";

/** A group and what its text left open. */
export interface ParsedGroup {
  readonly group: SpaceGroup;
  readonly assumed: readonly GroupAssumption[];
}

/**
 * Reads a space group: a table number (`62`, `227:1`), a Hermann–Mauguin symbol with optional setting code
 * (`P n m a`, `P21/c`, `R -3 m:H`), a Hall symbol (`hall:-P 2ac 2n`, the prefix optional where no Hermann–Mauguin
 * symbol is spelt so) or coordinate triplets separated by `;`. A change of basis may follow in brackets: `(a,b,2c;0,0,1/4)`
 * in the letters of International Tables A, behind a Hall symbol also Hall's `(0 0 1)` or `(x-y,x+y,z)`.
 *
 * @throws `syntax`, `unknown-group`, `ambiguous-group`, `not-a-group`, `singular-basis`, `conflicting-arguments`, each
 *   with the column
 */
export function parseGroup(text: string): SpaceGroup {
  return parseGroupWithNotes(text).group;
}

/** `parseGroup` together with what had to be assumed: setting, origin, reading of the symbol. */
export function parseGroupWithNotes(text: string): ParsedGroup {
  // An overline behind its digit (combining, U+0305 or U+0304) is how print shows the bar.
  const { head, column, hallOperator, basisChange } = takeBrackets(text.replace(/(\d)[\u0304\u0305]/g, "-$1"));
  if (head === "")
    fail("syntax", "the space group is empty", {
      where: { column },
      expected: "a number, a Hermann–Mauguin symbol, a Hall symbol or triplets",
      found: "nothing",
    });
  const parsed = parseHead(head, column, hallOperator);
  if (basisChange === null) return parsed;
  const change = parseBasisChange(basisChange.inner, basisChange.column);
  const group = changeBasis(parsed.group, change);
  return determinant(change.matrix)[0] > 0
    ? { ...parsed, group }
    : { assumed: [...parsed.assumed, leftHanded(basisChange.inner)], group };
}

function leftHanded(axes: string): GroupAssumption {
  return {
    what: "handedness of the axes",
    value: "left-handed",
    because: `the axes (${axes.trim()}) turn a right-handed basis into a left-handed one`,
  };
}

function parseHead(head: string, column: number, hallOperator: Brackets | null): ParsedGroup {
  const prefix = /^hall\s*:\s*/i.exec(head);
  if (prefix)
    return { group: hallGroup(head.slice(prefix[0].length), column + prefix[0].length, hallOperator), assumed: [] };
  if (head.includes(",")) {
    refuseHallOperator(hallOperator, "triplets");
    return { group: tripletGroup(head, column), assumed: [] };
  }
  const number = /^(\d+)\s*(?::\s*(\S+))?$/.exec(head);
  if (number) {
    refuseHallOperator(hallOperator, "a table number");
    const { row, assumed } = findNumber(Number(number[1]), number[2] ?? null, column);
    return { group: groupFromSetting(row), assumed };
  }
  // Hall's operator settles that a symbol which can be Hall's is meant so.
  const found = hallOperator === null || !looksLikeHall(head) ? findSymbol(head, column) : null;
  if (found) {
    refuseHallOperator(hallOperator, "a Hermann–Mauguin symbol");
    const group = groupFromSetting(found.row);
    return { group, assumed: [...found.assumed, ...readingNote(head, group)] };
  }
  const group = hallOrUnknown(head, column, hallOperator);
  return { group, assumed: hallOperator ? [] : spellingNote(head, group) };
}

function refuseHallOperator(operator: Brackets | null, what: string): void {
  if (operator)
    fail("conflicting-arguments", `Hall's change of basis \`(${operator.inner})\` cannot follow ${what}`, {
      where: { column: operator.column },
      expected: "new axes in the letters a, b, c, for example (a,b,2c;0,0,1/4)",
      found: operator.inner.trim(),
      remedy: "letters x, y, z and three integers belong to Hall symbols alone",
    });
}

function hallGroup(symbol: string, column: number, operator: Brackets | null): SpaceGroup {
  const hall = parseHallSymbol(symbol, column);
  const base = groupFromHall(hall);
  const change = operator ? parseHallOperator(operator.inner, operator.column) : null;
  const group = change ? changeBasis(base, change) : base;
  const own = settingWithOperators(group);
  if (own) return { ...group, name: nameOfSetting(own) };
  const parent = change ? settingWithOperators(base) : null;
  if (parent && change) return { ...group, name: { ...nameOfSetting(parent), basisChange: formatBasisChange(change) } };
  const written = operator ? `${hall.text} (${operator.inner.trim()})` : hall.text;
  return { ...group, name: { ...unnamed, hall: written } };
}

function tripletGroup(text: string, column: number): SpaceGroup {
  const { lattice, operators, columns } = parseTripletList(text, column);
  const group = groupOnLattice(lattice, operators, {}, columns);
  const own = settingWithOperators(group);
  return own ? { ...group, name: nameOfSetting(own) } : group;
}

/** A text that is no Hermann–Mauguin symbol: a Hall symbol, or unknown. */
function hallOrUnknown(head: string, column: number, operator: Brackets | null): SpaceGroup {
  if (operator || head.startsWith("-") || looksLikeHall(head)) return hallGroup(head, column, operator);
  const near = nearestSymbols(head.split(":")[0] as string);
  return fail("unknown-group", `\`${head}\` is in no table of space groups`, {
    where: { column },
    expected: "a number from 1 to 230, a Hermann–Mauguin symbol, a Hall symbol or triplets separated by `;`",
    found: head,
    ...(near.length > 0 ? { remedy: `spelt alike: ${near.join(", ")}` } : {}),
  });
}

/** Every word behind the lattice letter begins with a rotation order, and there is a mark that only Hall symbols have. */
function looksLikeHall(head: string): boolean {
  return /^-?[PABCIRHF]\s*-?[12346]/i.test(head) && !/[:/_]/.test(head) && /^\S+(\s+-?[12346]\S*)*\s*$/.test(head);
}

/** A note where the text is at once a Hermann–Mauguin symbol and a Hall symbol of other operators: `P 2`, `A 2`. */
function readingNote(head: string, group: SpaceGroup): GroupAssumption[] {
  if (!/\s/.test(head) || !looksLikeHall(head)) return [];
  try {
    if (sameOperators(groupFromHallText(head), group)) return [];
  } catch (error) {
    if (error instanceof KvaneError) return [];
    throw error;
  }
  return [
    {
      what: "reading of the symbol",
      value: group.name.hermannMauguin ?? head,
      because: `read as a Hermann–Mauguin symbol; the Hall symbol spelt so is written hall:${head}`,
    },
  ];
}

/** A note where a Hall symbol without its prefix would be a Hermann–Mauguin symbol without its blanks: `P 3 2`. */
function spellingNote(head: string, group: SpaceGroup): GroupAssumption[] {
  const alike = findSymbol(head.replace(/\s+/g, ""));
  if (alike === null || alike.row.hall === group.name.hall) return [];
  return [
    {
      what: "reading of the symbol",
      value: `Hall symbol ${head}${group.name.hermannMauguin === null ? "" : `, ${group.name.hermannMauguin}`}`,
      because: `with these blanks it is no Hermann–Mauguin symbol; ${alike.row.short} is written without them`,
    },
  ];
}
