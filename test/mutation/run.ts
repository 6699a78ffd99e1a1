/**
 * `npm run mutate` tries a random sample of small changes in each of the exact rooms and counts those that a unit or
 * law test notices. A broken run goes on where it was; what survived is tried again when the tests change.
 * `npm run mutate -- numbers irreps` does these rooms only. The numbers go to results.json and docs/mutation.md.
 */
import { rmSync } from "node:fs";
import { join } from "node:path";
import { build } from "esbuild";
import { testBundle } from "../tools/bundle-test.mjs";
import { root } from "../tools/paths.mjs";
import { choiceName, chosenTests } from "./chosen-tests.js";
import { readGraph, translated } from "./module-graph.js";
import { type Mutant, mutated } from "./mutant.js";
import { notedGraph, pointName } from "./noted-graph.js";
import { type RoomResult, readResults, roomResult, scores, writeResults } from "./results.js";
import { type Room, roomSeeds, rooms, roomTexts, type Sample, sampleOf } from "./rooms.js";
import { type Outcome, openState } from "./state.js";
import { type KnownTest, recordTests, testFiles } from "./suite.js";
import { createWatchedThread } from "./watched-thread.js";
import { writePage } from "./write-page.js";

const cache = join(root, "node_modules/.cache/kvane/mutation");

const wanted = process.argv.slice(2);
const unknown = wanted.filter((name) => !rooms.includes(name as Room));
if (unknown.length > 0) throw new Error(`no exact room is called ${unknown.join(", ")}; there are ${rooms.join(", ")}`);
const chosen = rooms.filter((room) => wanted.length === 0 || wanted.includes(room));

const program = join(cache, `test-thread-${process.pid}.mjs`);
await build({ ...testBundle("test/mutation/test-thread.ts"), outfile: program });

const files = testFiles();
const graph = readGraph(files);
const samples = new Map(rooms.map((room) => [room, sampleOf(room)]));
const tests = await record([...samples.values()]);
const thread = createWatchedThread(program, { graph, points: 0 });
const done: RoomResult[] = [];
for (const room of chosen) done.push(await tryRoom(room, samples.get(room) as Sample));
await thread.close();
rmSync(program);
writeResults(done, rooms);
writePage(readResults());

async function record(all: readonly Sample[]): Promise<KnownTest[]> {
  const noted = notedGraph(graph);
  const points = new Set(all.flatMap(({ mutants }) => mutants.map(({ file, point }) => pointName(file, point))));
  const recorder = createWatchedThread(program, { graph: noted.graph, points: noted.points.length });
  const recorded = await recordTests(files, graph, noted.points, points, recorder, join(cache, "reach"));
  await recorder.close();
  return recorded;
}

async function tryRoom(room: Room, { all, mutants }: Sample): Promise<RoomResult> {
  const texts = roomTexts(room);
  const state = openState(join(cache, `${room}.jsonl`));
  const tried: [Mutant, Outcome][] = [];
  process.stderr.write(`${room}: ${mutants.length} of ${all} mutants\n`);
  for (const [position, mutant] of mutants.entries()) {
    const text = texts.get(mutant.file) as string;
    const challengers = chosenTests(mutant, room, tests, graph);
    const choice = choiceName(challengers, graph);
    const before = state.of(mutant, text);
    const holds = before && (before.status !== "survived" || before.choice === choice);
    const outcome = holds ? before : await tryMutant(mutant, text, challengers, choice);
    tried.push([mutant, outcome]);
    if (holds) continue;
    state.keep(mutant, text, outcome);
    const what = `${mutant.file}:${mutant.line}:${mutant.column} ${mutant.change}`;
    process.stderr.write(`${room} ${position + 1}: ${outcome.status} ${what}\n`);
  }
  const result = roomResult({ room, seed: roomSeeds[room], mutants: all }, tried, texts);
  const { raw, real } = scores(result);
  const survivors = `${result.survivors.length} survivors`;
  process.stderr.write(`${room}: ${raw.toFixed(1)} %, without equivalents ${real.toFixed(1)} %, ${survivors}\n`);
  return result;
}

async function tryMutant(
  mutant: Mutant,
  text: string,
  challengers: readonly KnownTest[],
  choice: string,
): Promise<Outcome> {
  const changed = {
    code: translated(mutant.file, mutated(text, mutant)).code,
    targets: graph.get(mutant.file)?.targets ?? {},
  };
  const name = (position: number): string => {
    const test = challengers[position];
    return test ? `${test.file}: ${test.name}` : "";
  };
  const ending = await thread.ask(
    { kind: "challenge", file: mutant.file, changed, tests: challengers.map(({ file, index }) => ({ file, index })) },
    (position) => 3000 + 6 * (challengers[position]?.milliseconds ?? 0),
  );
  const tried = challengers.length;
  if (ending.kind === "stopped")
    return { status: "stopped", by: `${name(ending.position)}: out of ${ending.why}`, choice, tried };
  const { killer } = ending;
  if (killer) return { status: "killed", by: `${name(killer.position)}: ${killer.error}`, choice, tried };
  return { status: "survived", by: null, choice, tried };
}
