import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { kvane } from "../cli/command.js";

/** The README is run as it stands: its commands, its shown output, its library example. */
const readme = readFileSync(new URL("../../README.md", import.meta.url), "utf8");

/** Words of a shell line, double quotes understood. */
function words(line: string): string[] {
  return [...line.matchAll(/"([^"]*)"|(\S+)/g)].map((match) => match[1] ?? (match[2] as string));
}

describe("README", () => {
  const shown = [
    ...readme.matchAll(/```sh\nnode packages\/cli\/bin\/kvane\.js ([^\n]+)\n```\s+```text\n([\s\S]*?)```/g),
  ];

  it("shows at least one result", () => {
    expect(shown.length).toBeGreaterThan(0);
  });

  for (const [, command, block] of shown)
    it(`kvane ${command} prints what is shown`, async () => {
      const { status, stdout } = await kvane(words(command as string));
      expect(status).toBe(0);
      for (const part of (block as string).trimEnd().split("\n\n")) expect(stdout).toContain(part);
    });

  it("names every command that works (a row in its table), and no other", async () => {
    const { commandTable } = await import("@kvane/core/job");
    const named = new Set([...readme.matchAll(/`kvane ([a-z]+)/g)].map((match) => match[1] as string));
    named.delete("kvane");
    expect([...named].sort()).toEqual([...Object.keys(commandTable), "batch"].sort());
  });

  it("has a library example that runs", async () => {
    const code = /```ts\n([\s\S]*?)```/.exec(readme)?.[1] ?? "";
    for (const [, names, room] of code.matchAll(/import \{ ([^}]+) \} from "@kvane\/core\/([a-z]+)"/g)) {
      const module = (await import(/* @vite-ignore */ `@kvane/core/${room}`).catch(
        () => import(`../../packages/core/src/${room}/index.ts`),
      )) as Record<string, unknown>;
      for (const name of (names as string).split(", ")) expect(module[name], `${room}: ${name}`).toBeTypeOf("function");
    }
    const { parseGroup } = await import("@kvane/core/spacegroups");
    const { parseWaveVector, placeWaveVector } = await import("@kvane/core/kvectors");
    const { smallIrreps } = await import("@kvane/core/irreps");
    const group = parseGroup("P n m a");
    const { k } = placeWaveVector(group, parseWaveVector("0,1/2,0"));
    // Two two-dimensional irreps: Bradley & Cracknell (1972); Pnma at (0,1/2,0), reference data of the project.
    expect(smallIrreps(group, k).irreps.map((irrep) => irrep.dimension)).toEqual([2, 2]);
  });
});
