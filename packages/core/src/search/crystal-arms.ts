import { equivalentWaveVectors, numericWaveVector, star, type WaveVector } from "../kvectors/index.js";
import { identityMatrix, negateForm, overCommonDenominator } from "../numbers/index.js";
import { fromPrimitiveRow, type SpaceGroup } from "../spacegroups/index.js";

export type Triple = readonly [number, number, number];

/** A satellite vector ±arm, before H is added. */
export interface SignedArm {
  /** Index in the star of k. */
  readonly arm: number;
  readonly sign: 1 | -1 | 0;
  /** The arm itself; the satellite is at H + k or H − k of it. */
  readonly k: WaveVector;
  readonly vector: Triple;
}

/** All satellites modulo L*: one arm of every ±k pair with both signs, or with sign 0 where they agree. */
export function signedArms(group: SpaceGroup, k: WaveVector): readonly SignedArm[] {
  const { arms, minusK } = star(group, k);
  const signs = minusK === "equivalent" ? ([0] as const) : ([1, -1] as const);
  const kept: WaveVector[] = [];
  const result: SignedArm[] = [];
  arms.forEach((arm, index) => {
    if (minusK === "in star" && kept.some((earlier) => equivalentWaveVectors(group, negated(arm), earlier))) return;
    kept.push(arm);
    const numeric = numericWaveVector(arm) as Triple;
    for (const sign of signs) {
      const side = sign === -1 ? -1 : 1;
      result.push({ arm: index, sign, k: arm, vector: [side * numeric[0], side * numeric[1], side * numeric[2]] });
    }
  });
  return result;
}

function negated(k: WaveVector): WaveVector {
  const [first, second, third] = k.components;
  return { ...k, components: [negateForm(first), negateForm(second), negateForm(third)] };
}

/** Finds the vector of L* next to a row, both in a*, b*, c*, by rounding in the dual of the primitive basis. */
export function latticeRounding({ lattice }: SpaceGroup): (row: Triple) => Triple {
  const dual = overCommonDenominator(identityMatrix.flatMap((unit) => fromPrimitiveRow(lattice, unit)));
  return (row) => {
    const eta = lattice.vectors.map((vector) =>
      Math.round((row[0] * vector[0] + row[1] * vector[1] + row[2] * vector[2]) / lattice.denominator),
    );
    const at = (axis: 0 | 1 | 2): number =>
      eta.reduce((sum, entry, index) => sum + entry * (dual.numerators[3 * index + axis] as number), 0) /
        dual.denominator +
      0;
    return [at(0), at(1), at(2)];
  };
}

/** Vectors of L* per unit volume of reciprocal lattice units: the volume of the primitive cell over that of the cell. */
export function latticeDensity({ lattice }: SpaceGroup): number {
  // The rows of the Hermite form are triangular.
  return (
    Math.abs(lattice.vectors.reduce((product, vector, axis) => product * (vector[axis] as number), 1)) /
    lattice.denominator ** 3
  );
}
