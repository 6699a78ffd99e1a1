import type { SmallIrreps } from "../../irreps/index.js";
import { projectComponents, siteModes, type WritingOptions, writtenSite } from "../../modes/index.js";
import { type ModesRecord, modesRecord } from "../../reports/index.js";
import type { SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";

/** Fourier components of the atoms of the only site, in the convention that modes are written in. */
export interface GivenComponents {
  readonly file: string;
  readonly components: Parameters<typeof projectComponents>[2];
}

/** The modes of all sites at one k, as they are to be written. */
export function modesOf(
  group: SpaceGroup,
  irreps: SmallIrreps,
  orbits: readonly SiteOrbit[],
  options: WritingOptions & { readonly axial: boolean },
  given: GivenComponents | null = null,
): ModesRecord {
  const { axial } = options;
  const sites = orbits.map((orbit) => {
    const site = siteModes(group, irreps, orbit, { axial });
    const projected = given && projectComponents(group, site, given.components, options);
    return { ...writtenSite(group, site, options), read: given && projected && { file: given.file, projected } };
  });
  return modesRecord(group, irreps, sites, options);
}
