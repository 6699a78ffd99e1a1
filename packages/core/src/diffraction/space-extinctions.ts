import { vanishingShare } from "../numbers/index.js";
import type { SatelliteLine } from "../reflections/index.js";
import { magneticFormFactor } from "./form-factors.js";
import type { ScatteringGeometry, Triple } from "./geometry.js";
import type { MomentSpace } from "./moment-space.js";
import type { LineMembers } from "./satellite-members.js";
import { basisFactors, magneticLengthPerMagneton, prepareSpace } from "./structure-factors.js";

/** Whether lines or vectors vanish for every arrangement of a space. */
export interface SpaceExtinctions {
  /** All vectors of a powder line on all waves. */
  readonly line: (line: SatelliteLine) => boolean;
  /** One vector Q = H + k of a wave, in a*, b*, c*. */
  readonly vector: (wave: number, q: Triple) => boolean;
}

/**
 * Tells of lines and single vectors whether they vanish for every arrangement of a space (of a configuration): F⊥ is
 * linear in the amplitudes, so that it does exactly when it does for each of them alone. The moments of configurations come as
 * numbers, so that zero means below `vanishingShare` of the sum of sizes; for irreps `extinctionTest` decides
 * exactly. Form factors are left out: where one of them happens to be 0 is no matter of symmetry.
 */
export function spaceExtinctions(
  geometry: ScatteringGeometry,
  members: LineMembers,
  space: MomentSpace,
): SpaceExtinctions {
  const formFactor = magneticFormFactor({ constant: 1 });
  const prepared = prepareSpace(geometry, { ...space, atoms: space.atoms.map((atom) => ({ ...atom, formFactor })) });
  const sizes = space.basis.map(
    ({ components }) =>
      magneticLengthPerMagneton *
      components.reduce(
        (sum, wave) => sum + wave.reduce((own, { real, imaginary }) => own + Math.hypot(...real, ...imaginary), 0),
        0,
      ),
  );
  const vector = (wave: number, q: Triple): boolean => {
    const factors = basisFactors(prepared, wave, q);
    return sizes.every(
      (size, index) => Math.hypot(...factors.subarray(6 * index, 6 * index + 6)) <= vanishingShare * size,
    );
  };
  return {
    vector,
    line: (line) => {
      const first = members.of(line.h, line.sign);
      return space.waves.every((wave, index) => members.onArm(first, wave).every((q) => vector(index, q)));
    },
  };
}
