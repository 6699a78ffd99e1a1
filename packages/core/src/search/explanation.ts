import type { WeightedResiduals, WorkHost } from "../algorithms/index.js";
import type { WaveVector } from "../kvectors/index.js";
import type { Assignment, Correction, Region } from "./types.js";

/** What a k makes of the peaks. */
export interface Explanation {
  readonly assignments: readonly Assignment[];
  /** Standard uncertainties of the peaks by index, in the unit of the residuals. */
  readonly uncertainties: ReadonlyMap<number, number>;
  /** Indices of the peaks outside every line's tolerance. */
  readonly unmatched: readonly number[];
  /** Σ over peaks of the log-odds against chance, before any charge for searching. */
  readonly logOdds: number;
  /** The ratio of densities behind it, peak by peak in the order of the model. */
  readonly ratios: Float64Array;
  readonly rootMeanSquare: number;
  readonly largest: number;
  readonly chiSquared: number;
  /** Numbers that the matched peaks give: one each for a powder, three for h k l. */
  readonly observations: number;
  /** What k predicts, to compare k with k: distinct Q in rising order, or the flattened vectors ±arm for h k l. */
  readonly predicted: Float64Array;
  readonly deWolff: number | null;
  readonly smithSnyder: number | null;
}

/** A quantity that is refined with k, from −limit to limit. */
export interface CorrectionLimit {
  readonly name: Correction["name"];
  readonly limit: number;
}

/** A k that branch and bound came to. */
export interface Solution {
  readonly k: WaveVector;
  /** Most peaks that some k beside it matches, corrections free within their limits. */
  readonly matched: number;
  /** Index among the regions of the kind. */
  readonly region: number;
}

/** What the search of one kind of k gives. */
export interface KindFindings {
  readonly solutions: readonly Solution[];
  readonly regions: readonly Region[];
  readonly boxes: number;
  /** Å⁻¹ (r.l.u. for h k l): half-diagonal of the smallest box. */
  readonly smallestBox: number;
  readonly leaves: number;
  readonly unexplored: number;
  readonly stopped: "boxes" | "leaves" | null;
  /** Whether `solutions` holds every distinct one. */
  readonly complete: boolean;
}

/** How far the search of a kind may go. */
export interface KindBudget {
  /** Peaks that must match. */
  readonly wanted: number;
  readonly boxes: number;
}

/**
 * How peaks of one sort (powder positions, or fractional h k l) speak about k. The rest of the room works through it
 * and does not ask which sort it is.
 */
export interface PeakModel {
  readonly total: number;
  /** The chance of each peak to be no satellite, in the order of the model. */
  readonly strayShares: readonly number[];
  /** Peaks (by index) that repeat an earlier one. */
  readonly repeated: readonly number[];
  /** Numbers that a matched peak gives: its Q, or three indices. */
  readonly numbersPerPeak: 1 | 3;
  /** Half-width of a typical match, in the unit of `metric`'s square root. */
  readonly tolerance: number;
  /** Metric (nine numbers) in a*, b*, c* of the space where k is measured: Å⁻² with 4π², or 1 for h k l. */
  readonly metric: readonly number[];
  /** Metric of the dual of the primitive basis, Å⁻² with 4π². */
  readonly primitiveMetric: readonly number[];
  /** Å⁻¹: how far k moves within a typical tolerance. */
  readonly kTolerance: number;
  /** Å⁻¹: k nearer than this may look the same; on a mirror plane |Q| changes to second order only. */
  readonly blur: number;
  /** Least and largest Q of the peaks, Å⁻¹. */
  readonly range: { readonly lowest: number; readonly highest: number };
  readonly corrections: readonly CorrectionLimit[];
  /**
   * @param corrections values of the corrections; all zero when left out
   * @param widened take a peak as matched wherever some values of the corrections within their limits would match it
   */
  explain(k: WaveVector, corrections?: readonly number[], widened?: boolean): Explanation;
  /**
   * The matched peaks as equations for the values of the letters of `k` and then of the corrections, at given values.
   */
  equations(k: WaveVector, assignments: readonly Assignment[], values: Float64Array): WeightedResiduals;
  /** Whether two k predict the same positions within the tolerance, over the range of the peaks. */
  samePositions(a: Explanation, b: Explanation): boolean;
  /** Every part of a kind of k (its form with open letters) where at least `wanted` peaks may match. */
  solve(form: WaveVector, budget: KindBudget, host: WorkHost): Promise<KindFindings>;
}
