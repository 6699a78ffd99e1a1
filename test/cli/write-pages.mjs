// @ts-check
/**
 * Writes what is made from the program: the examples of docs/examples, the pages of docs/commands, the schemas of
 * docs/schemas and the page docs/errors.md. Needs the build.
 */
import { spawnSync } from "node:child_process";
import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";
import { commandPages } from "./command-pages.mjs";

const command = join(root, "packages/cli/bin/kvane.js");
const folder = join(root, "docs/examples");

/** @param {string} line */
function words(line) {
  return [...line.matchAll(/"([^"]*)"|(\S+)/g)].map(([, quoted, bare]) => quoted ?? bare ?? "");
}

/** @param {string} line */
function output(line) {
  return spawnSync(process.execPath, [command, ...words(line).slice(1)], { encoding: "utf8" }).stdout;
}

const commands = JSON.parse(readFileSync(join(folder, "commands.json"), "utf8"));
for (const [file, line] of Object.entries(commands)) writeFileSync(join(folder, file), output(line));

/** @type {{code: string, meaning: string, exitStatus: number}[]} */
const codes = JSON.parse(output("kvane explain --json")).result.codes;
writeFileSync(
  join(root, "docs/errors.md"),
  `# Codes of problems

Every problem that kvane reports has one of these codes, on the error output as \`error[code]\` and in JSON as \`code\`.
A code keeps its meaning; new ones may be added. Beside it stand the place (file, line and column, or the argument), what
was expected, what was found and what to do. All problems of an input are reported at once. The exit status of a command
is that of its first error: 1 the job failed on valid input or output could not be written, 2 the input or the usage is
wrong, 70 an internal fault, 130 interrupted. A code with the status 0 is only a warning beside an answer; some others
appear as warnings too, which do not change the exit status. \`kvane explain CODE\` prints a line of this page and what
mostly helps; \`node test/cli/write-pages.mjs\` makes the page from \`packages/core/src/errors/codes.ts\`.

| code | exit status | meaning |
|---|---|---|
${codes.map(({ code, meaning, exitStatus }) => `| \`${code}\` | ${exitStatus} | ${meaning} |`).join("\n")}
`,
);

for (const [folderName, pages] of Object.entries(await commandPages(output))) {
  const target = join(root, "docs", folderName);
  mkdirSync(target, { recursive: true });
  for (const name of readdirSync(target)) if (!(name in pages)) rmSync(join(target, name));
  for (const [name, text] of Object.entries(pages)) writeFileSync(join(target, name), text);
}
