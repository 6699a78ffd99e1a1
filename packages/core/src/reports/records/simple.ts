/** Result of `kvane explain`: one code, or all of them when none was named. */
export interface ExplainRecord {
  readonly codes: readonly {
    readonly code: string;
    readonly meaning: string;
    readonly exitStatus: number;
    /** What mostly helps; null where only the problem itself can say it. */
    readonly remedy: string | null;
  }[];
}

/** Result of `kvane help TOPIC`. */
export interface HelpRecord {
  readonly topic: string;
  readonly title: string;
  readonly text: string;
  readonly topics: readonly string[];
}
