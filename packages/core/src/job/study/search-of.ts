import { KvaneError, type Problem, placed, problem } from "../../errors/index.js";
import type { WaveVector } from "../../kvectors/index.js";
import { peaksRecord, type SearchRecord, searchRecord } from "../../reports/index.js";
import {
  type Candidate,
  indexPeaks,
  locate,
  type PeakList,
  type SearchOptions,
  type SeveralVectors,
  setAsidePeaks,
} from "../../search/index.js";
import type { Cell, SpaceGroup } from "../../spacegroups/index.js";
import { checkSearchFits } from "../inputs/search-input.js";
import { remember, type Work } from "../work.js";

/** A peak list and the name of the file that it came from. */
export interface ReadPeaks {
  readonly list: PeakList;
  readonly file: string;
}

export interface SearchInput {
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly peaks: ReadPeaks;
  readonly options: SearchOptions;
}

/** Candidates as the search gives them, and the record for the answer, in one order. */
export interface Found {
  readonly candidates: readonly Candidate[];
  /** The vectors of the best set of several, where that gains on one and is more than chance; else none. */
  readonly several: readonly WaveVector[];
  readonly record: SearchRecord;
}

/** The peaks as satellites of each of the given k, in the order given; nothing is searched. */
export function indexedBy(work: Work, input: SearchInput, ks: readonly WaveVector[]): Found {
  const { group, cell, peaks, options } = input;
  checkSearchFits(work, { ...options, unmatched: 0 }, peaks.list);
  const candidates = ks.map((k) => {
    try {
      return indexPeaks(group, cell, k, peaks.list, options);
    } catch (error) {
      return inTheList(error, peaks.file);
    }
  });
  for (const { warnings } of candidates) remember(work, [], warnings);
  const record = searchRecord(group, cell, peaksRecord(peaks.list, peaks.file), {
    candidates,
    certificate: null,
    setAside: setAsidePeaks(group, cell, peaks.list, options),
    unmatched: candidates[0]?.unmatched ?? [],
    dropped: 0,
  });
  return { candidates, several: [], record };
}

/** That too few peaks are left is said of the list; every other problem has its place elsewhere. */
function inTheList(error: unknown, file: string): never {
  const few = error instanceof KvaneError && error.problems.some(({ code }) => code === "too-few-peaks");
  return placed(few ? { file } : {}, () => {
    throw error;
  });
}

function nothingFound({ unmatched, maxDimension }: SearchOptions): Problem {
  return problem("no-candidate", "no wave vector of those searched explains enough of the peaks", {
    expected: `a k that leaves at most ${unmatched} of the peaks unmatched`,
    found: "none",
    remedy: `${maxDimension < 3 ? "raise --max-dimension, " : ""}raise --unmatched or --tolerance, look for peaks that are not magnetic, or check the cell`,
  });
}

/** In natural log-odds: what several vectors must gain to be followed instead of one that leaves peaks over. */
const clearGain = 3;

function severalOf(result: SeveralVectors | null): readonly WaveVector[] {
  if (result === null) return [];
  const [set] = result.found;
  if (set !== undefined && set.evidence.value > 0 && set.gain > clearGain) return set.vectors;
  return result.single.evidence.reading === "found" ? [result.single.k] : [];
}

/** The search over the kinds of k. */
export async function searchedFor(work: Work, input: SearchInput): Promise<Found> {
  const { group, cell, peaks, options } = input;
  checkSearchFits(work, options, peaks.list);
  const found = await locate(group, cell, peaks.list, options, work.host).catch((error) =>
    inTheList(error, peaks.file),
  );
  remember(work, [], found.warnings);
  for (const { warnings } of found.candidates.slice(0, 1)) remember(work, [], warnings);
  if (found.candidates.length === 0) remember(work, [], [nothingFound(options)]);
  const record = searchRecord(group, cell, peaksRecord(peaks.list, peaks.file), found);
  const several = severalOf(found.severalVectors);
  return { candidates: found.candidates, several, record };
}
