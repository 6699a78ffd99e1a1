import { fail } from "../../errors/index.js";
import type { CifStructure } from "../../files/index.js";
import { waveVectorToJson } from "../../kvectors/index.js";
import { type CheckRecord, cellRecord, checkedSiteRecord, groupRecord } from "../../reports/index.js";
import { cellFor, cellIfGiven } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { intensitiesIfGiven } from "../inputs/intensities-input.js";
import { placedK, writtenKs } from "../inputs/k-input.js";
import { peaksIfGiven } from "../inputs/peaks-input.js";
import { checkSearchFits, searchOptionsOf } from "../inputs/search-input.js";
import { type GivenSite, orbitsOf, sitesIfGiven } from "../inputs/site-input.js";
import { needStudy } from "../inputs/study-input.js";
import { checkExchange, onsetIfGiven } from "../study/model-and-scan.js";
import { remember, together, type Work } from "../work.js";
import { checkCif } from "./check-cif.js";

/** `kvane check`: everything that a study says, understood and held against each other; all problems at once. */
export async function checkCommand(work: Work): Promise<CheckRecord> {
  if (work.structure?.from === "argument") return checkCif(work, work.structure);
  const study = studyOrCif(work);
  remember(work, [], study.warnings);
  const { group, written, given, peaks, sites, options, intensities } = await together({
    group: () => (study.group === null && work.structure === null ? null : groupOf(work)),
    written: () => writtenKs(work),
    given: () => cellIfGiven(work),
    peaks: () => peaksIfGiven(work),
    sites: () => sitesIfGiven(work),
    options: () => searchOptionsOf(work),
    intensities: () => intensitiesIfGiven(work),
    scan: () => onsetIfGiven(work),
  });
  const { cell, ks, orbits } = await together({
    cell: () => (given === null ? null : group === null ? given.cell : cellFor(group, given)),
    ks: () => (group === null ? [] : written.map((one) => placedK(work, group, one))),
    orbits: () => (group === null ? [] : orbitsOf(work, group, sites, given?.cell ?? null)),
    fits: () => peaks && checkSearchFits(work, written.length > 0 ? { ...options, unmatched: 0 } : options, peaks.list),
  });
  await checkExchange(work, group, cell, orbits);
  const structure = work.structure?.structure ?? null;
  return {
    kind: "study",
    blocks: null,
    title: study.title,
    cell: cell && cellRecord(cell),
    group: group && groupRecord(group),
    sites: orbits.map((orbit, index) => checkedSiteRecord(orbit, sites[index]?.ion ?? null)),
    k: ks.map(waveVectorToJson),
    peaks: peaks && { file: peaks.file, kind: peaks.list.kind, count: peaks.list.peaks.length },
    missing: [
      ...missingParts(study, structure, written.length),
      ...(intensities === null ? [] : missingIons(work, sites)),
    ],
    cif: null,
  };
}

/** `check --structure FILE.cif` without a study has nothing to check but the CIF, which is an argument then. */
function studyOrCif(work: Work): NonNullable<Work["study"]> {
  if (work.study !== null || work.structure === null) return needStudy(work.study);
  return fail("missing-argument", "no study was given beside the CIF", {
    where: { argument: "STUDY" },
    expected: "kvane check FILE.cif, or kvane check STUDY.yaml --structure FILE.cif",
    found: "--structure alone",
    remedy: "name the CIF without --structure to check it by itself",
  });
}

/** Form factors of intensities need to know what stands on the magnetic sites. */
function missingIons({ study }: Work, sites: readonly GivenSite[]): string[] {
  const own = (label: string) => study?.sites.find((site) => site.label === label)?.formFactor ?? null;
  const without = sites.filter(({ ion, site: { label } }) => ion === null && own(label) === null);
  return without.map(({ site: { label } }) => `the ion of ${label}, for its form factor (ion)`);
}

function missingParts(study: NonNullable<Work["study"]>, cif: CifStructure | null, ks: number): string[] {
  return [
    ...(study.group === null && !cif?.symmetry ? ["the space group (group)"] : []),
    ...(study.cell === null && !cif?.cell && (ks === 0 || study.peaks !== null) ? ["the unit cell (cell)"] : []),
    ...(study.sites.length === 0 && !cif?.sites.length ? ["the magnetic sites (sites)"] : []),
    ...(study.peaks === null && ks === 0 ? ["a peak list (peaks) or a wave vector (k)"] : []),
  ];
}
