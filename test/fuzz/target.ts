import type { Random } from "../support/random.js";

/** Whether an input was taken or refused as it should be; both are right. */
export type Outcome = "taken" | "refused";

/** One kind of input and what kvane does with it. */
export interface Target<Input = unknown> {
  readonly name: string;
  /** Inputs of a long run that goes over all targets, out of a hundred thousand. */
  readonly share: number;
  /** Inputs of the short loop that every test run makes. */
  readonly few: number;
  /** Seconds of processor time that an input may take at most: the bar is there for hangs, on any machine. */
  readonly patience: number;
  /** Makes one input, plain data that survives JSON: the same one for the same random numbers. */
  readonly make: (random: Random) => Input;
  /** Throws when kvane breaks a promise on it. */
  readonly run: (input: Input) => Outcome | Promise<Outcome>;
}

/** A target as the loops see it: what it makes goes only into its own `run`. */
export function target<Input>(one: Target<Input>): Target {
  return one as Target<unknown>;
}

/**
 * The seed of one input, from that of the loop, the target and the number of the input: each can be made again alone,
 * and a broken run goes on anywhere. (FNV-1a, 32 bits.)
 */
export function seedOf(seed: number, name: string, number: number): number {
  let hash = 0x811c9dc5;
  for (const letter of `${seed} ${name} ${number}`) hash = Math.imul(hash ^ letter.charCodeAt(0), 0x01000193);
  return hash >>> 0;
}
