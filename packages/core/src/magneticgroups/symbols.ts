import { subtractVectors, vectorFrom } from "../numbers/index.js";
import {
  isLatticeVector,
  rotationType,
  type SpaceGroup,
  type SymmetryOperator,
  type TabulatedSetting,
} from "../spacegroups/index.js";
import { antiTranslationOf, bnsSettings, primesOf } from "./compact-rows.js";
import { baseGroup, numberOf, type StoredRow } from "./stored-rows.js";

/**
 * The BNS symbol of a row, by the rule of Belov, Neronova and Smirnova (International Tables A, section 3.6.3.3): the
 * short Hermann–Mauguin symbol of the space group of its number; type II with `1'` behind it; type III with primes on
 * the elements that come with time reversal; type IV with the anti-translation as subscript of the lattice letter.
 * `_` stands before a subscript: `P2_1'/c`, `C_c2/c`.
 */
export function bnsSymbol(row: StoredRow): string {
  const number = numberOf(row.bns);
  const short = formerSymbols[number] ?? (bnsSettings().get(number) as TabulatedSetting).short;
  if (row.type === 1) return short;
  if (row.type === 2) return `${short}1'`;
  const base = baseGroup(number);
  if (row.type === 3) return primedSymbol(short, number, base, primesOf(row.data, base));
  return `${short.slice(0, 1)}_${latticeSubscript(short, number, row, base)}${short.slice(1)}`;
}

/**
 * Five Hermann–Mauguin symbols from before the letter e of 1992: those of Belov, Neronova and Smirnova (1957), and what
 * papers on magnetic structures go on writing (`C_Amca` of BaFe₂As₂).
 */
const formerSymbols: Readonly<Record<number, string>> = { 39: "Abm2", 41: "Aba2", 64: "Cmca", 67: "Cmma", 68: "Ccca" };

const halves: readonly (readonly [string, readonly [number, number, number]])[] = [
  ["a", [1, 0, 0]],
  ["b", [0, 1, 0]],
  ["c", [0, 0, 1]],
  ["A", [0, 1, 1]],
  ["B", [1, 0, 1]],
  ["C", [1, 1, 0]],
  ["I", [1, 1, 1]],
];

/**
 * The letter of the anti-translation: that of the axis which it halves, else of the face or cell that it centres, the
 * first that is the same up to centring. Triclinic and face-centred lattices have one kind each, S; rhombohedral ones
 * halve the cell along its threefold axis, I.
 */
function latticeSubscript(short: string, number: number, row: StoredRow, { lattice }: SpaceGroup): string {
  if (number <= 2 || short.startsWith("F")) return "S";
  if (short.startsWith("R")) return "I";
  const vector = antiTranslationOf(row.data);
  const found = halves.find(([, half]) => isLatticeVector(lattice, subtractVectors(vector, vectorFrom(half, 2))));
  if (!found) throw new RangeError(`${row.bns} has an anti-translation that halves no lattice vector`);
  return found[0];
}

/** One direction of a short symbol: an axis, an axis over a plane, or a plane. */
const direction = /(-?[12346](?:_[1-5])?)?(?:\/?([abcdemn]))?/y;

/** The short symbol with a prime behind each element that comes with time reversal. */
function primedSymbol(short: string, number: number, base: SpaceGroup, primes: readonly boolean[]): string {
  const axes = symmetryDirections(number);
  let text = short.slice(0, 1);
  let position = 1;
  for (const axis of axes) {
    direction.lastIndex = position;
    const [whole, rotation, plane] = direction.exec(short) as RegExpExecArray;
    // An axis and a plane without `/` between them are two directions: `32`, `4m`.
    const single = rotation !== undefined && !whole.includes("/");
    const parts: string[] = [];
    if (rotation !== undefined) parts.push(rotation + primeOf(Number.parseInt(rotation, 10), axis));
    if (plane !== undefined && !single) parts.push(plane + primeOf(-2, axis));
    text += parts.join("/");
    position += single ? rotation.length : whole.length;
  }
  return text;

  function primeOf(type: number, axis: readonly number[]): string {
    if (type === 1) return "";
    const index = base.operators.findIndex(
      ({ rotation }) => rotationType(rotation) === type && (type === -1 || hasAxis(rotation, axis)),
    );
    if (index < 0) throw new RangeError(`${short} has no operator of type ${type} along ${axis.join()}`);
    return primes[index] ? "'" : "";
  }
}

/** True when the rotation, or the proper part of an improper one, leaves the direction as it is. */
function hasAxis(rotation: SymmetryOperator["rotation"], axis: readonly number[]): boolean {
  const sign = (rotationType(rotation) as number) < 0 ? -1 : 1;
  return [0, 1, 2].every(
    (row) =>
      axis.reduce((sum, entry, column) => sum + sign * (rotation[3 * row + column] as number) * entry, 0) === axis[row],
  );
}

/** The directions of a Hermann–Mauguin symbol in their order (International Tables A, table 2.1.3.1). */
function symmetryDirections(number: number): readonly (readonly [number, number, number])[] {
  const [a, b, c, diagonal] = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
    [1, -1, 0],
  ] as const;
  if (number <= 15) return [b];
  if (number <= 74) return [a, b, c];
  if (number <= 194) return [c, a, diagonal];
  return [a, [1, 1, 1], diagonal];
}
