import { createHash } from "node:crypto";
import { appendFileSync, existsSync, mkdirSync, readFileSync } from "node:fs";
import { dirname } from "node:path";
import type { Mutant } from "./mutant.js";

/** How a mutant fared: a test failed, a test took far too long or all the memory, or every test passed. */
export interface Outcome {
  readonly status: "killed" | "stopped" | "survived";
  /** The test that noticed. */
  readonly by: string | null;
  /** Of the tests that were tried on a survivor. */
  readonly choice: string;
  /** How many they were. */
  readonly tried: number;
}

/** Outcomes so far, kept in an ignored folder so that a broken run goes on where it was. */
export interface State {
  readonly of: (mutant: Mutant, text: string) => Outcome | undefined;
  readonly keep: (mutant: Mutant, text: string, outcome: Outcome) => void;
}

export function openState(file: string): State {
  mkdirSync(dirname(file), { recursive: true });
  const done = new Map<string, Outcome>();
  // The last line may be cut off.
  for (const line of existsSync(file) ? readFileSync(file, "utf8").split("\n").slice(0, -1) : []) {
    const { key, outcome } = JSON.parse(line) as { key: string; outcome: Outcome };
    done.set(key, outcome);
  }
  return {
    of: (mutant, text) => done.get(keyOf(mutant, text)),
    keep: (mutant, text, outcome) => {
      const key = keyOf(mutant, text);
      done.set(key, outcome);
      appendFileSync(file, `${JSON.stringify({ key, outcome })}\n`);
    },
  };
}

/** The same change of the same text of a file. */
function keyOf({ file, start, end, replacement }: Mutant, text: string): string {
  const hash = createHash("sha256").update(text).digest("hex").slice(0, 16);
  return `${file}@${hash}:${start}-${end}:${replacement}`;
}
