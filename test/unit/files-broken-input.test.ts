import { readdirSync, readFileSync } from "node:fs";
import { parsePeakList, parseStudy } from "@kvane/core/files";
import { describe, expect, it } from "vitest";
import { problemsOf } from "../support/problems-of.js";
import { seeded } from "../support/random.js";
import { root } from "../tools/paths.mjs";

function folder(path: string, ending: RegExp): [string, string][] {
  const names = readdirSync(`${root}/${path}`).filter((name) => ending.test(name));
  return names.map((name) => [name, readFileSync(`${root}/${path}/${name}`, "utf8")]);
}

const studies = [...folder("test/fixtures/studies", /\.yaml$/), ...folder("packages/cli/example", /\.yaml$/)];
const lists = [...folder("test/fixtures/peaks", /./), ...folder("packages/cli/example", /^satellites\.csv$/)];

/** The text cut behind every word, every mark and every line. */
function cuts(text: string): string[] {
  return [...text.matchAll(/\w+|[^\w\s]|\n/g)].map((found) => text.slice(0, found.index + found[0].length));
}

/** Texts with some bytes changed, removed, doubled or moved. */
function damaged(text: string, seed: number, count: number): string[] {
  const random = seeded(seed);
  const marks = [..."[]{}:,;#!&*-+'\"/.()|>%@` \t\r\n\u0000\uFEFF\u2212~0x9eEnN", "\ud800", "é"];
  return Array.from({ length: count }, () => {
    let result = text;
    for (let times = 1 + random.below(3); times > 0; times -= 1) {
      const at = random.below(result.length);
      const rest = result.slice(at + 1);
      const change = random.below(4);
      if (change === 0) result = result.slice(0, at) + rest;
      else if (change === 1) result = result.slice(0, at) + random.pick(marks) + rest;
      else if (change === 2) result = result.slice(0, at) + random.pick(marks) + result.slice(at);
      else result = result.slice(0, at) + String.fromCharCode(result.charCodeAt(at) ^ (1 << random.below(7))) + rest;
    }
    return result;
  });
}

/** Reads a text and holds every problem against the promise: file, line and column, within the text. */
async function expectPlaced(text: string, read: (text: string) => unknown): Promise<boolean> {
  const problems = await problemsOf(() => read(text));
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\r|\n/);
  for (const { message, where } of problems) {
    const shown = `${message}\n${JSON.stringify(text)}`;
    expect(where.file, shown).toBe("broken");
    expect(where.line, shown).toBeGreaterThan(0);
    expect(where.line, shown).toBeLessThanOrEqual(lines.length);
    expect(where.column, shown).toBeGreaterThan(0);
    expect(where.column, shown).toBeLessThanOrEqual((lines[(where.line ?? 1) - 1]?.length ?? 0) + 1);
  }
  return problems.length > 0;
}

const readList = (text: string) => parsePeakList(text, { file: "broken", wavelengthAngstrom: 1.2 });
const readStudy = (text: string) => parseStudy(text, "broken");

describe("broken files give a result or problems with places, never anything else", () => {
  it.each(studies)("the study %s", async (_name, text) => {
    expect(await problemsOf(() => readStudy(text))).toEqual([]);
    let refused = 0;
    for (const broken of [...cuts(text), ...damaged(text, 20261201, 60)]) {
      if (await expectPlaced(broken, readStudy)) refused += 1;
    }
    expect(refused).toBeGreaterThan(25);
  });

  it.each(lists)("the peak list %s", async (_name, text) => {
    expect(await problemsOf(() => readList(text))).toEqual([]);
    let refused = 0;
    for (const broken of [...cuts(text), ...damaged(text, 20261202, 150)]) {
      if (await expectPlaced(broken, readList)) refused += 1;
    }
    expect(refused).toBeGreaterThan(25);
  });

  it("bytes that are no text at all", async () => {
    const random = seeded(20261203);
    for (let times = 0; times < 100; times += 1) {
      const text = String.fromCharCode(...Array.from({ length: 1 + random.below(80) }, () => 1 + random.below(300)));
      await expectPlaced(text, readStudy);
      await expectPlaced(text, (one) => parsePeakList(one, { file: "broken", kind: "d" }));
    }
  });
});
