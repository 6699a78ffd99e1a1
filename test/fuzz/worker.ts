/**
 * Tries the inputs of one target, for run.ts: `worker.ts TARGET SEED FROM TO FILE`. The number of the input that is being
 * tried stands in FILE before it is tried, so that one that hangs or ends the process is known; each batch is told as a
 * line of JSON.
 */
import { openSync, writeSync } from "node:fs";
import { keepFailure } from "./failures.js";
import { emptyCount } from "./progress.js";
import { targets } from "./targets.js";
import { inputOf, tryInput } from "./try-input.js";

const [name, seedText, from, to, positionFile] = process.argv.slice(2) as [string, string, string, string, string];
const target = targets.find((one) => one.name === name);
if (target === undefined) throw new Error(`no target is called ${name}`);
const seed = Number(seedText);
const position = openSync(positionFile, "w");

/** Milliseconds between two reports. */
const pause = 2_000;

let count = emptyCount;
let told = Date.now();
for (let number = Number(from); number < Number(to); number += 1) {
  writeSync(position, String(number).padEnd(12), 0);
  const input = inputOf(target, seed, number);
  const { outcome, fault, seconds } = await tryInput(target, input);
  if (fault !== null) {
    const file = keepFailure({ target: name, seed, number, fault, input });
    console.error(`FAILED ${file}\n  ${fault.split("\n").slice(0, 3).join("\n  ")}`);
  }
  count = {
    ...count,
    [outcome]: count[outcome] + 1,
    seconds: count.seconds + seconds,
    aboveOne: count.aboveOne + (seconds > 1 ? 1 : 0),
    ...(seconds > count.slowest ? { slowest: seconds, slowestNumber: number } : {}),
    megabytes: Math.max(count.megabytes, number % 100 === 0 ? Math.round(process.memoryUsage.rss() / 2 ** 20) : 0),
  };
  if (Date.now() - told < pause && number + 1 < Number(to)) continue;
  console.log(JSON.stringify({ next: number + 1, count }));
  count = emptyCount;
  told = Date.now();
}
