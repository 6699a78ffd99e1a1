// @ts-check
import { cpSync, mkdirSync, readdirSync, readFileSync, realpathSync, writeFileSync } from "node:fs";
import { join } from "node:path";
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
  let count = 0;
  for (const copy of runtimeDependencies()) {
    // By tar and not by `npm pack`, which fails on some packages that are published already.
    const parent = join(folder, `copy-${count}`);
    cpSync(copy, join(parent, "package"), { recursive: true });
    runProgram("tar", ["-czf", join(packed, `dependency-${count}.tgz`), "-C", parent, "package"], folder);
    count += 1;
  }
  writeFileSync(join(project, "package.json"), '{"name": "project", "private": true, "type": "module"}\n');
  const files = readdirSync(packed).map((file) => join(packed, file));
  runProgram("npm", ["install", "--offline", "--no-audit", "--no-fund", ...files], project);
  return project;
}

/** Folders of the packages that core needs, with those that they need in turn. */
function runtimeDependencies() {
  const core = join(root, "packages/core");
  const found = new Set(dependenciesOf(core).map((name) => realpathSync(join(core, "node_modules", name))));
  // A set goes on to what is added while it is walked. pnpm puts what a package needs beside it.
  for (const copy of found) {
    const beside = copy.slice(0, copy.lastIndexOf("node_modules") + "node_modules".length);
    for (const name of dependenciesOf(copy)) found.add(realpathSync(join(beside, name)));
  }
  return found;
}

/** @param {string} folder of a package */
function dependenciesOf(folder) {
  const { dependencies } = JSON.parse(readFileSync(join(folder, "package.json"), "utf8"));
  return Object.keys(dependencies ?? {});
}
