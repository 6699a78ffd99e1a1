/** A number with its standard uncertainty. */
export interface MeasuredRecord {
  readonly value: number;
  readonly su: number | null;
}

/** The fitted law I = I₀ (1 − T/T_N)^2β + background, with its range. */
export interface PowerLawRecord {
  /** K. */
  readonly transition: MeasuredRecord;
  readonly beta: MeasuredRecord;
  readonly amplitude: MeasuredRecord;
  readonly background: MeasuredRecord;
  readonly chiSquared: number;
  readonly degreesOfFreedom: number;
  readonly uncertaintySource: "given" | "scatter";
  readonly points: number;
  readonly pointsBelow: number;
  /** K. */
  readonly from: number;
  readonly to: number;
  readonly reducedRange: number;
  readonly fits: boolean;
}

/** A peak of a scan: its data, and the fitted law or why there is none. */
export interface PeakOnsetRecord {
  readonly name: string;
  readonly behaviour: "onset" | "loss" | "constant" | "gradual" | "absent" | "undecided";
  readonly evidence: number;
  readonly onBackground: boolean;
  readonly fit: PowerLawRecord | null;
  readonly data: {
    readonly temperatures: readonly number[];
    readonly values: readonly number[];
    readonly uncertainties: readonly number[] | null;
  };
}

/** Peaks that share one temperature of onset. */
export interface TransitionRecord {
  readonly temperature: MeasuredRecord;
  /** Indices in `peaks`. */
  readonly peaks: readonly number[];
  readonly probability: number | null;
}

/** A component of k against temperature. */
export interface MovingKRecord {
  readonly name: string;
  readonly behaviour: "constant" | "sliding" | "lock-in" | "undecided";
  readonly plateaus: readonly {
    readonly from: number;
    readonly to: number;
    readonly points: number;
    readonly mean: MeasuredRecord;
    /** `1/3`; null where no simple fraction is near. */
    readonly fraction: string | null;
  }[];
  readonly slope: MeasuredRecord | null;
  readonly uncertaintySource: "given" | "scatter";
  readonly data: PeakOnsetRecord["data"];
}

/** What a column of the scan was taken as. */
export interface ScanColumnRecord {
  readonly name: string;
  readonly as: "temperature" | "intensity" | "k" | "uncertainty";
  /** The column that uncertainties belong to; null for other columns. */
  readonly of: string | null;
}

/** Result of `kvane onset`. */
export interface OnsetRecord {
  readonly file: string;
  readonly columns: readonly ScanColumnRecord[];
  readonly rows: number;
  readonly peaks: readonly PeakOnsetRecord[];
  readonly transitions: readonly TransitionRecord[];
  readonly k: readonly MovingKRecord[];
}
