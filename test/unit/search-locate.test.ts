import { KvaneError } from "@kvane/core/errors";
import { formatWaveVector, specialPoints } from "@kvane/core/kvectors";
import { defaultSearchOptions as allKinds, locate, type SearchResult } from "@kvane/core/search";
import { parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { breathe } from "#core/algorithms/index.js";
import { lengthOf, reciprocalAxes } from "../support/line-twin.ts";
import { crystalList, powderList } from "../support/peak-lists.ts";

const defaultSearchOptions = { ...allKinds, maxDimension: 0 as const };
const cell = { a: 4, b: 5.3, c: 6.1, alpha: 90, beta: 90, gamma: 90 };
const axes = reciprocalAxes(cell);
const half = [
  [0.5, 0, 0],
  [0.5, 1, 0],
  [0.5, 0, 1],
  [0.5, 1, 1],
  [1.5, 0, 0],
].map((row) => lengthOf(axes, row));
const group = parseGroup("P m m m");

function shown(result: SearchResult): string[] {
  return result.candidates.map(({ k }) => formatWaveVector(k));
}

describe("locate over the special points", () => {
  test("finds the k that the peaks were made with; the impurity is listed", async () => {
    const result = await locate(group, cell, powderList([...half, 1.111], 0.004), defaultSearchOptions);
    expect(shown(result)).toEqual(["(1/2, 0, 0)"]);
    expect(result.candidates[0]).toMatchObject({ matched: 5, total: 6, unmatched: [5], manifold: { dimension: 0 } });
    expect(result.candidates[0]?.evidence.reading).toBe("found");
    expect(result.unmatched).toEqual([5]);
    expect(result.setAside).toEqual([]);
  });

  test("the certificate says what was tried and what would have been shown", async () => {
    const result = await locate(group, cell, powderList(half, 0.004), { ...defaultSearchOptions, unmatched: 2 });
    const { kinds, ...whole } = result.certificate;
    expect(whole).toEqual({
      minimumMatched: 3,
      boxes: 8,
      smallestBox: 0,
      exhaustive: true,
      maxDimension: 0,
      zeroShift: 0,
      cellScale: 0,
      stopped: null,
    });
    expect(kinds.map(({ kind }) => formatWaveVector(kind))).toEqual(
      specialPoints(group).map(({ k }) => formatWaveVector(k)),
    );
    expect(result.candidates.every(({ matched }) => matched >= 3)).toBe(true);
    expect(result.candidates.length + result.dropped).toBe(8);
  });

  test("those below the minimum on request; at least one match is always asked", async () => {
    const all = await locate(group, cell, powderList(half, 0.004), { ...defaultSearchOptions, belowMinimum: true });
    expect(all.candidates.length).toBe(8);
    expect(all.dropped).toBe(0);
    const lone = await locate(group, cell, powderList([0.05], 0.001), defaultSearchOptions);
    expect(lone).toMatchObject({ candidates: [], dropped: 8, unmatched: [0], certificate: { minimumMatched: 1 } });
  });

  test("a zero shift cannot be refined where no wavelength turns Q into 2θ, and it is said", async () => {
    const free = { ...defaultSearchOptions, zeroShift: 0.1 };
    await expect(locate(group, cell, powderList(half, 0.004), free)).rejects.toMatchObject({
      code: "missing-wavelength",
    });
  });

  test("ties by the metric are told: (1/2,0,0) and (0,0,1/2) where a tetragonal cell is a cube", async () => {
    const tetragonal = parseGroup("P 4/m m m");
    const cube = { a: 4, b: 4, c: 4, alpha: 90, beta: 90, gamma: 90 };
    const list = powderList(
      [
        [0.5, 0, 0],
        [0.5, 1, 0],
        [0.5, 1, 1],
      ].map((row) => lengthOf(reciprocalAxes(cube), row)),
      0.004,
    );
    const result = await locate(tetragonal, cube, list, defaultSearchOptions);
    expect([...shown(result)].sort()).toEqual(["(0, 0, 1/2)", "(0, 1/2, 0)"]);
    expect(result.candidates.map(({ tiedWith }) => tiedWith)).toEqual([[1], [0]]);
    // A cell that is nearly a cube ties them within the tolerance; one that is not, does not.
    const nearly = await locate(tetragonal, { ...cube, c: 4.005 }, list, defaultSearchOptions);
    expect(nearly.candidates[0]?.tiedWith).toEqual([1]);
    const clear = await locate(tetragonal, { ...cube, c: 4.4 }, list, { ...defaultSearchOptions, belowMinimum: true });
    expect(clear.candidates.every(({ tiedWith }) => tiedWith.length === 0)).toBe(true);
  });

  test("fractional h k l of a crystal", async () => {
    const fcc = parseGroup("F m -3 m");
    const cubic = { a: 4.43, b: 4.43, c: 4.43, alpha: 90, beta: 90, gamma: 90 };
    const peaks = [
      [0.5, 0.5, 0.5],
      [0.5, -0.5, 0.5],
      [1.5, 0.5, 0.5],
      [-0.5, 2.5, 0.5],
    ];
    const result = await locate(fcc, cubic, crystalList(peaks, 0.005), defaultSearchOptions);
    expect(shown(result)).toEqual(["(1/2, 1/2, 1/2)"]);
    expect(result.candidates[0]).toMatchObject({ matched: 4, arms: 4, tiedWith: [] });
    expect(new Set(result.candidates[0]?.assignments.map(({ arm }) => arm)).size).toBeGreaterThan(1);
  });

  test("the result is plain data, and the same every time", async () => {
    const list = powderList([...half, 1.111], 0.004);
    const [first, second] = [
      await locate(group, cell, list, defaultSearchOptions),
      await locate(group, cell, list, defaultSearchOptions),
    ];
    expect(structuredClone(first)).toEqual(first);
    expect(JSON.parse(JSON.stringify(first))).toEqual(first);
    expect(JSON.stringify(second)).toBe(JSON.stringify(first));
  });
});

describe("long work", () => {
  test("tells its progress and stops when it is cancelled", async () => {
    const seen: [number, number | null][] = [];
    await locate(group, cell, powderList(half, 0.004), defaultSearchOptions, {
      progress: (done, total) => seen.push([done, total]),
    });
    expect(seen.at(-1)).toEqual([specialPoints(group).length, specialPoints(group).length]);
    const stopped = locate(group, cell, powderList(half, 0.004), defaultSearchOptions, { signal: { aborted: true } });
    await expect(stopped).rejects.toThrow(KvaneError);
    await expect(stopped).rejects.toMatchObject({ code: "interrupted" });
  });

  test("breathe gives the thread back after 20 ms and not before", async () => {
    const host = { signal: { aborted: false } };
    let ran = false;
    await breathe(host);
    setTimeout(() => {
      ran = true;
    }, 0);
    await breathe(host);
    expect(ran).toBe(false);
    const start = Date.now();
    while (Date.now() - start < 25);
    await breathe(host);
    expect(ran).toBe(true);
    host.signal.aborted = true;
    await expect(breathe(host)).rejects.toMatchObject({ code: "interrupted" });
  });
});
