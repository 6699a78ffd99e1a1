import { KvaneError } from "../../errors/index.js";
import type { SatellitesRecord } from "../../reports/index.js";
import type { SiteOrbit } from "../../spacegroups/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { numericK, writtenK } from "../inputs/k-input.js";
import { numberOption } from "../inputs/number-input.js";
import { wavelengthOf } from "../inputs/peaks-input.js";
import { type GivenSite, orbitsOf, sitesIfGiven } from "../inputs/site-input.js";
import { usualQMax } from "../inputs/usual-q-max.js";
import { satellitesOf } from "../study/satellites-of.js";
import { remember, together, type Work } from "../work.js";

/** `kvane satellites`: where the satellites of k lie, and what lies on them. */
export async function satellitesCommand(work: Work): Promise<SatellitesRecord> {
  const { group, written, given, wavelength, asked, sites } = await together({
    group: () => groupOf(work),
    written: () => writtenK(work),
    given: () => writtenCell(work),
    wavelength: () => wavelengthOf(work),
    asked: () => numberOption(work.request, "qMax", { above: 0 }),
    sites: () => sitesAsFar(work),
  });
  const { k, cell } = await together({
    k: () => numericK(work, group, written),
    cell: () => cellFor(group, given),
  });
  const qMax = limitOf(work, asked, wavelength);
  const orbits = asFarAsPossible(work, () => orbitsOf(work, group, sites, cell));
  return satellitesOf(work.host, group, cell, k, { qMax, wavelengthAngstrom: wavelength }, orbits);
}

/** Sites only add what is extinct: those of --site must be right, others are left out where they cannot be used. */
async function sitesAsFar(work: Work): Promise<readonly GivenSite[]> {
  if (work.request.sites) return sitesIfGiven(work);
  try {
    return await sitesIfGiven(work);
  } catch (error) {
    return withoutSites(work, error);
  }
}

function asFarAsPossible(work: Work, read: () => readonly SiteOrbit[]): readonly SiteOrbit[] {
  if (work.request.sites) return read();
  try {
    return read();
  } catch (error) {
    return withoutSites(work, error);
  }
}

function withoutSites(work: Work, error: unknown): [] {
  if (!(error instanceof KvaneError)) throw error;
  remember(work, [], error.problems);
  return [];
}

/** What was asked or the usual limit; never beyond 2θ = 180°. */
function limitOf(work: Work, asked: number | null, wavelength: number | null): number {
  const reach = wavelength === null ? Number.POSITIVE_INFINITY : (4 * Math.PI) / wavelength;
  const limit = Math.min(asked ?? usualQMax, reach);
  if (asked === null || asked > reach)
    remember(
      work,
      [
        {
          what: "Q limit",
          value: `${Number(limit.toPrecision(6))} Å⁻¹`,
          because:
            asked === null
              ? `--q-max was not given${limit === reach ? ", and 2θ ends at 180°" : ""}`
              : `the wavelength reaches no further: 4π/λ, 2θ = 180°`,
        },
      ],
      [],
    );
  return limit;
}
