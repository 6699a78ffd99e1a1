/**
 * When does a peak set in? Power laws `I = I₀ (1 − T/T_N)^{2β} + background` fitted to intensities against temperature,
 * peaks grouped by common T_N, peaks without an onset, and whether k stays, slides or locks in. Temperatures in K,
 * intensities in any unit. Sources: M. F. Collins, Magnetic Critical Scattering (1989), chapter 2; Golub & Pereyra,
 * SIAM J. Numer. Anal. 10 (1973) 413; Wilks, Ann. Math. Stat. 9 (1938) 60.
 */
import { fitSeries } from "./fit-series.js";
import { movingK } from "./moving-k.js";
import { transitionsOf } from "./transitions.js";
import type { OnsetAnalysis, OnsetOptions, ScanSeries } from "./types.js";

export { likeUncertainties } from "./like-uncertainties.js";
export type {
  KAgainstTemperature,
  Measured,
  OnsetAnalysis,
  OnsetOptions,
  PeakBehaviour,
  Plateau,
  PowerLaw,
  ScanSeries,
  SeriesOnset,
  Transition,
} from "./types.js";

/**
 * The onsets of several peaks and the movement of k. A fit holds near T_N only; its range of (T_N − T)/T_N is the widest
 * of those tried that the law fits, unless one is given.
 *
 * @param intensities of each peak against temperature
 * @param k components of the wave vector against temperature; empty where none were measured
 */
export function analyseScan(
  intensities: readonly ScanSeries[],
  k: readonly ScanSeries[] = [],
  options: OnsetOptions = {},
): OnsetAnalysis {
  const fitted = intensities.map((series) => fitSeries(series, options));
  return { peaks: fitted.map(({ onset }) => onset), transitions: transitionsOf(fitted), k: k.map(movingK) };
}
