// @ts-check

import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { root } from "../tools/paths.mjs";

/**
 * @typedef {(line: string) => string | Promise<string>} Output what a `kvane …` line prints
 * @typedef {{[name: string]: string}} Pages texts by name
 */

const made = "Made from the program by `node test/cli/write-pages.mjs`.";

/** @param {string} room */
function load(room) {
  return import(pathToFileURL(join(root, `packages/core/dist/${room}/index.js`)).href);
}

/**
 * The pages of docs/commands, one for each command with its help, and the schemas of docs/schemas.
 *
 * @param {Output} output
 * @returns {Promise<{readonly commands: Pages, readonly schemas: Pages}>}
 */
export async function commandPages(output) {
  /** @type {{commandTable: object, requestSchema: () => object}} */
  const { commandTable, requestSchema } = await load("job");
  /** @type {{answerSchema: (command: string) => object, describedCommands: readonly string[]}} */
  const { answerSchema, describedCommands } = await load("reports");
  return {
    commands: await helpPages(output, [...Object.keys(commandTable), "batch"], describedCommands),
    schemas: schemaPages(answerSchema, describedCommands, requestSchema()),
  };
}

/**
 * @param {Output} output
 * @param {readonly string[]} commands
 * @param {readonly string[]} described those with a schema
 * @returns {Promise<Pages>}
 */
async function helpPages(output, commands, described) {
  /** @type {readonly string[]} */
  const topics = JSON.parse(await output("kvane help --json")).result.topics;
  /** @type {Pages} */
  const pages = {};
  const rows = [];
  for (const name of commands) {
    const help = (await output(`kvane ${name} --help`)).trimEnd();
    const schema = described.includes(name) ? `\nIts \`--json\` obeys [this schema](../schemas/${name}.json).\n` : "";
    pages[`${name}.md`] = `# kvane ${name}\n\n${textBlock(help)}${schema}`;
    rows.push(`| [\`kvane ${name}\`](${name}.md) | ${(help.split("\n")[2] ?? "").replaceAll("|", "\\|")} |`);
  }
  pages["help.md"] += "\n## Topics\n";
  for (const topic of topics)
    pages["help.md"] += `\n### ${topic}\n\n${textBlock((await output(`kvane help ${topic}`)).trimEnd())}`;
  pages["README.md"] = `# Commands

${made} Topics of \`kvane help\` explain [formats and conventions](help.md): ${topics.map((topic) => `\`${topic}\``).join(", ")}.

| command | what it does |
|---|---|
${rows.join("\n")}
`;
  return pages;
}

/** @param {string} text */
function textBlock(text) {
  return `\`\`\`text\n${text}\n\`\`\`\n`;
}

/**
 * @param {(command: string) => object} answerSchema
 * @param {readonly string[]} described
 * @param {object} request schema of a line of `kvane batch`
 * @returns {Pages}
 */
function schemaPages(answerSchema, described, request) {
  const list = described.map((name) => `- [${name}](${name}.json)`).join("\n");
  return {
    ...Object.fromEntries(
      described.map((name) => [`${name}.json`, `${JSON.stringify(answerSchema(name), null, 2)}\n`]),
    ),
    "request.json": `${JSON.stringify(request, null, 2)}\n`,
    "README.md": `# JSON schemas

${made} JSON Schema 2020-12 of what each command prints with \`--json\`; the library gives them as \`answerSchema(command)\`
of \`@kvane/core/reports\`. \`kvane help json\` describes the envelope. [request](request.json) is a line of \`kvane batch\`.

${list}
`,
  };
}
