import { breathe } from "../algorithms/index.js";
import { minusKRelation, smallIrreps } from "../irreps/index.js";
import { numericWaveVector, type WaveVector, waveVectorToJson } from "../kvectors/index.js";
import { ownWriting } from "../modes/index.js";
import {
  type BranchRecord,
  cellRecord,
  groupRecord,
  irrepsRecord,
  peaksRecord,
  type RunRecord,
  resultFileNames,
} from "../reports/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../spacegroups/index.js";
import { numberOption } from "./inputs/number-input.js";
import { coincidencesOf } from "./study/coincidences.js";
import { configurationsFor } from "./study/configurations-for.js";
import { type FoundK, findK } from "./study/find-k.js";
import { modesOf } from "./study/modes-of.js";
import { nextSteps } from "./study/next-steps.js";
import { readStudy, type StudyInputs, satelliteLimit } from "./study/read-study.js";
import { satellitesOf } from "./study/satellites-of.js";
import { starOf } from "./study/star-of.js";
import type { Work } from "./work.js";

/** How many tied candidates are followed unless the user says otherwise. */
const usualBranches = 3;

/**
 * The whole job: read study → k from the peaks (or as given) → for each k that the data allow: little group → irreps →
 * modes → configurations → satellites → what to do next. Weights are of a later version, null here.
 */
export async function runStudy(work: Work): Promise<RunRecord> {
  const bound = numberOption(work.request, "branches", { from: 1, whole: true }) ?? usualBranches;
  const inputs = await readStudy(work);
  const found = await findK(work, inputs, bound);
  const branches: BranchRecord[] = [];
  for (const one of found.followed) {
    work.host.progress?.(branches.length, found.followed.length, "symmetry and modes");
    await breathe(work.host);
    branches.push(await followBranch(work, inputs, one));
  }
  const { search, notFollowed } = found;
  const { peaks } = inputs;
  const coincidences = coincidencesOf(inputs);
  const record = {
    title: inputs.title,
    group: groupRecord(inputs.group),
    cell: inputs.cell && cellRecord(inputs.cell),
    peaks: peaks && peaksRecord(peaks.list, peaks.file),
    coincidences,
    search,
    branches,
    notFollowed,
    next: nextSteps(
      inputs,
      found,
      branches,
      coincidences,
      work.warnings.map(({ code }) => code),
    ),
  };
  return { ...record, files: work.request.files === true ? resultFileNames(record) : [] };
}

/** All that follows from one k. */
async function followBranch(work: Work, inputs: StudyInputs, { k, candidate }: FoundK): Promise<BranchRecord> {
  const { group, cell, orbits } = inputs;
  return {
    k: waveVectorToJson(k),
    candidate,
    star: starOf(group, k),
    ...representationsOf(group, cell, k, orbits),
    configurations: await configurationList(work, inputs, k),
    satellites: await satelliteList(work, inputs, cell, k),
    weigh: null,
  };
}

function representationsOf(group: SpaceGroup, cell: Cell | null, k: WaveVector, orbits: readonly SiteOrbit[]) {
  const irreps = smallIrreps(group, k);
  return {
    irreps: irrepsRecord(group, irreps, minusKRelation(group, irreps)),
    modes: modesOf(group, irreps, orbits, { axial: true, cell, convention: ownWriting, star: false }),
  };
}

/** All arrangements of one ±k pair; none where there is no site. */
async function configurationList(work: Work, { group, cell, sites, orbits }: StudyInputs, k: WaveVector) {
  return orbits.length === 0 ? null : configurationsFor(work, { group, cell, k, sites, orbits }, {});
}

/** Positions need a cell and a number for every letter. */
async function satelliteList({ host }: Work, inputs: StudyInputs, cell: Cell | null, k: WaveVector) {
  if (cell === null || numericWaveVector(k) === null) return null;
  return satellitesOf(host, inputs.group, cell, k, {
    qMax: satelliteLimit(inputs),
    wavelengthAngstrom: inputs.wavelengthAngstrom,
  });
}
