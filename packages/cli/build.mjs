// @ts-check
/**
 * Bundles the command into bin/: kvane.js with what every command and the small ones need, and parts beside it that `import()`
 * in the source loads when a command wants them. Not many small modules, because finding and opening them would cost more than
 * a small command's own work; not one file, because Node reads through all of a file's text before it runs any of it. They
 * are CommonJS, since Node's loader of ES modules alone takes a tenth of the time of a bare `node`.
 */
import { chmodSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";
import { packParts } from "./pack-parts.mjs";
import { doorsGoneThrough, pastTheDoors } from "./past-the-doors.mjs";

const here = dirname(fileURLToPath(import.meta.url));
const { version } = JSON.parse(readFileSync(join(here, "package.json"), "utf8"));

const bin = join(here, "bin");
mkdirSync(bin, { recursive: true });

/** The commands whose start is to take no longer than it must: what they load is in kvane.js from the beginning. */
const small = ["ops", "star", "irreps", "modes"].flatMap((name) => [
  `../core/src/job/commands/${name}.ts`,
  `../core/src/reports/text/${name}-text.ts`,
]);

/** @satisfies {import("esbuild").BuildOptions} */
const options = {
  absWorkingDir: here,
  outdir: bin,
  bundle: true,
  platform: /** @type {const} */ ("node"),
  target: "node20.19",
  // Less text to read at each start. The command never prints a stack, so short names cost nobody anything.
  minify: true,
  // Text that is ASCII throughout is read faster.
  charset: /** @type {const} */ ("ascii"),
  legalComments: /** @type {const} */ ("none"),
  logLevel: /** @type {const} */ ("warning"),
  write: /** @type {const} */ (false),
};
// esbuild cuts bundles into parts as ES modules only.
const { metafile, outputFiles } = await build({
  ...options,
  entryPoints: { kvane: "src/main.ts" },
  chunkNames: "part-[hash]",
  splitting: true,
  format: "esm",
  // From the source, so that a bundle never holds a stale build of core.
  conditions: ["kvane-source"],
  define: { KVANE_VERSION: JSON.stringify(version), "import.meta.dirname": "__dirname" },
  alias: {
    // Loaded by commander for subcommands that are programs of their own, which kvane has none of; it is slow to load.
    "node:child_process": "./src/no-child-process.ts",
    // Its modules and not its CommonJS, whose names a part of its own would not carry.
    yaml: join(here, "../core/node_modules/yaml/browser/index.js"),
  },
  plugins: [pastTheDoors(join(here, "../core/src"))],
  metafile: true,
});
const missed = doorsGoneThrough(metafile.inputs);
if (missed.length > 0) throw new Error(`a part would hold a whole room: ${missed.join("; ")}`);
const written = new Set(["kvane.js", "package.json", "THIRD-PARTY-LICENSES.txt"]);
writeFileSync(join(bin, "package.json"), '{ "type": "commonjs" }\n');
writeFileSync(join(bin, "THIRD-PARTY-LICENSES.txt"), licences(Object.keys(metafile.inputs)));
// kvane.js comes last: it names the new parts, and a command that starts meanwhile finds the old ones with the old.
const packed = await packParts({ outputs: metafile.outputs, files: outputFiles, early: small, options });
for (const { name, text } of packed) {
  writeFileSync(join(bin, name), text);
  written.add(name);
}
chmodSync(join(bin, "kvane.js"), 0o755);
for (const file of readdirSync(bin)) if (!written.has(file)) rmSync(join(bin, file));

/**
 * The licence text of every package that a bundled file comes from.
 * @param {string[]} inputs paths relative to this folder
 */
function licences(inputs) {
  const folders = new Set();
  for (const input of inputs) {
    const folder = /^.*node_modules\/(?:@[^/]+\/)?[^/]+(?=\/)/.exec(input)?.[0];
    if (folder) folders.add(resolve(here, folder));
  }
  const texts = [...folders].map(licence);
  // The script of the report page is a text in the bundle; what is in it and nowhere else is not among the inputs.
  for (const notice of pageNotices()) {
    const entry = `${"-".repeat(80)}\n${notice}\n`;
    if (!texts.includes(entry)) texts.push(entry);
  }
  texts.sort();
  return `kvane carries parts of these packages.\n\n${texts.join("\n")}`;
}

/** The licence texts that packages/core/make-page-script.mjs has put beside the script of the report page. */
function pageNotices() {
  const made = readFileSync(join(here, "../core/src/reports/generated/page-script.ts"), "utf8");
  const lines = made.slice(made.indexOf("pageNotices")).matchAll(/^ {2}(".*"),$/gm);
  return [...lines].map(([, text]) => /** @type {string} */ (JSON.parse(text ?? "")));
}

/** @param {string} folder of one package */
function licence(folder) {
  const about = JSON.parse(readFileSync(join(folder, "package.json"), "utf8"));
  const text = licenceText(folder, about.name);
  return `${"-".repeat(80)}\n${about.name} ${about.version} (${about.license})\n\n${text.trim()}\n`;
}

/**
 * @param {string} folder
 * @param {string} name
 */
function licenceText(folder, name) {
  for (const file of ["LICENSE", "LICENSE.md", "LICENSE.txt", "LICENCE", "license"]) {
    try {
      return readFileSync(join(folder, file), "utf8");
    } catch {
      // The next spelling may be there.
    }
  }
  throw new Error(`${name} is bundled but its folder has no licence text`);
}
