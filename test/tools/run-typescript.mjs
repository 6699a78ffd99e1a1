// @ts-check
/**
 * `node test/tools/run-typescript.mjs FILE.ts [arguments]` runs a TypeScript program of this repository, bundled by
 * esbuild with core from its source: long runs go at the full speed of plain JavaScript, without a test runner.
 */
import { mkdirSync, rmSync } from "node:fs";
import { basename, join, resolve } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "esbuild";
import { testBundle } from "./bundle-test.mjs";
import { root } from "./paths.mjs";

const [, , program, ...rest] = process.argv;
if (!program) throw new Error("expected a TypeScript file to run");

const folder = join(root, "node_modules/.cache/kvane");
mkdirSync(folder, { recursive: true });
const outfile = join(folder, `${basename(program, ".ts")}-${process.pid}.mjs`);
// Packages that are not modules ask for others by name while they are loaded.
const banner = { js: 'import { createRequire } from "node:module"; const require = createRequire(import.meta.url);' };
await build({ ...testBundle(resolve(program)), outfile, banner, sourcemap: "inline" });
process.once("exit", () => rmSync(outfile, { force: true }));
process.argv = [process.execPath, resolve(program), ...rest];
process.setSourceMapsEnabled(true);
await import(pathToFileURL(outfile).href);
