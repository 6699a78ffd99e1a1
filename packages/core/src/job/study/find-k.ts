import { numericWaveVector, type WaveVector } from "../../kvectors/index.js";
import type { SearchRecord } from "../../reports/index.js";
import type { Candidate } from "../../search/index.js";
import { remember, type Work } from "../work.js";
import type { StudyInputs } from "./read-study.js";
import { type Found, indexedBy, searchedFor } from "./search-of.js";

/** A k that the job goes on with, and the index of its candidate where peaks were indexed. */
export interface FoundK {
  readonly k: WaveVector;
  readonly candidate: number | null;
}

export interface FoundKs {
  readonly search: SearchRecord | null;
  readonly candidates: readonly Candidate[];
  readonly followed: readonly FoundK[];
  /** Tied candidates beyond the bound. */
  readonly notFollowed: readonly number[];
  /** Whether k was searched for, and not given. */
  readonly searched: boolean;
}

/**
 * The wave vectors to go on with: those given, refined where there are peaks, else the first candidate of the search and
 * all that are tied with it, up to `bound`.
 */
export async function findK(work: Work, inputs: StudyInputs, bound: number): Promise<FoundKs> {
  if (inputs.given.length > 0) return withGivenK(work, inputs);
  const found = await searchedFor(work, searchInput(inputs));
  const [best] = found.candidates;
  if (best === undefined)
    return {
      search: found.record,
      candidates: [],
      // No single k explains enough: each vector of the best set is followed on its own.
      followed: found.several.map((k) => ({ k, candidate: null })),
      notFollowed: [],
      searched: true,
    };
  const allowed = [0, ...best.tiedWith.filter((index) => index > 0)].sort((a, b) => a - b);
  return {
    search: found.record,
    candidates: found.candidates,
    followed: allowed
      .slice(0, bound)
      .map((index) => ({ k: (found.candidates[index] as Candidate).k, candidate: index })),
    notFollowed: allowed.slice(bound),
    searched: true,
  };
}

function withGivenK(work: Work, inputs: StudyInputs): FoundKs {
  const numeric = inputs.peaks !== null && inputs.given.every((k) => numericWaveVector(k) !== null);
  const found: Found | null = numeric ? indexedBy(work, searchInput(inputs), inputs.given) : null;
  for (const one of found?.candidates ?? []) rememberRefined(work, one);
  return {
    search: found?.record ?? null,
    candidates: found?.candidates ?? [],
    followed: inputs.given.map((k, index) => ({
      k: found?.candidates[index]?.k ?? k,
      candidate: found === null ? null : index,
    })),
    notFollowed: [],
    searched: false,
  };
}

/** A given k that the peaks moved. */
function rememberRefined(work: Work, { k, refinement, matched }: Candidate): void {
  if (refinement === null || !refinement.determined) return;
  const text = (one: WaveVector) =>
    `(${(numericWaveVector(one) ?? []).map((entry) => Number(entry.toFixed(5))).join(", ")})`;
  const [from, to] = [text(refinement.from), text(k)];
  if (from === to) return;
  const because = `it was refined against the ${matched} peaks that it matches`;
  remember(work, [{ what: `wave vector ${from}`, value: to, because }], []);
}

function searchInput({ group, cell, peaks, options }: StudyInputs) {
  if (cell === null || peaks === null) throw new TypeError("a search needs a cell and peaks");
  return { group, cell, peaks, options };
}
