import type { Surroundings } from "./surroundings.js";

/** A line on the error output that shows how far long work is; nothing where that is no terminal. */
export interface ProgressLine {
  readonly show: ((done: number, total: number | null, what: string) => void) | undefined;
  readonly clear: () => void;
}

/** Milliseconds between two updates. */
const pause = 100;

export function progressLine({ showsProgress, writeError }: Surroundings, quiet: boolean): ProgressLine {
  if (quiet || !showsProgress) return { show: undefined, clear: () => {} };
  let shown = false;
  let last = 0;
  return {
    show: (done, total, what) => {
      if (Date.now() - last < pause) return;
      last = Date.now();
      shown = true;
      writeError(`\r\u001b[K${what} ${done}${total === null ? "" : ` of ${total}`}`);
    },
    clear: () => {
      if (shown) writeError("\r\u001b[K");
    },
  };
}
