import { KvaneError } from "@kvane/core/errors";
import { numericWaveVector } from "@kvane/core/kvectors";
import { defaultSearchOptions, locate } from "@kvane/core/search";
import { parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { lengthOf, reciprocalAxes } from "../support/line-twin.ts";
import { crystalList, normal, powderList } from "../support/peak-lists.ts";
import { seeded } from "../support/random.ts";
import { slowStarDistance, type Triple } from "../support/search-cases.ts";

const cell = { a: 5.1, b: 6.3, c: 7.2, alpha: 90, beta: 90, gamma: 90 };
const axes = reciprocalAxes(cell);
const group = parseGroup("P n m a");
const few = { ...defaultSearchOptions, mostBoxes: 60_000 };

describe("degenerate lists end with a result or a clear error, quickly", () => {
  test("one peak: only points are searched, nothing is called found, and it is said why", {
    timeout: 20_000,
  }, async () => {
    const result = await locate(group, cell, powderList([1.1], 0.004), few);
    expect(result.candidates.every(({ evidence }) => evidence.reading !== "found")).toBe(true);
    expect(result.warnings.map(({ code }) => code)).toContain("too-few-peaks");
    expect(result.certificate.maxDimension).toBe(0);
  });

  test("equal peaks, and peaks below the smallest possible", { timeout: 20_000 }, async () => {
    const result = await locate(group, cell, powderList([1.1, 1.1, 1.1, 1.1], 0.004), few);
    expect(result.candidates.length).toBeGreaterThan(0);
    const impossible = await locate(group, cell, powderList([0.001, 0.002, 0.0035, 0.005, 0.0065, 0.0081], 1e-5), {
      ...few,
      unmatched: 0,
    });
    expect(impossible.candidates).toEqual([]);
    expect(impossible.unmatched).toEqual([0, 1, 2, 3, 4, 5]);
    expect(impossible.certificate.exhaustive).toBe(true);
  });

  test("a tolerance of zero is refused; one wider than the zone says nothing and says so", {
    timeout: 20_000,
  }, async () => {
    const list = powderList([0.9, 1.4, 1.7], 0.004);
    await expect(locate(group, cell, list, { ...few, tolerance: 0 })).rejects.toThrow(KvaneError);
    const wide = await locate(group, cell, list, { ...few, tolerance: 5 });
    expect(wide.candidates.every(({ evidence }) => evidence.reading !== "found")).toBe(true);
  });

  test("10 000 peaks", { timeout: 30_000 }, async () => {
    const random = seeded(3);
    const list = powderList(
      Array.from({ length: 10_000 }, () => 0.3 + 3 * random.next()),
      1e-4,
    );
    const result = await locate(group, cell, list, { ...few, maxDimension: 1 });
    expect(result.candidates).toEqual([]);
  });

  test("a spent budget is said, with what was not looked at", async () => {
    const random = seeded(4);
    const list = powderList(
      Array.from({ length: 9 }, () => 0.4 + 1.5 * random.next()),
      0.004,
    );
    const result = await locate(parseGroup("P -1"), { ...cell, alpha: 82, beta: 95, gamma: 101 }, list, {
      ...defaultSearchOptions,
      unmatched: 2,
      mostBoxes: 500,
    });
    expect(result.certificate).toMatchObject({ exhaustive: false });
    expect(result.certificate.stopped).toMatch(/^\(u, v, w\): .* not looked at, the budget of boxes was spent$/);
    expect(result.warnings.map(({ code }) => code)).toContain("search-stopped");
    const share = result.certificate.kinds.at(-1)?.unexplored ?? 0;
    expect(share).toBeGreaterThan(0);
    expect(share).toBeLessThanOrEqual(1);
  });
});

describe("fractional h k l of a crystal", () => {
  const k: Triple = [0.137, 0.281, 0.412];
  const random = seeded(5);
  const peaks = [
    [0, 0, 0],
    [1, 0, 0],
    [0, 1, -1],
    [2, 0, 1],
    [-1, 1, 0],
  ].map((h, index) =>
    h.map(
      (entry, axis) =>
        entry +
        (index % 2 ? -1 : 1) * (k[axis] as number) * (index === 3 && axis === 1 ? -1 : 1) +
        0.003 * Math.max(-2, Math.min(2, normal(random))),
    ),
  );

  test("a general k from peaks of several domains, with uncertainties, one stray", async () => {
    const result = await locate(group, cell, crystalList([...peaks, [0.4, 0.77, 0.05]], 0.003), defaultSearchOptions);
    const [first] = result.candidates;
    expect(first).toMatchObject({ matched: 5, total: 6, unmatched: [5] });
    expect(first?.evidence.reading).toBe("found");
    expect(slowStarDistance(group, cell, [], numericWaveVector(first?.k as never) as Triple, k)).toBeLessThan(0.005);
    expect(result.certificate.exhaustive).toBe(true);
  });

  test("on a plane it is found there and the general one goes under it", async () => {
    const flat = peaks.map(([h, , l], index) => [h as number, index % 2, l as number]);
    const result = await locate(group, cell, crystalList(flat, 0.003), defaultSearchOptions);
    expect(result.candidates[0]).toMatchObject({ matched: 5, manifold: { dimension: 2 } });
    expect(result.candidates[0]?.merged.some(({ dimension }) => dimension === 3)).toBe(true);
  });
});

test("a special k is listed once, with the lines and planes through it beneath, both evidences shown", async () => {
  const lines = [
    [0, 0.5, 0],
    [1, 0.5, 0],
    [0, 0.5, 1],
    [1, 0.5, 1],
    [0, 1.5, 0],
    [2, 0.5, 0],
    [0, 0.5, 2],
  ].map((row) => lengthOf(axes, row));
  const result = await locate(group, cell, powderList(lines, 0.003), defaultSearchOptions);
  const [first] = result.candidates;
  expect(numericWaveVector(first?.k as never)).toEqual([0, 0.5, 0]);
  expect(new Set(first?.merged.map(({ dimension }) => dimension))).toEqual(new Set([1, 2, 3]));
  for (const { evidence } of first?.merged ?? []) expect(evidence.value).toBeLessThan(first?.evidence.value ?? 0);
  // k = 0 is weighed and shown although it explains nothing.
  expect(result.references.map(({ k }) => numericWaveVector(k))).toContainEqual([0, 0, 0]);
});
