import { fail } from "../errors/index.js";
import { formatWaveVector, numericWaveVector, type WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { checkLimits } from "./limits.js";
import { vectorOrbits } from "./orbits.js";
import { reciprocalFrame } from "./reciprocal-frame.js";
import { type SymmetryOfK, symmetryOfK } from "./symmetry-of-k.js";
import type { PositionLimits, SatelliteLine } from "./types.js";

/** Lists the satellites of a k within the limits; throws as `satelliteLines` does. */
export type SatelliteLister = (k: WaveVector, limits: PositionLimits) => readonly SatelliteLine[];

/**
 * `satelliteLines` for many k of one group and cell: what does not depend on k is worked out once, and the symmetry of k
 * once for all k that differ in the values of their letters only.
 *
 * Throws `invalid-cell` and `cell-contradicts-group`.
 */
export function satelliteLister(group: SpaceGroup, cell: Cell): SatelliteLister {
  const frame = reciprocalFrame(group, cell);
  const symmetries = new WeakMap<WaveVector["components"], SymmetryOfK>();
  return (k, limits) => {
    checkLimits(limits);
    const kappa = primitiveNumbers(group, numbersOf(k));
    const symmetry = symmetries.get(k.components) ?? symmetryOfK(group, k);
    symmetries.set(k.components, symmetry);
    return vectorOrbits(frame, symmetry, kappa, limits).map(({ h, sign, q, multiplicity }) => ({
      h,
      sign,
      arm: 0,
      q,
      d: roundNumber((2 * Math.PI) / q),
      multiplicity,
      multiplicityAllArms: multiplicity * symmetry.armPairs,
    }));
  };
}

/**
 * The satellites H ± k, H ∈ L*, of one k with `qMin ≤ Q ≤ qMax` (Å⁻¹), none missed, Q = 0 left out: one line for each
 * set of vectors that the group of ±k extended by −1 makes equivalent, in order of Q. With k = 0 these are the nuclear
 * positions. Lines that coincide by accident of the metric stay apart.
 *
 * Throws `k-needs-values` while k has an open letter, `invalid-argument` for impossible limits, `invalid-cell` and
 * `cell-contradicts-group`.
 */
export function satelliteLines(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  limits: PositionLimits,
): readonly SatelliteLine[] {
  return satelliteLister(group, cell)(k, limits);
}

/** `κ = k B`, in the dual of the primitive basis. */
function primitiveNumbers({ lattice }: SpaceGroup, k: readonly number[]): [number, number, number] {
  const along = (vector: readonly number[] | undefined): number =>
    (vector as readonly number[]).reduce((sum, entry, axis) => sum + entry * (k[axis] as number), 0) /
    lattice.denominator;
  return [along(lattice.vectors[0]), along(lattice.vectors[1]), along(lattice.vectors[2])];
}

/** The components of k as floats; throws `k-needs-values`. */
function numbersOf(k: WaveVector): readonly [number, number, number] {
  const numeric = numericWaveVector(k);
  if (numeric === null)
    fail("k-needs-values", `positions need numbers, but k = ${formatWaveVector(k)} has open parameters`, {
      expected: "three numbers or fractions",
      found: formatWaveVector(k),
      remedy: "write a number or a fraction in place of each letter, for example 0,0.472,0",
    });
  return numeric;
}
