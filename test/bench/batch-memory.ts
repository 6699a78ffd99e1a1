import { join } from "node:path";
import { measureBatch } from "../support/measure-batch.js";
import { root } from "../tools/paths.mjs";

/**
 * Whether `kvane batch` grows: its resident memory after 1000 and 10 000 requests of a varied stream, on Linux and after
 * a build. `node test/tools/run-typescript.mjs test/bench/batch-memory.ts`
 */
const counts = [100, 1000, 2500, 5000, 7500, 10_000];
const start = Date.now();
const found = await measureBatch(join(root, "packages/cli/bin/kvane.js"), counts);
for (const [index, count] of counts.entries())
  console.log(`${String(count).padStart(6)} requests  ${found[index]?.toFixed(0)} MB`);
console.log(`${((Date.now() - start) / counts[counts.length - 1]!).toFixed(1)} ms a request`);
