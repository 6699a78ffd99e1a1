import { fail } from "../../errors/index.js";
import { smallIrreps } from "../../irreps/index.js";
import { formatWaveVector, numericWaveVector, type WaveVector } from "../../kvectors/index.js";
import type { ModesRecord } from "../../reports/index.js";
import type { Cell } from "../../spacegroups/index.js";
import { cellFor, cellIfGiven } from "../inputs/cell-input.js";
import { componentsFor, componentsIfGiven } from "../inputs/components-input.js";
import { conventionOf } from "../inputs/convention-input.js";
import { groupOf } from "../inputs/group-input.js";
import { type GivenK, placedK, writtenK } from "../inputs/k-input.js";
import { orbitsOf, writtenSites } from "../inputs/site-input.js";
import { argumentNames } from "../request.js";
import { modesOf } from "../study/modes-of.js";
import { together, type Work } from "../work.js";

/** `kvane modes`: for each site the decomposition, mode vectors and what each irrep allows. */
export async function modesCommand(work: Work): Promise<ModesRecord> {
  const { group, written, sites, given, convention, list } = await together({
    group: () => groupOf(work),
    written: () => writtenK(work),
    sites: () => writtenSites(work),
    given: () => cellIfGiven(work),
    convention: () => conventionOf(work.request),
    list: () => componentsIfGiven(work),
  });
  const axial = work.request.polar !== true;
  const { k, cell } = await together({
    k: () => placedK(work, group, written),
    cell: () => given && cellFor(group, given),
  });
  const orbits = orbitsOf(work, group, sites, cell);
  if (convention.components !== "lattice") refuseComponents(convention.components, cell, k, written);
  const read = list && (await componentsFor(list, orbits, k));
  const options = { axial, cell, convention, star: work.request.star === true };
  return modesOf(group, smallIrreps(group, k), orbits, options, read);
}

/** Crystal and Cartesian components are numbers: they need a cell, and a number for every letter of k. */
function refuseComponents(components: string, cell: Cell | null, k: WaveVector, { given }: GivenK): void {
  if (cell === null)
    fail("missing-argument", `${components} components need a unit cell`, {
      where: { argument: argumentNames.cell },
      expected: '--cell "a b c alpha beta gamma" in Å and degrees',
      found: "nothing",
      remedy: "give --cell, or leave --components out",
    });
  if (numericWaveVector(k) === null)
    fail("k-needs-values", `${components} components need a number for every letter of ${formatWaveVector(k)}`, {
      where: given.where,
      expected: "fractions or decimals, such as 0,0.472,0",
      found: given.text,
      remedy: "give numbers in place of the letters, or leave --components out",
    });
}
