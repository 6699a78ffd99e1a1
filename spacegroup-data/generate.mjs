// @ts-check
/**
 * Makes packages/core/src/spacegroups/generated/settings.ts from settings.yaml. `--check` only compares and exits with
 * status 1 on a difference. Fingerprints come from the library's own expansion of the Hall symbols.
 */
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const root = dirname(dirname(fileURLToPath(import.meta.url)));
const source = join(root, "spacegroup-data/settings.yaml");
const target = join(root, "packages/core/src/spacegroups/generated/settings.ts");

/**
 * @typedef {{number: number, hall: string, short: string, full: string, choice: string, standard?: boolean,
 *   former?: string}} Entry
 */

/** @returns {Entry[]} */
function readEntries() {
  const requireOfCore = createRequire(join(root, "packages/core/package.json"));
  const entries = requireOfCore("yaml").parse(readFileSync(source, "utf8"));
  const known = ["number", "hall", "short", "full", "choice", "standard", "former"];
  for (const [index, entry] of entries.entries()) {
    const strange = Object.keys(entry).filter((key) => !known.includes(key));
    const texts = [entry.hall, entry.short, entry.full, entry.choice, entry.former ?? ""];
    if (strange.length > 0 || !Number.isInteger(entry.number) || texts.some((text) => !/^[^|\n\\`$]*$/.test(text)))
      throw new Error(`settings.yaml, entry ${index + 1}: ${JSON.stringify(entry)} is not of the expected form`);
  }
  for (let number = 1; number <= 230; number++) {
    const standard = entries.filter((/** @type {Entry} */ entry) => entry.number === number && entry.standard);
    if (standard.length !== 1) throw new Error(`settings.yaml: number ${number} has ${standard.length} standard rows`);
  }
  return entries;
}

/** @returns {Promise<(hall: string) => string>} */
async function loadFingerprint() {
  const { outputFiles } = await build({
    stdin: {
      contents: 'export { hallFingerprint } from "./packages/core/src/spacegroups/fingerprints.ts";',
      resolveDir: root,
    },
    bundle: true,
    format: "esm",
    platform: "node",
    write: false,
  });
  const text = /** @type {{text: string}} */ (outputFiles[0]).text;
  return (await import(`data:text/javascript;base64,${Buffer.from(text).toString("base64")}`)).hallFingerprint;
}

const entries = readEntries();
const fingerprint = await loadFingerprint();
const rows = entries.map((entry) =>
  [
    entry.number,
    entry.hall,
    entry.short,
    entry.full,
    entry.choice,
    entry.standard ? "*" : "",
    entry.former ?? "",
    fingerprint(entry.hall),
  ].join("|"),
);
const output = `// Made by spacegroup-data/generate.mjs from spacegroup-data/settings.yaml; edit that file and run \`npm run data\`.

/** number|Hall|short|full|choice|standard|former symbol|fingerprint of the operators, one row a setting. */
export const settingRows = \`${rows.join("\n")}\`;
`;

if (process.argv.includes("--check")) {
  const current = readFileSync(target, "utf8").replaceAll("\r\n", "\n");
  if (current !== output) {
    console.error(`${target} differs from what settings.yaml gives: run \`npm run data\``);
    process.exitCode = 1;
  }
} else {
  mkdirSync(dirname(target), { recursive: true });
  writeFileSync(target, output);
}
