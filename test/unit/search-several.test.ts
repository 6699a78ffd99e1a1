import { numericWaveVector } from "@kvane/core/kvectors";
import { defaultSearchOptions, locate, type SearchResult } from "@kvane/core/search";
import { parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { reciprocalAxes, twinLines } from "../support/line-twin.ts";
import { crystalList, normal, powderList } from "../support/peak-lists.ts";
import { seeded } from "../support/random.ts";
import { slowStarDistance, type Triple } from "../support/search-cases.ts";

const cell = { a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90 };
const pnma = parseGroup("P n m a");
const s = 0.0013;

/** Arms of k under mmm. */
function arms([x, y, z]: Triple): Triple[] {
  return [1, -1].flatMap((a) => [1, -1].flatMap((b) => [1, -1].map((c): Triple => [a * x, b * y, c * z])));
}

/** Lines of each vector with noise, some of them not seen; the numbers of lines wanted of each. */
function listOf(vectors: readonly Triple[], wanted: readonly number[], seed: number, strays = 0) {
  const random = seeded(seed);
  const positions = vectors.flatMap((k, index) => {
    const lines: number[] = [];
    let last = -1;
    for (const { q } of twinLines(cell, [], arms(k), 3)) {
      if (q < 0.2 || q - last < 4 * s || random.next() > 0.7 || lines.length === wanted[index]) continue;
      last = q;
      lines.push(q + s * Math.max(-2.5, Math.min(2.5, normal(random))));
    }
    return lines;
  });
  for (let stray = 0; stray < strays; stray++) positions.push(0.4 + 1.5 * random.next());
  return powderList(
    positions.sort((a, b) => a - b),
    s,
  );
}

const vectorsOf = (result: SearchResult) =>
  (result.severalVectors?.found[0]?.vectors ?? []).map((k) => numericWaveVector(k) as Triple);

function isNear(k: Triple | undefined, wanted: Triple): boolean {
  return k !== undefined && slowStarDistance(pnma, cell, [], k, wanted) < 0.02;
}

describe("more than one vector", () => {
  const pairs: readonly (readonly [string, Triple, Triple])[] = [
    ["two points", [0, 0.5, 0], [0.5, 0, 0.5]],
    ["a point and a line", [0, 0.5, 0], [0.31, 0, 0]],
    ["two lines", [0, 0.372, 0], [0, 0, 0.213]],
  ];
  for (const [name, first, second] of pairs)
    test(`${name}: no single k, both vectors found, whichever comes first`, { timeout: 20_000 }, async () => {
      for (const seed of [11]) {
        const result = await locate(pnma, cell, listOf([first, second], [8, 6], seed), defaultSearchOptions);
        expect(result.candidates).toEqual([]);
        const [find] = result.severalVectors?.found ?? [];
        expect(find?.stage).toBe("second vector");
        expect(find?.evidence.reading).toBe("found");
        expect(find?.gain).toBeGreaterThan(3);
        const [a, b] = vectorsOf(result);
        expect((isNear(a, first) && isNear(b, second)) || (isNear(a, second) && isNear(b, first))).toBe(true);
      }
    });

  for (const order of [2, 3] as const)
    test(`harmonic ${order}k: comes before a second independent vector, k refined from both`, {
      timeout: 20_000,
    }, async () => {
      const k: Triple = [0, 0.172, 0];
      for (const seed of [1, 3]) {
        const list = listOf([k, [0, order * k[1], 0]], [8, 6], seed);
        const result = await locate(pnma, cell, list, defaultSearchOptions);
        const [find] = result.severalVectors?.found ?? [];
        expect(find?.stage).toBe("harmonics");
        expect(find?.members.map(({ name }) => name)).toEqual(["k1", `${order} k1`]);
        const [refined] = find?.vectors ?? [];
        const value = refined?.values?.[0] as number;
        const su = refined?.uncertainties?.[0] as number;
        // The harmonic moves with its multiple: better known than from the first order alone, which gives about 0.001.
        expect(Math.abs(value - k[1])).toBeLessThan(4 * su);
        expect(su).toBeLessThan(0.0006);
      }
    });

  test("k1 + k2 for what the two leave over, and not where they leave nothing", { timeout: 20_000 }, async () => {
    const [first, second]: [Triple, Triple] = [
      [0, 0.5, 0],
      [0.31, 0, 0],
    ];
    const sum: Triple = [0.31, 0.5, 0];
    const three = await locate(pnma, cell, listOf([first, second, sum], [8, 7, 5], 5), {
      ...defaultSearchOptions,
      unmatched: 5,
      maxDimension: 1,
    });
    const found = three.severalVectors?.found ?? [];
    const sums = found.find(({ stage }) => stage === "sums");
    const pair = found.find(({ stage }) => stage === "second vector");
    expect(sums?.evidence.value).toBeGreaterThan((pair?.evidence.value ?? 0) + 3);
    expect(isNear(numericWaveVector(sums?.members[2]?.k as never) as Triple, sum)).toBe(true);
    const two = await locate(pnma, cell, listOf([first, second], [8, 7], 6), defaultSearchOptions);
    expect(two.severalVectors?.found.some(({ stage }) => stage === "sums")).toBe(false);
  });

  test("one vector with a stray peak: nothing with several vectors is called better by more than chance", {
    timeout: 30_000,
  }, async () => {
    for (const seed of [21, 22, 23, 24]) {
      const result = await locate(pnma, cell, listOf([[0, 0.372, 0]], [10], seed, 1), defaultSearchOptions);
      expect(result.candidates[0]?.evidence.reading).toBe("found");
      for (const find of result.severalVectors?.found ?? []) expect(find.gain).toBeLessThan(3);
    }
  });

  test("chance peaks: no set of vectors reads as found", { timeout: 60_000 }, async () => {
    for (const seed of [31, 32, 33]) {
      const random = seeded(seed);
      const list = powderList(
        Array.from({ length: 12 }, () => 0.4 + 1.8 * random.next()).sort((a, b) => a - b),
        s,
      );
      const result = await locate(pnma, cell, list, defaultSearchOptions);
      for (const find of result.severalVectors?.found ?? []) expect(find.evidence.reading).not.toBe("found");
    }
  });

  test("a crystal with two vectors", async () => {
    const ks: readonly Triple[] = [
      [0, 0.5, 0],
      [0.31, 0, 0],
    ];
    const random = seeded(3);
    const rows = ks.flatMap((k) =>
      Array.from({ length: 6 }, () =>
        k.map(
          (entry) => Math.floor(4 * random.next()) + (random.next() < 0.5 ? 1 : -1) * entry + 0.002 * normal(random),
        ),
      ),
    );
    const result = await locate(pnma, cell, crystalList(rows, 0.003), defaultSearchOptions);
    const [a, b] = vectorsOf(result);
    const [first, second] = ks as [Triple, Triple];
    expect((isNear(a, first) && isNear(b, second)) || (isNear(a, second) && isNear(b, first))).toBe(true);
  });

  test("off on request, and none where one k leaves nothing over", async () => {
    const list = listOf([[0, 0.5, 0]], [9], 41);
    expect((await locate(pnma, cell, list, defaultSearchOptions)).severalVectors).toBeNull();
    const two = listOf(
      [
        [0, 0.5, 0],
        [0.31, 0, 0],
      ],
      [8, 6],
      42,
    );
    const off = await locate(pnma, cell, two, { ...defaultSearchOptions, severalVectors: false });
    expect(off.severalVectors).toBeNull();
  });
});

describe("what peaks are worth", () => {
  const k: Triple = [0, 0.372, 0];

  test("a repeated row adds no evidence", async () => {
    const once = listOf([k], [7], 51);
    const rows = once.peaks.map(({ q }) => q as number);
    const options = { ...defaultSearchOptions, unmatched: 0, maxDimension: 1 as const };
    const twice = powderList([...rows, ...rows.slice(0, 4)], s);
    const [one, other] = [await locate(pnma, cell, once, options), await locate(pnma, cell, twice, options)];
    // The tuning of k is charged a little more for the apparently better determined k, never less.
    const [a, b] = [one.candidates[0]?.evidence.value as number, other.candidates[0]?.evidence.value as number];
    expect(b).toBeLessThanOrEqual(a + 1e-6);
    expect(b).toBeGreaterThan(a - 1);
  });

  test("by intensity a weak stray costs less than a strong one; without intensities nothing changes", async () => {
    const made = listOf([k], [9], 52);
    const stray = 1.3131;
    const rows = [...made.peaks.map(({ q }) => q as number), stray];
    const evidence = async (intensity: number | null, weighByIntensity: boolean) => {
      const list = powderList(rows, s);
      const peaks = list.peaks.map((peak) => ({
        ...peak,
        intensity: intensity === null ? null : peak.q === stray ? intensity : 100,
      }));
      const result = await locate(pnma, cell, { ...list, peaks }, { ...defaultSearchOptions, weighByIntensity });
      return result.candidates[0]?.evidence.value as number;
    };
    expect(await evidence(10, true)).toBeGreaterThan(await evidence(1000, true));
    expect(await evidence(null, true)).toBe(await evidence(null, false));
    expect(await evidence(10, false)).toBe(await evidence(1000, false));
  });

  test("two peaks too far apart to be one line, with one line between them, are told", async () => {
    const made = listOf([k], [8], 53);
    const rows = made.peaks.map(({ q }) => q as number);
    const line = rows[3] as number;
    const split = powderList([...rows.filter((q) => q !== line), line - 2.6 * s, line + 2.6 * s], s);
    const result = await locate(pnma, cell, split, { ...defaultSearchOptions, unmatched: 2, maxDimension: 1 });
    expect(result.candidates[0]?.warnings.map(({ code }) => code)).toContain("shared-line");
    const fine = await locate(pnma, cell, made, { ...defaultSearchOptions, maxDimension: 1 });
    expect(fine.candidates[0]?.warnings.map(({ code }) => code)).not.toContain("shared-line");
  });

  test("parents of λ/2 images get their measured intensities", async () => {
    const axes = reciprocalAxes(cell);
    const length = (h: Triple) =>
      Math.hypot(...[0, 1, 2].map((i) => h.reduce((sum, n, axis) => sum + n * (axes[axis]?.[i] as number), 0)));
    const list = powderList([0, 1, 2].flatMap((l) => [length([0, 0.5, l]), length([1, 0.5, l])]).sort(), 0.002);
    const parents = powderList([length([0, 1, 2]), length([2, 1, 0])], 0.002);
    const nuclear = { ...parents, peaks: parents.peaks.map((peak, index) => ({ ...peak, intensity: 500 + index })) };
    const { flags } = await locate(pnma, cell, list, { ...defaultSearchOptions, maxDimension: 0, nuclear });
    const half = flags.filter((flag) => flag.with === "half wavelength");
    expect(half.find(({ h }) => h.map(Math.abs).join() === "0,1,2")?.parentIntensity).toBe(500);
    expect(half.find(({ h }) => h.map(Math.abs).join() === "2,1,0")?.parentIntensity).toBe(501);
    expect(half.some(({ parentIntensity }) => parentIntensity === null)).toBe(true);
  });

  test("few peaks beyond the free components: a reading of found is withheld and it is said", async () => {
    const list = powderList([1.0426], 1e-6);
    const result = await locate(pnma, cell, list, { ...defaultSearchOptions, unmatched: 0, maxDimension: 0 });
    for (const { evidence } of result.candidates) expect(evidence.reading).not.toBe("found");
    const point = listOf([[0, 0.5, 0]], [2], 54);
    const two = await locate(pnma, cell, point, { ...defaultSearchOptions, unmatched: 0 });
    expect(two.warnings.map(({ code }) => code)).toContain("too-few-peaks");
  });
});
