// @ts-check
/**
 * Makes packages/core/src/spacegroups/generated/settings.ts from settings.yaml and
 * packages/core/src/magneticgroups/generated/magnetic-groups.ts from magnetic-groups.txt, and the tables of the
 * diffraction room. `--check` only compares and exits with status 1 on a difference. Fingerprints come from the library's own expansion of the Hall symbols; the
 * generators of a magnetic group are multiplied out and compared with the space group of its number.
 */
import { existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";
import { scatteringTables } from "./scattering-tables.mjs";

const root = dirname(dirname(fileURLToPath(import.meta.url)));
const source = join(root, "spacegroup-data/settings.yaml");
const target = join(root, "packages/core/src/spacegroups/generated/settings.ts");
const magneticSource = join(root, "spacegroup-data/magnetic-groups.txt");
const magneticTarget = join(root, "packages/core/src/magneticgroups/generated/magnetic-groups.ts");

/**
 * @typedef {{number: number, hall: string, short: string, full: string, choice: string, standard?: boolean,
 *   former?: string}} Entry
 */

/** @param {string} symbol */
function withoutBlanks(symbol) {
  return symbol.replaceAll(" ", "");
}

/** @returns {Entry[]} */
function readEntries() {
  const requireOfCore = createRequire(join(root, "packages/core/package.json"));
  const entries = requireOfCore("yaml").parse(readFileSync(source, "utf8"));
  const known = ["number", "hall", "short", "full", "choice", "standard", "former"];
  for (const [index, entry] of entries.entries()) {
    const strange = Object.keys(entry).filter((key) => !known.includes(key));
    const texts = [entry.hall, entry.short, entry.full, entry.choice, entry.former ?? ""];
    const unfit = texts.some((text) => typeof text !== "string" || !/^[^|\n\\`$]*$/.test(text));
    if (strange.length > 0 || !Number.isInteger(entry.number) || unfit)
      throw new Error(`settings.yaml, entry ${index + 1}: ${JSON.stringify(entry)} is not of the expected form`);
  }
  // A symbol of another row would win over it, and nobody would ever reach it.
  const taken = new Map(
    entries.flatMap((/** @type {Entry} */ entry) =>
      [entry.short, entry.full].map((text) => [withoutBlanks(text), entry]),
    ),
  );
  for (const { former, hall } of entries) {
    const other = former === undefined ? undefined : taken.get(withoutBlanks(former));
    if (other !== undefined && other.hall !== hall)
      throw new Error(`settings.yaml: the former symbol ${former} of ${hall} is a symbol of ${other.hall} today`);
  }
  for (let number = 1; number <= 230; number++) {
    const standard = entries.filter((/** @type {Entry} */ entry) => entry.number === number && entry.standard);
    if (standard.length !== 1) throw new Error(`settings.yaml: number ${number} has ${standard.length} standard rows`);
  }
  return entries;
}

/**
 * A part of the library, bundled from its source.
 * @param {string} contents
 */
async function loadFromSource(contents) {
  const { outputFiles } = await build({
    stdin: { contents, resolveDir: root },
    bundle: true,
    format: "esm",
    platform: "node",
    write: false,
  });
  const text = /** @type {{text: string}} */ (outputFiles[0]).text;
  return import(`data:text/javascript;base64,${Buffer.from(text).toString("base64")}`);
}

/**
 * Writes a generated file, or with `--check` compares it.
 * @param {string} target
 * @param {string} sourceName
 * @param {string} output
 */
function deliver(target, sourceName, output) {
  if (!process.argv.includes("--check")) {
    mkdirSync(dirname(target), { recursive: true });
    writeFileSync(target, output);
  } else if (!existsSync(target) || readFileSync(target, "utf8").replaceAll("\r\n", "\n") !== output) {
    console.error(`${target} differs from what ${sourceName} gives: run \`npm run data\``);
    process.exitCode = 1;
  }
}

const entries = readEntries();
/** @type {{hallFingerprint: (hall: string) => string}} */
const { hallFingerprint } = await loadFromSource(
  'export { hallFingerprint } from "./packages/core/src/spacegroups/fingerprints.ts";',
);
const rows = entries.map((entry) =>
  [
    entry.number,
    entry.hall,
    entry.short,
    entry.full,
    entry.choice,
    entry.standard ? "*" : "",
    entry.former ?? "",
    hallFingerprint(entry.hall),
  ].join("|"),
);
const output = `// Made by spacegroup-data/generate.mjs from spacegroup-data/settings.yaml; edit that file and run \`npm run data\`.

/** number|Hall|short|full|choice|standard|former symbol|fingerprint of the operators, one row a setting. */
export const settingRows = \`${rows.join("\n")}\`;
`;

deliver(target, "settings.yaml", output);

/** @typedef {{bns: string, og: string, type: number, generators: string[]}} MagneticEntry */

/** @returns {MagneticEntry[]} */
function readMagneticEntries() {
  const lines = readFileSync(magneticSource, "utf8").split(/\r?\n/);
  const entries = lines.flatMap((line, index) => {
    if (line.trim() === "" || line.startsWith("#")) return [];
    const [bns = "", og = "", type = "", ...generators] = line.trim().split(/\s+/);
    const texts = generators.every((text) => /^[-+xyz0-9/,]+,[+-]1$/.test(text));
    if (!/^\d+\.\d+$/.test(bns) || !/^\d+\.\d+\.\d+$/.test(og) || !/^[1-4]$/.test(type) || !texts)
      throw new Error(`magnetic-groups.txt, line ${index + 1}: \`${line}\` is not of the expected form`);
    return [{ bns, og, type: Number(type), generators }];
  });
  const serials = entries.map(({ bns, og }) => [Number(bns.split(".")[1]), Number(og.split(".")[2])]);
  if (entries.length !== 1651 || new Set(serials.map(([, og]) => og)).size !== 1651)
    throw new Error(`magnetic-groups.txt: ${entries.length} rows, or serial numbers twice`);
  return entries;
}

/** @type {{compactData: (number: number, type: number, generators: readonly string[]) => string}} */
const { compactData } = await loadFromSource(
  'export { compactData } from "./packages/core/src/magneticgroups/compact-rows.ts";',
);
const magneticRows = readMagneticEntries().map(({ bns, og, type, generators }) =>
  [bns, og, type, compactData(Number(bns.split(".")[0]), type, generators)].join("|"),
);
deliver(
  magneticTarget,
  "magnetic-groups.txt",
  `// Made by spacegroup-data/generate.mjs from spacegroup-data/magnetic-groups.txt; edit that file and run \`npm run data\`.

/** BNS number|OG number|type|primed operators (III) or anti-translation in 24ths (IV), one row a type. */
export const magneticGroupRows = \`${magneticRows.join("\n")}\`;
`,
);

for (const table of scatteringTables(join(root, "spacegroup-data")))
  deliver(join(root, table.target), table.source, table.output);
