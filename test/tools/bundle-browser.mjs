// @ts-check
import { gzipSync } from "node:zlib";
import { build } from "esbuild";

/**
 * A program bundled for a browser, as its users would: minified ES modules, `import()` in pieces of their own.
 * @typedef {{files: ReadonlyMap<string, Uint8Array>, entries: readonly string[], start: ReadonlyMap<string, readonly string[]>}} BrowserBundle
 */

/**
 * @param {import("esbuild").BuildOptions} options entry points or `stdin`, and where packages are looked for
 * @returns {Promise<BrowserBundle>} the files by name, the entries, and which files each entry loads at its start
 */
export async function browserBundle(options) {
  const { outputFiles = [], metafile } = await build({
    bundle: true,
    splitting: true,
    format: "esm",
    platform: "browser",
    target: "es2022",
    minify: true,
    outdir: "/out",
    write: false,
    metafile: true,
    logLevel: "warning",
    ...options,
  });
  const nameOf = (/** @type {string} */ path) => path.slice(path.lastIndexOf("/") + 1);
  const outputs = Object.entries(metafile?.outputs ?? {}).map(([path, output]) => ({ name: nameOf(path), ...output }));
  // Files that are loaded by import() are entries too, by esbuild's counting: the user's are in no package.
  const entries = outputs
    .filter(({ entryPoint }) => entryPoint !== undefined && !/\/(?:dist|node_modules)\//.test(entryPoint))
    .map(({ name }) => name);
  const loads = new Map(
    outputs.map(({ name, imports }) => [
      name,
      imports.filter(({ kind }) => kind === "import-statement").map(({ path }) => nameOf(path)),
    ]),
  );
  return {
    files: new Map(outputFiles.map(({ path, contents }) => [nameOf(path.replaceAll("\\", "/")), contents])),
    entries,
    start: new Map(entries.map((entry) => [entry, [...reached(entry, loads)]])),
  };
}

/**
 * @param {string} first
 * @param {ReadonlyMap<string, readonly string[]>} loads
 */
function reached(first, loads) {
  const found = new Set([first]);
  // A set goes on to what is added while it is walked.
  for (const name of found) for (const next of loads.get(name) ?? []) found.add(next);
  return found;
}

/**
 * Kilobytes (1000 bytes) of files, each compressed as a server sends it.
 * @param {BrowserBundle} bundle
 * @param {Iterable<string>} [names]
 */
export function compressedKilobytes({ files }, names = files.keys()) {
  let size = 0;
  for (const name of names) size += gzipSync(files.get(name) ?? new Uint8Array()).length;
  return size / 1000;
}
