import { readFileSync } from "node:fs";
import { join } from "node:path";
import { seeded } from "../support/random.js";
import { root } from "../tools/paths.mjs";
import { sourceFiles } from "../tools/source-files.mjs";
import { findMutants } from "./find-mutants.js";
import type { Mutant } from "./mutant.js";

/** The rooms whose answers are exact, each with the seed of its sample. */
export const roomSeeds = { numbers: 901, spacegroups: 902, kvectors: 903, irreps: 904, modes: 905 } as const;
export type Room = keyof typeof roomSeeds;
export const rooms = Object.keys(roomSeeds) as Room[];

/** Mutants that are tried in each room. */
export const sampleSize = 300;

/** Values that people chose, each with its reason beside it: another one would be no error. */
const chosenValues = "packages/core/src/numbers/tolerances.ts";

/** The edited files of a room by path; what is generated is not among them. */
export function roomTexts(room: Room): Map<string, string> {
  return new Map(
    sourceFiles(`packages/core/src/${room}`)
      .filter((file) => file !== chosenValues)
      .map((file) => [file, readFileSync(join(root, file), "utf8")]),
  );
}

export interface Sample {
  /** How many mutants the room has. */
  readonly all: number;
  readonly mutants: readonly Mutant[];
}

/** A random sample without repetition, in random order: what is done of a broken run is a smaller random sample. */
export function sampleOf(room: Room): Sample {
  const all = [...roomTexts(room)].flatMap(([file, text]) => findMutants(file, text));
  const { below } = seeded(roomSeeds[room]);
  const mutants = [...all];
  for (let last = mutants.length - 1; last > 0; last--) {
    const other = below(last + 1);
    [mutants[last], mutants[other]] = [mutants[other] as Mutant, mutants[last] as Mutant];
  }
  return { all: all.length, mutants: mutants.slice(0, sampleSize) };
}
