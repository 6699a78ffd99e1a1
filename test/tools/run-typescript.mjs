// @ts-check
/**
 * `node test/tools/run-typescript.mjs FILE.ts [arguments]` runs a TypeScript program of this repository, bundled by
 * esbuild with core from its source: long runs go at the full speed of plain JavaScript, without a test runner.
 * `import.meta.url` keeps meaning the place of the source file, and `#core/…` the inside of core.
 */
import { mkdirSync, readFileSync, rmSync } from "node:fs";
import { basename, join, resolve } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "esbuild";
import { root } from "./paths.mjs";

const [, , program, ...rest] = process.argv;
if (!program) throw new Error("expected a TypeScript file to run");

/** @type {import("esbuild").Plugin} */
const keepPlaces = {
  name: "keep-places",
  setup(bundle) {
    bundle.onLoad({ filter: /[\\/]test[\\/].*\.(?:ts|mjs)$/ }, ({ path }) => {
      const text = readFileSync(path, "utf8");
      const contents = text.replaceAll("import.meta.url", JSON.stringify(pathToFileURL(path).href));
      return { contents, loader: path.endsWith(".ts") ? "ts" : "js" };
    });
    bundle.onResolve({ filter: /^#core\// }, ({ path, kind }) =>
      bundle.resolve(`./packages/core/src/${path.slice("#core/".length)}`, { resolveDir: root, kind }),
    );
  },
};

const { devDependencies } = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));
const folder = join(root, "node_modules/.cache/kvane");
mkdirSync(folder, { recursive: true });
const outfile = join(folder, `${basename(program, ".ts")}-${process.pid}.mjs`);
await build({
  absWorkingDir: root,
  entryPoints: [resolve(program)],
  outfile,
  bundle: true,
  format: "esm",
  platform: "node",
  target: "node20.19",
  conditions: ["kvane-source"],
  external: Object.keys(devDependencies).filter((name) => name !== "@kvane/core"),
  sourcemap: "inline",
  plugins: [keepPlaces],
  logLevel: "warning",
});
process.once("exit", () => rmSync(outfile, { force: true }));
process.argv = [process.execPath, resolve(program), ...rest];
process.setSourceMapsEnabled(true);
await import(pathToFileURL(outfile).href);
