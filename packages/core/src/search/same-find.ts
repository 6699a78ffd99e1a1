import { breathe, type WorkHost } from "../algorithms/index.js";
import type { Weighed } from "./candidate.js";
import type { Explanation, PeakModel } from "./explanation.js";
import type { StarDistance } from "./near-in-k.js";
import type { MergedCandidate } from "./types.js";

/** In natural log-odds: what tells two k apart. */
export const toldApartBy = 3;

/** χ²/2 that an unmatched peak counts for when k is compared with k: that of a peak at 3 s.u. */
const unmatchedMisfit = 4.5;

/** How much better the peaks fit the first k than the second, in units of ln(likelihood); lines predicted do not count. */
export function betterFit(one: Explanation, other: Explanation): number {
  const misfit = (of: Explanation): number => of.chiSquared / 2 + unmatchedMisfit * of.unmatched.length;
  return misfit(other) - misfit(one);
}

/** A weighed k with what the search knows of it. */
export interface Entry extends Weighed {
  readonly dimension: 0 | 1 | 2 | 3;
  /** Index of its region among all, −1 for a point. */
  readonly region: number;
  /** Most peaks that a k beside it matches. */
  readonly mostMatched: number;
}

/**
 * Lists each find once. Beside a special k the lines and planes through it and the general kind match the same peaks:
 * where such a k predicts the same positions within the tolerance, is near, and has no better evidence to speak of, it
 * goes under the simpler one. Of two of one kind that are one k the better stays.
 */
export async function mergeSameFinds(
  entries: readonly Entry[],
  model: PeakModel,
  distance: StarDistance,
  host: WorkHost,
): Promise<readonly Entry[]> {
  const byRank = [...entries].sort(
    (a, b) => a.dimension - b.dimension || b.candidate.evidence.value - a.candidate.evidence.value,
  );
  const kept: { readonly entry: Entry; readonly merged: MergedCandidate[] }[] = [];
  for (const entry of byRank) {
    await breathe(host);
    const same = kept.find((earlier) => isSameFind(earlier.entry, entry, model, distance));
    if (same === undefined) kept.push({ entry, merged: [] });
    else if (same.entry.dimension < entry.dimension) same.merged.push(mergedFrom(entry));
  }
  return kept.map(({ entry, merged }) => ({
    ...entry,
    candidate: { ...entry.candidate, merged: bestOfKinds(merged) },
  }));
}

function isSameFind(simple: Entry, other: Entry, model: PeakModel, distance: StarDistance): boolean {
  if (other.dimension === 0) return false;
  const gain = other.candidate.evidence.value - simple.candidate.evidence.value;
  if (simple.dimension < other.dimension && gain > toldApartBy) return false;
  const reach = simple.dimension < other.dimension ? model.blur : 2 * model.kTolerance;
  if (distance(simple.candidate.k, other.candidate.k) > reach) return false;
  return model.samePositions(simple.explanation, other.explanation);
}

function mergedFrom({ candidate, dimension }: Entry): MergedCandidate {
  return { k: candidate.k, dimension, evidence: candidate.evidence, matched: candidate.matched };
}

/** The best of each kind. */
function bestOfKinds(merged: readonly MergedCandidate[]): readonly MergedCandidate[] {
  return merged.filter(
    (one, index) =>
      !merged.some(
        (other, place) =>
          other.k.components === one.k.components &&
          (other.evidence.value > one.evidence.value || (other.evidence.value === one.evidence.value && place < index)),
      ),
  );
}
