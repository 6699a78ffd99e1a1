/**
 * The 1651 rows of `spacegroup-data/magnetic-groups.txt`, multiplied out by a plain routine of its own: integer
 * rotations, translations in 24ths modulo the integers, centring written out. Nothing of the library goes into it.
 */
import { readFileSync } from "node:fs";

export interface MagneticRow {
  readonly bns: string;
  readonly og: string;
  readonly type: number;
  readonly generators: readonly string[];
}

/** Nine rotation integers, three translations in 24ths, the time reversal. */
export type FlatOperator = readonly number[];

export function magneticRows(): readonly MagneticRow[] {
  const text = readFileSync(new URL("../../spacegroup-data/magnetic-groups.txt", import.meta.url), "utf8");
  return text
    .split("\n")
    .filter((line) => line !== "" && !line.startsWith("#"))
    .map((line) => {
      const [bns, og, type, ...generators] = line.split(/\s+/).filter((word) => word !== "");
      return { bns: bns as string, og: og as string, type: Number(type), generators };
    });
}

/** All operators modulo integer translations, identity among them. */
export function expandRow({ generators }: MagneticRow): readonly FlatOperator[] {
  const parsed = generators.map(parseFlat);
  const identity: FlatOperator = [1, 0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1];
  const reached = new Map([[identity.join(), identity]]);
  for (const element of reached.values())
    for (const generator of parsed) {
      const next = multiplyFlat(element, generator);
      if (!reached.has(next.join())) reached.set(next.join(), next);
    }
  return [...reached.values()];
}

/** `-x+1/2,y-x,z,-1`; integer coefficients of x, y, z only. */
export function parseFlat(text: string): FlatOperator {
  const parts = text.split(",");
  const rotation: number[] = [];
  const translation: number[] = [];
  for (const part of parts.slice(0, 3)) {
    const row = [0, 0, 0];
    let shift = 0;
    for (const [, sign, letter, top, bottom] of part.matchAll(/([+-]?)(?:([xyz])|(\d+)(?:\/(\d+))?)/g)) {
      const factor = sign === "-" ? -1 : 1;
      if (letter) row["xyz".indexOf(letter)] = factor;
      else shift += (factor * 24 * Number(top)) / Number(bottom ?? 1);
    }
    rotation.push(...row);
    translation.push(((shift % 24) + 24) % 24);
  }
  return [...rotation, ...translation, Number(parts[3] ?? 1)];
}

export function multiplyFlat(a: FlatOperator, b: FlatOperator): FlatOperator {
  const at = (list: FlatOperator, index: number): number => list[index] as number;
  const product: number[] = [];
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++)
      product.push([0, 1, 2].reduce((sum, k) => sum + at(a, 3 * row + k) * at(b, 3 * k + column), 0));
  for (let row = 0; row < 3; row++) {
    const moved = [0, 1, 2].reduce((sum, k) => sum + at(a, 3 * row + k) * at(b, 9 + k), at(a, 9 + row));
    product.push(((moved % 24) + 24) % 24);
  }
  return [...product, at(a, 12) * at(b, 12)];
}
