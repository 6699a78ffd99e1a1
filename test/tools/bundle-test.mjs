// @ts-check
import { readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "esbuild";
import { root } from "./paths.mjs";

// Put together, so that this file may be bundled by its own rule.
const placeWords = ["import", "meta", "url"].join(".");

/**
 * The words for the place of a module keep meaning that of the source file, and `#core/…` the inside of core.
 * @type {import("esbuild").Plugin}
 */
const keepPlaces = {
  name: "keep-places",
  setup(bundle) {
    bundle.onLoad({ filter: /[\\/]test[\\/].*\.(?:ts|mjs)$/ }, ({ path }) => {
      const text = readFileSync(path, "utf8");
      const contents = text.replaceAll(placeWords, JSON.stringify(pathToFileURL(path).href));
      return { contents, loader: path.endsWith(".ts") ? "ts" : "js" };
    });
    bundle.onResolve({ filter: /^#core\// }, ({ path, kind }) =>
      bundle.resolve(`./packages/core/src/${path.slice("#core/".length)}`, { resolveDir: root, kind }),
    );
  },
};

const { devDependencies } = JSON.parse(readFileSync(join(root, "package.json"), "utf8"));

/**
 * How a TypeScript program of this repository is bundled with core from its source.
 * @param {string} program path, absolute or from the root of the repository
 * @returns {import("esbuild").BuildOptions}
 */
export function testBundle(program) {
  return {
    absWorkingDir: root,
    entryPoints: [resolve(root, program)],
    bundle: true,
    format: "esm",
    platform: "node",
    target: "node20.19",
    conditions: ["kvane-source"],
    external: Object.keys(devDependencies).filter((name) => name !== "@kvane/core"),
    plugins: [keepPlaces],
    logLevel: "warning",
  };
}

/**
 * The bundle of a program as text, without comments: it changes when the code does that the program reaches.
 * @param {string} program
 * @returns {Promise<string>}
 */
export async function bundleText(program) {
  const { outputFiles } = await build({ ...testBundle(program), minify: true, write: false });
  return (outputFiles ?? []).map(({ text }) => text.replaceAll(pathToFileURL(root).href, "")).join("");
}
