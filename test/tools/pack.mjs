// @ts-check
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { root } from "./paths.mjs";
import { runPnpm, runProgram } from "./run-program.mjs";

/**
 * Packs core and the command as they would be published and installs both into an empty project. The packages that core
 * depends on are packed from the workspace's own copies, so that no network is needed.
 * @param {string} folder an empty folder
 * @returns {string} the folder of the project
 */
export function packAndInstall(folder) {
  const packed = join(folder, "packed");
  const project = join(folder, "project");
  mkdirSync(packed, { recursive: true });
  mkdirSync(project, { recursive: true });
  for (const name of ["core", "cli"]) {
    runPnpm(["--silent", "pack", "--pack-destination", packed], join(root, "packages", name));
  }
  for (const dependency of runtimeDependencies()) {
    const copy = join(root, "packages/core/node_modules", dependency);
    runProgram("npm", ["pack", "--ignore-scripts", "--pack-destination", packed, resolve(copy)], folder);
  }
  writeFileSync(join(project, "package.json"), '{"name": "project", "private": true, "type": "module"}\n');
  const files = readdirSync(packed).map((file) => join(packed, file));
  runProgram("npm", ["install", "--offline", "--no-audit", "--no-fund", ...files], project);
  return project;
}

function runtimeDependencies() {
  const { dependencies } = JSON.parse(readFileSync(join(root, "packages/core/package.json"), "utf8"));
  return Object.keys(dependencies ?? {});
}
