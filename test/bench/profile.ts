import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";
import { median } from "./paired.js";
import type { Part } from "./part.js";
import type { ProfiledJob } from "./profile-child.js";

/**
 * Where the whole job spends its time: the bundled example answered in a process of its own by the built core, self times of
 * the profiler added up by room, over all of it.
 */
export const profile: Part = {
  name: "profile",
  measure: async ({ few }) => {
    const jobs = Array.from({ length: few }, profiledJob);
    const names = [...new Set(jobs.flatMap(({ shares }) => Object.keys(shares)))];
    const rows = names
      .map((name) => ({
        what: `profile, ${name}`,
        over: "the whole job",
        ratios: jobs.map(({ shares }) => shares[name] ?? 0),
      }))
      .sort((a, b) => median(b.ratios) - median(a.ratios));
    const time = median(jobs.map(({ milliseconds }) => milliseconds)).toFixed(0);
    return { rows, notes: [`the whole job, the bundled example in process, took ${time} ms under the profiler`] };
  },
};

function profiledJob(): ProfiledJob {
  const program = [join(root, "test/tools/run-typescript.mjs"), join(root, "test/bench/profile-child.ts")];
  const { status, stdout, stderr } = spawnSync(process.execPath, program, { encoding: "utf8", cwd: root });
  if (status !== 0) throw new Error(stderr || `the profiled job ended with ${status}`);
  return JSON.parse(stdout) as ProfiledJob;
}
