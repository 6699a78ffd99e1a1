// @ts-check
import { spawnSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";

/**
 * Runs a program to its end; throws with all it printed if it fails.
 * @param {string} program
 * @param {readonly string[]} parameters
 * @param {string} [folder] where it runs
 * @returns {string} what it printed
 */
export function runProgram(program, parameters, folder = root) {
  // On Windows npm and pnpm are command files, which only a shell starts.
  const shell = process.platform === "win32" && program !== process.execPath;
  const run = spawnSync(program, parameters, { cwd: folder, encoding: "utf8", shell });
  if (run.error) throw run.error;
  if (run.status === 0) return run.stdout;
  throw new Error(`${program} ${parameters.join(" ")} ended with ${run.status}\n${run.stdout}${run.stderr}`);
}

/**
 * Runs the pinned pnpm: the one on the path, or the one that npm keeps.
 * @param {readonly string[]} parameters
 * @param {string} [folder]
 */
export function runPnpm(parameters, folder = root) {
  const { packageManager } = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));
  if (process.env["npm_config_user_agent"]?.startsWith(packageManager.replace("@", "/"))) {
    return runProgram("pnpm", parameters, folder);
  }
  const fetch = ["exec", "--yes", "--prefer-offline", `--package=${packageManager}`, "--", "pnpm"];
  return runProgram("npm", [...fetch, ...parameters], folder);
}
