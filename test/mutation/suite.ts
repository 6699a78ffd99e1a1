import { existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { sourceFiles } from "../tools/source-files.mjs";
import type { RecordedTest } from "./messages.js";
import { fingerprint, type ModuleGraph, readGraph } from "./module-graph.js";
import { fileOfPoint } from "./noted-graph.js";
import { rooms } from "./rooms.js";
import type { WatchedThread } from "./watched-thread.js";

/** The unit and law tests that load the exact rooms and no room that stands on them: what those notice is left out. */
export function testFiles(): string[] {
  return ["test/unit", "test/laws"]
    .flatMap((folder) => sourceFiles(folder))
    .filter((file) => file.endsWith(".test.ts") && isOfExactRooms(file));
}

const below: readonly string[] = ["errors", "algorithms"];

function isOfExactRooms(file: string): boolean {
  const loaded = new Set(
    [...readGraph([file]).keys()].flatMap((name) => /^packages\/core\/src\/([a-z]+)\//.exec(name)?.[1] ?? []),
  );
  for (const room of below) loaded.delete(room);
  return loaded.size > 0 && [...loaded].every((room) => (rooms as readonly string[]).includes(room));
}

/** A test that passes without mutants, with those of the wanted points that it reaches. */
export interface KnownTest {
  readonly file: string;
  readonly index: number;
  readonly name: string;
  readonly milliseconds: number;
  readonly reached: ReadonlySet<string>;
  /** How many points it reaches in each file. */
  readonly visits: ReadonlyMap<string, number>;
}

/** Each test alone may take this much of processor time when nothing is mutated. */
const longestRecordMilliseconds = 600_000;

/** Runs every test once, or takes what it did before where the code it reaches is the same. */
export async function recordTests(
  files: readonly string[],
  graph: ModuleGraph,
  pointNames: readonly string[],
  wanted: ReadonlySet<string>,
  thread: WatchedThread,
  folder: string,
): Promise<KnownTest[]> {
  mkdirSync(folder, { recursive: true });
  const tests: KnownTest[] = [];
  for (const [position, file] of files.entries()) {
    const cache = join(folder, `${file.replaceAll(/[\\/]/g, "-")}-${fingerprint(file, graph)}.json`);
    let saved = savedTests(cache);
    if (saved === null) {
      process.stderr.write(`recording ${position + 1} of ${files.length}: ${file}\n`);
      const ending = await thread.ask({ kind: "record", file }, () => longestRecordMilliseconds);
      if (ending.kind === "stopped") throw new Error(`${file}: out of ${ending.why} without a mutant`);
      saved = { points: pointNames, tests: ending.recorded };
      writeFileSync(cache, JSON.stringify(saved));
    }
    tests.push(...knownTests(file, saved, wanted));
  }
  return tests;
}

interface Saved {
  readonly points: readonly string[];
  readonly tests: readonly RecordedTest[];
}

function savedTests(cache: string): Saved | null {
  return existsSync(cache) ? (JSON.parse(readFileSync(cache, "utf8")) as Saved) : null;
}

function knownTests(file: string, { points, tests }: Saved, wanted: ReadonlySet<string>): KnownTest[] {
  return tests.flatMap(({ name, milliseconds, error, reached }, index) => {
    if (error !== null) {
      process.stderr.write(`left out, fails alone: ${file}: ${name}: ${error}\n`);
      return [];
    }
    const names = reached.map((place) => points[place] as string);
    const visits = new Map<string, number>();
    for (const point of names) visits.set(fileOfPoint(point), (visits.get(fileOfPoint(point)) ?? 0) + 1);
    return [{ file, index, name, milliseconds, reached: new Set(names.filter((point) => wanted.has(point))), visits }];
  });
}
