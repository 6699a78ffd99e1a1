import { fail } from "../../errors/index.js";
import type { WaveVector } from "../../kvectors/index.js";
import type { SearchOptions } from "../../search/index.js";
import {
  type Cell,
  lengthInMetric,
  reciprocalMetric,
  type SiteOrbit,
  type SpaceGroup,
} from "../../spacegroups/index.js";
import { cellFor, cellIfGiven, writtenCell } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenKs } from "../inputs/k-input.js";
import { peaksIfGiven, wavelengthOf } from "../inputs/peaks-input.js";
import { searchOptionsOf } from "../inputs/search-input.js";
import { type GivenSite, orbitsOf, writtenSites } from "../inputs/site-input.js";
import { needStudy } from "../inputs/study-input.js";
import { usualQMax } from "../inputs/usual-q-max.js";
import { remember, together, type Work } from "../work.js";
import type { ReadPeaks } from "./search-of.js";

/** A study with everything understood, and held against each other. */
export interface StudyInputs {
  readonly title: string | null;
  readonly group: SpaceGroup;
  /** Null only where k is given and no positions are asked for. */
  readonly cell: Cell | null;
  readonly sites: readonly GivenSite[];
  readonly orbits: readonly SiteOrbit[];
  /** The wave vectors given; empty when k is to be searched. */
  readonly given: readonly WaveVector[];
  readonly peaks: ReadPeaks | null;
  readonly wavelengthAngstrom: number | null;
  readonly options: SearchOptions;
}

/** Reads all that the whole job needs; throws the problems of independent parts at once. */
export async function readStudy(work: Work): Promise<StudyInputs> {
  const study = needStudy(work.study);
  remember(work, [], study.warnings);
  const hasPeaks = study.peaks !== null || typeof work.request.peaks === "string";
  const hasK = (study.k ?? []).length > 0 || typeof work.request.k === "string";
  const { group, written, givenCell, sites, peaks, wavelengthAngstrom, options } = await together({
    group: () => groupOf(work),
    written: () => writtenKs(work),
    givenCell: () => (hasPeaks || !hasK ? writtenCell(work) : cellIfGiven(work)),
    sites: () => writtenSites(work),
    wavelengthAngstrom: () => wavelengthOf(work),
    peaks: () => peaksIfGiven(work),
    options: () => searchOptionsOf(work),
    source: () => hasPeaks || hasK || refuseWithoutSource(study.file),
  });
  const { given, cell, orbits } = await together({
    given: () => written.map((one) => placedK(work, group, one)),
    cell: () => givenCell && cellFor(group, givenCell),
    orbits: () => orbitsOf(work, group, sites, givenCell?.cell ?? null),
  });
  return { title: study.title, group, cell, sites, orbits, given, peaks, wavelengthAngstrom, options };
}

function refuseWithoutSource(file: string): never {
  fail("missing-key", "the study has neither peaks nor a wave vector", {
    where: { file, path: "peaks" },
    expected: "`peaks: {file: …, as: …}`, or `k: [[0, 1/2, 0]]`",
    found: "neither",
    remedy: "add the peak list, or give --peaks or --k",
  });
}

/** How far satellites are listed: a little beyond the last peak, else to the usual limit; never beyond 2θ = 180°. */
export function satelliteLimit({ cell, peaks, options, wavelengthAngstrom }: StudyInputs): number {
  const last = Math.max(0, ...(peaks?.list.peaks ?? []).map((peak) => peak.q ?? lengthOf(cell, peak.hkl)));
  const reach = wavelengthAngstrom === null ? Number.POSITIVE_INFINITY : (4 * Math.PI) / wavelengthAngstrom;
  return Math.min(options.qMax ?? (last > 0 ? 1.1 * last : usualQMax), reach);
}

/** Å⁻¹, of fractional indices. */
function lengthOf(cell: Cell | null, hkl: readonly number[] | null): number {
  return cell === null || hkl === null ? 0 : 2 * Math.PI * lengthInMetric(reciprocalMetric(cell), hkl);
}
