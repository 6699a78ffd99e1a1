import type { WaveVector } from "../kvectors/index.js";
import { overlapInverseAngstrom, roundNumber } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { nuclearLines } from "./nuclear-lines.js";
import { overlapsOf } from "./overlaps.js";
import { qToTwoThetaDeg } from "./positions.js";
import { satelliteLines } from "./satellite-lines.js";
import type { PositionLimits, SatelliteReflection } from "./types.js";

/** What a list of satellites should show beside the positions. */
export interface ReflectionOptions extends PositionLimits {
  readonly wavelengthAngstrom?: number | null;
  /** Half-width in Å⁻¹ within which a nuclear line counts as overlapping; default `overlapInverseAngstrom`. */
  readonly resolution?: number;
}

/**
 * `satelliteLines` with the scattering angle and the nuclear lines that fall on each satellite, at the wavelength in
 * use and through half of it.
 */
export function satelliteReflections(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  options: ReflectionOptions,
): readonly SatelliteReflection[] {
  const { wavelengthAngstrom = null, resolution = overlapInverseAngstrom } = options;
  const lines = satelliteLines(group, cell, k, options);
  const nuclear = nuclearLines(group, cell, { qMax: 2 * (options.qMax + resolution) });
  return lines.map((line) => {
    const angle = wavelengthAngstrom === null ? null : qToTwoThetaDeg(line.q, wavelengthAngstrom);
    return {
      ...line,
      twoThetaDeg: angle === null ? null : roundNumber(angle),
      overlaps: overlapsOf(line.q, nuclear, resolution),
    };
  });
}
