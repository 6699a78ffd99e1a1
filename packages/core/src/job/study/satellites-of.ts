import type { WaveVector } from "../../kvectors/index.js";
import { overlapInverseAngstrom } from "../../numbers/index.js";
import { satelliteReflections } from "../../reflections/index.js";
import { type SatellitesRecord, satellitesRecord } from "../../reports/index.js";
import type { Cell, SpaceGroup } from "../../spacegroups/index.js";

/** The list of satellites up to `qMax` in Å⁻¹, with the scattering angles where there is a wavelength. */
export function satellitesOf(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  limits: { readonly qMax: number; readonly wavelengthAngstrom: number | null },
): SatellitesRecord {
  const overlapWithin = overlapInverseAngstrom;
  const reflections = satelliteReflections(group, cell, k, { ...limits, resolution: overlapWithin });
  return satellitesRecord(group, cell, k, { ...limits, overlapWithin, reflections });
}
