import { breathe, type WorkHost } from "../../algorithms/index.js";
import { placed } from "../../errors/index.js";
import type { WaveVector } from "../../kvectors/index.js";
import { overlapInverseAngstrom } from "../../numbers/index.js";
import { reflectionList, type SatelliteReflection } from "../../reflections/index.js";
import { type SatellitesRecord, satellitesRecord } from "../../reports/index.js";
import type { Cell, SpaceGroup } from "../../spacegroups/index.js";

/** Satellites that are worked on between two looks at the cancel signal. */
const batch = 200;

/**
 * The list of satellites up to `qMax` in Å⁻¹, with the scattering angles where there is a wavelength. Throws
 * `interrupted`, and `invalid-argument` where the list would be too long.
 */
export async function satellitesOf(
  host: WorkHost,
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  limits: { readonly qMax: number; readonly wavelengthAngstrom: number | null },
): Promise<SatellitesRecord> {
  const overlapWithin = overlapInverseAngstrom;
  await breathe(host);
  // Only the limit makes a list too long.
  const { lines, noted } = placed({ argument: "--q-max" }, () =>
    reflectionList(group, cell, k, { ...limits, resolution: overlapWithin }),
  );
  const reflections: SatelliteReflection[] = [];
  for (const line of lines) {
    if (reflections.length % batch === 0) {
      await breathe(host);
      host.progress?.(reflections.length, lines.length, "satellites");
    }
    reflections.push(noted(line));
  }
  return satellitesRecord(group, cell, k, { ...limits, overlapWithin, reflections });
}
