/**
 * The rows of `magnetic-table.ts` in the BNS settings: moved from origin 1 to origin 2 where International Tables A has
 * two. The shifts are searched for in the tables of International Tables B, A1.4.2.7 (test/fixtures/ORIGIN.md), without kvane.
 */
import { readFileSync } from "node:fs";
import { expandRow, type FlatOperator, type MagneticRow } from "./magnetic-table.js";

interface Setting {
  readonly number: number;
  readonly choice: string;
  readonly ops: readonly (readonly number[])[];
}

const settings: readonly Setting[] = JSON.parse(
  readFileSync(new URL("../fixtures/settings.json", import.meta.url), "utf8"),
);
const shifts = new Map<number, readonly number[]>();

/** All operators modulo integer translations of a row in the BNS setting. */
export function bnsOperators(row: MagneticRow): readonly FlatOperator[] {
  const number = Number(row.bns.split(".")[0]);
  const shift = shifts.get(number) ?? shiftOf(number);
  shifts.set(number, shift);
  return expandRow(row).map((operator) => moved(operator, shift));
}

function shiftOf(number: number): readonly number[] {
  const [first, second] = ["1", "2"].map((choice) =>
    settings.find((one) => one.number === number && one.choice === choice),
  );
  if (!first || !second) return [0, 0, 0];
  const wanted = new Set(second.ops.map(String));
  // Origins lie at eighths.
  for (let index = 0; index < 512; index++) {
    const shift = [3 * (index % 8), 3 * (Math.floor(index / 8) % 8), 3 * Math.floor(index / 64)];
    if (first.ops.every((operator) => wanted.has(String(moved(operator, shift))))) return shift;
  }
  throw new Error(`no shift of origin takes the two settings of number ${number} into each other`);
}

/** t → t + R p − p in 24ths. */
function moved(operator: readonly number[], shift: readonly number[]): readonly number[] {
  return operator.map((entry, place) => {
    if (place < 9 || place > 11) return entry;
    const row = operator.slice(3 * (place - 9), 3 * (place - 8));
    const turned = row.reduce((sum, factor, axis) => sum + factor * (shift[axis] as number), 0);
    return (((entry + turned - (shift[place - 9] as number)) % 24) + 24) % 24;
  });
}
