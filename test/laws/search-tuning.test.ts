import { parseWaveVector, placeWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { averagedReciprocalMetric, satelliteLister } from "@kvane/core/reflections";
import { defaultSearchOptions, indexPeaks } from "@kvane/core/search";
import { type Cell, cellVolume, parseGroup, tabulatedSettings } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { tunedSet } from "#core/search/tuned-set.js";
import { tuningCharge } from "#core/search/tuning-charge.js";
import { twinLogOdds } from "../support/evidence-twin.ts";
import { normal, powderList } from "../support/peak-lists.ts";
import { seeded } from "../support/random.ts";
import { randomCell } from "../support/random-cells.ts";

function at(symbol: string, text: string): WaveVector {
  return placeWaveVector(parseGroup(symbol), parseWaveVector(text)).k;
}

describe("the volume of the set that the letters run over", () => {
  const a = 4;
  const cube: Cell = { a, b: a, c: a, alpha: 90, beta: 90, gamma: 90 };
  const star = (2 * Math.PI) / a;
  // Asymmetric parts read off by hand: (u,0,0) 0…1/2; (u,u,0) 0…1/2 of √2; (u,v,0) the triangle 0 ≤ v ≤ u ≤ 1/2, …
  const cubic: readonly [string, string, number][] = [
    ["P m -3 m", "0.2137,0,0", star / 2],
    ["P m -3 m", "0.2137,0.2137,0", (star * Math.SQRT2) / 2],
    ["P m -3 m", "0.2137,0.2137,0.2137", (star * Math.sqrt(3)) / 2],
    ["P m -3 m", "0.2137,0.1319,0", star ** 2 / 8],
    ["P m -3 m", "0.2137,0.2137,0.1319", (star ** 2 * Math.SQRT2) / 4],
    // In an F lattice 2a* is the shortest lattice vector along (u,0,0); (0,0,1) is an end point, half of it.
    ["F m -3 m", "0,0,0.2137", star],
    // In an I lattice (1,1,0) is in L*, and (1/2,1/2,0) is the end point.
    ["I m -3 m", "0.2137,0.2137,0", (star * Math.SQRT2) / 2],
    ["F m -3 m", "0.2137,0.2137,0.2137", (star * Math.sqrt(3)) / 2],
  ];

  test.each(cubic)("%s at %s", (symbol, text, volume) => {
    const group = parseGroup(symbol);
    const metric = averagedReciprocalMetric(group, cube).map((entry) => 4 * Math.PI ** 2 * entry);
    expect(tunedSet(group, at(symbol, text), metric, 1e-6).volume).toBeCloseTo(volume, 9);
  });

  test("general k: the zone over the order of the point group extended by −1, in any setting", () => {
    const random = seeded(3);
    for (let run = 0; run < 25; run++) {
      const hall = random.pick(tabulatedSettings()).hall;
      const group = parseGroup(`hall:${hall}`);
      const cell = randomCell(group, random, 100);
      const metric = averagedReciprocalMetric(group, cell).map((entry) => 4 * Math.PI ** 2 * entry);
      const k = placeWaveVector(group, parseWaveVector("0.1371,0.2193,0.0817")).k;
      const set = tunedSet(group, k, metric, 1e-6);
      const centric = group.operators.some(({ rotation }) => rotation.join() === "-1,0,0,0,-1,0,0,0,-1");
      const order = group.operators.length * (centric ? 1 : 2);
      // Triangular rows: the product of the diagonal is the share of the cell that is primitive.
      const share = group.lattice.vectors.reduce((product, vector, axis) => product * (vector[axis] as number), 1);
      const primitive = (cellVolume(cell) * share) / group.lattice.denominator ** 3;
      expect(set.volume / ((2 * Math.PI) ** 3 / primitive / order), hall).toBeCloseTo(1, 9);
      expect(set.coincidentImages).toBe(1);
    }
  });

  test("images of k that coincide within the tolerance are counted", () => {
    const group = parseGroup("P m m m");
    const metric = averagedReciprocalMetric(group, cube).map((entry) => 4 * Math.PI ** 2 * entry);
    // −0.01 is 0.02 a* = 0.031 Å⁻¹ away.
    expect(tunedSet(group, at("P m m m", "0.01,0,0"), metric, 0.032).coincidentImages).toBe(2);
    expect(tunedSet(group, at("P m m m", "0.01,0,0"), metric, 0.03).coincidentImages).toBe(1);
    // Near the end point 1/2 of the line it is a lattice vector that brings the image back.
    expect(tunedSet(group, at("P m m m", "0.49,0,0"), metric, 0.032).coincidentImages).toBe(2);
    expect(tunedSet(group, at("P m m m", "0.01,0.49,0"), metric, 0.05).coincidentImages).toBe(4);
  });
});

test("m images that cannot be told apart cost ln m, no observation costs nothing", () => {
  const set = { dimension: 1, gram: Float64Array.of(4), volume: 2, coincidentImages: 1 };
  const jacobian = Float64Array.of(300, 500);
  expect(tuningCharge({ ...set, coincidentImages: 4 }, jacobian) - tuningCharge(set, jacobian)).toBeCloseTo(
    Math.log(4),
    12,
  );
  // One letter, orthonormal slopes 150 and 250 per unit: V = √2π / (W √(Σ slope² + 2π/W²)).
  expect(tuningCharge(set, jacobian)).toBeCloseTo(
    -Math.log(Math.sqrt(2 * Math.PI) / (2 * Math.sqrt(150 ** 2 + 250 ** 2 + Math.PI / 2))),
    12,
  );
  expect(tuningCharge(set, Float64Array.of(0))).toBeCloseTo(0, 12);
});

describe("the charge for tuning against the integral that it stands for", () => {
  // ln[(1/W) ∫ exp(log-odds) dk] over the asymmetric part, by the trapezoid rule; Laplace's form is good to a few
  // tenths once the peaks pin k well.
  const cell: Cell = { a: 4, b: 4, c: 7, alpha: 90, beta: 90, gamma: 90 };
  const group = parseGroup("P 4/m m m");
  const list = satelliteLister(group, cell);

  test("a line, (0,0,w)", () => {
    const random = seeded(17);
    const s = 0.004;
    const truth = at("P 4/m m m", "0,0,0.2137");
    const positions = list(truth, { qMax: 2.6 })
      .slice(0, 9)
      .map(({ q }) => q + s * normal(random));
    const peaks = positions.map((q) => ({ q, s }));
    const found = indexPeaks(
      group,
      cell,
      at("P 4/m m m", "0,0,0.2141"),
      powderList(positions, s),
      defaultSearchOptions,
    );
    const steps = 1000;
    let sum = 0;
    for (let step = 0; step < steps; step++) {
      const k = { ...truth, values: [(0.5 * (step + 0.5)) / steps] };
      sum += Math.exp(twinLogOdds(peaks, list(k, { qMax: 3.3 }).filter(distinct)));
    }
    expect(found.matched).toBe(9);
    expect(found.evidence.value).toBeCloseTo(Math.log(sum / steps), 0);
    expect(Math.abs(found.evidence.value - Math.log(sum / steps))).toBeLessThan(0.4);
    expect(found.evidence.charges.tuning).toBeGreaterThan(2);
  });

  test("a plane, (u,v,0), near its best point", () => {
    const random = seeded(23);
    const s = 0.006;
    const truth = at("P 4/m m m", "0.3137,0.1319,0");
    const positions = list(truth, { qMax: 3.2 })
      .slice(0, 10)
      .map(({ q }) => q + s * normal(random));
    const peaks = positions.map((q) => ({ q, s }));
    const found = indexPeaks(group, cell, truth, powderList(positions, s), defaultSearchOptions);
    // Almost all of the integral lies within some s.u. of the best point; the rest of the triangle is left out.
    const reach = 0.02;
    const steps = 36;
    let sum = 0;
    for (let i = 0; i < steps; i++)
      for (let j = 0; j < steps; j++) {
        const values = [0.3137 + reach * ((2 * i + 1) / steps - 1), 0.1319 + reach * ((2 * j + 1) / steps - 1)];
        sum += Math.exp(twinLogOdds(peaks, list({ ...truth, values }, { qMax: 3.9 }).filter(distinct)));
      }
    const mean = (sum * (2 * reach) ** 2) / steps ** 2 / (1 / 8);
    expect(Math.abs(found.evidence.value - Math.log(mean))).toBeLessThan(0.5);
    expect(found.evidence.charges.tuning).toBeGreaterThan(5);
  });

  /** Lines come in order of Q: one of each position. */
  function distinct({ q }: { readonly q: number }, index: number, all: readonly { readonly q: number }[]): boolean {
    return index === 0 || q - (all[index - 1] as { readonly q: number }).q > 1e-7;
  }
});
