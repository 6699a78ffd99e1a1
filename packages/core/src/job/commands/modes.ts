import { smallIrreps } from "../../irreps/index.js";
import { siteModes } from "../../modes/index.js";
import { type ModesRecord, modesRecord } from "../../reports/index.js";
import { cellFor, cellIfGiven } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenK } from "../inputs/k-input.js";
import { orbitsOf, writtenSites } from "../inputs/site-input.js";
import { together, type Work } from "../work.js";

/** `kvane modes`: for each site the decomposition, mode vectors and what each irrep allows. */
export async function modesCommand(work: Work): Promise<ModesRecord> {
  const { group, written, sites, given } = await together({
    group: () => groupOf(work),
    written: () => writtenK(work),
    sites: () => writtenSites(work),
    given: () => cellIfGiven(work),
  });
  const axial = work.request.polar !== true;
  const { k, orbits } = await together({
    k: () => placedK(work, group, written),
    orbits: () => orbitsOf(work, group, sites, given && cellFor(group, given)),
  });
  const irreps = smallIrreps(group, k);
  return modesRecord(
    group,
    irreps,
    orbits.map((orbit) => siteModes(group, irreps, orbit, { axial })),
    { axial },
  );
}
