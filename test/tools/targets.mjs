// @ts-check
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { packAndInstall } from "./pack.mjs";
import { root } from "./paths.mjs";

/**
 * What the tests run on: `source` (needs no build), `dist` (after `npm run build`) or `packed`
 * (packs both packages, installs them into an empty folder and takes them from there).
 * @typedef {"source" | "dist" | "packed"} TargetName
 * @typedef {{name: TargetName, coreFolder: string, command: string, entry: (room: string) => string}} Target
 */

/** @returns {TargetName} */
export function targetFromEnvironment() {
  const name = process.env["KVANE_TEST_TARGET"] || "source";
  if (name === "source" || name === "dist" || name === "packed") return name;
  throw new Error(`KVANE_TEST_TARGET is "${name}"; expected source, dist or packed`);
}

/**
 * @param {TargetName} name
 * @returns {Target}
 */
export function resolveTarget(name) {
  const command = join(root, "packages/cli/bin/kvane.js");
  if (name === "source") return target(name, join(root, "packages/core/src"), command);
  if (name === "dist") return target(name, join(root, "packages/core/dist"), command);
  const folder = mkdtempSync(join(tmpdir(), "kvane-packed-"));
  process.once("exit", () => rmSync(folder, { recursive: true, force: true }));
  const installed = join(packAndInstall(folder), "node_modules/@kvane");
  return target(name, join(installed, "core/dist"), join(installed, "cli/bin/kvane.js"));
}

/**
 * @param {TargetName} name
 * @param {string} coreFolder where the folders of the rooms are
 * @param {string} command the file of the command
 * @returns {Target}
 */
function target(name, coreFolder, command) {
  const extension = name === "source" ? "ts" : "js";
  const entry = (/** @type {string} */ room) => `${coreFolder}/${room === "" ? "" : `${room}/`}index.${extension}`;
  return { name, coreFolder, command, entry };
}
