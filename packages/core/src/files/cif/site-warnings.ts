import type { Place, Problem } from "../../errors/index.js";
import { doubtful, someOf } from "./places.js";
import type { CifSite, SiteNotes } from "./sites.js";

/** Occupancies this near 1 are full: one unit of the third decimal, as files print them. */
const full = 0.999;

/** One warning for each thing about the atoms that a study cannot say. */
export function siteWarnings(sites: readonly CifSite[], notes: SiteNotes, block: Partial<Place>): Problem[] {
  const about = (which: (site: CifSite) => boolean, name: (site: CifSite) => string, text: string, remedy: string) => {
    const found = sites.filter(which);
    const [first] = found;
    return first ? [doubtful(`${text}: ${someOf(found.map(name))}`, first.place, remedy)] : [];
  };
  return [
    ...about(
      ({ position }) => position === null,
      ({ label }) => label,
      "sites have no coordinates",
      "they are left out; complete the CIF if they carry moments",
    ),
    ...about(
      ({ shares }) => shares !== null,
      ({ label, shares }) => `${label} with ${shares}`,
      "sites share one position",
      "one of them stands for the position; mixed ions are one magnetic site with a mean moment",
    ),
    ...about(
      ({ occupancy }) => occupancy < full && occupancy > 0,
      ({ label, occupancy }) => `${label} (${occupancy})`,
      "sites are partly occupied",
      "symmetry takes every site as full; moments refer to the mean over its atoms",
    ),
    ...about(
      ({ occupancy }) => occupancy > 1.001 || occupancy <= 0,
      ({ label, occupancy }) => `${label} (${occupancy})`,
      "sites have impossible occupancies",
      "check them; the sites are kept",
    ),
    ...about(
      ({ disorder }) => disorder !== null,
      ({ label, disorder }) => `${label} (${disorder})`,
      "sites belong to disordered groups",
      "alternatives of one atom are all kept; leave out those that are not meant",
    ),
    ...(notes.unknown.length > 0
      ? [
          doubtful(
            `sites have no element that is known: ${someOf(notes.unknown, 20)}`,
            block,
            "correct the type symbols (Fe or Fe3+), or give the ions in the study",
          ),
        ]
      : []),
    ...(notes.dummies.length > 0
      ? [doubtful(`dummy atoms are left out: ${someOf(notes.dummies)}`, block, "nothing, if they are no atoms")]
      : []),
    ...(notes.relabelled.length > 0
      ? [
          doubtful(
            `labels that have blanks or stand twice are written anew: ${someOf(notes.relabelled)}`,
            block,
            "use the new labels, or give the atoms labels that differ",
          ),
        ]
      : []),
  ];
}
