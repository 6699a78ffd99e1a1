import { spawn } from "node:child_process";
import { once } from "node:events";
import { readFileSync } from "node:fs";
import { batchRequest } from "./batch-requests.js";

/**
 * Resident memory in MB of one `kvane batch` after so many answers. Requests are sent as they are taken. Linux only: it
 * is read from /proc.
 *
 * @param at counts of answers, in rising order; the last is the number of requests
 */
export async function measureBatch(commandFile: string, at: readonly number[]): Promise<number[]> {
  const child = spawn(process.execPath, [commandFile, "batch", "--quiet"], { stdio: ["pipe", "pipe", "inherit"] });
  const ended = once(child, "close");
  const found: number[] = [];
  let answers = 0;
  let paused = () => {};
  child.stdout.on("data", (part: Buffer) => {
    for (const byte of part)
      if (byte === 10) {
        answers += 1;
        if (answers === at[found.length]) found.push(residentMegabytes(child.pid));
      }
    paused();
  });
  const count = at.at(-1) ?? 0;
  for (let number = 0; number < count; number++) {
    child.stdin.write(`${JSON.stringify(batchRequest(number))}\n`);
    // Few on their way, so that the process still runs when its last answer is counted.
    while (number - answers > 20)
      await new Promise<void>((resolve) => {
        paused = resolve;
      });
  }
  while (answers < count)
    await new Promise<void>((resolve) => {
      paused = resolve;
    });
  child.stdin.end();
  await ended;
  return found;
}

function residentMegabytes(pid: number | undefined): number {
  return Number(/VmRSS:\s+(\d+)/.exec(readFileSync(`/proc/${pid}/status`, "utf8"))?.[1]) / 1024;
}
