import { fail } from "../errors/index.js";
import type { WaveVector } from "../kvectors/index.js";
import { overlapInverseAngstrom, roundNumber } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { nuclearLines } from "./nuclear-lines.js";
import { overlapsOf } from "./overlaps.js";
import { qToTwoThetaDeg } from "./positions.js";
import { satelliteLines } from "./satellite-lines.js";
import type { PositionLimits, SatelliteLine, SatelliteReflection } from "./types.js";

/** What a list of satellites should show beside the positions. */
export interface ReflectionOptions extends PositionLimits {
  readonly wavelengthAngstrom?: number | null;
  /** Half-width in Å⁻¹ within which a nuclear line counts as overlapping; default `overlapInverseAngstrom`. */
  readonly resolution?: number;
}

/** A longer list helps nobody. */
const mostReflections = 50_000;

/** Nuclear lines, and images of nuclear lines, that are named on one satellite. */
const mostOverlaps = 8;

/** Satellites without what lies on them, and what works that out for each. */
export interface ReflectionList {
  readonly lines: readonly SatelliteLine[];
  /** Looks for what falls on a line of the list. */
  readonly noted: (line: SatelliteLine) => SatelliteReflection;
}

/**
 * `satelliteLines` with the scattering angle and the nuclear lines that fall on each satellite, at the wavelength in
 * use and through half of it, in two steps, so that long lists can be interrupted.
 *
 * Throws `invalid-argument` for lists of more than 50 000 lines, and as `satelliteLines` does.
 */
export function reflectionList(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  options: ReflectionOptions,
): ReflectionList {
  const { wavelengthAngstrom = null, resolution = overlapInverseAngstrom } = options;
  const lines = satelliteLines(group, cell, k, options);
  if (lines.length > mostReflections)
    fail("invalid-argument", `the list would hold ${lines.length} satellites`, {
      expected: `at most ${mostReflections} satellites within the limit of Q`,
      found: String(lines.length),
      remedy: "lower the limit of Q, or check the units of the cell (Å) and of Q (Å⁻¹)",
    });
  const nuclear = nuclearLines(group, cell, { qMax: 2 * (options.qMax + resolution) });
  return {
    lines,
    noted: (line) => {
      const angle = wavelengthAngstrom === null ? null : qToTwoThetaDeg(line.q, wavelengthAngstrom);
      const { list, more } = overlapsOf(line.q, nuclear, resolution, mostOverlaps);
      return {
        ...line,
        twoThetaDeg: angle === null ? null : roundNumber(angle),
        overlaps: list,
        moreOverlaps: more,
      };
    },
  };
}

/** The whole `reflectionList` at once. */
export function satelliteReflections(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  options: ReflectionOptions,
): readonly SatelliteReflection[] {
  const { lines, noted } = reflectionList(group, cell, k, options);
  return lines.map(noted);
}
