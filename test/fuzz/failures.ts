import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";

/** Where runs keep how far they are and the inputs that failed; never committed. */
export const fuzzFolder = join(root, "node_modules/.cache/kvane/fuzz");

/** An input that failed, with all that is needed to make it again. */
export interface Failure {
  readonly target: string;
  readonly seed: number;
  readonly number: number;
  readonly fault: string;
  readonly input: unknown;
}

/** Writes the input that failed and gives the name of the file. */
export function keepFailure(failure: Failure): string {
  mkdirSync(fuzzFolder, { recursive: true });
  const name = `${failure.target.replaceAll(" ", "-")}-${failure.seed}-${failure.number}.json`;
  const file = join(fuzzFolder, name);
  writeFileSync(file, `${JSON.stringify(failure, null, 2)}\n`);
  return file;
}

export function readFailure(file: string): Failure {
  return JSON.parse(readFileSync(file, "utf8")) as Failure;
}
