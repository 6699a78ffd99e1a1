import { fail } from "../errors/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { magneticGroup } from "./build.js";
import { antiTranslationOf, primesOf, withAntiTranslation } from "./compact-rows.js";
import { baseGroup, numberOf, rowsOfNumber, type StoredRow } from "./stored-rows.js";
import { bnsSymbol } from "./symbols.js";
import type { MagneticGroup, MagneticGroupName, MagneticGroupType, MagneticOperator } from "./types.js";

/** A row of the table of the 1651 types. */
export interface MagneticTableRow {
  readonly name: MagneticGroupName;
  readonly type: MagneticGroupType;
}

/** All 1651 types in the order of the table. */
export function magneticGroupTable(): readonly MagneticTableRow[] {
  return Array.from({ length: 230 }, (_, index) => index + 1).flatMap((number) =>
    rowsOfNumber(number).map((row) => ({ name: nameOf(row), type: row.type })),
  );
}

/** Numbers and symbol of a row. */
export function nameOf(row: StoredRow): MagneticGroupName {
  return { bns: { number: row.bns, symbol: bnsSymbol(row) }, og: { number: row.og } };
}

/**
 * The group of a BNS number such as `15.90` (a text) in the BNS setting.
 *
 * @throws `unknown-group` when the table has no such number
 */
export function magneticGroupByNumber(bns: string): MagneticGroup {
  const number = /^\d{1,3}\.\d{1,4}$/.test(bns.trim()) ? numberOf(bns.trim()) : 0;
  const row = rowsOfNumber(number).find((one) => one.bns === bns.trim());
  if (!row)
    return fail("unknown-group", `no type of magnetic groups has the BNS number ${bns.trim()}`, {
      expected: "a number such as 15.90, from 1.1 to 230.149",
      found: bns,
      remedy: "write it as a text: 1.10 is not 1.1",
    });
  return groupOfRow(row);
}

/** The group of a row in the BNS setting. */
export function groupOfRow(row: StoredRow): MagneticGroup {
  const base = baseGroup(numberOf(row.bns));
  return magneticGroup(base.lattice, operatorsOfRow(row, base));
}

function operatorsOfRow({ type, data }: StoredRow, base: SpaceGroup): readonly MagneticOperator[] {
  const plain = base.operators.map((operator): MagneticOperator => ({ operator, timeReversal: 1 }));
  switch (type) {
    case 1:
      return plain;
    case 2:
      return [...plain, ...base.operators.map((operator): MagneticOperator => ({ operator, timeReversal: -1 }))];
    case 3: {
      const primes = primesOf(data, base);
      return base.operators.map((operator, index) => ({ operator, timeReversal: primes[index] ? -1 : 1 }));
    }
    default: {
      const vector = antiTranslationOf(data);
      return [
        ...plain,
        ...base.operators.map(
          (operator): MagneticOperator => ({ operator: withAntiTranslation(operator, vector), timeReversal: -1 }),
        ),
      ];
    }
  }
}
