import type { WaveVector } from "../kvectors/index.js";
import { evidenceOf, peakLogOdds } from "./evidence.js";
import type { Explanation, PeakModel } from "./explanation.js";
import type { EvidenceCharges, VectorFind, VectorMember } from "./types.js";

/** One vector of several that share the peaks among them. */
export interface MixedVector {
  readonly name: VectorMember["name"];
  readonly k: WaveVector;
  readonly explanation: Explanation;
}

/** What is charged for the vectors, and how many letters they have. */
export interface MixtureCharges {
  readonly charges: EvidenceCharges;
  readonly letters: number;
}

/**
 * Evidence of several vectors together. A peak that is no stray belongs to each vector's lines with equal chance, so that
 * its log-odds are `ln[ε + (1 − ε) (r₁ + … + r_M)/M]` with the ratio of densities r of each; the charges of the
 * independent ones add up (D. J. C. MacKay, 2003, chapter 28: mixtures weigh like any other model).
 */
export function mixtureOf(
  stage: VectorFind["stage"],
  model: PeakModel,
  independent: readonly WaveVector[],
  members: readonly MixedVector[],
  { charges, letters }: MixtureCharges,
  bestSingle: number,
): VectorFind {
  const logOdds = model.strayShares.reduce((sum, stray, peak) => {
    const ratios = members.reduce((total, { explanation }) => total + (explanation.ratios[peak] ?? 0), 0);
    return sum + peakLogOdds(ratios / members.length, stray);
  }, 0);
  const explained = new Set(members.flatMap(({ explanation }) => explanation.assignments.map(({ peak }) => peak)));
  const [first] = members as readonly [MixedVector, ...MixedVector[]];
  const all = [...first.explanation.assignments.map(({ peak }) => peak), ...first.explanation.unmatched];
  const perPeak = first.explanation.observations / Math.max(1, first.explanation.assignments.length);
  const evidence = evidenceOf(logOdds, charges, explained.size * perPeak - letters);
  return {
    stage,
    vectors: independent,
    members: members.map(({ name, k, explanation }) => ({
      name,
      k,
      peaks: explanation.assignments.map(({ peak }) => peak).sort((a, b) => a - b),
    })),
    evidence,
    gain: evidence.value - bestSingle,
    matched: explained.size,
    total: model.total,
    unmatched: all.filter((peak) => !explained.has(peak)).sort((a, b) => a - b),
  };
}
