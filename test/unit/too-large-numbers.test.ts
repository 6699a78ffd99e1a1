import { parseCif, parsePeakList, parseScanTable, readCifStructure } from "@kvane/core/files";
import { answer } from "@kvane/core/job";
import { parseCell } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { isTooLarge, whyNoNumber } from "#core/errors/index.js";
import { places, problemsOf } from "../support/problems-of.js";

const said = "is too large for a number of this kind (beyond 1.8e308)";
const manyDigits = "7".repeat(400);

describe("numbers beyond the largest double (IEEE 754: 1.797…e308)", () => {
  test("are told from what is no number", () => {
    for (const text of ["1e400", "-1E400", "+.5e+309", "\u22121.8e308", "1e400(2)", manyDigits])
      expect(isTooLarge(text), text).toBe(true);
    for (const text of ["1.797e308", "1e-400", "", "e400", "1e", "Infinity", "1,5e400", "1e400x", "0x1F", "nan"])
      expect(isTooLarge(text), text).toBe(false);
    expect(whyNoNumber("1e400")).toBe(said);
    expect(whyNoNumber("1,5")).toBe("is no number");
  });

  test.each([
    ["a cell", () => parseCell("1e400 6 5 90 90 90"), "`1e400`"],
    ["a peak list, in its first row", () => parsePeakList("1e400\n", { file: "p", kind: "d" }), "`1e400`"],
    ["a peak list", () => parsePeakList("d su\n3 1e400\n", { file: "p" }), "`1e400`"],
    ["a scan, in its first row", () => parseScanTable("1e400 5\n", "s"), "`1e400`"],
    ["a scan", () => parseScanTable("T I\n1 1e400\n", "s"), "`1e400`"],
  ])("%s says so", async (_what, read, named) => {
    expect((await problemsOf(read))[0]?.message).toBe(`${named} ${said}`);
  });

  test("an uncertainty in brackets does not let one in", async () => {
    const problems = await problemsOf(() => parsePeakList(`d\n${manyDigits}(3)\n`, { file: "p" }));
    expect(places(problems)).toEqual(["invalid-peak 2:1"]);
  });

  test("a CIF, an option and a study say so", async () => {
    const { problems } = await readCifStructure(await parseCif("data_a\n_cell_length_a 1e400(2)\n", "a.cif"));
    expect(problems.cell.map(({ message }) => message)).toContain(`_cell_length_a ${said}`);
    const asked = { command: "satellites", group: "1", cell: "5 6 7 90 90 90", k: "0,0,0", qMax: "1e400" };
    const none = { readText: async () => "" };
    expect((await answer(asked, none)).errors).toMatchObject([{ message: `--q-max ${said}` }]);
    const study = "group: P 1\ncell: {a: 1e400, b: 7, c: 8, alpha: 90, beta: 90, gamma: 90}\n";
    expect((await answer({ command: "check", study: "s" }, { readText: async () => study })).errors).toMatchObject([
      { where: { path: "cell.a" }, remedy: `correct the number: it ${said}` },
    ]);
  });
});
