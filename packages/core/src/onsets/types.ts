/** A number with its standard uncertainty. */
export interface Measured {
  readonly value: number;
  /** Null where the data do not fix it. */
  readonly su: number | null;
}

/** One quantity against temperature; rows that lack it are left out. */
export interface ScanSeries {
  readonly name: string;
  /** K, in rising order. */
  readonly temperatures: readonly number[];
  readonly values: readonly number[];
  /** Standard uncertainties, or null where none are given. */
  readonly uncertainties: readonly number[] | null;
}

/** `I = I₀ (1 − T/T_N)^{2β} + background` below T_N, the background alone above. */
export interface PowerLaw {
  /** K. */
  readonly transition: Measured;
  readonly beta: Measured;
  readonly amplitude: Measured;
  readonly background: Measured;
  readonly chiSquared: number;
  readonly degreesOfFreedom: number;
  /** Where no uncertainties are given they are taken from the scatter about the fit. */
  readonly uncertaintySource: "given" | "scatter";
  /** Points used, and how many of them lie below T_N. */
  readonly points: number;
  readonly pointsBelow: number;
  /** K. */
  readonly from: number;
  readonly to: number;
  /** Largest (T_N − T)/T_N of a point used. */
  readonly reducedRange: number;
  /** False where the scatter about the law is more than the uncertainties explain even in the narrowest range. */
  readonly fits: boolean;
}

/** What a peak does. */
export type PeakBehaviour =
  /** Grows below a temperature of the range. */
  | "onset"
  /** Loses intensity below one. */
  | "loss"
  /** The same at all temperatures. */
  | "constant"
  /** Changes smoothly, as thermal motion makes a nuclear peak do, or sets in beyond the range. */
  | "gradual"
  /** Nothing there at any temperature. */
  | "absent"
  /** Too few points for an answer. */
  | "undecided";

/** The onset of one column of a scan. */
export interface SeriesOnset {
  readonly name: string;
  readonly behaviour: PeakBehaviour;
  /** By how much in χ² an onset explains the data better than a smooth curve, after its price for more parameters. */
  readonly evidence: number;
  /** For `onset` and `loss`. */
  readonly fit: PowerLaw | null;
  /** Intensity above the transition, more than three s.u. from zero: the peak has another part that does not order. */
  readonly onBackground: boolean;
}

/** Peaks whose onsets are one within their uncertainties. */
export interface Transition {
  /** K. */
  readonly temperature: Measured;
  /** Indices of the series. */
  readonly series: readonly number[];
  /** Probability that common onsets scatter as much as these; null for a single peak. */
  readonly probability: number | null;
}

/** A range of temperatures in which k does not move. */
export interface Plateau {
  /** K. */
  readonly from: number;
  readonly to: number;
  readonly points: number;
  readonly mean: Measured;
  /** A simple fraction within two s.u. of the mean, as `[n, m]`. */
  readonly fraction: readonly [number, number] | null;
}

/** How a component of k moves. */
export interface KAgainstTemperature {
  readonly name: string;
  readonly behaviour: "constant" | "sliding" | "lock-in" | "undecided";
  readonly plateaus: readonly Plateau[];
  /** Per K, outside the plateaus. */
  readonly slope: Measured | null;
  readonly uncertaintySource: "given" | "scatter";
}

/** What a temperature scan says: onsets, common transitions, the movement of k. */
export interface OnsetAnalysis {
  readonly peaks: readonly SeriesOnset[];
  readonly transitions: readonly Transition[];
  readonly k: readonly KAgainstTemperature[];
}

/** How scans are fitted. */
export interface OnsetOptions {
  /** Largest (T_N − T)/T_N used; without it the widest range that the law fits. */
  readonly reducedRange?: number;
}
