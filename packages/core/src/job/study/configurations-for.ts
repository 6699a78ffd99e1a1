import { type ConfigurationOptions, configurationsOf } from "../../configurations/index.js";
import { smallIrreps } from "../../irreps/index.js";
import type { WaveVector } from "../../kvectors/index.js";
import { siteModes } from "../../modes/index.js";
import { type ConfigurationsRecord, configurationsRecord } from "../../reports/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";
import { parentSitesOf } from "../inputs/parent-sites.js";
import type { GivenSite } from "../inputs/site-input.js";
import type { Work } from "../work.js";

/** What the configurations of one k are asked for. */
export interface ConfigurationInput {
  readonly group: SpaceGroup;
  readonly cell: Cell | null;
  readonly k: WaveVector;
  readonly sites: readonly GivenSite[];
  readonly orbits: readonly SiteOrbit[];
}

/** All arrangements that the irreps of k allow on the sites, as their record. */
export async function configurationsFor(
  work: Work,
  { group, cell, k, sites, orbits }: ConfigurationInput,
  options: ConfigurationOptions,
): Promise<ConfigurationsRecord> {
  const irreps = smallIrreps(group, k);
  const modes = orbits.map((orbit) => siteModes(group, irreps, orbit));
  const set = await configurationsOf(group, irreps, modes, cell, options, work.host);
  return configurationsRecord(set, cell, parentSitesOf(work, group, cell, sites, orbits));
}
