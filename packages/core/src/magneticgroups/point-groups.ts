import { fail } from "../errors/index.js";
import type { IntegerMatrix } from "../numbers/index.js";
import { pointGroupSymbol, rotationType } from "../spacegroups/index.js";

/** A rotation of any lattice basis and whether it comes with time reversal. */
export interface MagneticRotation {
  readonly rotation: IntegerMatrix;
  readonly timeReversal: 1 | -1;
}

const countedTypes = [2, 3, 4, 6, -1, -2, -3, -4, -6];

/**
 * The 58 classes in which half of the operators come with time reversal. Key: the crystal class, then how many of its
 * operators of the types 2, 3, 4, 6, -1, m, -3, -4, -6 are primed; the keys differ for any two. Which of two equivalent
 * ways of setting the primes (`4'22'`, `4'2'2`) is written follows International Tables A, chapter 3.6.
 */
const halfPrimed: Readonly<Record<string, string>> = {
  "-1 000010000": "-1'",
  "2 100000000": "2'",
  "m 000001000": "m'",
  "2/m 100010000": "2'/m",
  "2/m 000011000": "2/m'",
  "2/m 100001000": "2'/m'",
  "222 200000000": "2'2'2",
  "mm2 100001000": "m'm2'",
  "mm2 000002000": "m'm'2",
  "mmm 200011000": "m'mm",
  "mmm 200002000": "m'm'm",
  "mmm 000013000": "m'm'm'",
  "4 002000000": "4'",
  "-4 000000020": "-4'",
  "4/m 002000020": "4'/m",
  "4/m 000011020": "4/m'",
  "4/m 002011000": "4'/m'",
  "422 202000000": "4'22'",
  "422 400000000": "42'2'",
  "4mm 002002000": "4'm'm",
  "4mm 000004000": "4m'm'",
  "-42m 200000020": "-4'2'm",
  "-42m 000002020": "-4'2m'",
  "-42m 200002000": "-42'm'",
  "4/mmm 400011020": "4/m'mm",
  "4/mmm 202002020": "4'/mm'm",
  "4/mmm 202013000": "4'/m'm'm",
  "4/mmm 400004000": "4/mm'm'",
  "4/mmm 000015020": "4/m'm'm'",
  "-3 000010200": "-3'",
  "32 300000000": "32'",
  "3m 000003000": "3m'",
  "-3m 300010200": "-3'm",
  "-3m 000013200": "-3'm'",
  "-3m 300003000": "-3m'",
  "6 100200000": "6'",
  "-6 000001002": "-6'",
  "6/m 100210200": "6'/m",
  "6/m 000011202": "6/m'",
  "6/m 100201002": "6'/m'",
  "622 400200000": "6'22'",
  "622 600000000": "62'2'",
  "6mm 100203000": "6'mm'",
  "6mm 000006000": "6m'm'",
  "-62m 000004002": "-6'2m'",
  "-62m 300001002": "-6'2'm",
  "-62m 300003000": "-62'm'",
  "6/mmm 600011202": "6/m'mm",
  "6/mmm 400213200": "6'/mmm'",
  "6/mmm 400204002": "6'/m'mm'",
  "6/mmm 600006000": "6/mm'm'",
  "6/mmm 000017202": "6/m'm'm'",
  "m-3 000013800": "m'-3'",
  "432 606000000": "4'32'",
  "-43m 000006060": "-4'3m'",
  "m-3m 606013800": "m'-3'm",
  "m-3m 606006060": "m-3m'",
  "m-3m 000019860": "m'-3'm'",
};

/**
 * The symbol of a magnetic point group, e.g. `2'/m`, `-31'`: that of the crystal class with primes on the operators
 * with time reversal, and `1'` behind it when time reversal itself belongs to the group. Repeated rotations (those of a
 * group with anti-translations) count once. The class alone: `-42m` also stands for `-4m2`, `-62m` for `-6m2`.
 *
 * @throws `not-a-group` when the set is none of the 122 groups
 */
export function magneticPointGroupSymbol(operators: readonly MagneticRotation[]): string {
  const distinct = new Map(operators.map((one) => [`${one.rotation.join()};${one.timeReversal}`, one]));
  const plain = [...distinct.values()].filter((one) => one.timeReversal === 1).map((one) => one.rotation);
  const primed = [...distinct.values()].filter((one) => one.timeReversal === -1).map((one) => one.rotation);
  const plainTexts = new Set(plain.map(String));
  const shared = primed.filter((rotation) => plainTexts.has(String(rotation))).length;
  if (shared > 0) {
    if (shared !== plain.length || shared !== primed.length) refuse(operators.length);
    return `${pointGroupSymbol(plain)}1'`;
  }
  const crystalClass = pointGroupSymbol([...plain, ...primed]);
  if (primed.length === 0) return crystalClass;
  const types = primed.map(rotationType);
  const counts = countedTypes.map((type) => types.filter((found) => found === type).length);
  return halfPrimed[`${crystalClass} ${counts.join("")}`] ?? refuse(operators.length);
}

function refuse(count: number): never {
  return fail("not-a-group", `${count} operators do not make up one of the 122 magnetic point groups`);
}
