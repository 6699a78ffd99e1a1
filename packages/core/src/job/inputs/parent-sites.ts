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
  const ofStudy = new Map((work.study?.sites ?? []).map((site) => [site.label, site]));
  const inFile = work.structure?.structure?.sites ?? [];
  const magnetic = orbits.map((orbit, index): NamedSite => {
    const label = sites[index]?.site.label ?? orbit.label;
    const own = ofStudy.get(label);
    return {
      orbit,
      ion: sites[index]?.ion ?? null,
      occupancy: own?.occupancy ?? inFile.find((site) => site.label === label)?.occupancy ?? 1,
      spin: own?.spin ?? null,
    };
  });
  const atoms = [
    ...(work.study?.atoms ?? []),
    ...inFile.map(({ label, ion, position, occupancy }) => ({ label, ion: ion?.text ?? null, position, occupancy })),
  ];
  // An equivalent atom that is listed twice stands there once; another ion on a site stands beside the first.
  const taken = new Set(magnetic.flatMap(({ orbit, ion }) => orbit.positions.map((one) => `${textOf(one)} ${ion}`)));
  const others: NamedSite[] = [];
  for (const { label, ion, position, occupancy } of atoms) {
    if (position === null || orbits.some((orbit) => orbit.label === label)) continue;
    const orbit = orbitOrNull(group, { label, position }, cell);
    if (orbit === null || taken.has(`${textOf(orbit.position)} ${ion}`)) continue;
    for (const one of orbit.positions) taken.add(`${textOf(one)} ${ion}`);
    others.push({ orbit, ion, occupancy: occupancy ?? 1, spin: null });
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
