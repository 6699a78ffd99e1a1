import { KvaneError } from "../../errors/index.js";
import { formatRational } from "../../numbers/index.js";
import type { NamedSite, ParentSites } from "../../reports/index.js";
import { type Cell, type SiteOrbit, type SpaceGroup, siteOrbit } from "../../spacegroups/index.js";
import type { Work } from "../work.js";
import type { GivenSite } from "./site-input.js";

/**
 * The magnetic sites with their ions, and the other atoms of the structure where a CIF tells them: what a file for a
 * refinement needs beside the moments.
 */
export function parentSitesOf(
  work: Work,
  group: SpaceGroup,
  cell: Cell | null,
  sites: readonly GivenSite[],
  orbits: readonly SiteOrbit[],
): ParentSites {
  const spins = new Map((work.study?.sites ?? []).map(({ label, spin }) => [label, spin]));
  const structure = work.structure?.structure ?? null;
  const inFile = structure?.sites ?? [];
  const magnetic = orbits.map((orbit, index): NamedSite => {
    const label = sites[index]?.site.label ?? orbit.label;
    return {
      orbit,
      ion: sites[index]?.ion ?? null,
      occupancy: inFile.find((site) => site.label === label)?.occupancy ?? 1,
      spin: spins.get(label) ?? null,
    };
  });
  const taken = new Set(orbits.flatMap(({ positions }) => positions.map(textOf)));
  const others: NamedSite[] = [];
  for (const { label, ion, position, occupancy } of inFile) {
    if (position === null || orbits.some((orbit) => orbit.label === label)) continue;
    const orbit = orbitOrNull(group, { label, position }, cell);
    // A second ion on a magnetic site is left to the magnetic one.
    if (orbit === null || taken.has(textOf(orbit.position))) continue;
    for (const one of orbit.positions) taken.add(textOf(one));
    others.push({ orbit, ion: ion?.text ?? null, occupancy, spin: null });
  }
  return { magnetic, others };
}

/** A site of the file that does not fit the group is no fault here: the magnetic ones were checked. */
function orbitOrNull(group: SpaceGroup, site: Parameters<typeof siteOrbit>[1], cell: Cell | null): SiteOrbit | null {
  try {
    return siteOrbit(group, site, cell);
  } catch (error) {
    if (error instanceof KvaneError) return null;
    throw error;
  }
}

function textOf(position: SiteOrbit["position"]): string {
  return position.map(formatRational).join(" ");
}
