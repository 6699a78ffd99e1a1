import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { kvane } from "../cli/command.js";

/** The page is run as it stands: its commands, what they print, its scan of k, its study and its library example. */
const page = readFileSync(new URL("../../docs/exchange-and-onset.md", import.meta.url), "utf8");
const folder = mkdtempSync(join(tmpdir(), "kvane-docs-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));
writeFileSync(join(folder, "slide.csv"), /```csv\n([\s\S]*?)```/.exec(page)?.[1] ?? "");

function words(line: string): string[] {
  return [...line.matchAll(/"([^"]*)"|(\S+)/g)].map((match) => match[1] ?? (match[2] as string));
}

describe("exchange-and-onset.md", () => {
  const shown = [...page.matchAll(/```sh\nkvane ([^\n]+)\n```\n```text\n([\s\S]*?)```/g)];

  it("shows results", () => {
    expect(shown.length).toBe(8);
  });

  it.each(shown.map(([, command, block]) => [command as string, block as string]))(
    "kvane %s",
    async (command, block) => {
      const { status, stdout } = await kvane(words(command), { cwd: folder });
      expect(status).toBe(0);
      for (const part of block.trimEnd().split("\n\n")) expect(stdout).toContain(part);
    },
  );

  it("has a study section that is understood", async () => {
    const section = /```yaml\n([\s\S]*?)```/.exec(page)?.[1] ?? "";
    const { parseStudy } = await import("@kvane/core/files");
    const study = await parseStudy(section, "page");
    expect(study.exchange?.map(({ bond }) => bond)).toEqual(["1", "3b", "2", "3a"]);
  });

  it("has a library example that runs", async () => {
    const { bondTable, exchangeModel, groundOf } = await import("@kvane/core/exchange");
    const { parseGroup, parseSite, siteOrbit } = await import("@kvane/core/spacegroups");
    const group = await parseGroup("P 4/m m m");
    const cell = { a: 4, b: 4, c: 40, alpha: 90, beta: 90, gamma: 90 };
    const table = bondTable(group, cell, [siteOrbit(group, parseSite("M 0 0 0"), cell)], { shells: 2 });
    const model = exchangeModel(table, [
      { bond: "1", between: null, j: 1 },
      { bond: "2", between: null, j: 0.6 },
    ]);
    // Stripes beyond J2 = J1/2: −2 J2 a spin.
    expect((await groundOf(model)).energy).toBeCloseTo(-1.2, 9);
  });
});
