import { groupFromSetting, type SpaceGroup, type TabulatedSetting } from "../spacegroups/index.js";
import { bnsSettings, type CompactData } from "./compact-rows.js";
import { magneticGroupRows } from "./generated/magnetic-groups.js";
import type { MagneticGroupType } from "./types.js";

/** A row of the table of the 1651 types as it is stored. */
export interface StoredRow {
  readonly bns: string;
  readonly og: string;
  readonly type: MagneticGroupType;
  readonly data: CompactData;
}

let stored: ReadonlyMap<number, readonly StoredRow[]> | null = null;

/** The rows whose BNS number begins with this number of a space group. */
export function rowsOfNumber(number: number): readonly StoredRow[] {
  stored ??= readRows();
  return stored.get(number) ?? [];
}

function readRows(): ReadonlyMap<number, readonly StoredRow[]> {
  const rows = new Map<number, StoredRow[]>();
  for (const line of magneticGroupRows.split("\n")) {
    const [bns, og, type, data] = line.split("|") as [string, string, string, string];
    const list = rows.get(numberOf(bns)) ?? [];
    list.push({ bns, og, type: Number(type) as MagneticGroupType, data });
    rows.set(numberOf(bns), list);
  }
  return rows;
}

/** The number of the space group that a BNS number begins with: of the family, for type IV of the unprimed subgroup. */
export function numberOf(bns: string): number {
  return Number(bns.slice(0, bns.indexOf(".")));
}

const groups = new Map<number, SpaceGroup>();

/** The space group of that number in the setting of the table. */
export function baseGroup(number: number): SpaceGroup {
  const known = groups.get(number) ?? groupFromSetting(bnsSettings().get(number) as TabulatedSetting);
  groups.set(number, known);
  return known;
}
