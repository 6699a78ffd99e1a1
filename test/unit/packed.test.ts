import { execFileSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { packAndInstall } from "../tools/pack.mjs";
import { root } from "../tools/paths.mjs";
import { publicNames } from "../tools/public-names.mjs";
import { runProgram } from "../tools/run-program.mjs";

/** Both packages as a stranger gets them: packed, installed into an empty project, used from there. */
describe("the packed packages", () => {
  const folder = mkdtempSync(join(tmpdir(), "kvane-packed-"));
  let project = "";

  beforeAll(() => {
    if (!existsSync(join(root, "packages/cli/bin/kvane.js"))) throw new Error("not built yet: npm run build");
    project = packAndInstall(folder);
  }, 120_000);
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  test("every public value can be imported from its subpath", () => {
    const names = publicNames();
    const checks = [...new Set(names.map(({ entry }) => entry))].map((entry) => [
      entry,
      names.filter((each) => each.entry === entry && each.kind === "value").map(({ name }) => name),
    ]);
    const program = `for (const [entry, names] of ${JSON.stringify(checks)}) {
      const found = Object.keys(await import(entry));
      for (const name of names) if (!found.includes(name)) console.log(entry, "misses", name);
      for (const name of found) if (!names.includes(name)) console.log(entry, "has unlisted", name);
    }`;
    writeFileSync(join(project, "imports.mjs"), program);
    expect(runProgram(process.execPath, ["imports.mjs"], project)).toBe("");
  });

  test("the types are found and hold under strict settings", () => {
    const entries = [...new Set(publicNames().map(({ entry }) => entry))];
    const imports = entries.map((entry, index) => `import * as room${index} from "${entry}";`);
    const uses = entries.map((_entry, index) => `export type Room${index} = keyof typeof room${index};`);
    const proof = [
      'import { KvaneError } from "@kvane/core/errors";',
      "// @ts-expect-error The types must not have become any.",
      "export const wrong: number = KvaneError;",
    ];
    writeFileSync(join(project, "use.ts"), [...imports, ...uses, ...proof, ""].join("\n"));
    const settings = ["--strict", "--noEmit", "--module", "nodenext", "--target", "es2022", "--lib", "es2022"];
    const compiler = join(root, "node_modules/typescript/bin/tsc");
    expect(runProgram(process.execPath, [compiler, ...settings, "use.ts"], project)).toBe("");
  });

  test("the command runs, knows its version and carries the example and the licences", () => {
    const installed = join(project, "node_modules/@kvane/cli");
    const { version } = JSON.parse(readFileSync(join(installed, "package.json"), "utf8"));
    const command = join(installed, "bin/kvane.js");
    expect(runProgram(process.execPath, [command, "--version"], project).trim()).toBe(version);
    expect(runProgram(process.execPath, [command, "ops", "62"], project)).toContain("x,y,z");
    expect(existsSync(join(installed, "example"))).toBe(true);
    expect(existsSync(join(installed, "LICENSE"))).toBe(true);
    expect(readFileSync(join(installed, "bin/THIRD-PARTY-LICENSES.txt"), "utf8")).toContain("commander");
  });

  test.skipIf(process.platform === "win32")("the name kvane is on the path of the project", () => {
    const file = join(project, "node_modules/.bin/kvane");
    expect(execFileSync(file, ["--version"], { encoding: "utf8" })).toMatch(/^\d+\.\d+\.\d+\n$/);
  });
});
