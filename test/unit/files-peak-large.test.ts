import { parsePeakList } from "@kvane/core/files";
import { describe, expect, test } from "vitest";
import { problemsOf } from "../support/problems-of.js";

const rows = Array.from({ length: 100_000 }, (_, index) => [
  (1 + index * 1e-4).toFixed(5),
  "0.002",
  String(index % 97),
]);

describe("long peak lists", () => {
  test.each([
    ["commas", ",", 100_000],
    ["semicolons", ";", 10_000],
    ["tabs", "\t", 10_000],
    ["blanks", "  ", 100_000],
  ])("many rows with %s, with and without a header, say the same", (_name, separator, count) => {
    const body = rows
      .slice(0, count)
      .map((row) => row.join(separator))
      .join("\r\n");
    const header = ["d", "su", "intensity"].join(separator);
    const started = performance.now();
    const plain = parsePeakList(body, { file: "big", kind: "d" });
    const headed = parsePeakList(`# long\n${header} ! the columns\n${body}\n`, { file: "big" });
    // Half a second by itself; what grows faster than the list would take minutes.
    expect(performance.now() - started).toBeLessThan(60_000);
    expect(plain.peaks).toHaveLength(count);
    expect(headed.peaks.map(({ position }) => position)).toEqual(plain.peaks.map(({ position }) => position));
    const last = plain.peaks.at(-1);
    const d = 1 + (count - 1) * 1e-4;
    expect(last?.position).toBeCloseTo(d, 9);
    // Q = 2π/d.
    expect(last?.q).toBeCloseTo((2 * Math.PI) / d, 9);
  });

  test("decimal commas are refused in every shape, at their place", async () => {
    for (const [text, place] of [
      ["3,10;0,01\n", "1:1"],
      ["3,10 0,01\n", "1:1"],
      ["3,10\t0,01\n", "1:1"],
      ["3,14\n2,71\n", "1:1"],
      ["d;su\n3.10;0,01\n", "2:6"],
    ]) {
      const problems = await problemsOf(() => parsePeakList(text ?? "", { file: "commas", kind: "d" }));
      expect(problems[0], text).toMatchObject({ code: "invalid-peak" });
      expect(problems[0]?.message, text).toContain("decimal comma");
      expect(`${problems[0]?.where.line}:${problems[0]?.where.column}`, text).toBe(place);
    }
  });
});
