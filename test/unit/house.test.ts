import { describe, expect, test } from "vitest";
import { problemOf } from "../tools/check-imports.mjs";
import { houseRules } from "../tools/house-rules.mjs";
import { readImports } from "../tools/read-imports.mjs";

describe("the house", () => {
  test.each(Object.entries(houseRules))("%s", (_name, rule) => {
    expect(rule()).toEqual([]);
  });
});

/** What the rules say about one line of a file of core. */
function verdict(file: string, line: string): string | null {
  const [found] = readImports(file, line);
  if (!found) throw new Error(`no import in ${line}`);
  return problemOf(`packages/core/src/${file}`, found);
}

describe("the import table", () => {
  test.each([
    ["spacegroups/setting.ts", 'import { add } from "../numbers/index.js";'],
    ["spacegroups/setting.ts", 'import { closure } from "./closure.js";'],
    ["files/study.ts", 'const { parse } = await import("yaml");'],
    ["files/study.ts", 'import type { Mode } from "../modes/index.js";'],
    ["files/study.ts", 'import { type Mode } from "../modes/index.js";'],
    ["index.ts", 'export * from "./spacegroups/index.js";'],
  ])("allows %s: %s", (file, line) => {
    expect(verdict(file, line)).toBeNull();
  });

  test.each([
    ["spacegroups/setting.ts", 'import { star } from "../kvectors/index.js";', "may not import values from kvectors"],
    ["kvectors/star.ts", 'import { closure } from "../spacegroups/closure.js";', "goes past the door of spacegroups"],
    ["kvectors/star.ts", 'import { readFileSync } from "node:fs";', "may not import the package"],
    ["kvectors/star.ts", 'type A = import("../modes/index.js").Mode;', "may not import types from modes"],
    ["kvectors/star.ts", 'export const a = import("../modes/index.js");', "may not import values from modes"],
    ["kvectors/star.ts", "export const a = import(name);", "may not import the package"],
    ["job/run.ts", 'import { parse } from "yaml";', "may not import the package"],
    ["numbers/units.ts", 'import { unit } from "mathjs";', "may not import the package"],
    ["files/study.ts", 'import { parse } from "yaml";', "only by import()"],
    ["files/study.ts", 'import { modes, type Mode } from "../modes/index.js";', "may not import values from modes"],
    ["spacegroups/setting.ts", 'import { closure } from "./closure";', "ending .js"],
    ["spacegroups/setting.ts", 'import { answer } from "../../../cli/src/main.js";', "leads out of core"],
    ["spacegroups/setting.ts", 'import { answer } from "../index.js";', "root of the package"],
    ["index.ts", 'export * from "./numbers/index.js";', "no public room"],
    ["cellar/wine.ts", 'import { fail } from "../errors/index.js";', "not in the table of rooms"],
  ])("forbids %s: %s", (file, line, reason) => {
    expect(verdict(file, line)).toContain(reason);
  });
});
