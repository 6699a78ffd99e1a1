import { KvaneError, type Problem } from "@kvane/core/errors";
import {
  cellVolume,
  checkCell,
  checkCellAgainstGroup,
  directMetric,
  lengthInMetric,
  parseCell,
  parseGroup,
  reciprocalMetric,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";

function problemsOf(action: () => unknown): readonly Problem[] {
  try {
    action();
    return [];
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    return error.problems;
  }
}

describe("cells", () => {
  it("read six numbers, blanks or commas between them", () => {
    const cell = { a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 95.5, gamma: 90 };
    expect(parseCell("10.21 6.05 4.71 90 95.5 90")).toEqual(cell);
    expect(parseCell(" 10.21,6.05, 4.71 ,90 95.5\t90 ")).toEqual(cell);
  });

  it.each([
    ["", [["invalid-cell", 1]]],
    ["1 2 3", [["invalid-cell", 6]]],
    ["1 2 3 90 90 90 1", [["invalid-cell", 16]]],
    [
      "1 2 x 90 90 NaN",
      [
        ["invalid-number", 5],
        ["invalid-number", 13],
      ],
    ],
    [
      "0 -1 1 90 90 180",
      [
        ["invalid-cell", 1],
        ["invalid-cell", 3],
        ["invalid-cell", 14],
      ],
    ],
    ["1 1 Infinity 90 90 90", [["invalid-number", 5]]],
    ["1 1 1 120 120 120", [["invalid-cell", 7]]],
    ["1 1 1 30 30 100", [["invalid-cell", 7]]],
  ])("refuse `%s`", (text, expected) => {
    expect(problemsOf(() => parseCell(text)).map((one) => [one.code, one.where.column])).toEqual(expected);
  });

  it("name the field where a record is wrong", () => {
    const problems = problemsOf(() => checkCell({ a: 1, b: 0, c: 1, alpha: 90, beta: 90, gamma: Number.NaN }));
    expect(problems.map((one) => one.where.path)).toEqual(["b", "gamma"]);
  });

  it("have the volume and the metric of textbooks", () => {
    // Hexagonal: V = a²c √3/2; d(100) = a √3/2. Rhombohedral: V = a³ √(1 − 3cos² + 2cos³).
    const hexagonal = parseCell("5 5 12 90 90 120");
    expect(cellVolume(hexagonal)).toBeCloseTo((25 * 12 * Math.sqrt(3)) / 2, 10);
    expect(1 / lengthInMetric(reciprocalMetric(hexagonal), [1, 0, 0])).toBeCloseTo((5 * Math.sqrt(3)) / 2, 12);
    expect(lengthInMetric(directMetric(hexagonal), [1, 1, 0])).toBeCloseTo(5, 12);
    const cosine = Math.cos((55 * Math.PI) / 180);
    expect(cellVolume(parseCell("5 5 5 55 55 55"))).toBeCloseTo(
      125 * Math.sqrt(1 - 3 * cosine ** 2 + 2 * cosine ** 3),
      10,
    );
  });

  it("have a reciprocal metric that is the inverse", () => {
    const cell = parseCell("5.1 6.2 7.3 81 95 112");
    const [direct, reciprocal] = [directMetric(cell), reciprocalMetric(cell)];
    for (const row of [0, 1, 2])
      for (const column of [0, 1, 2]) {
        const entry = [0, 1, 2].reduce(
          (sum, middle) => sum + (direct[3 * row + middle] as number) * (reciprocal[3 * middle + column] as number),
          0,
        );
        expect(entry).toBeCloseTo(row === column ? 1 : 0, 12);
      }
  });
});

describe("cell and group", () => {
  it.each([
    ["5 6 7 81 95 112", "P -1"],
    ["5 6 7 90 95 90", "P 21/c"],
    ["5 6 7 90 90 95", "P 1 1 21/b"],
    ["5 6 7 90 90 90", "P n m a"],
    ["5 5 7 90 90 90", "I 4/m m m"],
    ["5 5 7 90 90 120", "R -3 m:H"],
    ["5 5 5 70 70 70", "R -3 m:R"],
    ["5 5 7 90 90 120", "P 63/m m c"],
    ["5 5 5 90 90 90", "F m -3 m"],
    ["5.000 5.004 5 90 90.05 90", "F m -3 m"],
    ["3 3 3 60 60 60", "225 (a/2+b/2,b/2+c/2,a/2+c/2)"],
    ["7.07107 7.07107 7 90 90 90", "139 (a-b,a+b,c)"],
  ])("%s fits %s", (cell, group) => {
    expect(problemsOf(() => checkCellAgainstGroup(parseCell(cell), parseGroup(group)))).toEqual([]);
  });

  it.each([
    ["5 6 7 91 95 90", "P 21/c", "alpha = 90"],
    ["5 6 7 90 95 90", "P n m a", "beta = 90"],
    ["5 5.1 7 90 90 90", "I 4/m m m", "a = b"],
    ["5 5 7 90 90 90", "P 63/m m c", "gamma = 120"],
    ["5 5 7 90 90 60", "P 63/m m c", "gamma = 120"],
    ["5 5 5.1 90 90 90", "F m -3 m", "a = c"],
    ["5 5 7 90 90 120", "R -3 m:R", "a = c"],
    ["5 5 5 70 70 71", "R -3 m:R", "alpha = gamma"],
    ["3 3 3 60 60 61", "225 (a/2+b/2,b/2+c/2,a/2+c/2)", "gamma = 60"],
  ])("%s contradicts %s: %s", (cell, group, expected) => {
    const [found] = problemsOf(() => checkCellAgainstGroup(parseCell(cell), parseGroup(group)));
    expect(found?.code).toBe("cell-contradicts-group");
    expect(found?.expected).toContain(expected);
    expect(found?.found).toContain(`a = ${cell.split(" ")[0]}`);
  });
});
