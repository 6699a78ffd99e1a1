// @ts-check
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";
import { innerRooms, roomTable } from "./room-table.mjs";

/**
 * One version and one licence everywhere, and one subpath of core for every public room that exists.
 * @param {readonly string[]} rooms the folders of core that exist
 * @param {string} [base] the repository
 */
export function manifestProblems(rooms, base = root) {
  const { version } = manifest("package.json");
  /** @type {string[]} */
  const problems = [];
  for (const file of ["packages/core/package.json", "packages/cli/package.json"]) {
    if (manifest(file).version !== version) problems.push(`${file}: version is not ${version}`);
  }
  const licence = text("LICENSE");
  // Packing takes only what stands in the folder of the package.
  for (const file of ["packages/core/LICENSE", "packages/cli/LICENSE"]) {
    if (text(file) !== licence) problems.push(`${file}: differs from LICENSE`);
  }
  const citation = /^version: (.*)$/m.exec(text("CITATION.cff"))?.[1];
  if (citation !== version) problems.push(`CITATION.cff: version is not ${version}`);

  const subpaths = Object.keys(manifest("packages/core/package.json").exports);
  for (const room of Object.keys(roomTable)) {
    const expected = rooms.includes(room) && !innerRooms.includes(room);
    if (subpaths.includes(`./${room}`) !== expected) {
      problems.push(`packages/core/package.json: ${expected ? "misses" : "must not have"} the subpath ./${room}`);
    }
  }
  return problems;

  /** @param {string} file */
  function manifest(file) {
    return JSON.parse(text(file));
  }

  /** @param {string} file */
  function text(file) {
    return readFileSync(join(base, file), "utf8");
  }
}
