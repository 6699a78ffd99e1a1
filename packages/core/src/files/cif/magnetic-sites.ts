import { type Assumption, fail, KvaneError, type Problem } from "../../errors/index.js";
import { formatRational } from "../../numbers/index.js";
import { type Cell, type SiteOrbit, type SpaceGroup, siteOrbit } from "../../spacegroups/index.js";
import { momentChance } from "./moments.js";
import { doubtful } from "./places.js";
import type { CifSite } from "./sites.js";
import type { CifStructure } from "./structure.js";

/** Sites that may carry moments, each orbit once. */
export interface MagneticSites {
  readonly sites: readonly CifSite[];
  readonly assumed: readonly Assumption[];
  readonly warnings: readonly Problem[];
}

/** More magnetic sites than that nobody means; orbits of so many would take long. */
const mostSites = 100;

/**
 * The sites that may carry a moment, by element and charge: those likely to, or where there is none those that do in
 * some compounds. Of several on one orbit (mixed ions, equivalent atoms listed twice) the first stands for all.
 *
 * @param group the group that the sites are used with
 * @throws `cif-missing` where no site has such an element, `missing-argument` where there are too many
 */
export function magneticSites(structure: CifStructure, group: SpaceGroup | null, cell: Cell | null): MagneticSites {
  const placed = structure.sites.filter(({ position }) => position !== null);
  const likely = placed.filter(({ ion }) => momentChance(ion) === "likely");
  const chosen = likely.length > 0 ? likely : placed.filter(({ ion }) => momentChance(ion) === "possible");
  if (chosen.length === 0)
    fail("cif-missing", "no site of the CIF has an element that is known for moments", {
      where: structure.sites[0]?.place ?? { file: structure.file },
      expected: "a d or f element with a partly filled shell",
      found: structure.sites.length === 0 ? "no sites" : "other elements, or closed shells",
      remedy: "name the sites that are meant: --site LABEL, or `sites:` in the study",
    });
  if (chosen.length > mostSites)
    fail("missing-argument", `${chosen.length} sites of the CIF may carry moments`, {
      where: { argument: "--site" },
      expected: `the sites that are meant, at most ${mostSites}`,
      found: "none named",
      remedy: "name them: --site LABEL, once for each site",
    });
  const { kept, warnings } = group ? eachOrbitOnce(chosen, group, cell) : { kept: chosen, warnings: [] };
  const others = structure.sites.length - chosen.length;
  return {
    sites: kept,
    warnings,
    assumed: [
      {
        what: "magnetic sites",
        value: kept.map(({ label, ion }) => `${label}${ion ? ` (${ion.text})` : ""}`).join(", "),
        because: `their elements ${likely.length > 0 ? "mostly carry moments" : "carry moments in some compounds"}${
          others > 0 ? `; ${others} other sites of the CIF are left out` : ""
        }; --site LABEL names others`,
      },
    ],
  };
}

function eachOrbitOnce(sites: readonly CifSite[], group: SpaceGroup, cell: Cell | null) {
  const taken = new Map<string, string>();
  const warnings: Problem[] = [];
  const kept = sites.filter((site) => {
    const orbit = orbitOf(site, group, cell);
    if (orbit === null) return true;
    const first = ownerOf(orbit, taken);
    if (first === null) return true;
    warnings.push(
      doubtful(
        `${site.label} stands on the orbit of ${first}`,
        site.place,
        `${first} stands for both; --site ${site.label} takes the other`,
      ),
    );
    return false;
  });
  return { kept, warnings };
}

/** The orbit of a site, null without coordinates; what is wrong with it is left to whoever uses it. */
export function orbitOf({ label, position }: CifSite, group: SpaceGroup, cell: Cell | null): SiteOrbit | null {
  if (position === null) return null;
  try {
    return siteOrbit(group, { label, position }, cell);
  } catch (error) {
    if (error instanceof KvaneError) return null;
    throw error;
  }
}

/** The label of an earlier orbit that has these atoms; else null, and the orbit is remembered. */
export function ownerOf(orbit: SiteOrbit, taken: Map<string, string>): string | null {
  const text = (position: SiteOrbit["position"]) => position.map(formatRational).join(" ");
  const owner = taken.get(text(orbit.position)) ?? null;
  if (owner === null) for (const position of orbit.positions) taken.set(text(position), orbit.label);
  return owner;
}
