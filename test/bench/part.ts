/** One line of the table. Each figure is a ratio to something that was measured in turn with it, so never a time. */
export interface Row {
  /** What was measured. */
  readonly what: string;
  /** What it is a ratio to. */
  readonly over: string;
  /** The ratio of every pair. */
  readonly ratios: readonly number[];
  /** A ratio that the median should keep below; the table marks what does not. */
  readonly bound?: number;
}

/** What a part of the bench found. */
export interface Measured {
  readonly rows: readonly Row[];
  /** Said below the table: what a reference took, what could not be measured. */
  readonly notes: readonly string[];
}

/** How often to measure. */
export interface Counts {
  /** Pairs of what is quick. */
  readonly pairs: number;
  /** Pairs of what is slow. */
  readonly few: number;
}

/** A part of `npm run bench`: its name chooses it. */
export interface Part {
  readonly name: string;
  readonly measure: (counts: Counts) => Promise<Measured>;
}
