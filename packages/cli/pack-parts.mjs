// @ts-check
import { basename } from "node:path";
import { build } from "esbuild";

const start = "kvane.js";

/**
 * Turns the parts of a split bundle, which are ES modules, into CommonJS files: kvane.js takes in all that it imports and
 * all that the `early` sources do, and offers it to the other parts, each piece under a name of its own.
 *
 * @param {object} bundle
 * @param {import("esbuild").Metafile["outputs"]} bundle.outputs
 * @param {readonly import("esbuild").OutputFile[]} bundle.files
 * @param {readonly string[]} bundle.early sources that `import()` loads, as the metafile names them
 * @param {import("esbuild").BuildOptions & {write: false}} bundle.options how the files are written
 * @returns {Promise<{name: string, text: string}[]>} kvane.js last
 */
export async function packParts({ outputs, files, early, options }) {
  const texts = new Map(files.map(({ path, text }) => [basename(path), text]));
  const parts = new Map(Object.entries(outputs).map(([path, output]) => [basename(path), output]));
  const sources = new Set(early);
  const offered = new Set([...parts.values()].map(({ entryPoint = "" }) => entryPoint));
  const gone = early.filter((source) => !offered.has(source));
  if (gone.length > 0) throw new Error(`no \`import()\` loads ${gone.join(", ")}`);
  const inStart = closure(
    parts,
    [...parts].filter(([name, { entryPoint = "" }]) => name === start || sources.has(entryPoint)),
  );
  const rest = [...texts.keys()].filter((name) => !inStart.has(name));
  const pieces = [...importedBy(parts, rest)].filter((name) => inStart.has(name)).sort();
  const entry = startText(pieces.map((name) => ({ name, names: parts.get(name)?.exports ?? [] })));

  /** @type {import("esbuild").Plugin} */
  const arrange = {
    name: "arrange",
    setup(bundle) {
      bundle.onResolve({ filter: /^(?:\.\/)?(?:kvane|part-[^/]*)\.js$|^start$/ }, ({ path, importer, namespace }) => {
        const name = basename(path);
        if (namespace === "offered" || (importer !== "" && !inStart.has(name)))
          return { path: `./${name}`, external: true };
        const offered = importer !== "" && importer !== "start" && !inStart.has(importer);
        return { path: name, namespace: offered ? "offered" : "part" };
      });
      bundle.onLoad({ filter: /./, namespace: "part" }, ({ path }) => ({
        contents: path === "start" ? entry : (texts.get(path) ?? ""),
        resolveDir: options.absWorkingDir ?? "",
      }));
      bundle.onLoad({ filter: /./, namespace: "offered" }, ({ path }) => ({
        contents: `module.exports = require("./${start}").pieces[${pieces.indexOf(path)}]();`,
      }));
    },
  };
  const { outputFiles } = await build({
    ...options,
    entryPoints: [{ in: "start", out: "kvane" }, ...rest.map((name) => ({ in: name, out: name.slice(0, -3) }))],
    format: "cjs",
    supported: { "dynamic-import": false },
    plugins: [arrange],
  });
  return outputFiles
    .map(({ path, text }) => ({
      name: basename(path),
      text: `${basename(path) === start ? shebang : ""}${strict}${text}`,
    }))
    .sort((a, b) => Number(a.name === start) - Number(b.name === start));
}

const shebang = "#!/usr/bin/env node\n";

/** As in modules. */
const strict = '"use strict";';

/**
 * The start, and what it offers: for each piece a function that gives what it exports, because few commands ask for any
 * and a namespace, with a getter for each of hundreds of names, takes a fiftieth of a quick command's time. Nothing of
 * the source exports what changes.
 * @param {readonly {readonly name: string, readonly names: readonly string[]}[]} pieces
 */
function startText(pieces) {
  const imports = pieces.map(
    ({ name, names }, index) =>
      `import { ${names.map((one) => `${one} as p${index}${one}`).join(", ")} } from "./${name}";`,
  );
  const offers = pieces.map(
    ({ names }, index) => `() => ({ ${names.map((one) => `${one}: p${index}${one}`).join(", ")} })`,
  );
  return [...imports, `import "./${start}";`, `export const pieces = [${offers.join(", ")}];`].join("\n");
}

/**
 * What these parts import, one way or the other.
 * @param {Map<string, import("esbuild").Metafile["outputs"][string]>} parts
 * @param {readonly string[]} names
 */
function importedBy(parts, names) {
  return new Set(names.flatMap((name) => parts.get(name)?.imports ?? []).map(({ path }) => basename(path)));
}

/**
 * These parts and all that they import, without what `import()` loads.
 * @param {Map<string, import("esbuild").Metafile["outputs"][string]>} parts
 * @param {readonly (readonly [string, unknown])[]} from
 */
function closure(parts, from) {
  const found = new Set(from.map(([name]) => name));
  // A set goes on to what is added while it is walked.
  for (const name of found)
    for (const { path, kind } of parts.get(name)?.imports ?? [])
      if (kind === "import-statement" && parts.has(basename(path))) found.add(basename(path));
  return found;
}
