import type { KvaneError } from "@kvane/core/errors";
import { parseScanTable } from "@kvane/core/files";
import { describe, expect, it } from "vitest";

function problems(text: string): string[] {
  try {
    parseScanTable(text, "scan.csv");
  } catch (error) {
    return (error as KvaneError).problems.map(({ code, where }) => `${code} ${where.line}:${where.column}`);
  }
  return [];
}

describe("a temperature scan", () => {
  it("has peaks by name, uncertainties beside them, rows in any order", () => {
    const text = "# invented\nT, 001, su, (1 0 1/2), k\n20, 5, 0.5, 7, 0.25\n10, 9, 0.6, -, 0.26\n";
    const { intensities, k, headed } = parseScanTable(text, "scan.csv");
    expect(headed).toBe(true);
    expect(intensities).toEqual([
      { name: "001", temperatures: [10, 20], values: [9, 5], uncertainties: [0.6, 0.5] },
      { name: "(1 0 1/2)", temperatures: [20], values: [7], uncertainties: null },
    ]);
    expect(k).toEqual([{ name: "k", temperatures: [10, 20], values: [0.26, 0.25], uncertainties: null }]);
  });

  it("takes names with blanks in brackets, and uncertainties in brackets", () => {
    const { intensities } = parseScanTable("T (0 0 1) (1 0 1)\n5 12.0(3) 4\n6 11.0(4) 3\n", "scan.txt");
    expect(intensities.map(({ name, uncertainties }) => [name, uncertainties])).toEqual([
      ["(0 0 1)", [0.3, 0.4]],
      ["(1 0 1)", null],
    ]);
  });

  it("without a header has numbered intensities", () => {
    const { intensities, headed } = parseScanTable("5\t12\t3\n6\t11\t2\n", "scan.txt");
    expect(headed).toBe(false);
    expect(intensities.map(({ name }) => name)).toEqual(["column 2", "column 3"]);
  });

  it("finds the temperature in another column than the first", () => {
    const { intensities } = parseScanTable("I;su;T/K\n12;1;5\n11;1;6\n", "scan.txt");
    expect(intensities).toEqual([{ name: "I", temperatures: [5, 6], values: [12, 11], uncertainties: [1, 1] }]);
  });

  it.each([
    ["a word for a number", "T I\n5 12\n6 high\n", ["invalid-scan 3:3"]],
    ["no temperature in the header", "x I\n5 12\n", ["invalid-scan 1:1"]],
    ["nothing beside the temperature", "T\n5\n6\n", ["invalid-scan 1:1"]],
    ["a temperature below zero, and a word", "T I\n-5 12\n6 x\n", ["invalid-scan 2:1", "invalid-scan 3:3"]],
    ["an uncertainty of zero", "T I su\n5 12 0\n", ["invalid-scan 2:6"]],
    ["two columns of one name", "T I I\n5 12 3\n", ["invalid-scan 1:5"]],
    ["more values than columns", "T I\n5 12 3\n", ["invalid-scan 2:6"]],
    ["a decimal comma", "T;I\n5;12,4\n", ["invalid-peak 2:3"]],
    ["comments alone", "# nothing\n", ["file-empty 1:1"]],
  ])("is refused with %s", (_what, text, expected) => {
    expect(problems(text)).toEqual(expected);
  });
});

describe("a scan that cannot be read", () => {
  it("has no rows, uncertainties before any value, short rows or too many values: said with place", () => {
    expect(problems("T a su\n")).toEqual(["invalid-scan 1:1"]);
    expect(problems("T su a\n5 1 2\n")).toEqual(["invalid-scan 1:3"]);
    expect(problems("T a b\n5 1 2\n6 1\n")).toEqual(["invalid-scan 3:3"]);
    expect(problems(`T a\n${"5 1\n".repeat(10001)}`)).toEqual(["invalid-scan 1:1"]);
  });

  it("takes -, NaN and nan for values that are not there", () => {
    const { intensities } = parseScanTable("T a\n5 -\n6 NaN\n7 nan\n8 1\n", "scan.txt");
    expect(intensities[0]?.temperatures).toEqual([8]);
  });
});
