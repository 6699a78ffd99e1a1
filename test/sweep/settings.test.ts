import { readFileSync } from "node:fs";
import { SpaceGroupsData } from "@chemistry/space-groups";
import {
  formatTriplet,
  groupFromSetting,
  operatorsModuloIntegers,
  parseGroup,
  parseGroupWithNotes,
  parseTriplet,
  type SpaceGroup,
  type SymmetryOperator,
  tabulatedSettings,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { findSymbol } from "#core/spacegroups/symbol-look-up.js";

/** test/fixtures/ORIGIN.md: International Tables B, table A1.4.2.7, expanded without kvane. */
interface ReferenceRow {
  readonly number: number;
  readonly hall: string;
  readonly short: string;
  readonly full: string;
  readonly choice: string;
  readonly ops: readonly (readonly number[])[];
  readonly standard: boolean;
}

const reference: readonly ReferenceRow[] = JSON.parse(
  readFileSync(new URL("../fixtures/settings.json", import.meta.url), "utf8"),
);
const settings = tabulatedSettings();
const groups = settings.map(groupFromSetting);

/** Rotation and translation modulo integers in 24ths, as in the fixture. */
function operatorKey(operator: SymmetryOperator): string {
  const scale = 24 / operator.translationDenominator;
  const translation = operator.translation.map((entry) => (((entry * scale) % 24) + 24) % 24);
  return [...operator.rotation, ...translation].join();
}

const keysOf = (group: SpaceGroup): string => operatorsModuloIntegers(group).map(operatorKey).sort().join(" ");
const ourKeys = groups.map(keysOf);

/** What the rows for which `check` gives a text have to say; an empty list is success. */
function failures<T>(rows: readonly T[], check: (row: T, index: number) => string | null): string[] {
  return rows.flatMap((row, index) => {
    const problem = check(row, index);
    return problem === null ? [] : [problem];
  });
}

describe("the 530 tabulated settings", () => {
  it("are the rows of the reference table with its operators, none missing and none more", () => {
    expect(settings).toHaveLength(530);
    const wrong = failures(reference, (row, index) => {
      const own = settings[index];
      const named = own?.number === row.number && own.hall === row.hall && own.full === row.full;
      const coded = own?.choice === row.choice && own.standard === row.standard;
      const expected = row.ops
        .map((entries) => entries.join())
        .sort()
        .join(" ");
      return named && coded && ourKeys[index] === expected ? null : `${row.number}:${row.choice} ${row.hall}`;
    });
    expect(wrong).toEqual([]);
  });

  it("have the reference's short symbols but for one, where it keeps the older letter", () => {
    const other = failures(reference, (row, index) => (settings[index]?.short === row.short ? null : row.short));
    expect(other).toEqual(["Bbcb"]);
  });

  it("agree with a second source, operator by operator", () => {
    expect(SpaceGroupsData).toHaveLength(530);
    const wrong = failures(SpaceGroupsData, (row, index) => {
      const theirs = row.s
        .map((text) => operatorKey(parseTriplet(text)))
        .sort()
        .join(" ");
      return settings[index]?.number === row.id && ourKeys[index] === theirs ? null : `${row.id} ${row.hs}`;
    });
    expect(wrong).toEqual([]);
  });

  it("come out of the second source's Hall symbols too, dozens of which are spelt in another way", () => {
    let spelt = 0;
    const wrong = failures(SpaceGroupsData, (row, index) => {
      if (row.hs !== settings[index]?.hall) spelt += 1;
      const group = parseGroup(`hall:${row.hs}`);
      const named = group.name.number === row.id && group.name.basisChange === "a,b,c;0,0,0";
      return named && keysOf(group) === ourKeys[index] ? null : `${row.id} ${row.hs}`;
    });
    expect(wrong).toEqual([]);
    expect(spelt).toBeGreaterThan(50);
  });

  it("have group order = point-group order × centring vectors, all operators distinct", () => {
    const wrong = failures(groups, (group, index) => {
      const centring =
        { P: 1, A: 2, B: 2, C: 2, I: 2, R: 3, F: 4 }[settings[index]?.hall.replace("-", "")[0] ?? ""] ?? 0;
      const keys = new Set(ourKeys[index]?.split(" "));
      return keys.size === group.operators.length * centring ? null : `${settings[index]?.hall}`;
    });
    expect(wrong).toEqual([]);
  });
});

describe("looking groups up", () => {
  it("finds every row by full and short symbol with its code: blanks, underscores and case do not matter", () => {
    const wrong = failures(settings, (row, index) => {
      const code = row.choice === "" ? "" : `:${row.choice}`;
      const writings = [row.full, row.short].flatMap((symbol) => [
        symbol,
        symbol.replaceAll("_", ""),
        symbol.replaceAll(" ", ""),
        symbol.replaceAll(/[ _]/g, "").toLowerCase(),
        symbol.replaceAll("_", "").toUpperCase(),
      ]);
      const found = writings.map((text) => findSymbol(`${text}${code}`)?.row);
      const right = found.every(
        (one) => one?.number === row.number && one.hall === row.hall && one.choice === row.choice,
      );
      return right && keysOf(parseGroup(`${row.full}${code}`)) === ourKeys[index] ? null : `${row.full}${code}`;
    });
    expect(wrong).toEqual([]);
  });

  it("finds every row by the second source's Hermann–Mauguin symbol, without a code where it is the only one", () => {
    const wrong = failures(SpaceGroupsData, (row, index) => {
      const alone = SpaceGroupsData.filter((other) => other.hm === row.hm).length === 1;
      const code = alone ? "" : `:${settings[index]?.choice}`;
      return keysOf(parseGroup(row.hm + code)) === ourKeys[index] ? null : row.hm + code;
    });
    expect(wrong).toEqual([]);
  });

  it("takes the standard row for a number and for a symbol of several rows, and tells where there was a choice", () => {
    const wrong = failures(reference, (row) => {
      if (!row.standard) return null;
      const byNumber = parseGroupWithNotes(String(row.number));
      const bySymbol = parseGroupWithNotes(row.short);
      const right = [byNumber, bySymbol].every(({ group }) => group.name.hall === row.hall);
      const told = byNumber.assumed.length === (row.choice === "" ? 0 : 1);
      return right && told ? null : `${row.number} ${row.short}`;
    });
    expect(wrong).toEqual([]);
  });

  it("reads every Hall symbol with its prefix, and without it unless it is a Hermann–Mauguin symbol", () => {
    const differing: string[] = [];
    const wrong = failures(reference, (row, index) => {
      const plain = parseGroupWithNotes(row.hall);
      if (keysOf(plain.group) !== ourKeys[index]) {
        differing.push(row.hall);
        if (!plain.assumed.some((note) => note.because.includes(`hall:${row.hall}`))) return row.hall;
      }
      return keysOf(parseGroup(`hall:${row.hall}`)) === ourKeys[index] ? null : row.hall;
    });
    expect(wrong).toEqual([]);
    // Unique axis c in Hall's symbols without a letter, b in Hermann–Mauguin symbols without their ones.
    expect(differing).toEqual(["P 2", "A 2", "I 2"]);
  });

  it("names a group given by its triplets, whatever their order", () => {
    const wrong = failures(groups, (group, index) => {
      const triplets = operatorsModuloIntegers(group).map(formatTriplet);
      if (triplets.length > 48) return null;
      const again = parseGroup(triplets.reverse().join("; "));
      const row = settings[index];
      return again.name.number === row?.number && again.name.hall === row.hall && keysOf(again) === ourKeys[index]
        ? null
        : `${row?.hall}`;
    });
    expect(wrong).toEqual([]);
  });
});
