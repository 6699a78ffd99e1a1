import { modulo } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { fromPrimitiveIntegers, rotateRow } from "./integer-form.js";
import { littleGroup, star } from "./little-group.js";
import { plainestRepresentative } from "./plainest.js";
import type { SpecialPoint } from "./types.js";
import { exactWaveVector } from "./wave-vector.js";

/**
 * 12 k ∈ L* for every isolated k. Its little co-group leaves no vector fixed, so it holds one of the smallest such
 * classes -1, 222, -4, 32, -6. For these `det(R − 1)` or the sum over the group gives 2k, 4k, 4k, 6k, 6k ∈ L*.
 */
export const pointDenominator = 12;

/**
 * The special points of a group: the isolated k of its point group extended by −1, k = 0 among them, one per star of
 * ±k, in order of the number of arms, then of the components.
 */
export function specialPoints(group: SpaceGroup): readonly SpecialPoint[] {
  const rotations = group.primitive.rotations;
  const seen = new Uint8Array(pointDenominator ** 3);
  const points: SpecialPoint[] = [];
  for (let code = 0; code < seen.length; code++) {
    if (seen[code] === 1) continue;
    const row = [Math.floor(code / 144), Math.floor(code / 12) % 12, code % 12];
    const images = new Set<number>();
    const fixing: number[] = new Array<number>(9).fill(0);
    for (const rotation of rotations) {
      const image = rotateRow(row, rotation);
      for (const sign of [1, -1]) {
        const imageCode = encode(image, sign);
        images.add(imageCode);
        if (imageCode === code) rotation.forEach((entry, index) => (fixing[index] = (fixing[index] as number) + sign * entry));
      }
    }
    for (const image of images) seen[image] = 1;
    // The sum over a group projects on its fixed vectors: zero means that k is isolated.
    if (fixing.every((entry) => entry === 0)) points.push(describe(group, row, images.size));
  }
  return points.sort(comparePoints);
}

function encode(row: readonly number[], sign: number): number {
  const [a, b, c] = row as [number, number, number];
  return (
    modulo(sign * a, pointDenominator) * 144 + modulo(sign * b, pointDenominator) * 12 + modulo(sign * c, pointDenominator)
  );
}

function describe(group: SpaceGroup, row: readonly number[], images: number): SpecialPoint {
  const k = plainestRepresentative(group, exactWaveVector(fromPrimitiveIntegers(group, row, pointDenominator)));
  const { operators, symbol } = littleGroup(group, k);
  const { arms, minusK } = star(group, k);
  return {
    k,
    arms: arms.length,
    armPairs: minusK === "equivalent" ? images : images / 2,
    minusK,
    littleCoGroup: { symbol, order: operators.length },
  };
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

