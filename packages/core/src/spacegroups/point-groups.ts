import { fail } from "../errors/index.js";
import { type IntegerMatrix, integerDeterminant } from "../numbers/index.js";

/**
 * The type of an integer rotation matrix of any lattice basis from trace and determinant (International Tables A,
 * section 1.2.2.4), as n or −n; mirror planes are −2. Null when it is none of a crystal.
 */
export function rotationType(rotation: IntegerMatrix): number | null {
  const determinant = integerDeterminant(rotation);
  if (determinant !== 1 && determinant !== -1) return null;
  const trace = determinant * ((rotation[0] as number) + (rotation[4] as number) + (rotation[8] as number));
  const order = { "3": 1, "-1": 2, "0": 3, "1": 4, "2": 6 }[String(trace)];
  return order === undefined ? null : determinant * order;
}

/**
 * How many operators of the types 2, 3, 4, 6, -1, m, -3, -4, -6 each of the 32 classes has (International Tables A,
 * section 10.1 of the fifth, 3.2.1 of the sixth edition). The counts differ for any two of them.
 */
const classCounts: Readonly<Record<string, string>> = {
  "000000000": "1",
  "000010000": "-1",
  "100000000": "2",
  "000001000": "m",
  "100011000": "2/m",
  "300000000": "222",
  "100002000": "mm2",
  "300013000": "mmm",
  "102000000": "4",
  "100000020": "-4",
  "102011020": "4/m",
  "502000000": "422",
  "102004000": "4mm",
  "300002020": "-42m",
  "502015020": "4/mmm",
  "020000000": "3",
  "020010200": "-3",
  "320000000": "32",
  "020003000": "3m",
  "320013200": "-3m",
  "120200000": "6",
  "020001002": "-6",
  "120211202": "6/m",
  "720200000": "622",
  "120206000": "6mm",
  "320004002": "-62m",
  "720217202": "6/mmm",
  "380000000": "23",
  "380013800": "m-3",
  "986000000": "432",
  "380006060": "-43m",
  "986019860": "m-3m",
};

const countedTypes = [2, 3, 4, 6, -1, -2, -3, -4, -6];

/**
 * The Hermann–Mauguin symbol of the crystal class of a finite group of integer rotation matrices in any lattice basis,
 * e.g. `mmm`, `-3m`. The class alone: `-42m` also stands for `-4m2`, `-62m` for `-6m2`.
 *
 * @throws `not-a-group` when the set is no crystallographic point group
 */
export function pointGroupSymbol(rotations: readonly IntegerMatrix[]): string {
  const types = rotations.map(rotationType);
  const counts = countedTypes.map((type) => types.filter((found) => found === type).length);
  const symbol = counts.every((count) => count <= 9) ? classCounts[counts.join("")] : undefined;
  if (symbol === undefined || 1 + counts.reduce((sum, count) => sum + count, 0) !== rotations.length)
    fail("not-a-group", `${rotations.length} rotations do not make up one of the 32 crystal classes`);
  return symbol;
}
