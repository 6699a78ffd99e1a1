/**
 * Answers the bundled example once under the profiler, from the first module of the built core to the files of the result,
 * and prints the shares of the rooms as JSON. `profile.ts` starts it, since modules load once in a process.
 */
import { readFileSync } from "node:fs";
import { Session } from "node:inspector/promises";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { root } from "../tools/paths.mjs";
import { type Shares, sharesOf } from "./profile-shares.js";

/** One profiled job. */
export interface ProfiledJob {
  readonly milliseconds: number;
  readonly shares: Shares;
}

type Job = typeof import("@kvane/core/job");
type Reports = typeof import("@kvane/core/reports");

const core = join(root, "packages/core/dist");
const example = join(root, "packages/cli/example");

/** A room of the built core; the name is made here, so that no bundle has it from the source. */
function room<T>(name: string): Promise<T> {
  return import(pathToFileURL(join(core, name, "index.js")).href) as Promise<T>;
}

async function wholeJob(): Promise<void> {
  const { answer } = await room<Job>("job");
  const answered = await answer(
    { command: "run", study: "study.yaml", files: true },
    { readText: async (path) => readFileSync(join(example, path), "utf8") },
  );
  if (answered.errors.length > 0) throw new Error(JSON.stringify(answered.errors));
  const { reportText, resultFolder } = await room<Reports>("reports");
  await reportText(answered);
  await resultFolder(answered as Parameters<typeof resultFolder>[0]);
}

// Maps of the sources would be read with every module.
process.setSourceMapsEnabled(false);
const session = new Session();
session.connect();
await session.post("Profiler.enable");
await session.post("Profiler.setSamplingInterval", { interval: 250 });
await session.post("Profiler.start");
await wholeJob();
const { profile } = await session.post("Profiler.stop");
const found: ProfiledJob = {
  milliseconds: (profile.endTime - profile.startTime) / 1000,
  shares: sharesOf(profile, core),
};
process.stdout.write(JSON.stringify(found));
