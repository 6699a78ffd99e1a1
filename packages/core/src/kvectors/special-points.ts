import type { SpaceGroup } from "../spacegroups/index.js";
import { atlasWithOrbits, type KindWithOrbit } from "./atlas.js";
import type { SpecialPoint } from "./types.js";

/**
 * The special points of a group: the isolated k of its point group extended by −1, k = 0 among them, one per star of
 * ±k, in order of the number of arms, then of the components.
 */
export function specialPoints(group: SpaceGroup): readonly SpecialPoint[] {
  return atlasWithOrbits(group, true, [0]).map(describe).sort(comparePoints);
}

function describe({ kind, orbit }: KindWithOrbit): SpecialPoint {
  const { k, arms, minusK, littleCoGroup } = kind;
  const images = orbit.flats.length;
  return { k, arms, armPairs: minusK === "equivalent" ? images : images / 2, minusK, littleCoGroup };
}

function comparePoints(a: SpecialPoint, b: SpecialPoint): number {
  if (a.armPairs !== b.armPairs) return a.armPairs - b.armPairs;
  for (const axis of [0, 1, 2] as const) {
    const [left, right] = [a.k.components[axis].constant, b.k.components[axis].constant];
    const difference = left[0] * right[1] - right[0] * left[1];
    if (difference !== 0) return difference;
  }
  return 0;
}
