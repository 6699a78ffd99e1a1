import { specialPoints } from "@kvane/core/kvectors";
import { defaultSearchOptions as allKinds, indexPeaks, locate } from "@kvane/core/search";
import { parseGroup, tabulatedSettings } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { deWolff, smithSnyder } from "#core/search/figures-of-merit.js";
import { nearFractions } from "#core/search/near-fractions.js";
import { twinLogOdds } from "../support/evidence-twin.ts";
import { countArms, floatGroup } from "../support/float-group.ts";
import { twinLines } from "../support/line-twin.ts";
import { powderList } from "../support/peak-lists.ts";
import { seeded } from "../support/random.ts";
import { randomCell } from "../support/random-cells.ts";
import { wave } from "../support/written.ts";

/** These tests are about evidence over the special points. */
const defaultSearchOptions = { ...allKinds, maxDimension: 0 as const };

type Vector = [number, number, number];

describe("evidence against the plain sum over brute-force lines", () => {
  const random = seeded(41);
  const cases = Array.from({ length: 20 }, (_, index) => ({
    index,
    hall: random.pick(tabulatedSettings()).hall,
    seed: random.below(1e9),
  }));

  test.each(cases)("$index: $hall", async ({ hall, seed }) => {
    const own = seeded(seed);
    const group = parseGroup(`hall:${hall}`);
    const cell = randomCell(group, own, 60 + 100 * own.next());
    const peaks = Array.from({ length: 2 + own.below(6) }, () => ({
      q: 0.3 + 2.2 * own.next(),
      s: 0.002 + 0.02 * own.next(),
    }));
    const list = powderList(
      peaks.map(({ q }) => q),
      peaks.map(({ s }) => s),
    );
    const result = await locate(group, cell, list, { ...defaultSearchOptions, belowMinimum: true });
    const points = specialPoints(group);
    expect(result.candidates.length).toBe(points.length);
    expect(result.certificate.boxes).toBe(points.length);
    const centring = group.lattice.vectors.map(
      (vector) => vector.map((entry) => entry / group.lattice.denominator) as Vector,
    );
    for (const { k, evidence, matched, arms, total } of result.candidates) {
      const numeric = k.components.map(({ constant: [top, bottom] }) => top / bottom) as Vector;
      const lines = twinLines(cell, centring, [numeric], 3.3);
      expect(evidence.value).toBeCloseTo(twinLogOdds(peaks, lines) - Math.log(points.length), 8);
      expect(matched).toBe(peaks.filter(({ q, s }) => lines.some((line) => Math.abs(line.q - q) <= 3 * s)).length);
      expect(total).toBe(peaks.length);
      expect(arms).toBe(countArms(floatGroup(group), numeric));
    }
    const values = result.candidates.map(({ evidence }) => evidence.value);
    expect(values).toEqual([...values].sort((a, b) => b - a));
  });

  test("few lines: a density below 0.5 per Å⁻¹ is not believed", () => {
    // A cube of 2.5 Å at (1/2,1/2,1/2): the lines are at 2.18 and 4.17 Å⁻¹.
    const cell = { a: 2.5, b: 2.5, c: 2.5, alpha: 90, beta: 90, gamma: 90 };
    const lines = twinLines(cell, [], [[0.5, 0.5, 0.5]], 4);
    expect(lines.length).toBe(1);
    const peaks = [{ q: 1.3, s: 0.3 }];
    const group = parseGroup("P m -3 m");
    const found = indexPeaks(group, cell, wave("1/2 1/2 1/2"), powderList([1.3], 0.3), defaultSearchOptions);
    expect(found.evidence.value).toBeCloseTo(twinLogOdds(peaks, lines) - Math.log(4), 8);
  });

  test("a special point given to index has the evidence that the search gives it", async () => {
    const group = parseGroup("P n m a");
    const cell = { a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90 };
    const list = powderList([0.8067, 1.4309, 1.8], 0.004);
    const { candidates } = await locate(group, cell, list, { ...defaultSearchOptions, belowMinimum: true });
    for (const candidate of candidates)
      expect(indexPeaks(group, cell, candidate.k, list, defaultSearchOptions).evidence).toEqual(candidate.evidence);
  });

  test("the reading: above 3 found, from 0 weak, below not informative", () => {
    const group = parseGroup("P m m m");
    const cell = { a: 4, b: 5, c: 6, alpha: 90, beta: 90, gamma: 90 };
    const half = Math.PI / 4;
    const readings = [[half], [half + 0.011], [half + 0.05]].map(
      (positions) =>
        indexPeaks(group, cell, wave("1/2 0 0"), powderList(positions, 0.004), defaultSearchOptions).evidence,
    );
    for (const { value, reading } of readings)
      expect(reading).toBe(value > 3 ? "found" : value >= 0 ? "weak" : "not informative");
    expect(readings.map(({ reading }) => reading)).toEqual(["weak", "not informative", "not informative"]);
    const more = powderList([half, Math.hypot(half, (2 * Math.PI) / 5), Math.hypot(half, (2 * Math.PI) / 6)], 0.004);
    expect(indexPeaks(group, cell, wave("1/2 0 0"), more, defaultSearchOptions).evidence.reading).toBe("found");
  });
});

