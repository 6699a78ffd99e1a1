import type { Surroundings } from "./surroundings.js";

/** A line on the error output that shows how far long work is; nothing where that is no terminal. */
export interface ProgressLine {
  readonly show: ((done: number, total: number | null, what: string) => void) | undefined;
  readonly clear: () => void;
}

/** Milliseconds between two updates. */
const pause = 100;

export function progressLine(surroundings: Surroundings, quiet: boolean): ProgressLine {
  if (quiet) return { show: undefined, clear: () => {} };
  const { writeError } = surroundings;
  let shown = false;
  let last = 0;
  return {
    show: (done, total, what) => {
      // Asked only where there is something to show: the error output is not opened for quick commands.
      if (Date.now() - last < pause || !surroundings.showsProgress) return;
      last = Date.now();
      shown = true;
      writeError(`\r\u001b[K${what} ${done}${total === null ? "" : ` of ${total}`}`);
    },
    clear: () => {
      if (shown) writeError("\r\u001b[K");
    },
  };
}
