// @ts-check
/**
 * Bundles the command into bin/kvane.js: one file without runtime dependencies, because loading many small modules
 * would cost more than the command's own work. `import()` in the source stays lazy inside the one file. It is a CommonJS
 * file, since Node's loader of ES modules alone takes a tenth of the time of a bare `node`.
 */
import { chmodSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const here = dirname(fileURLToPath(import.meta.url));
const { version } = JSON.parse(readFileSync(join(here, "package.json"), "utf8"));

mkdirSync(join(here, "bin"), { recursive: true });
const { metafile } = await build({
  absWorkingDir: here,
  entryPoints: ["src/main.ts"],
  outfile: "bin/kvane.js",
  bundle: true,
  format: "cjs",
  platform: "node",
  target: "node20.19",
  // From the source, so that a bundle never holds a stale build of core.
  conditions: ["kvane-source"],
  define: { KVANE_VERSION: JSON.stringify(version), "import.meta.dirname": "__dirname" },
  alias: {
    // Loaded by commander for subcommands that are programs of their own, which kvane has none of; it is slow to load.
    "node:child_process": "./src/no-child-process.ts",
  },
  // Less text to read at each start. The command never prints a stack, so short names cost nobody anything.
  minify: true,
  // Text that is ASCII throughout is read faster.
  charset: "ascii",
  banner: { js: "#!/usr/bin/env node" },
  metafile: true,
  legalComments: "none",
  logLevel: "warning",
});
writeFileSync(join(here, "bin/package.json"), '{ "type": "commonjs" }\n');
chmodSync(join(here, "bin/kvane.js"), 0o755);
writeFileSync(join(here, "bin/THIRD-PARTY-LICENSES.txt"), licences(Object.keys(metafile.inputs)));

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
