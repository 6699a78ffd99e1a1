import type { IntegerMatrix } from "../numbers/index.js";

/** Axis symbols of a Hall symbol: a cell axis, a face diagonal normal to a cell axis (' is −, " is +), or a+b+c. */
export type HallAxis = "x" | "y" | "z" | "x'" | "y'" | "z'" | 'x"' | 'y"' | 'z"' | "*";

/**
 * Proper rotations about the principal axes (International Tables B, table A1.4.2.3), face diagonals (table A1.4.2.4)
 * and the body diagonal (table A1.4.2.5), row by row.
 */
const rotations: Readonly<Record<string, IntegerMatrix>> = {
  "2x": [1, 0, 0, 0, -1, 0, 0, 0, -1],
  "3x": [1, 0, 0, 0, 0, -1, 0, 1, -1],
  "4x": [1, 0, 0, 0, 0, -1, 0, 1, 0],
  "6x": [1, 0, 0, 0, 1, -1, 0, 1, 0],
  "2y": [-1, 0, 0, 0, 1, 0, 0, 0, -1],
  "3y": [-1, 0, 1, 0, 1, 0, -1, 0, 0],
  "4y": [0, 0, 1, 0, 1, 0, -1, 0, 0],
  "6y": [0, 0, 1, 0, 1, 0, -1, 0, 1],
  "2z": [-1, 0, 0, 0, -1, 0, 0, 0, 1],
  "3z": [0, -1, 0, 1, -1, 0, 0, 0, 1],
  "4z": [0, -1, 0, 1, 0, 0, 0, 0, 1],
  "6z": [1, -1, 0, 1, 0, 0, 0, 0, 1],
  "2x'": [-1, 0, 0, 0, 0, -1, 0, -1, 0],
  '2x"': [-1, 0, 0, 0, 0, 1, 0, 1, 0],
  "2y'": [0, 0, -1, 0, -1, 0, -1, 0, 0],
  '2y"': [0, 0, 1, 0, -1, 0, 1, 0, 0],
  "2z'": [0, -1, 0, -1, 0, 0, 0, 0, -1],
  '2z"': [0, 1, 0, 1, 0, 0, 0, 0, -1],
  "3*": [0, 0, 1, 1, 0, 0, 0, 1, 0],
};

/** The direction of each axis, for screw translations. */
const directions: Readonly<Record<HallAxis, readonly [number, number, number]>> = {
  x: [1, 0, 0],
  y: [0, 1, 0],
  z: [0, 0, 1],
  "x'": [0, 1, -1],
  'x"': [0, 1, 1],
  "y'": [1, 0, -1],
  'y"': [1, 0, 1],
  "z'": [1, -1, 0],
  'z"': [1, 1, 0],
  "*": [1, 1, 1],
};

/** The proper rotation of order `order` about `axis`, or null where Hall's tables have none. */
export function hallRotation(order: number, axis: HallAxis): IntegerMatrix | null {
  if (order === 1) return [1, 0, 0, 0, 1, 0, 0, 0, 1];
  return rotations[`${order}${axis}`] ?? null;
}

export function axisDirection(axis: HallAxis): readonly [number, number, number] {
  return directions[axis];
}

/** Centring vectors in 12ths by lattice symbol (International Tables B, table A1.4.2.2). */
export const latticeSymbols: Readonly<Record<string, readonly (readonly [number, number, number])[]>> = {
  P: [],
  A: [[0, 6, 6]],
  B: [[6, 0, 6]],
  C: [[6, 6, 0]],
  I: [[6, 6, 6]],
  R: [
    [8, 4, 4],
    [4, 8, 8],
  ],
  H: [
    [8, 4, 0],
    [4, 8, 0],
  ],
  F: [
    [0, 6, 6],
    [6, 0, 6],
    [6, 6, 0],
  ],
};

/** Translations by letter, in 12ths (International Tables B, table A1.4.2.6). */
export const translationLetters: Readonly<Record<string, readonly [number, number, number]>> = {
  a: [6, 0, 0],
  b: [0, 6, 0],
  c: [0, 0, 6],
  n: [6, 6, 6],
  u: [3, 0, 0],
  v: [0, 3, 0],
  w: [0, 0, 3],
  d: [3, 3, 3],
};
