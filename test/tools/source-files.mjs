// @ts-check
import { readdirSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";

/** Folders whose content nobody edits: fetched, built, or generated. */
const notEdited = new Set(["node_modules", "dist", "bin", "generated", "fixtures", ".git"]);

/**
 * Every edited program file under a folder of the repository, as sorted paths with `/` relative to the repository.
 * @param {string} folder relative to the repository
 * @param {string} [base] the repository
 * @returns {string[]}
 */
export function sourceFiles(folder, base = root) {
  /** @type {string[]} */
  const found = [];
  visit(folder);
  return found.sort();

  /** @param {string} path */
  function visit(path) {
    for (const entry of entries(join(base, path))) {
      if (entry.isDirectory() && !notEdited.has(entry.name)) visit(`${path}/${entry.name}`);
      else if (entry.isFile() && /\.(?:ts|mjs|js)$/.test(entry.name)) found.push(`${path}/${entry.name}`);
    }
  }
}

/** @param {string} path */
function entries(path) {
  try {
    return readdirSync(path, { withFileTypes: true });
  } catch (error) {
    if (/** @type {NodeJS.ErrnoException} */ (error).code === "ENOENT") return [];
    throw error;
  }
}
