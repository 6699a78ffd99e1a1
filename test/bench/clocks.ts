import { spawnSync } from "node:child_process";
import { root } from "../tools/paths.mjs";

/** Processor time in milliseconds that the work takes in this process, all its threads together. */
export async function processorTime(work: () => unknown): Promise<number> {
  const start = process.cpuUsage();
  await work();
  const { user, system } = process.cpuUsage(start);
  return (user + system) / 1000;
}

/** Wall time in milliseconds of `node` with these parameters, from its start to its end. */
export function processTime(parameters: readonly string[]): number {
  const start = process.hrtime.bigint();
  const { status, stdout, stderr } = spawnSync(process.execPath, parameters, { encoding: "utf8", cwd: root });
  const time = Number(process.hrtime.bigint() - start) / 1e6;
  if (status !== 0) throw new Error(stderr || stdout || `node ${parameters.join(" ")} ended with ${status}`);
  return time;
}
