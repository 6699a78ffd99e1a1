import { fail } from "../errors/index.js";
import type { WorkHost } from "./work-host.js";

// The one thing that core needs of its surroundings: every browser and Node have it, the language itself does not.
declare const setTimeout: (action: () => void, milliseconds: number) => unknown;

/** Time in ms after which work gives the thread back at its next step; a cancel or a screen update waits for that. */
export const breathMilliseconds = 20;

/** When each host last had the thread. Weak, so that nothing outlives the work it belongs to. */
const lastBreath = /* @__PURE__ */ new WeakMap<WorkHost, number>();

/**
 * To be awaited between the steps of long work: gives the thread back to the event loop when 20 ms have passed since it
 * last did so for this host, so that cancel and progress work in one thread. The clock decides only when to pause,
 * never what comes out.
 *
 * Throws `interrupted` when the host's signal is aborted.
 */
export async function breathe(host: WorkHost): Promise<void> {
  refuseWhenAborted(host);
  const now = Date.now();
  const last = lastBreath.get(host);
  if (last === undefined) {
    lastBreath.set(host, now);
    return;
  }
  if (now - last < breathMilliseconds) return;
  await new Promise<void>((resolve) => setTimeout(resolve, 0));
  lastBreath.set(host, Date.now());
  refuseWhenAborted(host);
}

function refuseWhenAborted(host: WorkHost): void {
  if (host.signal?.aborted)
    fail("interrupted", "the work was cancelled before it ended", {
      remedy: "start the command again; nothing was written",
    });
}
