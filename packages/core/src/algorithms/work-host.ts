/** Tells that the work is no longer wanted. The standard abort signal of browsers and Node fits it. */
export interface CancelSignal {
  readonly aborted: boolean;
}

/** What long work needs from whoever started it. */
export interface WorkHost {
  readonly signal?: CancelSignal;
  /** Called now and then with the steps done, the steps in all (null when not known) and what is being done. */
  readonly progress?: (done: number, total: number | null, what: string) => void;
}
