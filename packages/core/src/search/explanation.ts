import type { WeightedResiduals } from "../algorithms/index.js";
import type { WaveVector } from "../kvectors/index.js";
import type { Assignment } from "./types.js";

/** What a k makes of the peaks. */
export interface Explanation {
  readonly assignments: readonly Assignment[];
  /** Indices of the peaks outside every line's tolerance. */
  readonly unmatched: readonly number[];
  /** Σ over peaks of the log-odds against chance, before any charge for searching. */
  readonly logOdds: number;
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

/**
 * How peaks of one sort (powder positions, or fractional h k l) speak about k. The rest of the room works through it
 * and does not ask which sort it is.
 */
export interface PeakModel {
  readonly total: number;
  /** Half-width of a typical match, in the unit of `metric`'s square root. */
  readonly tolerance: number;
  /** Metric (nine numbers) in a*, b*, c* of the space where k is measured: Å⁻² with 4π², or 1 for h k l. */
  readonly metric: readonly number[];
  explain(k: WaveVector): Explanation;
  /** The matched peaks as equations for the values of the letters of `k`, at given values. */
  equations(k: WaveVector, assignments: readonly Assignment[], values: Float64Array): WeightedResiduals;
  /** Whether two k predict the same positions within the tolerance, over the range of the peaks. */
  samePositions(a: Explanation, b: Explanation): boolean;
}
