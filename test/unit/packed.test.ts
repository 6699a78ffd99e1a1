import { execFileSync } from "node:child_process";
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { browserBundle, compressedKilobytes } from "../tools/bundle-browser.mjs";
import { packAndInstall } from "../tools/pack.mjs";
import { root } from "../tools/paths.mjs";
import { publicNames } from "../tools/public-names.mjs";
import { runProgram } from "../tools/run-program.mjs";
import { bytesIn, usePacked } from "../tools/use-packed.mjs";

/** Both packages as a stranger gets them: packed, installed into an empty project, used from there. */
describe("the packed packages", () => {
  const folder = mkdtempSync(join(tmpdir(), "kvane-packed-"));
  const names = publicNames();
  let project = "";

  beforeAll(() => {
    if (!existsSync(join(root, "packages/cli/bin/kvane.js"))) throw new Error("not built yet: npm run build");
    project = packAndInstall(folder);
  }, 120_000);
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  test("work from JavaScript: every public value, CommonJS, the whole job, the example of a worker", () => {
    const { answer, printed } = usePacked(project, process.execPath, names);
    expect(answer === readFileSync(join(root, "docs/examples/run.json"), "utf8")).toBe(true);
    expect(printed).toBe("k = (1/2,0,0), told of its progress on the way\nthe second run was cancelled: interrupted\n");
  }, 120_000);

  describe("have types that are found and hold under strict settings", () => {
    const strict = ["--strict", "--noEmit", "--target", "es2022", "--lib", "es2022"];
    const compile = (...parameters: string[]) =>
      runProgram(process.execPath, [join(root, "node_modules/typescript/bin/tsc"), ...strict, ...parameters], project);

    function writeUse(file: string): void {
      const entries = [...new Set(names.map(({ entry }) => entry))];
      const imports = entries.map((entry, index) => `import * as room${index} from "${entry}";`);
      const uses = entries.map((_entry, index) => `export type Room${index} = keyof typeof room${index};`);
      const proof = [
        'import { KvaneError } from "@kvane/core/errors";',
        'import { answer, hostOfTexts, type Request } from "@kvane/core/job";',
        'const request: Request = { command: "star", group: "62", k: "0,0,0" };',
        "export const answered: Promise<object | null> = answer(request, hostOfTexts({})).then(({ result }) => result);",
        "// @ts-expect-error The types must not have become any.",
        "export const wrong: number = KvaneError;",
      ];
      writeFileSync(join(project, file), [...imports, ...uses, ...proof, ""].join("\n"));
    }

    test.each([
      ["nodenext", "nodenext"],
      ["node16", "node16"],
      ["esnext", "bundler"],
    ])(
      "module %s, resolution %s",
      (module, resolution) => {
        writeUse("use.ts");
        expect(compile("--module", module, "--moduleResolution", resolution, "use.ts")).toBe("");
      },
      120_000,
    );

    test("in a file of CommonJS, through import()", () => {
      const program = `async function dimensions(): Promise<readonly number[]> {
  const { parseGroup } = await import("@kvane/core/spacegroups");
  const { parseWaveVector, placeWaveVector } = await import("@kvane/core/kvectors");
  const { smallIrreps } = await import("@kvane/core/irreps");
  const group = parseGroup("P n m a");
  return smallIrreps(group, placeWaveVector(group, parseWaveVector("0,1/2,0")).k).irreps.map(({ dimension }) => dimension);
}
export = dimensions;
`;
      writeFileSync(join(project, "use.cts"), program);
      expect(compile("--module", "node16", "--moduleResolution", "node16", "use.cts")).toBe("");
    }, 120_000);
  });

  test("the command runs, knows its version and carries the example and the licences", () => {
    const installed = join(project, "node_modules/@kvane/cli");
    const { version } = JSON.parse(readFileSync(join(installed, "package.json"), "utf8"));
    const command = join(installed, "bin/kvane.js");
    expect(runProgram(process.execPath, [command, "--version"], project).trim()).toBe(version);
    expect(runProgram(process.execPath, [command, "ops", "62"], project)).toContain("x,y,z");
    expect(runProgram(process.execPath, [command, "batch", "--example"], project)).toBe(
      readFileSync(join(root, "docs/examples/batch.jsonl"), "utf8"),
    );
    expect(existsSync(join(installed, "LICENSE"))).toBe(true);
    expect(readFileSync(join(installed, "bin/THIRD-PARTY-LICENSES.txt"), "utf8")).toContain("commander");
  });

  test.skipIf(process.platform === "win32")("the name kvane is on the path of the project", () => {
    const file = join(project, "node_modules/.bin/kvane");
    expect(execFileSync(file, ["--version"], { encoding: "utf8" })).toMatch(/^\d+\.\d+\.\d+\n$/);
  });

  /**
   * Kilobytes of 1000 bytes, a fifth above what they were when they were set: room for the work of a release, and a test
   * that fails when a package that nobody wanted comes along. docs/embedding.md has the same numbers.
   */
  describe("keep to their size", () => {
    const page = readFileSync(join(root, "docs/embedding.md"), "utf8");
    const kilobytes = (bytes: number) => bytes / 1000;
    const packed = (name: string) => {
      const file = readdirSync(join(folder, "packed")).find((one) => one.startsWith(`kvane-${name}-`)) as string;
      return kilobytes(statSync(join(folder, "packed", file)).size);
    };
    const installed = (name: string) => kilobytes(bytesIn(join(project, "node_modules/@kvane", name)));
    const bundled = async (program: string, part: "all" | "start") => {
      const bundle = await browserBundle({ stdin: { contents: program, resolveDir: project } });
      return compressedKilobytes(bundle, part === "start" ? bundle.start.get("stdin.js") : undefined);
    };
    const wholeJob = 'export { answer, hostOfTexts } from "@kvane/core/job";';
    const irreps = `export { parseGroup } from "@kvane/core/spacegroups";
      export { parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
      export { smallIrreps } from "@kvane/core/irreps";`;

    test.each([
      ["`@kvane/core`, packed", 2600, () => packed("core")],
      ["`@kvane/core`, installed", 10_500, () => installed("core")],
      ["`@kvane/cli`, packed", 560, () => packed("cli")],
      ["`@kvane/cli`, installed", 1600, () => installed("cli")],
      ["browser: the whole job, all pieces", 520, () => bundled(wholeJob, "all")],
      ["browser: the whole job, before the first request", 10, () => bundled(wholeJob, "start")],
      ["browser: groups, wave vectors and small irreps alone", 36, () => bundled(irreps, "all")],
    ])("%s: at most %d kB", async (name, budget, measure) => {
      const size = await measure();
      expect(size).toBeLessThan(budget);
      // Half of a budget unused is no budget.
      expect(size).toBeGreaterThan(budget / 2);
      expect(page).toContain(`| ${name} | ${budget} kB |`);
    });
  });
});
