import {
  isExactWaveVector,
  numericWaveVector,
  parseWaveVector,
  placeWaveVector,
  plainestRepresentative,
  type WaveVector,
} from "../kvectors/index.js";
import { computedKSnap, toNumber } from "../numbers/index.js";
import { fromPrimitiveRow, type SpaceGroup } from "../spacegroups/index.js";

/** `κ = k B` of numbers: components in the dual of the primitive basis. */
export function kappaOf(group: SpaceGroup, k: readonly number[]): number[] {
  const { vectors, denominator } = group.lattice;
  return vectors.map(
    (vector) => vector.reduce((sum, entry, axis) => sum + entry * (k[axis] as number), 0) / denominator,
  );
}

/** The numbers of a wave vector as κ; throws for open letters, which callers have refused. */
export function kappaOfVector(group: SpaceGroup, k: WaveVector): number[] {
  const numbers = numericWaveVector(k);
  if (numbers === null) throw new Error("a letter of k is open");
  return kappaOf(group, numbers);
}

function dualRows(group: SpaceGroup): number[][] {
  return [0, 1, 2].map((axis) =>
    fromPrimitiveRow(group.lattice, [
      [axis === 0 ? 1 : 0, 1],
      [axis === 1 ? 1 : 0, 1],
      [axis === 2 ? 1 : 0, 1],
    ]).map(toNumber),
  );
}

/**
 * A computed κ as a wave vector of the setting: of all that symmetry and −1 make equal the one that reads most plainly,
 * put onto a simpler kind where that is nearer than the tolerance in reciprocal lattice units.
 */
export function placedVector(group: SpaceGroup, kappa: readonly number[], tolerance = computedKSnap): WaveVector {
  const plain = plainestImage(group, kappa);
  const text = plain.map((entry) => (entry + 0).toFixed(10)).join(",");
  const { k } = placeWaveVector(group, parseWaveVector(text), { tolerance });
  return isExactWaveVector(k) ? plainestRepresentative(group, k) : k;
}

function plainestImage(group: SpaceGroup, kappa: readonly number[]): number[] {
  const dual = dualRows(group);
  let best: { row: number[]; rank: readonly number[] } | null = null;
  const seen = new Set<string>();
  for (const rotation of group.primitive.rotations)
    for (const sign of [1, -1]) {
      const image = [0, 1, 2].map(
        (axis) => sign * kappa.reduce((sum, entry, row) => sum + entry * (rotation[3 * row + axis] as number), 0),
      );
      const centred = image.map((entry) => entry - Math.round(entry));
      const key = centred.map((entry) => Math.round(entry * 1e7)).join();
      if (seen.has(key)) continue;
      seen.add(key);
      for (const shift of neighbours) {
        const row = [0, 1, 2].map((axis) =>
          centred.reduce((sum, entry, a) => sum + (entry + (shift[a] as number)) * (dual[a]?.[axis] as number), 0),
        );
        const rank = plainness(row);
        if (best === null || before(rank, best.rank)) best = { row, rank };
      }
    }
  return best?.row ?? [...kappa];
}

const steps = [-1, 0, 1];
const neighbours = steps.flatMap((a) => steps.flatMap((b) => steps.map((c) => [a, b, c] as const)));

/** Fewest components that are not zero, smallest squares, fewest minus signs, then in order; millionths decide. */
function plainness(row: readonly number[]): readonly number[] {
  const whole = row.map((entry) => Math.round(entry * 1e6));
  return [
    whole.filter((entry) => entry !== 0).length,
    whole.reduce((sum, entry) => sum + entry * entry, 0),
    whole.filter((entry) => entry < 0).length,
    ...whole,
  ];
}

function before(a: readonly number[], b: readonly number[]): boolean {
  const at = a.findIndex((entry, index) => entry !== b[index]);
  return at >= 0 && (a[at] as number) < (b[at] as number);
}
