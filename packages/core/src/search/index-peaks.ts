import type { WaveVector } from "../kvectors/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { weigh } from "./candidate.js";
import { peakModel } from "./peak-model.js";
import type { Candidate, PeakList, SearchOptions } from "./types.js";

/**
 * What a given k makes of a peak list: assignment of each peak to H ± k with residuals and alternatives, evidence, and,
 * where k has measured values, these refined against the matched peaks with standard uncertainties. Peaks above
 * `options.qMax` are left out (`setAsidePeaks` lists them).
 *
 * Throws `k-needs-values` while k has an open letter, `too-few-peaks`, `invalid-peak`, `cell-contradicts-group`.
 */
export function indexPeaks(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  peaks: PeakList,
  options: SearchOptions,
): Candidate {
  return weigh(group, peakModel(group, cell, peaks, options).model, k, null).candidate;
}
