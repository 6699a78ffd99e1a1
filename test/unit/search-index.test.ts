import { KvaneError } from "@kvane/core/errors";
import { numericWaveVector, parseWaveVector, placeWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { defaultSearchOptions, indexPeaks, type PeakList, setAsidePeaks } from "@kvane/core/search";
import { parseGroup, type SpaceGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { lengthOf, reciprocalAxes } from "../support/line-twin.ts";
import { crystalList, normal, powderList } from "../support/peak-lists.ts";
import { seeded } from "../support/random.ts";
import { wave } from "../support/written.ts";

const pnma = parseGroup("P n m a");
const cell = { a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90 };
const axes = reciprocalAxes(cell);

function k(group: SpaceGroup, text: string): WaveVector {
  return placeWaveVector(group, parseWaveVector(text)).k;
}

function errorOf(action: () => unknown): KvaneError {
  try {
    action();
  } catch (error) {
    if (error instanceof KvaneError) return error;
    throw error;
  }
  throw new Error("nothing was thrown");
}

describe("a given k on a powder list", () => {
  test("assigns each peak, gives observed minus calculated and the others within the tolerance", () => {
    const q = lengthOf(axes, [0, 0.5, 0]);
    const far = lengthOf(axes, [2, 0.5, 1]);
    const near = lengthOf(axes, [3, 0.5, 0]);
    const found = indexPeaks(pnma, cell, wave("0 1/2 0"), powderList([q + 0.003, (far + near) / 2, 2.4], 0.02), {
      ...defaultSearchOptions,
      tolerance: 0.04,
    });
    expect(found.assignments[0]).toMatchObject({ peak: 0, h: [0, 0, 0], sign: 0, arm: 0, residualHkl: null });
    expect(found.assignments[0]?.residual).toBeCloseTo(0.003, 9);
    expect(found.assignments[0]?.q).toBeCloseTo(q, 9);
    const around = [found.assignments[1], ...(found.assignments[1]?.alternatives ?? [])];
    expect(around.map((line) => line?.h.join(" "))).toEqual(expect.arrayContaining(["2 0 1", "3 0 0"]));
    expect(around.every((line) => Math.abs(line?.residual ?? 1) <= 0.04)).toBe(true);
    const sizes = around.map((line) => Math.abs(line?.residual ?? 1));
    expect(sizes).toEqual([...sizes].sort((a, b) => a - b));
    expect(found.refinement).toBeNull();
  });

  test("3 s.u. of each peak, or the tolerance in their place; the evidence does not depend on it", () => {
    const q = lengthOf(axes, [0, 0.5, 0]);
    const list = powderList([q + 0.011, q + 0.011], [0.003, 0.004]);
    const at = (tolerance: number | null) =>
      indexPeaks(pnma, cell, wave("0 1/2 0"), list, { ...defaultSearchOptions, tolerance });
    expect(at(null).unmatched).toEqual([0]);
    expect(at(0.01).unmatched).toEqual([0, 1]);
    expect(at(0.012).unmatched).toEqual([]);
    expect(at(0.01).evidence).toEqual(at(0.012).evidence);
  });

  test("peaks above the limit of Q are set aside, with the reason", () => {
    const list = powderList([lengthOf(axes, [0, 0.5, 0]), 3.3], 0.004);
    const options = { ...defaultSearchOptions, qMax: 2 };
    expect(indexPeaks(pnma, cell, wave("0 1/2 0"), list, options)).toMatchObject({ matched: 1, total: 1 });
    expect(setAsidePeaks(pnma, cell, list, options)).toEqual([{ peak: 1, because: expect.stringContaining("2 Å⁻¹") }]);
  });

  test("k = 0 is marked: its lines are the nuclear ones; (1,0,0) of a C cell is another point", () => {
    const list = powderList([1.2], 0.004);
    const box = { a: 5.35, b: 13.1, c: 5.4, alpha: 90, beta: 90, gamma: 90 };
    const cmce = parseGroup("C m c e");
    const at = (text: string) => indexPeaks(cmce, box, wave(text), list, defaultSearchOptions).onNuclearLines;
    expect([at("0 0 0"), at("1 1 0"), at("1 0 0")]).toEqual([true, true, false]);
  });

  test("refuses what cannot be indexed", () => {
    const list = powderList([1.2], 0.004);
    expect(errorOf(() => indexPeaks(pnma, cell, k(pnma, "0,u,0"), list, defaultSearchOptions)).code).toBe(
      "k-needs-values",
    );
    expect(errorOf(() => indexPeaks(pnma, cell, wave("0 0 0"), powderList([], 0.1), defaultSearchOptions)).code).toBe(
      "too-few-peaks",
    );
    expect(errorOf(() => indexPeaks(pnma, cell, wave("0 0 0"), list, { ...defaultSearchOptions, qMax: 1 })).code).toBe(
      "too-few-peaks",
    );
    for (const bad of [
      powderList([Number.NaN], 0.1),
      powderList([1], 0),
      powderList([-1], 0.1),
      powderList([1], Number.NaN),
      { ...crystalList([[1, 0, 0]], 0.1), kind: "q" } as PeakList,
    ]) {
      const { code, problems } = errorOf(() => indexPeaks(pnma, cell, wave("0 0 0"), bad, defaultSearchOptions));
      expect([code, problems[0]?.where.line]).toEqual(["invalid-peak", 1]);
    }
    const cubic = { ...cell, b: cell.a };
    expect(
      errorOf(() => indexPeaks(parseGroup("P 4/m m m"), { ...cubic, b: 6 }, wave("0 0 0"), list, defaultSearchOptions))
        .code,
    ).toBe("cell-contradicts-group");
  });

  test("all impossible options at once", () => {
    const options = {
      tolerance: -1,
      unmatched: 0.5,
      maxDimension: 7 as 3,
      qMax: 0,
      zeroShift: Number.NaN,
      cellScale: -0.1,
    };
    const { problems } = errorOf(() => indexPeaks(pnma, cell, wave("0 0 0"), powderList([1.2], 0.004), options));
    expect(problems.map(({ where }) => where.argument)).toEqual([
      "--tolerance",
      "--unmatched",
      "--max-dimension",
      "--q-max",
      "--zero-shift",
      "--cell-scale",
    ]);
  });
});

describe("refinement of measured values", () => {
  // 24 satellites of a plane k in P n m a with seeded normal noise.
  const truth = [0.137, 0, 0.291];
  const h = [
    [0, 0, 0],
    [1, 0, 0],
    [-1, 0, 0],
    [0, 1, 0],
    [1, 1, 0],
    [0, 0, 1],
    [0, 0, -1],
    [2, 0, 0],
    [-2, 0, 0],
    [1, 0, -1],
    [-1, 0, 1],
    [2, 1, 0],
  ];
  const exact = h.flatMap((row) =>
    [1, -1].map((sign) =>
      lengthOf(
        axes,
        row.map((entry, axis) => entry + sign * (truth[axis] as number)),
      ),
    ),
  );

  test("finds the true values within their uncertainties, in 95 of 100 runs within 2 to the normal law", () => {
    const random = seeded(5);
    let within = 0;
    let chi = 0;
    for (let run = 0; run < 100; run++) {
      const s = 0.002;
      const list = powderList(
        exact.map((q) => q + s * normal(random)),
        s,
      );
      const found = indexPeaks(pnma, cell, k(pnma, "0.1365,0,0.2918"), list, {
        ...defaultSearchOptions,
        tolerance: 0.02,
      });
      expect(found.refinement?.determined).toBe(true);
      const numeric = numericWaveVector(found.k) as readonly number[];
      const [su, sw] = found.k.uncertainties as [number, number];
      if (Math.abs((numeric[0] as number) - 0.137) <= 2 * su) within += 1;
      if (Math.abs((numeric[2] as number) - 0.291) <= 2 * sw) within += 1;
      chi += found.residuals.reducedChiSquared ?? 0;
    }
    // 200 draws with probability 0.954: 191 ± 3. Lines close by may be swapped, which only makes χ² smaller.
    expect(within).toBeGreaterThan(180);
    expect(chi / 100).toBeGreaterThan(0.7);
    expect(chi / 100).toBeLessThan(1.2);
  });

  test("the uncertainty is that of the normal equations", () => {
    // One letter, peaks H = (0,m,0) ± k along b: dQ/du = ± b*, so s(u) = s / (b* √n).
    const positions = [0.28, 0.72, 1.28, 1.72].map((v) => lengthOf(axes, [0, v, 0]));
    const found = indexPeaks(pnma, cell, k(pnma, "0,0.2803,0"), powderList(positions, 0.004), defaultSearchOptions);
    const bStar = (2 * Math.PI) / cell.b;
    expect(found.k.values?.[0]).toBeCloseTo(0.28, 6);
    expect(found.k.uncertainties?.[0]).toBeCloseTo(0.004 / bStar / 2, 9);
    expect(found.refinement).toMatchObject({ determined: true, converged: true, from: { values: [0.2803] } });
    expect(found.residuals.degreesOfFreedom).toBe(3);
    expect(found.evidence.charges.tuning).toBeGreaterThan(0);
  });

  test("a start that matches few peaks pulls the others in", () => {
    const positions = [0.28, 0.72, 1.28, 1.72, 2.28].map((v) => lengthOf(axes, [1, v, 0]));
    const list = powderList(positions, 0.003);
    const start = k(pnma, "0,0.29,0");
    const before = indexPeaks(pnma, cell, wave("0 29/100 0"), list, defaultSearchOptions);
    const after = indexPeaks(pnma, cell, start, list, defaultSearchOptions);
    expect(before.matched).toBeLessThan(5);
    expect(after.matched).toBe(5);
    expect(after.k.values?.[0]).toBeCloseTo(0.28, 4);
  });

  test("letters that the peaks do not fix stay, and it is said", () => {
    const start = k(pnma, "0.137,0,0.291");
    const found = indexPeaks(
      pnma,
      cell,
      start,
      powderList([lengthOf(axes, [0.137, 0, 0.291])], 0.004),
      defaultSearchOptions,
    );
    expect(found.k).toEqual(start);
    expect(found.refinement?.determined).toBe(false);
    expect(found.warnings.map(({ code }) => code)).toContain("k-not-determined");
    expect(found.evidence.charges.tuning).toBe(0);
  });

  test("understated uncertainties are said, with the factor, and uncertainties rescaled", () => {
    const random = seeded(11);
    const list = powderList(
      exact.map((q) => q + 0.006 * normal(random)),
      0.001,
    );
    const found = indexPeaks(pnma, cell, k(pnma, "0.137,0,0.291"), list, { ...defaultSearchOptions, tolerance: 0.02 });
    expect(found.warnings.map(({ code }) => code)).toContain("uncertainties-understated");
    const factor = Math.sqrt(found.residuals.reducedChiSquared as number);
    expect(factor).toBeGreaterThan(3);
    expect(found.refinement?.rescaledUncertainties?.[0]).toBeCloseTo(
      (found.k.uncertainties?.[0] as number) * factor,
      9,
    );
    const honest = powderList(
      exact.map((q) => q + 0.002 * normal(random)),
      0.002,
    );
    expect(indexPeaks(pnma, cell, k(pnma, "0.137,0,0.291"), honest, defaultSearchOptions).warnings).toEqual([]);
  });
});

describe("fractional h k l of a crystal", () => {
  const tetragonal = parseGroup("P 4/m m m");
  const box = { a: 4, b: 4, c: 6, alpha: 90, beta: 90, gamma: 90 };
  const star = k(tetragonal, "0.213,0,0.5");

  test("every arm with its sign, index by index", () => {
    const peaks = [
      [0.213, 0, 0.5],
      [1.787, 1, -0.5],
      [0, 1.213, 0.5],
      [2, -0.213, 1.5],
    ];
    const found = indexPeaks(tetragonal, box, star, crystalList(peaks, 0.001), defaultSearchOptions);
    expect(found).toMatchObject({ matched: 4, total: 4, deWolff: null, smithSnyder: null, arms: 4 });
    expect(found.assignments[0]).toMatchObject({ h: [0, 0, 0], sign: 1, arm: 0 });
    expect(found.assignments[1]).toMatchObject({ h: [2, 1, 0], sign: -1, arm: 0 });
    const third = found.assignments[2];
    const fourth = found.assignments[3];
    expect(third?.arm).toBe(fourth?.arm);
    expect(third?.arm).not.toBe(0);
    expect((third?.sign ?? 0) * (fourth?.sign ?? 0)).toBe(-1);
    expect(found.evidence.reading).toBe("found");
    // Of the arms (±u,0,1/2) and (0,±u,1/2) only one of each pair is taken: no line appears twice.
    expect(found.assignments.every(({ alternatives }) => alternatives.length === 0)).toBe(true);
  });

  test("one index off by more than the tolerance is no match", () => {
    const found = indexPeaks(
      tetragonal,
      box,
      star,
      crystalList(
        [
          [0.213, 0, 0.5],
          [1.213, 0, 0.504],
        ],
        0.001,
      ),
      defaultSearchOptions,
    );
    expect(found.unmatched).toEqual([1]);
  });

  test("sign and arm tell k apart where powder positions cannot: (x,y,0) and (y,x,0) in 4/m", () => {
    const group = parseGroup("P 4/m");
    const peaks = [
      [1.13, 0.31, 0],
      [-0.31, 1.13, 0],
      [0.87, -0.31, 1],
    ];
    const [right, wrong] = ["0.13,0.31,0", "0.31,0.13,0"].map((text) =>
      indexPeaks(group, box, k(group, text), crystalList(peaks, 0.001), defaultSearchOptions),
    );
    expect([right?.matched, wrong?.matched]).toEqual([3, 0]);
    const lengths = powderList(
      peaks.map((row) => lengthOf(reciprocalAxes(box), row)),
      0.001,
    );
    const powder = ["0.13,0.31,0", "0.31,0.13,0"].map((text) =>
      indexPeaks(group, box, k(group, text), lengths, defaultSearchOptions),
    );
    expect(powder.map(({ matched }) => matched)).toEqual([3, 3]);
    expect(powder[0]?.evidence.value).toBeCloseTo(powder[1]?.evidence.value as number, 6);
  });

  test("refines the letters: mean of what each peak says, s.u. = s/√n", () => {
    const peaks = [
      [0.2121, 0, 0.5],
      [0.7871, 1, 0.5],
      [0, 1.2131, 0.5],
      [1, -0.2125, 1.5],
    ];
    const found = indexPeaks(tetragonal, box, star, crystalList(peaks, 0.001), defaultSearchOptions);
    expect(found.k.values?.[0]).toBeCloseTo((0.2121 + 0.2129 + 0.2131 + 0.2125) / 4, 9);
    expect(found.k.uncertainties?.[0]).toBeCloseTo(0.001 / 2, 9);
    expect(found.residuals.degreesOfFreedom).toBe(11);
  });

  test("centring: in a C cell (1,0,0) is no lattice vector", () => {
    const group = parseGroup("C m m m");
    const cmmm = { a: 5, b: 6, c: 7, alpha: 90, beta: 90, gamma: 90 };
    const found = indexPeaks(
      group,
      cmmm,
      wave("0 0 1/2"),
      crystalList(
        [
          [1, 1, 0.5],
          [1, 0, 0.5],
        ],
        0.001,
      ),
      defaultSearchOptions,
    );
    expect(found.unmatched).toEqual([1]);
  });

  test("chance against truth: evidence per peak is ln(N₃/n₃) at the centre", () => {
    // One arm with 2k ∈ L* in a primitive lattice: one satellite per unit volume.
    const group = parseGroup("P m m m");
    const found = indexPeaks(group, cell, wave("1/2 0 0"), crystalList([[1.5, 2, -1]], 0.01), defaultSearchOptions);
    const density = (0.01 * Math.sqrt(2 * Math.PI)) ** -3;
    expect(found.evidence.value).toBeCloseTo(Math.log(0.1 + 0.9 * density) - Math.log(8), 9);
  });
});
