// @ts-check
/**
 * How long the built command takes as a whole process, over a bare `node -e 0` measured in turn with it: ratios, because
 * seconds differ from machine to machine. `node test/bench/run.mjs [pairs] [words of a name]`.
 */
import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";
import { benches } from "./benches.mjs";

const pairs = Number(process.argv[2] ?? 15);
const wanted = process.argv[3] ?? "";
const command = join(root, "packages/cli/bin/kvane.js");

/**
 * Wall time of one whole process in milliseconds.
 * @param {readonly string[]} parameters
 * @param {boolean} mustSucceed
 */
function timeOf(parameters, mustSucceed = true) {
  const start = process.hrtime.bigint();
  const run = spawnSync(process.execPath, parameters, { encoding: "utf8", cwd: root });
  const time = Number(process.hrtime.bigint() - start) / 1e6;
  if (mustSucceed && run.status !== 0) throw new Error(run.stderr || run.stdout || `ended with ${run.status}`);
  return time;
}

/** @param {readonly number[]} values */
function median(values) {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? Number.NaN;
  return sorted.length % 2 ? upper : ((sorted[middle - 1] ?? Number.NaN) + upper) / 2;
}

/** @param {readonly string[]} parameters */
function measure(parameters) {
  timeOf([command, ...parameters]);
  /** @type {number[]} */
  const bare = [];
  /** @type {number[]} */
  const whole = [];
  for (let pair = 0; pair < pairs; pair += 1) {
    bare.push(timeOf(["-e", "0"]));
    whole.push(timeOf([command, ...parameters]));
  }
  const ratios = whole.map((time, index) => time / (bare[index] ?? Number.NaN));
  return {
    ratio: median(whole) / median(bare),
    least: Math.min(...ratios),
    most: Math.max(...ratios),
    bare: median(bare),
    whole: median(whole),
  };
}

const columns = ["ratio", "least", "most", "bare ms", "command ms"];
const rows = benches.filter(({ name }) => name.includes(wanted));
const width = Math.max(...rows.map(({ name }) => name.length));
console.log(`Whole process over a bare node, ${pairs} pairs each; ratio is that of the medians.\n`);
console.log(["command".padEnd(width), ...columns.map((column) => column.padStart(10))].join("  "));
for (const { name, parameters } of rows) {
  try {
    const { ratio, least, most, bare, whole } = measure(parameters);
    const cells = [ratio.toFixed(2), least.toFixed(2), most.toFixed(2), bare.toFixed(1), whole.toFixed(1)];
    console.log([name.padEnd(width), ...cells.map((cell) => cell.padStart(10))].join("  "));
  } catch (error) {
    console.log(`${name.padEnd(width)}  failed: ${String(error).split("\n")[0]}`);
    process.exitCode = 1;
  }
}

// What happens inside one process: irreps beside those of a computer-algebra system, the search beside its dense grid,
// weighing as it grows.
for (const inside of ["irreps", "search", "weighing"]) {
  if (wanted !== "" && !inside.includes(wanted)) continue;
  const program = [join(root, "test/tools/run-typescript.mjs"), join(root, `test/bench/${inside}.ts`)];
  const { status } = spawnSync(process.execPath, program, { stdio: "inherit", cwd: root });
  if (status !== 0) process.exitCode = 1;
}
