import { littleGroup, star, type WaveVector } from "../kvectors/index.js";
import { matrixFrom, type RationalVector, rowTimes, subtractVectors } from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";

/** `η → η R + shift` on satellites `η + κ`, where `κ R = κ + shift`. */
export interface SatelliteMap {
  /** Integer matrix in the primitive basis, acting on rows. */
  readonly rotation: readonly number[];
  readonly shift: readonly number[];
}

/**
 * What maps the satellites of one k onto one another, in the dual of the primitive basis, where they are `±(η + κ)` with
 * η ∈ Z³. The group is that of ±k in the point group extended by −1; of R and −R the one that keeps the sign of k is
 * listed (both where k ≡ −k).
 */
export interface SymmetryOfK {
  readonly maps: readonly SatelliteMap[];
  /** 2k ∈ L*: H + k and H − k are the same vectors. */
  readonly halfLattice: boolean;
  /** ±k pairs in the star. */
  readonly armPairs: number;
}

export function symmetryOfK(group: SpaceGroup, k: WaveVector): SymmetryOfK {
  const rotations = group.primitive.rotations;
  const maps = new Map<string, SatelliteMap>();
  const little = littleGroup(group, k);
  little.operators.forEach((index, position) => {
    const rotation = rotations[index] as readonly number[];
    maps.set(rotation.join(), { rotation, shift: little.shifts[position] as readonly number[] });
  });
  const { reversing, minusK } = star(group, k);
  const base = basePoint(group, k);
  for (const index of reversing) {
    const rotation = (rotations[index] as readonly number[]).map((entry) => 0 - entry);
    if (!maps.has(rotation.join())) maps.set(rotation.join(), { rotation, shift: shiftOf(base, rotation) });
  }
  const halfLattice = minusK === "equivalent";
  const groupOrder = halfLattice ? maps.size : 2 * maps.size;
  return { maps: [...maps.values()], halfLattice, armPairs: orderWithInversion(rotations) / groupOrder };
}

/** κ at zero values of the parameters: where κ R − κ is the same for all values, that point will do. */
function basePoint(group: SpaceGroup, k: WaveVector): RationalVector {
  const [first, second, third] = k.components;
  return toPrimitiveRow(group.lattice, [first.constant, second.constant, third.constant]);
}

function shiftOf(base: RationalVector, rotation: readonly number[]): number[] {
  return subtractVectors(rowTimes(base, matrixFrom(rotation)), base).map(([numerator, denominator]) => {
    if (denominator !== 1) throw new Error("a rotation that leaves k fixed moved it by no vector of L*");
    return numerator;
  });
}

/** Order of the point group extended by −1. */
function orderWithInversion(rotations: readonly (readonly number[])[]): number {
  const centric = rotations.some((rotation) => rotation.join() === "-1,0,0,0,-1,0,0,0,-1");
  return centric ? rotations.length : 2 * rotations.length;
}

/** `η R + shift`. */
export function mapIndices(
  { rotation, shift }: SatelliteMap,
  n1: number,
  n2: number,
  n3: number,
): [number, number, number] {
  const at = (column: 0 | 1 | 2): number =>
    n1 * (rotation[column] as number) +
    n2 * (rotation[3 + column] as number) +
    n3 * (rotation[6 + column] as number) +
    (shift[column] as number);
  return [at(0), at(1), at(2)];
}
