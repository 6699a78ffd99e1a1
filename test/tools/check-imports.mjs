// @ts-check
import { readFileSync } from "node:fs";
import { join, posix } from "node:path";
import { root } from "./paths.mjs";
import { readImports } from "./read-imports.mjs";
import { innerRooms, lazyPackages, packageImporters, roomTable } from "./room-table.mjs";
import { sourceFiles } from "./source-files.mjs";

const core = "packages/core/src";

/**
 * Every import of core that the table of rooms forbids, as `file:line: what is wrong`.
 * @param {string} [base] the repository
 * @returns {string[]}
 */
export function importProblems(base = root) {
  /** @type {string[]} */
  const problems = [];
  /** @type {Map<string, string[]>} */
  const graph = new Map();
  for (const file of sourceFiles(core, base)) {
    /** @type {string[]} */
    const loads = [];
    for (const found of readImports(file, readFileSync(join(base, file), "utf8"))) {
      const wrong = problemOf(file, found);
      if (wrong) problems.push(`${file}:${found.line}: ${wrong}`);
      const loaded = found.specifier.startsWith(".") && !found.typeOnly && !found.lazy;
      if (loaded) loads.push(resolveFile(file, found.specifier));
    }
    graph.set(file, loads);
  }
  const ring = importRing(graph);
  if (ring) problems.push(`${ring[0]}: import ring ${ring.join(" → ")}`);
  return problems;
}

/**
 * What is wrong with one import, or null.
 * @param {string} file
 * @param {import("./read-imports.mjs").Import} found
 * @returns {string | null}
 */
export function problemOf(file, found) {
  const room = roomOf(file);
  if (room !== "" && !roomTable[room]) return `"${room}" is not in the table of rooms (test/tools/room-table.mjs)`;
  if (!found.specifier.startsWith(".")) return packageProblem(room, found);
  if (!found.specifier.endsWith(".js")) return `"${found.specifier}" must name its file with the ending .js`;
  const target = resolveFile(file, found.specifier);
  if (!target.startsWith(`${core}/`)) return `"${found.specifier}" leads out of core`;
  const other = roomOf(target);
  if (other === room) return null;
  if (other === "") return "a room must not import the root of the package";
  if (target !== `${core}/${other}/index.ts`)
    return `"${found.specifier}" goes past the door of ${other} (its index.ts)`;
  if (room === "") return innerRooms.includes(other) ? `${other} is no public room` : null;
  const permission = roomTable[room];
  const allowed = found.typeOnly ? permission?.types : permission?.values;
  if (allowed === "any" || allowed?.includes(other)) return null;
  return `${room} may not import ${found.typeOnly ? "types" : "values"} from ${other}`;
}

/**
 * @param {string} room
 * @param {import("./read-imports.mjs").Import} found
 */
function packageProblem(room, found) {
  const name = /^(?:@[^/]+\/)?[^/]+/.exec(found.specifier)?.[0] ?? found.specifier;
  const importer = Object.entries(packageImporters).find(([key]) => key === name)?.[1];
  if (importer !== room) return `${room || "the root"} may not import the package "${found.specifier}"`;
  const eager = !found.typeOnly && !found.lazy;
  return eager && lazyPackages.includes(name) ? `"${name}" is loaded only by import(), off the start` : null;
}

/** @param {string} file */
function roomOf(file) {
  const inside = file.slice(core.length + 1);
  return inside.includes("/") ? inside.slice(0, inside.indexOf("/")) : "";
}

/**
 * @param {string} file
 * @param {string} specifier
 */
function resolveFile(file, specifier) {
  return posix.join(posix.dirname(file), specifier).replace(/\.js$/, ".ts");
}

/**
 * One closed path of the graph, or null.
 * @param {ReadonlyMap<string, readonly string[]>} graph
 */
function importRing(graph) {
  /** @type {Set<string>} */
  const done = new Set();
  /** @type {string[]} */
  const path = [];
  for (const start of graph.keys()) {
    const ring = follow(start);
    if (ring) return ring;
  }
  return null;

  /**
   * @param {string} file
   * @returns {string[] | null}
   */
  function follow(file) {
    const at = path.indexOf(file);
    if (at >= 0) return [...path.slice(at), file];
    if (done.has(file)) return null;
    path.push(file);
    for (const next of graph.get(file) ?? []) {
      const ring = follow(next);
      if (ring) return ring;
    }
    path.pop();
    done.add(file);
    return null;
  }
}
