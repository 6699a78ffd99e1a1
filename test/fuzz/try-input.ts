import { seeded } from "../support/random.js";
import { type Outcome, seedOf, type Target } from "./target.js";

/** What became of one input. */
export interface Tried {
  readonly outcome: Outcome | "failed";
  /** Stack or message of what went wrong; null where all is well. */
  readonly fault: string | null;
  /** Seconds of processor time. */
  readonly seconds: number;
}

/** One input of a target, made anew from the seed of the loop. */
export function inputOf({ name, make }: Target, seed: number, number: number): unknown {
  return make(seeded(seedOf(seed, name, number)));
}

/** Gives an input to its target, and measures. */
export async function tryInput({ run, patience }: Target, input: unknown): Promise<Tried> {
  const before = process.cpuUsage();
  let outcome: Tried["outcome"] = "failed";
  let fault: string | null = null;
  try {
    outcome = await run(input);
  } catch (error) {
    fault = error instanceof Error ? (error.stack ?? error.message) : `thrown: ${String(error)}`;
  }
  const { user, system } = process.cpuUsage(before);
  const seconds = (user + system) / 1e6;
  if (fault === null && seconds > patience) fault = `it took ${seconds.toFixed(1)} s of processor time`;
  return { outcome: fault === null ? outcome : "failed", fault, seconds };
}
