/**
 * The long run: `npm run fuzz -- COUNT [SEED] [TARGET…]` tries COUNT spoilt inputs, shared out among the targets (all of
 * COUNT for each target that is named). It goes on where a run of the same seed was broken off. Inputs that fail are
 * written into files; `npm run fuzz -- FILE.json` tries such an input again.
 */
import { spawn } from "node:child_process";
import { existsSync, mkdirSync, readFileSync, rmSync } from "node:fs";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { root } from "../tools/paths.mjs";
import { fuzzFolder, keepFailure, readFailure } from "./failures.js";
import { addCounts, type Count, emptyCount, keepProgress, type RunProgress, readProgress } from "./progress.js";
import type { Target } from "./target.js";
import { targets } from "./targets.js";
import { inputOf, tryInput } from "./try-input.js";

/** Seconds without a new input after which a process counts as hung, whatever else the machine does. */
const hung = 90;

const [first = "20000", second, ...named] = process.argv.slice(2);
if (first.endsWith(".json")) await again(first);
else await longRun(Number(first), second === undefined ? 1 : Number(second), named);

async function again(file: string): Promise<void> {
  const { target: name, input } = readFailure(file);
  const target = targets.find((one) => one.name === name);
  if (target === undefined) throw new Error(`no target is called ${name}`);
  const { outcome, fault, seconds } = await tryInput(target, input);
  console.log(`${name}: ${outcome}, ${seconds.toFixed(2)} s of processor time${fault === null ? "" : `\n${fault}`}`);
  if (fault !== null) process.exitCode = 1;
}

async function longRun(wanted: number, seed: number, names: readonly string[]): Promise<void> {
  if (!Number.isSafeInteger(wanted) || !Number.isSafeInteger(seed)) throw new Error("expected COUNT [SEED] [TARGET…]");
  const unknown = names.filter((name) => !targets.some((one) => one.name === name));
  if (unknown.length > 0)
    throw new Error(
      `no target is called ${unknown.join(", ")}; there are ${targets.map(({ name }) => name).join(", ")}`,
    );
  mkdirSync(fuzzFolder, { recursive: true });
  console.error(`seed ${seed}`);
  const shares = targets.reduce((sum, { share }) => sum + share, 0);
  const progress = readProgress(seed);
  for (const target of targets) {
    if (names.length > 0 && !names.includes(target.name)) continue;
    const last = names.length > 0 ? wanted : Math.ceil((wanted * target.share) / shares);
    await untilDone(target, seed, last, progress);
  }
  console.log(table(progress));
  if (Object.values(progress).some(({ count }) => count.failed > 0)) process.exitCode = 1;
}

/** Processes one after the other: a new one where an input ended the last. */
async function untilDone(target: Target, seed: number, last: number, progress: RunProgress): Promise<void> {
  const { name } = target;
  const add = (next: number, count: Count): void => {
    progress[name] = { next, count: addCounts(progress[name]?.count ?? emptyCount, count) };
    keepProgress(seed, progress);
    const { failed, seconds } = progress[name].count;
    console.error(`${name}: ${next} of ${last}, ${failed} failed, ${Math.round(seconds)} s`);
  };
  while ((progress[name]?.next ?? 0) < last) {
    const from = progress[name]?.next ?? 0;
    const stuck = await oneProcess(name, seed, from, last, add);
    if (stuck === null) continue;
    const fault = `the process ended or stood still: ${stuck.why}`;
    const file = keepFailure({
      target: name,
      seed,
      number: stuck.number,
      fault,
      input: inputOf(target, seed, stuck.number),
    });
    console.error(`FAILED ${file}\n  ${fault}`);
    // What the process tried since its last report is not known any more: only the input that failed counts.
    add(stuck.number + 1, { ...emptyCount, failed: 1, slowestNumber: stuck.number });
  }
}

/** One process from an input on; null when it came to the end, else at which input it did not. */
function oneProcess(
  name: string,
  seed: number,
  from: number,
  last: number,
  add: (next: number, count: Count) => void,
): Promise<{ readonly number: number; readonly why: string } | null> {
  const positionFile = join(fuzzFolder, `position-${process.pid}`);
  const positionNow = () => (existsSync(positionFile) ? readFileSync(positionFile, "utf8").trim() : "");
  const child = spawn(
    process.execPath,
    [
      // A small input that needs more than a gigabyte is a failure, and the process then ends.
      "--max-old-space-size=1024",
      join(root, "test/tools/run-typescript.mjs"),
      join(root, "test/fuzz/worker.ts"),
      ...[name, String(seed), String(from), String(last), positionFile],
    ],
    { cwd: root, stdio: ["ignore", "pipe", "inherit"] },
  );
  let seen = "";
  let ticks = 0;
  let killed = false;
  // Ticks, not the clock: a machine that was asleep had no time for the process either.
  const watch = setInterval(() => {
    const now = positionNow();
    if (now !== seen) [seen, ticks] = [now, 0];
    ticks += 1;
    if (ticks < hung) return;
    killed = true;
    child.kill("SIGKILL");
  }, 1000);
  createInterface({ input: child.stdout }).on("line", (line) => {
    const { next, count } = JSON.parse(line) as { next: number; count: Count };
    add(next, count);
  });
  return new Promise((resolve, reject) => {
    child.on("error", reject);
    child.on("close", (status, signal) => {
      clearInterval(watch);
      const number = Number(positionNow() || Number.NaN);
      rmSync(positionFile, { force: true });
      if (status === 0) return resolve(null);
      if (!Number.isInteger(number)) return reject(new Error(`the process did not begin: exit status ${status}`));
      return resolve({ number, why: killed ? `no end within ${hung} s` : `exit status ${status ?? signal}` });
    });
  });
}

function table(progress: RunProgress): string {
  const rows = Object.entries(progress).map(([name, { count }]) => [name, ...figures(count)]);
  const all = Object.values(progress).reduce((sum, { count }) => addCounts(sum, count), emptyCount);
  const head = ["target", "inputs", "taken", "refused", "failed", "s", "above 1 s", "slowest", "number", "MB"];
  const lines = [head, ...rows, ["all", ...figures(all)]];
  const widths = head.map((_, column) => Math.max(...lines.map((line) => (line[column] ?? "").length)));
  return lines.map((line) => line.map((word, column) => word.padStart(widths[column] ?? 0)).join("  ")).join("\n");
}

function figures({ taken, refused, failed, seconds, aboveOne, slowest, slowestNumber, megabytes }: Count): string[] {
  const counts = [taken + refused + failed, taken, refused, failed, Math.round(seconds), aboveOne];
  return [...counts.map(String), slowest.toFixed(2), String(slowestNumber), String(megabytes)];
}
