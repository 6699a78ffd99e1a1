import { analyseScan, type ScanSeries } from "@kvane/core/onsets";
import { describe, expect, it } from "vitest";
import { coverageOf, toldApart } from "../certify/exchange.js";
import { seeded } from "../support/random.js";
import { madeScan, normal } from "../support/scans.js";

const range = { from: 2, to: 60, step: 1 };

/** Any function of temperature with noise of one standard deviation. */
function made(name: string, value: (t: number) => number, noise: number, seed: number): ScanSeries {
  const random = seeded(seed);
  const temperatures = Array.from({ length: 59 }, (_, n) => 2 + n);
  return {
    name,
    temperatures,
    values: temperatures.map((t) => value(t) + noise * normal(random)),
    uncertainties: temperatures.map(() => noise),
  };
}

describe("one peak", () => {
  // The share of the normal distribution within 2.5 standard deviations is 98.8 %.
  it("has T_N and β within 2.5 s.u. of the truth in at least 95 % of simulated scans", () => {
    const { scans, found, transitions, betas } = coverageOf(0, 40);
    expect(found).toBe(scans);
    expect(transitions).toBeGreaterThanOrEqual(38);
    expect(betas).toBeGreaterThanOrEqual(38);
  });

  it("without noise gives back the law that made it", () => {
    const law = { transition: 40.3, beta: 0.31, amplitude: 80, background: 3 };
    const series = madeScan("a", law, range, () => 1e-3, seeded(1));
    const fit = analyseScan([series]).peaks[0]?.fit;
    expect(fit?.transition.value).toBeCloseTo(40.3, 3);
    expect(fit?.beta.value).toBeCloseTo(0.31, 4);
    expect(fit?.amplitude.value).toBeCloseTo(80, 1);
    expect(fit?.background.value).toBeCloseTo(3, 2);
    expect(fit?.fits).toBe(true);
  });

  it("is fitted near T_N alone where the law does not hold far below", () => {
    // Mean-field order of spin 1/2 saturates: m = tanh(m T_N/T); near T_N it goes as the square root.
    const field = (t: number) => {
      let m = 1;
      for (let step = 0; step < 4000; step++) m = Math.tanh((m * 40) / t);
      return t < 40 ? m * m : 0;
    };
    const series = made("a", (t) => 1000 * field(t), 2, 5);
    const fit = analyseScan([series]).peaks[0]?.fit;
    expect(fit?.reducedRange).toBeLessThan(0.6);
    expect(Math.abs((fit?.transition.value ?? 0) - 40)).toBeLessThan(0.3);
    expect(fit?.beta.value).toBeGreaterThan(0.4);
    expect(fit?.beta.value).toBeLessThan(0.6);
  });

  it("takes the range that is asked for", () => {
    const series = madeScan(
      "a",
      { transition: 40, beta: 0.3, amplitude: 80, background: 3 },
      range,
      () => 1,
      seeded(2),
    );
    const fit = analyseScan([series], [], { reducedRange: 0.3 }).peaks[0]?.fit;
    expect(fit?.reducedRange).toBeLessThanOrEqual(0.32);
    expect(fit?.pointsBelow).toBeLessThan(15);
  });

  it("gets its uncertainties from the scatter where none are given", () => {
    const series = madeScan(
      "a",
      { transition: 40, beta: 0.3, amplitude: 80, background: 3 },
      range,
      () => 1,
      seeded(3),
    );
    const [given, own] = [series, { ...series, uncertainties: null }].map((one) => analyseScan([one]).peaks[0]?.fit);
    expect(own?.uncertaintySource).toBe("scatter");
    expect(Math.abs((own?.transition.value ?? 0) - 40)).toBeLessThan(3 * (own?.transition.su ?? 0));
    expect((own?.transition.su ?? 0) / (given?.transition.su ?? 1)).toBeGreaterThan(0.5);
    expect((own?.transition.su ?? 0) / (given?.transition.su ?? 1)).toBeLessThan(2);
  });
});

describe("what peaks do", () => {
  const law = { transition: 35, beta: 0.3, amplitude: 60, background: 4 };
  it.each([
    ["onset", (seed: number) => madeScan("a", law, range, () => 1, seeded(seed))],
    ["loss", (seed: number) => madeScan("a", { ...law, amplitude: -30, background: 80 }, range, () => 1, seeded(seed))],
    ["constant", (seed: number) => made("a", () => 50, 1, seed)],
    ["absent", (seed: number) => made("a", () => 0, 1, seed)],
    // Thermal motion: I exp(−2W) with 2W rising as T².
    ["gradual", (seed: number) => made("a", (t) => 400 * Math.exp(-((t / 120) ** 2)), 1, seed)],
  ] as const)("%s", (behaviour, maker) => {
    const found = Array.from({ length: 6 }, (_, n) => analyseScan([maker(100 + n)]).peaks[0]?.behaviour);
    expect(found).toEqual(Array(6).fill(behaviour));
  });

  it("is undecided with too few points", () => {
    const few = { name: "a", temperatures: [2, 10, 20], values: [5, 4, 0], uncertainties: null };
    expect(analyseScan([few]).peaks[0]?.behaviour).toBe("undecided");
  });

  it("tells a peak on top of something that does not order", () => {
    const base = madeScan("a", { ...law, background: 50 }, range, () => 1, seeded(7));
    expect(analyseScan([base]).peaks[0]?.onBackground).toBe(true);
  });
});

