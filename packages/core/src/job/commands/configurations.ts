import type { ConfigurationsRecord } from "../../reports/index.js";
import { cellFor, cellIfGiven } from "../inputs/cell-input.js";
import { configurationOptionsOf } from "../inputs/configurations-input.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenK } from "../inputs/k-input.js";
import { orbitsOf, writtenSites } from "../inputs/site-input.js";
import { configurationsFor } from "../study/configurations-for.js";
import { together, type Work } from "../work.js";

/** `kvane configurations`: every arrangement that the irreps of k allow, each with its magnetic group. */
export async function configurationsCommand(work: Work): Promise<ConfigurationsRecord> {
  const { group, written, sites, given, options } = await together({
    group: () => groupOf(work),
    written: () => writtenK(work),
    sites: () => writtenSites(work),
    given: () => cellIfGiven(work),
    options: () => configurationOptionsOf(work.request),
  });
  const { k, cell } = await together({
    k: () => placedK(work, group, written),
    cell: () => given && cellFor(group, given),
  });
  const orbits = orbitsOf(work, group, sites, cell);
  return configurationsFor(work, { group, cell, k, sites, orbits }, options);
}
