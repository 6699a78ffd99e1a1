import type { SmallIrreps } from "../../irreps/index.js";
import { siteModes, type WritingOptions, writtenSite } from "../../modes/index.js";
import { type ModesRecord, modesRecord } from "../../reports/index.js";
import type { SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";

/** The modes of all sites at one k, as they are to be written. */
export function modesOf(
  group: SpaceGroup,
  irreps: SmallIrreps,
  orbits: readonly SiteOrbit[],
  options: WritingOptions & { readonly axial: boolean },
): ModesRecord {
  const { axial } = options;
  const sites = orbits.map((orbit) => writtenSite(group, siteModes(group, irreps, orbit, { axial }), options));
  return modesRecord(group, irreps, sites, options);
}
