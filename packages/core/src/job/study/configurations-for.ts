import { type ConfigurationOptions, type ConfigurationSet, configurationsOf } from "../../configurations/index.js";
import { smallIrreps } from "../../irreps/index.js";
import { star, type WaveVector } from "../../kvectors/index.js";
import { type SiteModes, siteModes } from "../../modes/index.js";
import { type ConfigurationsRecord, configurationsRecord } from "../../reports/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../../spacegroups/index.js";
import { checkChoices } from "../inputs/configurations-input.js";
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

/** The configurations of one k, and the modes of the sites that they were made from. */
export interface MadeConfigurations {
  readonly set: ConfigurationSet;
  readonly modes: readonly SiteModes[];
}

/** All arrangements that the irreps of k allow on the sites. */
export async function madeConfigurations(
  { host }: Work,
  { group, cell, k, orbits }: ConfigurationInput,
  options: ConfigurationOptions,
): Promise<MadeConfigurations> {
  const irreps = smallIrreps(group, k);
  checkChoices(options, {
    irreps: irreps.irreps.map(({ label }) => label),
    sites: orbits.map(({ label }) => label),
    arms: star(group, k).arms.length,
  });
  const modes = orbits.map((orbit) => siteModes(group, irreps, orbit));
  return { set: await configurationsOf(group, irreps, modes, cell, options, host), modes };
}

/** The same as their record. */
export function recordOfConfigurations(
  work: Work,
  { group, cell, sites, orbits }: ConfigurationInput,
  { set }: MadeConfigurations,
): Promise<ConfigurationsRecord> {
  return configurationsRecord(set, cell, parentSitesOf(work, group, cell, sites, orbits));
}

/** Both in one. */
export async function configurationsFor(
  work: Work,
  input: ConfigurationInput,
  options: ConfigurationOptions,
): Promise<ConfigurationsRecord> {
  return recordOfConfigurations(work, input, await madeConfigurations(work, input, options));
}
