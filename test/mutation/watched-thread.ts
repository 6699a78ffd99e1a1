import { Worker } from "node:worker_threads";
import type { Answer, Killer, RecordedTest, Request, Start } from "./messages.js";

/** How a request ended: with an answer, or because a test took too long or all the memory. */
export type Ending =
  | { readonly kind: "answered"; readonly killer: Killer | null; readonly recorded: readonly RecordedTest[] }
  | { readonly kind: "stopped"; readonly position: number; readonly why: "time" | "memory" };

/** One thread at a time; a new one is started after one had to be ended. */
export interface WatchedThread {
  /** @param limits processor milliseconds that each test in turn may take */
  readonly ask: (request: Request, limits: (position: number) => number) => Promise<Ending>;
  readonly close: () => Promise<void>;
}

const lookEveryMilliseconds = 200;
/** A test that only waits uses no processor; on a busy machine others wait too. */
const longestWaitMilliseconds = 3_600_000;
const memoryMegabytes = 2048;

export function createWatchedThread(program: string, start: Start): WatchedThread {
  let thread: Worker | null = null;
  const started = (): Worker => {
    thread ??= new Worker(program, { workerData: start, resourceLimits: { maxOldGenerationSizeMb: memoryMegabytes } });
    return thread;
  };
  const close = async (): Promise<void> => {
    const ended = thread;
    thread = null;
    await ended?.terminate();
  };
  const ask = async (request: Request, limits: (position: number) => number): Promise<Ending> => {
    const worker = started();
    const ending = await watched(worker, request, limits);
    if (ending.kind === "stopped") await close();
    return ending;
  };
  return { ask, close };
}

function watched(worker: Worker, request: Request, limits: (position: number) => number): Promise<Ending> {
  return new Promise((resolve) => {
    const recorded: RecordedTest[] = [];
    let position = 0;
    let began = { processor: process.cpuUsage(), time: performance.now() };
    const settle = (ending: Ending): void => {
      clearInterval(clock);
      worker.off("error", onError);
      worker.off("message", onMessage);
      resolve(ending);
    };
    const onError = (): void => settle({ kind: "stopped", position, why: "memory" });
    const onMessage = (answer: Answer): void => {
      if (answer.kind === "begin") {
        position = answer.position;
        began = { processor: process.cpuUsage(), time: performance.now() };
      } else if (answer.kind === "recorded") recorded.push(answer.test);
      else settle({ kind: "answered", killer: answer.killer, recorded });
    };
    // The thread that asks has nothing to do meanwhile, so the time of the process is that of the test.
    const clock = setInterval(() => {
      const { user, system } = process.cpuUsage(began.processor);
      const waited = performance.now() - began.time;
      if ((user + system) / 1000 > limits(position) || waited > longestWaitMilliseconds)
        settle({ kind: "stopped", position, why: "time" });
    }, lookEveryMilliseconds);
    worker.on("error", onError);
    worker.on("message", onMessage);
    worker.postMessage(request);
  });
}
