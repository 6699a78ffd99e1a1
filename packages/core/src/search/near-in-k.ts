import { numericWaveVector, type WaveVector } from "../kvectors/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { inner, type Triple } from "./flat-frame.js";
import { extendedRotations, rotated } from "./wedge.js";

/** Least distance between two k, all images under the point group extended by −1 and L* allowed. */
export type StarDistance = (a: WaveVector, b: WaveVector) => number;

/** @param metric of the dual of the primitive basis; the distance is in its unit */
export function starDistance(group: SpaceGroup, metric: readonly number[]): StarDistance {
  const { lattice } = group;
  const rotations = extendedRotations(group);
  const primitive = (k: WaveVector): Triple => {
    const row = numericWaveVector(k) as Triple;
    return lattice.vectors.map(
      (vector) => vector.reduce((sum, entry, axis) => sum + entry * (row[axis] as number), 0) / lattice.denominator,
    ) as unknown as Triple;
  };
  return (a, b) => {
    const [from, to] = [primitive(a), primitive(b)];
    let least = Number.POSITIVE_INFINITY;
    for (const rotation of rotations) {
      const image = rotated(from, rotation);
      const rest = [0, 1, 2].map((axis) => (image[axis] as number) - (to[axis] as number));
      least = Math.min(least, shortest(metric, rest.map((entry) => entry - Math.round(entry)) as unknown as Triple));
    }
    return Math.sqrt(least);
  };
}

/** Of a vector between −1/2 and 1/2 and its neighbours: enough for the short distances that matter here. */
function shortest(metric: readonly number[], [x, y, z]: Triple): number {
  let least = Number.POSITIVE_INFINITY;
  for (const i of [-1, 0, 1])
    for (const j of [-1, 0, 1])
      for (const l of [-1, 0, 1]) {
        const vector: Triple = [x + i, y + j, z + l];
        least = Math.min(least, inner(metric, vector, vector));
      }
  return Math.max(0, least);
}
