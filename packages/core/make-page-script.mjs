// @ts-check
/**
 * Makes src/reports/generated/page-script.ts: the script and the style of a report page, with the hashes by which the
 * page's Content-Security-Policy allows these two and nothing else, and the licence texts of the packages in the script.
 * `--check` only compares and exits with status 1 on a difference.
 */
import { createHash } from "node:crypto";
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const here = dirname(fileURLToPath(import.meta.url));
const page = join(here, "src/reports/page");
const target = join(here, "src/reports/generated/page-script.ts");

/** @param {string} entry */
async function bundled(entry) {
  const { outputFiles, metafile } = await build({
    absWorkingDir: here,
    entryPoints: [join(page, entry)],
    bundle: true,
    format: "iife",
    globalName: entry === "main.ts" ? undefined : "made",
    platform: "browser",
    target: "es2020",
    minify: true,
    charset: "ascii",
    legalComments: "none",
    metafile: true,
    write: false,
    logLevel: "warning",
  });
  return { text: /** @type {{text: string}} */ (outputFiles[0]).text.trim(), inputs: Object.keys(metafile.inputs) };
}

/** @param {readonly string[]} inputs */
function packageFolders(inputs) {
  const folders = new Set();
  for (const input of inputs) {
    const folder = /^.*node_modules\/(?:@[^/]+\/)?[^/]+(?=\/)/.exec(input)?.[0];
    if (folder) folders.add(resolve(here, folder));
  }
  return [...folders].sort((a, b) => (nameOf(a) < nameOf(b) ? -1 : 1));
}

/** @param {string} folder */
function nameOf(folder) {
  return /** @type {string} */ (JSON.parse(readFileSync(join(folder, "package.json"), "utf8")).name);
}

/** The licence file of a package, or the last part of its README where that is the licence. @param {string} folder */
function licenceText(folder) {
  const about = JSON.parse(readFileSync(join(folder, "package.json"), "utf8"));
  const head = `${about.name} ${about.version} (${about.license})`;
  try {
    return `${head}\n\n${readFileSync(join(folder, "LICENSE"), "utf8").trim()}`;
  } catch {
    const readme = readFileSync(join(folder, "README.md"), "utf8");
    const at = readme.indexOf(`## ${about.license}`);
    if (at < 0) throw new Error(`${about.name} is bundled but its folder has no licence text`);
    return `${head}\n\n${readme.slice(readme.indexOf("\n", at)).trim()}`;
  }
}

/** @param {string} text */
function hash(text) {
  return `sha256-${createHash("sha256").update(text, "utf8").digest("base64")}`;
}

const script = await bundled("main.ts");
const made = new Function(`${(await bundled("style.ts")).text}; return made;`)();
const style = `${made.paletteStyle}\n${readFileSync(join(page, "page.css"), "utf8").replaceAll("\r\n", "\n").trim()}`;
for (const [name, text] of [
  ["script", script.text],
  ["style", style],
])
  if (/<\/(?:script|style)|<!--/i.test(/** @type {string} */ (text)))
    throw new Error(`the ${name} would end its element`);
const notices = packageFolders(script.inputs).map(licenceText);
// A comment of HTML ends at the first two hyphens.
if (notices.some((text) => text.includes("--"))) throw new Error("a licence text would end its comment");

const output = `// Made by packages/core/make-page-script.mjs from src/reports/page; edit those files and run it again.

/** The script of a report page. */
export const pageScript =
  ${JSON.stringify(script.text)};

/** Its style. */
export const pageStyle =
  ${JSON.stringify(style)};

/** How a Content-Security-Policy names these two. */
export const pageHashes = {
  script: ${JSON.stringify(hash(script.text))},
  style: ${JSON.stringify(hash(style))},
};

/** Licence texts of the packages that the script has parts of. */
export const pageNotices: readonly string[] = [
${notices.map((text) => `  ${JSON.stringify(text)},`).join("\n")}
];
`;

if (process.argv.includes("--check")) {
  if (readFileSync(target, "utf8").replaceAll("\r\n", "\n") !== output) {
    console.error(
      `${target} differs from what src/reports/page gives: run \`node packages/core/make-page-script.mjs\``,
    );
    process.exitCode = 1;
  }
} else {
  mkdirSync(dirname(target), { recursive: true });
  writeFileSync(target, output);
}
