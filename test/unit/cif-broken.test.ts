import { parseCif, readCifStructure } from "@kvane/core/files";
import { describe, expect, test } from "vitest";
import { nextToken, scannerOf } from "#core/files/cif/scanner.js";
import { type CifFolder, cifNames, cifText } from "../support/cif-fixtures.js";
import { problemsOf } from "../support/problems-of.js";
import { seeded } from "../support/random.js";

/** The text cut behind every token, and in its middle. */
function cuts(text: string): string[] {
  const scanner = scannerOf(text, text.startsWith("#\\#CIF_2.0") ? "2.0" : "1.1");
  const ends = new Set<number>([0]);
  for (nextToken(scanner, 0, true); scanner.kind !== "end"; nextToken(scanner, scanner.end, true)) {
    ends.add(scanner.end);
    ends.add((scanner.start + scanner.end) >> 1);
  }
  return [...ends].map((end) => text.slice(0, end));
}

/** Reads all there is, and holds every problem against the promise: file, line and column within the text. */
async function expectPlaced(text: string): Promise<void> {
  const problems = await problemsOf(async () => {
    const document = await parseCif(text, "broken");
    const found = await problemsOf(() => readCifStructure(document));
    const structure = found.length > 0 ? null : await readCifStructure(document);
    const parts = structure ? Object.values(structure.problems).flat() : found;
    for (const { where } of [...parts, ...document.warnings]) expectWithin(text, where);
  });
  for (const { where } of problems) expectWithin(text, where);
}

function expectWithin(text: string, where: { file: string | null; line: number | null; column: number | null }): void {
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\r|\n/);
  const shown = `${JSON.stringify(where)} ${JSON.stringify(text)}`;
  expect(where.file, shown).toBe("broken");
  expect(where.line, shown).toBeGreaterThan(0);
  expect(where.line, shown).toBeLessThanOrEqual(lines.length);
  expect(where.column, shown).toBeGreaterThan(0);
  expect(where.column, shown).toBeLessThanOrEqual((lines[(where.line ?? 1) - 1]?.length ?? 0) + 1);
}

const folders: readonly CifFolder[] = ["good", "structures"];
const files = folders.flatMap((folder) => cifNames(folder).map((name) => [name, cifText(folder, name)] as const));

describe("broken CIFs give a result or problems with places, never anything else", () => {
  test.each(files)("%s cut behind every token", async (_name, text) => {
    for (const cut of cuts(text)) await expectPlaced(cut);
  });

  test("with characters changed, removed, doubled or moved (seed 5)", async () => {
    const random = seeded(5);
    const marks = [
      ..."[]{}:;#'\"_$ \t\r\n?.,()\\>+-/xyz0123",
      "data_",
      "loop_",
      "save_",
      "\n;",
      "é",
      "\uFEFF",
      "\u0001",
    ];
    for (let count = 0; count < 300; count++) {
      let [, text] = random.pick(files);
      for (let times = 1 + random.below(3); times > 0; times--) {
        const at = random.below(text.length);
        const skip = random.below(3);
        text = text.slice(0, at) + (random.below(3) > 0 ? random.pick(marks) : "") + text.slice(at + skip);
      }
      await expectPlaced(text);
    }
  });
});

describe("large CIFs", () => {
  const head = cifText("structures", "number-only.cif").replace(/Fe1 0 0 0\n$/, "");
  const rows = (count: number) =>
    Array.from({ length: count }, (_, row) => `Fe${row} 0.${row}(3) 0.25 0.${row % 7}`).join("\n");

  test("a hundred thousand atoms are read in seconds", async () => {
    const started = performance.now();
    const structure = await readCifStructure(await parseCif(`${head}${rows(100_000)}\n`, "big"));
    expect(structure.sites.length).toBe(100_000);
    // It takes about a second on a machine of two cores; what is not linear would take minutes.
    expect(performance.now() - started).toBeLessThan(20_000);
  });

  test.each([
    ["quotation marks that are not closed", "_x 'a\n"],
    ["blanks", " ".repeat(20)],
    ["values without a name", "a "],
    ["backslashes in a text field", ";\\\n\\ \\ \\ \n;\n"],
    ["opened lists", "[ "],
    ["empty lines", "\n"],
    ["comments", "#\n"],
    ["keywords", "loop_ "],
  ])("a megabyte of %s takes no longer than in proportion", async (_what, piece) => {
    for (const head of ["data_a\n_x\n", "#\\#CIF_2.0\ndata_a\n_x\n"]) {
      const started = performance.now();
      await problemsOf(() => parseCif(head + piece.repeat(Math.ceil(1_000_000 / piece.length)), "big"));
      expect(performance.now() - started).toBeLessThan(15_000);
    }
  });
});