describe("transitions", () => {
  it("at 40 K and 42 K are told apart, and one is not split", () => {
    const { apart, together } = toldApart(0, 4);
    expect(apart).toBe(4);
    expect(together).toBe(4);
  });

  it("have a common T_N that is better known than that of each peak", () => {
    const random = seeded(11);
    const peaks = ["a", "b", "c", "d"].map((name) =>
      madeScan(name, { transition: 40, beta: 0.35, amplitude: 80, background: 3 }, range, () => 3, random),
    );
    const { transitions, peaks: single } = analyseScan(peaks);
    expect(transitions).toHaveLength(1);
    const common = transitions[0]?.temperature;
    expect(common?.su ?? 1).toBeLessThan(Math.max(...single.map(({ fit }) => fit?.transition.su ?? 0)));
    expect(Math.abs((common?.value ?? 0) - 40)).toBeLessThan(3 * (common?.su ?? 0));
  });
});

describe("k against temperature", () => {
  const run = (value: (t: number) => number, seed: number) =>
    analyseScan([], [made("k", value, 0.0008, seed)]).k[0] as NonNullable<ReturnType<typeof analyseScan>["k"][0]>;

  it("constant", () => {
    const found = Array.from({ length: 10 }, (_, n) => run(() => 0.2815, 200 + n));
    expect(found.filter(({ behaviour }) => behaviour === "constant").length).toBeGreaterThanOrEqual(9);
    expect(found[0]?.plateaus[0]?.fraction).toBeNull();
  });

  it("sliding without a plateau", () => {
    const found = Array.from({ length: 10 }, (_, n) => run((t) => 0.27 + 0.0009 * t, 300 + n));
    expect(found.map(({ behaviour }) => behaviour)).toEqual(Array(10).fill("sliding"));
    expect(found.filter(({ plateaus }) => plateaus.length > 0).length).toBeLessThanOrEqual(1);
    expect(Math.abs((found[0]?.slope?.value ?? 0) - 0.0009)).toBeLessThan(4 * (found[0]?.slope?.su ?? 0));
  });

  it("locking in at 1/4 below 25 K", () => {
    const found = Array.from({ length: 10 }, (_, n) => run((t) => (t < 25 ? 0.25 : 0.25 + 0.0012 * (t - 25)), 400 + n));
    expect(found.map(({ behaviour }) => behaviour)).toEqual(Array(10).fill("lock-in"));
    for (const { plateaus } of found) {
      expect(plateaus.map(({ fraction }) => fraction?.join("/"))).toEqual(["1/4"]);
      expect(plateaus[0]?.to).toBeGreaterThan(20);
      expect(plateaus[0]?.to).toBeLessThan(30);
    }
  });

  it("level at no simple fraction is no lock-in", () => {
    const found = run((t) => (t < 25 ? 0.2815 : 0.2815 + 0.0012 * (t - 25)), 500);
    expect(found.behaviour).toBe("sliding");
    expect(found.plateaus).toHaveLength(1);
  });
});

describe("the uncertainty of T_N", () => {
  it("covers a second hollow of χ² below a cusp just above a point", () => {
    // Simulated with T_N = 40 K; χ² is least at 40.13 K with a narrow cusp, and has a second hollow 7 higher near 40.0 K.
    const rows = [
      [15, 90.051, 1.866],
      [15.897, 90.814, 1.844],
      [16.795, 87.524, 1.821],
      [17.692, 82.843, 1.798],
      [18.59, 80.951, 1.774],
      [19.487, 83.378, 1.75],
      [20.385, 80.221, 1.725],
      [21.282, 80.005, 1.699],
      [22.179, 77.812, 1.673],
      [23.077, 78.813, 1.646],
      [23.974, 77.103, 1.618],
      [24.872, 71.808, 1.59],
      [25.769, 72.426, 1.56],
      [26.667, 69.867, 1.529],
      [27.564, 66.621, 1.497],
      [28.462, 67.718, 1.464],
      [29.359, 64.653, 1.429],
      [30.256, 63.468, 1.393],
      [31.154, 64.085, 1.355],
      [32.051, 60.209, 1.314],
      [32.949, 57.44, 1.271],
      [33.846, 52.91, 1.225],
      [34.744, 49.148, 1.175],
      [35.641, 48.756, 1.121],
      [36.538, 43.411, 1.061],
      [37.436, 39.524, 0.992],
      [38.333, 33.835, 0.909],
      [39.231, 26.702, 0.802],
      [40.128, 6.468, 0.608],
      [41.026, 4.809, 0.608],
      [41.923, 4.829, 0.608],
      [42.821, 5.124, 0.608],
      [43.718, 5.174, 0.608],
      [44.615, 4.269, 0.608],
      [45.513, 3.918, 0.608],
      [46.41, 4.644, 0.608],
      [47.308, 4.869, 0.608],
      [48.205, 4.518, 0.608],
      [49.103, 4.386, 0.608],
      [50, 4.422, 0.608],
    ] as const;
    const [temperatures, values, uncertainties] = [0, 1, 2].map((n) => rows.map((row) => row[n] as number)) as [
      number[],
      number[],
      number[],
    ];
    const { value, su } = analyseScan([{ name: "a", temperatures, values, uncertainties }]).peaks[0]?.fit
      ?.transition ?? { value: 0, su: 0 };
    expect(Math.abs(value - 40)).toBeLessThan(2.5 * (su ?? 0));
    expect(su).toBeGreaterThan(0.05);
    expect(su).toBeLessThan(0.2);
  });

  it("and the grouping cost no more than a few seconds for many peaks", () => {
    const random = seeded(3);
    const peaks = Array.from({ length: 40 }, (_, n) =>
      madeScan(
        `p${n}`,
        { transition: n % 2 ? 40 : 42, beta: 0.3, amplitude: 80, background: 3 },
        range,
        () => 1,
        random,
      ),
    );
    expect(analyseScan(peaks).transitions.map(({ series }) => series.length)).toEqual([20, 20]);
  }, 60000);
});
