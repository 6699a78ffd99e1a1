// @ts-check
import { cpSync, readdirSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";
import { runProgram } from "./run-program.mjs";

const examples = join(root, "docs/examples/embedding");

/**
 * What a stranger does from JavaScript with both packages installed in a project, with any Node. Throws where something
 * does not work.
 * @param {string} project folder of the project
 * @param {string} node program
 * @param {readonly {entry: string, name: string, kind: "value" | "type"}[]} names what core exports
 * @returns {{answer: string, printed: string}} the JSON of the whole job of the bundled example, and what the example of
 *   a worker prints
 */
export function usePacked(project, node, names) {
  const run = (/** @type {readonly string[]} */ ...parameters) => runProgram(node, parameters, project);
  const missing = run(writeImports(project, names));
  if (missing !== "") throw new Error(missing);
  const loaded = run(writeCommonJs(project));
  if (loaded !== "2 2 [object Module]\n") throw new Error(`CommonJS gives ${loaded}`);
  cpSync(examples, join(project, "embedding"), { recursive: true });
  const study = join(project, "node_modules/@kvane/cli/example/study.yaml");
  const command = join(project, "node_modules/@kvane/cli/bin/kvane.js");
  return {
    answer: run(command, "run", "--example", "--json"),
    printed: run("embedding/worker-threads.mjs", study),
  };
}

/**
 * Every public value from its own entry, no more and no less.
 * @param {string} project
 * @param {readonly {entry: string, name: string, kind: "value" | "type"}[]} names
 */
function writeImports(project, names) {
  const entries = [...new Set(names.map(({ entry }) => entry))];
  const checks = entries.map((entry) => [
    entry,
    names.filter((each) => each.entry === entry && each.kind === "value").map(({ name }) => name),
  ]);
  const program = `for (const [entry, names] of ${JSON.stringify(checks)}) {
    const found = Object.keys(await import(entry));
    for (const name of names) if (!found.includes(name)) console.log(entry, "misses", name);
    for (const name of found) if (!names.includes(name)) console.log(entry, "has unlisted", name);
  }`;
  writeFileSync(join(project, "imports.mjs"), program);
  return "imports.mjs";
}

/**
 * A program in CommonJS, which gets ES modules by `import()`.
 * @param {string} project
 */
function writeCommonJs(project) {
  const program = `"use strict";
void (async () => {
  const { parseGroup } = await import("@kvane/core/spacegroups");
  const { parseWaveVector, placeWaveVector } = await import("@kvane/core/kvectors");
  const { smallIrreps } = await import("@kvane/core/irreps");
  const group = parseGroup("P n m a");
  const { irreps } = smallIrreps(group, placeWaveVector(group, parseWaveVector("0,1/2,0")).k);
  const whole = await import("@kvane/core");
  console.log(irreps.map(({ dimension }) => dimension).join(" "), Object.prototype.toString.call(whole));
})();
`;
  writeFileSync(join(project, "commonjs.cjs"), program);
  return "commonjs.cjs";
}

/**
 * Bytes of a folder with all in it.
 * @param {string} folder
 * @returns {number}
 */
export function bytesIn(folder) {
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .reduce((sum, { parentPath, name }) => sum + statSync(join(parentPath, name)).size, 0);
}
