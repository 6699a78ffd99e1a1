import { exactWaveVector, type WaveVector } from "@kvane/core/kvectors";
import type { BasisChange, Site } from "@kvane/core/spacegroups";
import type { Random } from "./random.js";
import { reduced } from "./written.js";

export type Pair = readonly [number, number];
type Triple = readonly [Pair, Pair, Pair];

/** Whole matrices of determinant 1, 1 and 2; the integers are no sublattice of what the last one makes of a lattice. */
const matrices: readonly (readonly number[])[] = [
  [1, 0, 0, 0, 1, 0, 0, 0, 1],
  [1, 1, 0, 0, 1, -1, 1, 1, 1],
  [1, -1, 0, 1, 1, 0, 0, 0, 1],
];

/** A random (P, p): new axes `(a,b,c) P`, origin at p. */
export function randomChange(random: Random): BasisChange {
  const entries = random.pick(matrices).map((entry): Pair => [entry, 1]);
  const shift = (): Pair => reduced(random.below(48), 48);
  return {
    matrix: [entries.slice(0, 3), entries.slice(3, 6), entries.slice(6, 9)] as unknown as readonly [
      Triple,
      Triple,
      Triple,
    ],
    shift: [shift(), shift(), shift()],
  };
}

/** `k' = k P` for a k without letters. */
export function changedWave(k: WaveVector, change: BasisChange): WaveVector {
  const row = k.components.map((form) => form.constant);
  const column = (at: number): Pair =>
    row.reduce<Pair>((sum, entry, index) => sumOf(sum, productOf(entry, change.matrix[index]?.[at] as Pair)), [0, 1]);
  return exactWaveVector([column(0), column(1), column(2)]);
}

/** `x' = P⁻¹ (x − p)`, the inverse through cofactors. */
export function changedSite(site: Site, change: BasisChange): Site {
  const entries = change.matrix.flatMap((row) => row.map(([top]) => top));
  const adjugate = adjugateOf(entries);
  const determinant = [0, 1, 2].reduce((sum, at) => sum + (entries[at] as number) * (adjugate[3 * at] as number), 0);
  const moved = site.position.map((entry, at) => sumOf(entry, productOf([-1, 1], change.shift[at] as Pair)));
  const row = (at: number): Pair =>
    moved.reduce<Pair>(
      (sum, entry, index) => sumOf(sum, productOf(entry, reduced(adjugate[3 * at + index] as number, determinant))),
      [0, 1],
    );
  return { label: site.label, position: [row(0), row(1), row(2)] };
}

function adjugateOf(m: readonly number[]): number[] {
  const at = (row: number, column: number): number => m[3 * (row % 3) + (column % 3)] as number;
  return Array.from({ length: 9 }, (_, index) => {
    const [row, column] = [Math.floor(index / 3), index % 3];
    // The cofactor of entry (column, row), with its sign through cyclic indices.
    return at(column + 1, row + 1) * at(column + 2, row + 2) - at(column + 1, row + 2) * at(column + 2, row + 1);
  });
}

export function sumOf(a: Pair, b: Pair): Pair {
  return reduced(a[0] * b[1] + b[0] * a[1], a[1] * b[1]);
}

export function productOf(a: Pair, b: Pair): Pair {
  return reduced(a[0] * b[0], a[1] * b[1]);
}
