import { createHash } from "node:crypto";
import { fingerprint, type ModuleGraph } from "./module-graph.js";
import type { Mutant } from "./mutant.js";
import { pointName } from "./noted-graph.js";
import type { Room } from "./rooms.js";
import type { KnownTest } from "./suite.js";

/** Processor time that the tests of one mutant may take together when nothing is wrong. */
export const budgetMilliseconds = 5_000;

/** Tests of the room itself go before others that take up to this many times less. */
const preference = 4;

/**
 * The tests that come to the mutant, quick ones first, and before them those that do much in its file and in its room,
 * until they take the time that one mutant may have. What only the tests beyond that would notice counts as not noticed.
 */
export function chosenTests(mutant: Mutant, room: Room, tests: readonly KnownTest[], graph: ModuleGraph): KnownTest[] {
  const point = pointName(mutant.file, mutant.point);
  const cost = ({ file, milliseconds, visits }: KnownTest): number =>
    milliseconds / (1 + (visits.get(mutant.file) ?? 0)) / (asksRoom(file, room, graph) ? preference : 1);
  const reaching = tests
    .filter(({ reached }) => reached.has(point))
    .map((test) => ({ test, cost: cost(test) }))
    .sort((a, b) => a.cost - b.cost);
  let left = budgetMilliseconds;
  return reaching.flatMap(({ test }, position) => {
    left -= test.milliseconds;
    return left >= 0 || position === 0 ? [test] : [];
  });
}

function asksRoom(file: string, room: Room, graph: ModuleGraph): boolean {
  return Object.values(graph.get(file)?.targets ?? {}).some((target) =>
    target.startsWith(`packages/core/src/${room}/`),
  );
}

/** Changes when another choice of tests, or another test, may notice more. */
export function choiceName(chosen: readonly KnownTest[], graph: ModuleGraph): string {
  const files = [...new Set(chosen.map(({ file }) => file))].sort();
  const hash = createHash("sha256").update(files.map((file) => fingerprint(file, graph)).join());
  return hash.digest("hex").slice(0, 16);
}
