import { fail } from "../errors/index.js";
import { add, fractionalPart, identityMatrix, type RationalVector, rational } from "../numbers/index.js";
import {
  groupFromSetting,
  isTranslation,
  latticeFromVectors,
  type SpaceGroup,
  type SymmetryOperator,
  type TabulatedSetting,
  tabulatedSettings,
  translationOf,
} from "../spacegroups/index.js";
import { composeMagnetic } from "./operators.js";
import { formatMagneticTriplet, parseMagneticTriplet } from "./triplets.js";
import type { MagneticGroupType, MagneticOperator } from "./types.js";

/**
 * What a row of the table holds beside its numbers. A group of type III is the space group of its BNS number with
 * primes: one bit an operator, in their order, four to a hexadecimal digit. A group of type IV is that space group and
 * one anti-translation, in 24ths. Types I and II need nothing more.
 */
export type CompactData = string;

let settings: ReadonlyMap<number, TabulatedSetting> | null = null;

/** The BNS settings: those that International Tables' number stands for, origin 2 where there are two. */
export function bnsSettings(): ReadonlyMap<number, TabulatedSetting> {
  settings ??= new Map(
    tabulatedSettings()
      .filter((row) => row.standard)
      .map((row) => [row.number, row]),
  );
  return settings;
}

/** The settings of the table's source: the same, but origin 1 where there are two. */
function sourceSetting(number: number): TabulatedSetting {
  const first = tabulatedSettings().find((row) => row.number === number && row.choice === "1");
  return first ?? (bnsSettings().get(number) as TabulatedSetting);
}

/**
 * The compact form of a group given by generators in the setting of the table's source, for the maker of the table. Integer
 * translations belong to it. Primes belong to rotations and anti-translations to no origin, so that nothing of it changes
 * when the origin is moved to that of the BNS setting.
 *
 * @throws `not-a-group` when the group does not consist of the operators of its space group in that setting
 */
export function compactData(number: number, type: MagneticGroupType, generators: readonly string[]): CompactData {
  const all = multiplyOut(generators.map((text) => parseMagneticTriplet(text)));
  const base = groupFromSetting(sourceSetting(number));
  const plain = all.filter((one) => type !== 4 || one.timeReversal === 1);
  const translations = plain.filter((one) => isTranslation(one.operator)).map((one) => translationOf(one.operator));
  const lattice = latticeFromVectors([...identityMatrix, ...translations]);
  const primes = base.operators.map((operator) => reversalsOf(plain, operator).join(""));
  const wanted = { 1: ["1"], 2: ["1-1", "-11"], 3: ["1", "-1"], 4: ["1"] }[type];
  const centrings = translations.length / (type === 2 ? 2 : 1);
  const order = centrings * base.operators.length * (type === 2 || type === 4 ? 2 : 1);
  if (
    JSON.stringify(lattice) !== JSON.stringify(base.lattice) ||
    !primes.every((text) => wanted.includes(text)) ||
    order !== all.length
  )
    fail("not-a-group", `${generators.join(" ")} is not in the setting of number ${number}`);
  if (type === 3) {
    const primed = new Set(base.operators.filter((_, index) => primes[index] === "-1").map(rotationText));
    const inBns = groupFromSetting(bnsSettings().get(number) as TabulatedSetting);
    return toHexadecimal(inBns.operators.map((operator) => primed.has(rotationText(operator))));
  }
  if (type !== 4) return "";
  const anti = all
    .filter((one) => one.timeReversal === -1 && isTranslation(one.operator))
    .map((one) => one.operator.translation.map((entry) => (entry * 24) / one.operator.translationDenominator));
  // Of the vectors that differ by centring the one with the fewest components other than 0, early axes first.
  anti.sort((a, b) => weight(a) - weight(b));
  return (anti[0] as number[]).join(" ");
}

function rotationText({ rotation }: SymmetryOperator): string {
  return rotation.join();
}

function weight(vector: readonly number[]): number {
  return vector.reduce((sum, entry, axis) => sum + (entry === 0 ? 0 : 1000 + entry + axis * 100), 0);
}

/** All operators modulo integer translations. */
function multiplyOut(generators: readonly MagneticOperator[]): readonly MagneticOperator[] {
  const reached = new Map<string, MagneticOperator>();
  const queue: MagneticOperator[] = [parseMagneticTriplet("x,y,z,+1")];
  for (let next = queue.pop(); next !== undefined; next = queue.pop()) {
    const reduced = modIntegers(next);
    const key = formatMagneticTriplet(reduced);
    if (reached.has(key)) continue;
    reached.set(key, reduced);
    for (const generator of generators) queue.push(composeMagnetic(reduced, generator));
  }
  return [...reached.values()];
}

function modIntegers({ operator, timeReversal }: MagneticOperator): MagneticOperator {
  const translation = operator.translation.map((entry) => {
    const [numerator, denominator] = fractionalPart(rational(entry, operator.translationDenominator));
    return (numerator * operator.translationDenominator) / denominator;
  }) as unknown as SymmetryOperator["translation"];
  return { operator: { ...operator, translation }, timeReversal };
}

/** The time reversals with which an operator occurs, centring disregarded. */
function reversalsOf(all: readonly MagneticOperator[], operator: SymmetryOperator): readonly number[] {
  const text = formatMagneticTriplet(modIntegers({ operator, timeReversal: 1 }));
  return all
    .filter((one) => formatMagneticTriplet({ ...one, timeReversal: 1 }) === text)
    .map((one) => one.timeReversal);
}

function toHexadecimal(bits: readonly boolean[]): string {
  let text = "";
  for (let start = 0; start < bits.length; start += 4)
    text += [0, 1, 2, 3].reduce((sum, index) => sum + (bits[start + index] ? 8 >> index : 0), 0).toString(16);
  return text;
}

/** Which operators of the space group are primed. */
export function primesOf(data: CompactData, base: SpaceGroup): readonly boolean[] {
  return base.operators.map(
    (_, index) => ((Number.parseInt(data[index >> 2] ?? "0", 16) >> (3 - (index % 4))) & 1) === 1,
  );
}

/** The anti-translation of type IV. */
export function antiTranslationOf(data: CompactData): RationalVector {
  const [x, y, z] = data.split(" ").map(Number) as [number, number, number];
  return [rational(x, 24), rational(y, 24), rational(z, 24)];
}

/** The other half of a group of type IV. */
export function withAntiTranslation(operator: SymmetryOperator, vector: RationalVector): SymmetryOperator {
  const denominator = operator.translationDenominator;
  return {
    ...operator,
    translation: operator.translation.map((entry, axis) => {
      const [numerator, own] = add(rational(entry, denominator), vector[axis as 0 | 1 | 2]);
      return (numerator * denominator) / own;
    }) as unknown as SymmetryOperator["translation"],
  };
}
