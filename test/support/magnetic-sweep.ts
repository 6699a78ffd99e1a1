import { changeMagneticBasis, identifyMagneticGroup } from "@kvane/core/magneticgroups";
import { bnsOperators } from "./magnetic-bns-setting.js";
import { flatTexts, groupOfFlat } from "./magnetic-operators.js";
import { expandRow, type MagneticRow } from "./magnetic-table.js";
import type { Random } from "./random.js";
import { randomBasis } from "./random-bases.js";

/** What is wrong with the identification of a row as it stands and in so many random bases; empty when nothing is. */
export function magneticRowProblems(row: MagneticRow, random: Random, bases: number): readonly string[] {
  const plain = expandRow(row);
  const wanted = bnsOperators(row).map(String).sort().join("|");
  const own = groupOfFlat(plain);
  if (own.type !== row.type) return [`${row.bns} has type ${own.type} instead of ${row.type}`];
  const groups = [own, ...Array.from({ length: bases }, () => changeMagneticBasis(own, randomBasis(random)))];
  return groups.flatMap((group, index) => {
    const { name, toBns } = identifyMagneticGroup(group);
    const where = index === 0 ? `${row.bns} as it stands` : `${row.bns} in random basis ${index}`;
    if (name.bns.number !== row.bns || name.og.number !== row.og)
      return [`${where} is called ${name.bns.number}, ${name.og.number}`];
    const carried = flatTexts(changeMagneticBasis(group, toBns)).join("|");
    return carried === wanted ? [] : [`${where}: other operators after the change of basis`];
  });
}
