import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fuzzFolder } from "./failures.js";

/** What came of the inputs of one target. */
export interface Count {
  readonly taken: number;
  readonly refused: number;
  readonly failed: number;
  /** Processor time. */
  readonly seconds: number;
  /** Inputs that took more than a second. */
  readonly aboveOne: number;
  /** Seconds of the slowest input, and its number. */
  readonly slowest: number;
  readonly slowestNumber: number;
  /** The most memory that the process had. */
  readonly megabytes: number;
}

export const emptyCount: Count = {
  taken: 0,
  refused: 0,
  failed: 0,
  seconds: 0,
  aboveOne: 0,
  slowest: 0,
  slowestNumber: 0,
  megabytes: 0,
};

export function addCounts(a: Count, b: Count): Count {
  const slower = b.slowest > a.slowest ? b : a;
  return {
    taken: a.taken + b.taken,
    refused: a.refused + b.refused,
    failed: a.failed + b.failed,
    seconds: a.seconds + b.seconds,
    aboveOne: a.aboveOne + b.aboveOne,
    slowest: slower.slowest,
    slowestNumber: slower.slowestNumber,
    megabytes: Math.max(a.megabytes, b.megabytes),
  };
}

/** How far a target is in the run of one seed. */
export interface Progress {
  readonly next: number;
  readonly count: Count;
}

export type RunProgress = { [target: string]: Progress };

function fileOf(seed: number): string {
  return join(fuzzFolder, `seed-${seed}.json`);
}

/** How far the run of a seed came; empty for one that was never begun. */
export function readProgress(seed: number): RunProgress {
  return existsSync(fileOf(seed)) ? JSON.parse(readFileSync(fileOf(seed), "utf8")) : {};
}

/** Keeps it, whole or not at all: a run may be broken off at any time. */
export function keepProgress(seed: number, progress: RunProgress): void {
  mkdirSync(fuzzFolder, { recursive: true });
  writeFileSync(`${fileOf(seed)}.part`, JSON.stringify(progress));
  renameSync(`${fileOf(seed)}.part`, fileOf(seed));
}
