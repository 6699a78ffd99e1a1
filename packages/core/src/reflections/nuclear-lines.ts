import { exactWaveVector } from "../kvectors/index.js";
import { modulo, roundNumber, zeroVector } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { checkLimits } from "./limits.js";
import { vectorOrbits } from "./orbits.js";
import { reciprocalFrame } from "./reciprocal-frame.js";
import { symmetryOfK } from "./symmetry-of-k.js";
import type { NuclearLine, PositionLimits } from "./types.js";

/**
 * The nuclear powder lines with `qMin ≤ Q ≤ qMax` (Å⁻¹) in order of Q: vectors of L* (which settles the centring) up to
 * the point group extended by −1. Those that a glide plane or screw axis forbids are listed and marked; extinctions
 * that hold for special positions only are not marked.
 */
export function nuclearLines(group: SpaceGroup, cell: Cell, limits: PositionLimits): readonly NuclearLine[] {
  checkLimits(limits);
  const orbits = vectorOrbits(
    reciprocalFrame(group, cell),
    symmetryOfK(group, exactWaveVector(zeroVector)),
    [0, 0, 0],
    limits,
  );
  return orbits.map(({ h, eta, q, multiplicity }) => ({
    h,
    q,
    d: roundNumber((2 * Math.PI) / q),
    multiplicity,
    extinct: isExtinct(group, eta),
  }));
}

/**
 * Whether some {R|t} with `h R = h` has `h·t` not integer: then F(h) = F(h) e^{2πi h·t} = 0 (International Tables A,
 * section 1.6.3, general reflection conditions).
 *
 * @param eta h in the dual of the primitive basis
 */
function isExtinct({ primitive }: SpaceGroup, eta: readonly [number, number, number]): boolean {
  const [n1, n2, n3] = eta;
  return primitive.rotations.some((rotation, index) => {
    for (const column of [0, 1, 2]) {
      const entry =
        n1 * (rotation[column] as number) +
        n2 * (rotation[3 + column] as number) +
        n3 * (rotation[6 + column] as number);
      if (entry !== eta[column]) return false;
    }
    const [t1, t2, t3] = primitive.translations[index] as readonly [number, number, number];
    return modulo(n1 * t1 + n2 * t2 + n3 * t3, primitive.denominator) !== 0;
  });
}
