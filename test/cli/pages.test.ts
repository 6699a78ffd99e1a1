import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { problemCodes } from "@kvane/core/errors";
import { describedCommands } from "@kvane/core/reports";
import { describe, expect, test } from "vitest";
import { longNumbers } from "../support/long-numbers.js";
import { root } from "../tools/paths.mjs";
import { kvane, shellWords } from "./command.js";
import { commandPages } from "./command-pages.mjs";
import { schemaErrors } from "./schemas.js";

const folder = join(root, "docs/examples");
const commands: Record<string, string> = JSON.parse(readFileSync(join(folder, "commands.json"), "utf8"));

/** A change detector: it says that output has changed, not that it was right. test/cli/write-pages.mjs writes anew. */
describe("docs/examples (change detector)", () => {
  test.each(Object.entries(commands))("%s is byte for byte what the command prints, each time", async (file, line) => {
    const committed = readFileSync(join(folder, file), "utf8");
    expect((await kvane(shellWords(line).slice(1))).stdout).toBe(committed);
    expect((await kvane(shellWords(line).slice(1))).stdout).toBe(committed);
  });

  test("numbers have 12 digits at most (what makes a record puts floats through roundNumber)", () => {
    for (const file of Object.keys(commands).filter((name) => name.endsWith(".json"))) {
      const answer = JSON.parse(readFileSync(join(folder, file), "utf8"));
      expect(longNumbers(answer), file).toEqual([]);
    }
  });

  test("there is one for every described command (a line in docs/examples/commands.json), and each obeys its schema", () => {
    for (const command of describedCommands) expect(Object.keys(commands)).toContain(`${command}.json`);
    for (const file of Object.keys(commands).filter((name) => name.endsWith(".json"))) {
      const answer = JSON.parse(readFileSync(join(folder, file), "utf8"));
      expect(schemaErrors(answer.command, answer), file).toEqual([]);
    }
  });
});

test("docs/errors.md has every code with its meaning, and no other (test/cli/write-pages.mjs makes it)", () => {
  const page = readFileSync(join(root, "docs/errors.md"), "utf8");
  const rows = [...page.matchAll(/^\| `(.+?)` \| \d+ \| (.*) \|$/gm)].map(([, code, meaning]) => [code, meaning]);
  expect(rows).toEqual(Object.entries(problemCodes));
});

test("docs/commands and docs/schemas are what the program says of itself (test/cli/write-pages.mjs makes them)", async () => {
  const made = await commandPages(async (line) => (await kvane(shellWords(line).slice(1))).stdout);
  for (const [name, pages] of Object.entries(made)) {
    const target = join(root, "docs", name);
    expect(readdirSync(target).sort()).toEqual(Object.keys(pages).sort());
    for (const [file, text] of Object.entries(pages))
      expect(readFileSync(join(target, file), "utf8"), `${name}/${file}`).toBe(text);
  }
});
