import { breathe } from "../algorithms/index.js";
import { KvaneError } from "../errors/index.js";
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
  type WeighRecord,
} from "../reports/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../spacegroups/index.js";
import { type GivenIntensities, intensitiesIfGiven } from "./inputs/intensities-input.js";
import { numberOption } from "./inputs/number-input.js";
import { coincidencesOf } from "./study/coincidences.js";
import { type MadeConfigurations, madeConfigurations, recordOfConfigurations } from "./study/configurations-for.js";
import { type FoundK, findK } from "./study/find-k.js";
import { exchangeIfGiven, needCellForExchange, onsetIfGiven } from "./study/model-and-scan.js";
import { modesOf } from "./study/modes-of.js";
import { nextSteps } from "./study/next-steps.js";
import { readStudy, type StudyInputs, satelliteLimit } from "./study/read-study.js";
import { satellitesOf } from "./study/satellites-of.js";
import { starOf } from "./study/star-of.js";
import { remember, together, type Work } from "./work.js";

/** How many tied candidates are followed unless the user says otherwise. */
const usualBranches = 3;

/**
 * The whole job: read study → k from the peaks (or as given) → for each k that the data allow: little group → irreps →
 * modes → configurations → satellites → weights where there are intensities → what to do next.
 */
export async function runStudy(work: Work): Promise<RunRecord> {
  const bound = numberOption(work.request, "branches", { from: 1, whole: true }) ?? usualBranches;
  const inputs = await readStudy(work);
  const { intensities, onset } = await together({
    intensities: () => intensitiesIfGiven(work),
    onset: () => onsetIfGiven(work),
    exchangeCell: () => needCellForExchange(work, inputs.cell),
  });
  const found = await findK(work, inputs, bound);
  const branches: BranchRecord[] = [];
  for (const one of found.followed) {
    work.host.progress?.(branches.length, found.followed.length, "symmetry and modes");
    await breathe(work.host);
    branches.push(await followBranch(work, inputs, intensities, one));
  }
  const exchange = await exchangeIfGiven(
    work,
    found.followed.map(({ k }) => k),
  );
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
    exchange,
    onset,
    notFollowed,
    next: nextSteps(
      inputs,
      found,
      branches,
      { coincidences, exchange, onset },
      work.warnings.map(({ code }) => code),
    ),
  };
  return { ...record, files: work.request.files === true ? resultFileNames(record) : [] };
}

/** All that follows from one k. */
async function followBranch(
  work: Work,
  inputs: StudyInputs,
  intensities: GivenIntensities | null,
  { k, candidate }: FoundK,
): Promise<BranchRecord> {
  const { group, cell, orbits } = inputs;
  const input = { ...inputs, k };
  const made = orbits.length === 0 ? null : await madeConfigurations(work, input, {});
  return {
    k: waveVectorToJson(k),
    candidate,
    star: starOf(group, k),
    ...representationsOf(group, cell, k, orbits),
    configurations: made && (await recordOfConfigurations(work, input, made)),
    satellites: await satelliteList(work, inputs, cell, k),
    weigh: intensities && made && (await weights(work, inputs, k, intensities, made)),
  };
}

function representationsOf(group: SpaceGroup, cell: Cell | null, k: WaveVector, orbits: readonly SiteOrbit[]) {
  const irreps = smallIrreps(group, k);
  return {
    irreps: irrepsRecord(group, irreps, minusKRelation(group, irreps)),
    modes: modesOf(group, irreps, orbits, { axial: true, cell, convention: ownWriting, star: false }),
  };
}

/** What stands in the way of weights is warned about: the rest of the answer does not need them. */
async function weights(
  work: Work,
  { cell, ...inputs }: StudyInputs,
  k: WaveVector,
  intensities: GivenIntensities,
  made: MadeConfigurations,
): Promise<WeighRecord | null> {
  if (cell === null || numericWaveVector(k) === null) return null;
  try {
    const { weighFor } = await import("./study/weigh-for.js");
    return await weighFor(work, { ...inputs, cell, k }, intensities, made);
  } catch (error) {
    if (!(error instanceof KvaneError) || error.problems.some(({ code }) => code === "interrupted")) throw error;
    remember(work, [], error.problems);
    return null;
  }
}

/** Positions need a cell and a number for every letter. */
async function satelliteList({ host }: Work, inputs: StudyInputs, cell: Cell | null, k: WaveVector) {
  if (cell === null || numericWaveVector(k) === null) return null;
  return satellitesOf(
    host,
    inputs.group,
    cell,
    k,
    {
      qMax: satelliteLimit(inputs),
      wavelengthAngstrom: inputs.wavelengthAngstrom,
    },
    inputs.orbits,
  );
}
