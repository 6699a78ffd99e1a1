/**
 * The thread that runs tests. Mutants may loop for ever or fill the memory, so it may be ended at any time. Each test
 * gets modules of its own; what a mutant leaves behind in a cache is gone with them.
 */
import { parentPort, workerData } from "node:worker_threads";
import { createCollector } from "./collect-tests.js";
import { runAnew } from "./fresh-modules.js";
import type { Answer, Request, Start, TestPlace } from "./messages.js";
import type { ModuleGraph, ModuleText } from "./module-graph.js";

const { graph, points } = workerData as Start;

// A promise that nobody waits for decides nothing.
process.on("unhandledRejection", () => {});
parentPort?.on("message", (request: Request) => {
  const answered =
    request.kind === "record" ? record(request.file) : challenge(request.file, request.changed, request.tests);
  // What goes wrong outside a test ends the thread.
  answered.catch((error: unknown) =>
    setImmediate(() => {
      throw error;
    }),
  );
});

async function record(file: string): Promise<void> {
  const tests = await collect(file, graph, new Uint8Array(points));
  for (const [position, { name }] of tests.entries()) {
    send({ kind: "begin", position });
    const reached = new Uint8Array(points);
    const started = process.cpuUsage();
    const error = await failure({ file, index: position }, graph, reached);
    const { user, system } = process.cpuUsage(started);
    const milliseconds = Math.round((user + system) / 1000);
    const places = [...reached.keys()].filter((place) => reached[place] === 1);
    send({ kind: "recorded", test: { name, milliseconds, error, reached: places } });
  }
  send({ kind: "end", killer: null });
}

async function challenge(file: string, changed: ModuleText, tests: readonly TestPlace[]): Promise<void> {
  const mutated = new Map(graph).set(file, changed);
  for (const [position, test] of tests.entries()) {
    send({ kind: "begin", position });
    const error = await failure(test, mutated, new Uint8Array(points));
    if (error !== null) return send({ kind: "end", killer: { position, error } });
  }
  send({ kind: "end", killer: null });
}

/** Why a test fails, or null. A test that a mutant takes out of its table does not fail. */
async function failure({ file, index }: TestPlace, modules: ModuleGraph, reached: Uint8Array): Promise<string | null> {
  try {
    const tests = await collect(file, modules, reached);
    await tests[index]?.run();
    return null;
  } catch (error) {
    return String(error).replaceAll(/\s+/g, " ").slice(0, 200);
  }
}

async function collect(file: string, modules: ModuleGraph, reached: Uint8Array) {
  const { api, tests } = createCollector();
  await runAnew(file, modules, { vitest: api }, reached);
  return tests;
}

function send(answer: Answer): void {
  parentPort?.postMessage(answer);
}