describe("chance and truth on made lists", () => {
  // By Markov's inequality chance exceeds E = 3 in at most e⁻³ = 5 % of lists; the bound of the test is that.
  test("lists of chance peaks seldom reach 3, and the true k comes first", async () => {
    const random = seeded(99);
    let chanceFound = 0;
    let first = 0;
    let made = 0;
    const settings = tabulatedSettings().filter(({ number }) => number > 2);
    for (let run = 0; run < 60; run++) {
      const group = parseGroup(`hall:${random.pick(settings).hall}`);
      const cell = randomCell(group, random, 80 + 150 * random.next());
      const chance = Array.from({ length: 6 }, () => 0.4 + 2 * random.next());
      const byChance = await locate(group, cell, powderList(chance, 0.004), {
        ...defaultSearchOptions,
        belowMinimum: true,
      });
      if ((byChance.candidates[0]?.evidence.value ?? 0) > 3) chanceFound += 1;
      const points = specialPoints(group);
      const truth = random.pick(points);
      const numeric = truth.k.components.map(({ constant: [top, bottom] }) => top / bottom) as Vector;
      const centring = group.lattice.vectors.map(
        (vector) => vector.map((entry) => entry / group.lattice.denominator) as Vector,
      );
      const lines = twinLines(cell, centring, [numeric], 2.6)
        .filter(() => random.next() < 0.7)
        .slice(0, 7);
      if (lines.length < 5) continue;
      made += 1;
      const list = powderList(
        lines.map(({ q }) => q + 0.004 * (random.next() + random.next() + random.next() - 1.5)),
        0.002,
      );
      const { candidates } = await locate(group, cell, list, defaultSearchOptions);
      const place = candidates.findIndex(({ k }) => JSON.stringify(k) === JSON.stringify(truth.k));
      if (place === 0 || (place > 0 && candidates[place]?.tiedWith.includes(0))) first += 1;
    }
    expect(made).toBeGreaterThan(25);
    expect(chanceFound).toBeLessThanOrEqual(0.05 * 60);
    expect(first / made).toBeGreaterThan(0.9);
  }, 60_000);
});

describe("figures of merit", () => {
  // Two lines of a cubic cell, a = 2π Å: Q = 1, √2, …; observed Q too large by 0.001 and 0.002.
  const matches = [
    { observed: 1.001, calculated: 1 },
    { observed: 1.416213562373095, calculated: Math.SQRT2 },
  ];
  const positions = Float64Array.from([1, Math.SQRT2, Math.sqrt(3), 2]);

  test("M_N = Q_N / (2 ⟨ΔQ⟩ N_calc) with Q = 1/d²", () => {
    const square = (q: number): number => (q / 2 / Math.PI) ** 2;
    const mean = (square(1.001) - square(1) + square(1.416213562373095) - square(Math.SQRT2)) / 2;
    expect(deWolff(matches, positions)).toBeCloseTo(square(1.416213562373095) / (2 * mean * 2), 8);
  });

  test("F_N = N / (⟨|Δ2θ|⟩ N_poss)", () => {
    const angle = (q: number): number => (2 * Math.asin((q * 1.5) / 4 / Math.PI) * 180) / Math.PI;
    const mean = (angle(1.001) - angle(1) + angle(1.416213562373095) - angle(Math.SQRT2)) / 2;
    expect(smithSnyder(matches, positions, 1.5)).toBeCloseTo(2 / (mean * 2), 8);
    expect(smithSnyder(matches, positions, null)).toBeNull();
  });

  test("lines before the last peak that nobody saw count against it", () => {
    const skipped = [matches[0] as (typeof matches)[0], { observed: 2.003, calculated: 2 }];
    const square = (q: number): number => (q / 2 / Math.PI) ** 2;
    const mean = (square(1.001) - square(1) + square(2.003) - square(2)) / 2;
    expect(deWolff(skipped, positions)).toBeCloseTo(square(2.003) / (2 * mean * 4), 8);
  });

  test("null for no match and for residuals that are rounding", () => {
    expect(deWolff([], positions)).toBeNull();
    expect(deWolff([{ observed: 1, calculated: 1 + 1e-12 }], positions)).toBeNull();
    expect(smithSnyder([{ observed: 1, calculated: 1 }], positions, 1.5)).toBeNull();
  });
});

describe("near fractions", () => {
  const line = (value: number, su: number | null) => ({
    components: [
      {
        constant: [0, 1],
        coefficients: [
          [0, 1],
          [1, 1],
          [0, 1],
        ],
      },
      {
        constant: [1, 3],
        coefficients: [
          [0, 1],
          [0, 1],
          [0, 1],
        ],
      },
      {
        constant: [0, 1],
        coefficients: [
          [0, 1],
          [0, 1],
          [0, 1],
        ],
      },
    ] as const,
    values: [value],
    uncertainties: [su],
  });

  test("in lowest terms, denominators up to 8, within 2 s.u., with the letter that the value belongs to", () => {
    expect(nearFractions(line(0.3331, 0.0005))).toEqual([
      { parameter: "v", fraction: [1, 3], deviation: expect.closeTo(-0.4667, 3) },
    ]);
    expect(nearFractions(line(0.3344, 0.0005))).toEqual([]);
    expect(nearFractions(line(-0.4996, 0.0005)).map(({ fraction }) => fraction)).toEqual([[-1, 2]]);
    expect(nearFractions(line(0.14, 0.01)).map(({ fraction }) => fraction)).toEqual([
      [1, 7],
      [1, 8],
    ]);
    expect(nearFractions(line(0.333, null))).toEqual([]);
  });
});
