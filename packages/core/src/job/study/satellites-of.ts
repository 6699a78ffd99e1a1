import { breathe, type WorkHost } from "../../algorithms/index.js";
import type { ExtinctionTest } from "../../diffraction/index.js";
import { placed } from "../../errors/index.js";
import type { WaveVector } from "../../kvectors/index.js";
import { overlapInverseAngstrom } from "../../numbers/index.js";
import { reflectionList, type SatelliteReflection } from "../../reflections/index.js";
import { type SatellitesRecord, satellitesRecord } from "../../reports/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";

/** Satellites that are worked on between two looks at the cancel signal. */
const batch = 200;

/**
 * The list of satellites up to `qMax` in Å⁻¹, with the scattering angles where there is a wavelength, and with the irreps
 * that make each line zero where there are sites. Throws
 * `interrupted`, and `invalid-argument` where the list would be too long.
 */
export async function satellitesOf(
  host: WorkHost,
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  limits: { readonly qMax: number; readonly wavelengthAngstrom: number | null },
  orbits: readonly SiteOrbit[] = [],
): Promise<SatellitesRecord> {
  const overlapWithin = overlapInverseAngstrom;
  await breathe(host);
  // Only the limit makes a list too long.
  const { lines, noted } = placed({ argument: "--q-max" }, () =>
    reflectionList(group, cell, k, { ...limits, resolution: overlapWithin }),
  );
  const extinctOn = orbits.length === 0 ? null : await extinctionsOf(group, k, orbits);
  const reflections: SatelliteReflection[] = [];
  const extinct: (readonly string[])[] = [];
  for (const line of lines) {
    if (reflections.length % batch === 0) {
      await breathe(host);
      host.progress?.(reflections.length, lines.length, "satellites");
    }
    reflections.push(noted(line));
    if (extinctOn !== null) extinct.push(extinctOn.line(line.h, line.sign));
  }
  return satellitesRecord(group, cell, k, { ...limits, overlapWithin, reflections, extinct: extinctOn && extinct });
}

/** Its rooms are loaded only where there are sites. */
async function extinctionsOf(group: SpaceGroup, k: WaveVector, orbits: readonly SiteOrbit[]): Promise<ExtinctionTest> {
  const [{ extinctionTest }, { smallIrreps }, { siteModes }] = await Promise.all([
    import("../../diffraction/index.js"),
    import("../../irreps/index.js"),
    import("../../modes/index.js"),
  ]);
  const irreps = smallIrreps(group, k);
  return extinctionTest(
    group,
    orbits.map((orbit) => siteModes(group, irreps, orbit)),
  );
}
