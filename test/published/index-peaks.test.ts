import { numericWaveVector, parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import { type Candidate, defaultSearchOptions, indexPeaks, type PeakList } from "@kvane/core/search";
import { type Cell, parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { equivalentRows } from "../support/equivalent-rows.ts";
import { normal, powderList } from "../support/peak-lists.ts";
import { seeded } from "../support/random.ts";

/*
 * Published k on lines and planes. The d below were computed from the published cell and k apart from this project, to
 * the digits given; they are no measured data.
 */

/** d in Å with the uncertainty of its last printed digit, 0.5 in 10⁻³ Å at least; noise of `noise` s.u. when asked. */
function spacings(d: readonly number[], su = 0.0015, noise: number | null = null): PeakList {
  const random = seeded(noise ?? 1);
  const q = d.map((value) => (2 * Math.PI) / value);
  const s = q.map((value, index) => (value * su) / (d[index] as number));
  return powderList(noise === null ? q : q.map((value, index) => value + (s[index] as number) * normal(random)), s);
}

function indexed(symbol: string, cell: Cell, k: string, list: PeakList): Candidate {
  const group = parseGroup(symbol);
  return indexPeaks(group, cell, placeWaveVector(group, parseWaveVector(k)).k, list, defaultSearchOptions);
}

function refined(candidate: Candidate): readonly number[] {
  return numericWaveVector(candidate.k) as readonly number[];
}

describe("CuO in C2/c, J. B. Forsyth, P. J. Brown & B. M. Wanklyn, J. Phys. C 21 (1988) 2917", () => {
  const cell: Cell = { a: 4.684, b: 3.423, c: 5.129, alpha: 90, beta: 99.5, gamma: 90 };
  const d = [7.466, 6.32, 3.352, 3.112, 3.092, 3.011, 3.01];

  test("k = (1/2,0,−1/2) lies on a plane and explains every line", () => {
    const found = indexed("C 1 2/c 1", cell, "1/2,0,-1/2", spacings(d));
    expect([found.matched, found.total]).toEqual([7, 7]);
    expect(found.evidence.reading).toBe("found");
    expect(found.manifold.dimension).toBe(2);
    expect(found.refinement).toBeNull();
  });

  test("(1/2,0,1/2) is the same modulo L*: same positions, but the lines bear other H", () => {
    // The two differ by (0,0,1), and h + k is even: the C lattice does not tell them apart, only intensities do.
    const [minus, plus] = ["1/2,0,-1/2", "1/2,0,1/2"].map((k) => indexed("C 1 2/c 1", cell, k, spacings(d)));
    expect(plus?.evidence).toEqual(minus?.evidence);
    expect([minus, plus].map((found) => found?.assignments.slice(0, 2).map(({ h }) => h.join(" ")))).toEqual([
      ["0 0 0", "0 0 1"],
      ["0 0 1", "0 0 0"],
    ]);
  });

  test("in I 1 2/a 1, where (0,0,1) is not in L*, the two are different vectors with different lines", () => {
    // The same lattice with axes a, −b, −a−c: k = (1/2,0,−1/2) of the C cell is (1/2,0,0) there.
    const group = parseGroup("I 1 2/a 1");
    expect(equivalentRows(group, placeWaveVector(group, parseWaveVector("1/2,0,-1/2")).k, [0.5, 0, 0.5])).toBe(false);
    const side = Math.sqrt(cell.a ** 2 + cell.c ** 2 + 2 * cell.a * cell.c * Math.cos((cell.beta * Math.PI) / 180));
    const beta = (Math.acos(-(cell.a + cell.c * Math.cos((cell.beta * Math.PI) / 180)) / side) * 180) / Math.PI;
    const turned: Cell = { ...cell, c: side, beta };
    const [right, wrong] = ["1/2,0,0", "0,0,1/2"].map((k) => indexed("I 1 2/a 1", turned, k, spacings(d)));
    expect(right?.matched).toBe(7);
    expect(wrong?.evidence.value).toBeLessThan((right?.evidence.value as number) - 10);
  });

  test("above 213 K, (0.506,0,−0.483) is told from (0.506,0,0.483)", () => {
    // Lines of the published k, computed here from the metric of a monoclinic cell.
    const lines = [
      [0, 0, 0],
      [0, 0, 1],
      [-1, 1, 0],
      [0, 0, -1],
      [0, 2, 0],
      [-1, 1, 1],
      [-2, 0, 0],
      [0, 0, 2],
    ].map(([h, k, l]) => monoclinicSpacing(cell, (h as number) + 0.506, k as number, (l as number) - 0.483));
    const list = spacings(lines, 0.003, 230);
    const right = indexed("C 1 2/c 1", cell, "0.506,0,-0.483", list);
    const wrong = indexed("C 1 2/c 1", cell, "0.506,0,0.483", list);
    expect(right.matched).toBe(8);
    expect(wrong.matched).toBeLessThan(6);
    expect(right.evidence.value).toBeGreaterThan(wrong.evidence.value + 5);
    const [x, , z] = refined(right);
    const [su, sw] = right.k.uncertainties as readonly number[];
    expect(Math.abs((x as number) - 0.506)).toBeLessThan(3 * (su as number));
    expect(Math.abs((z as number) + 0.483)).toBeLessThan(3 * (sw as number));
  });
});

/** 1/d² = (h²/a² + k² sin²β/b² + l²/c² − 2hl cos β/ac)/sin²β, unique axis b. */
function monoclinicSpacing({ a, b, c, beta }: Cell, h: number, k: number, l: number): number {
  const angle = (beta * Math.PI) / 180;
  const sum = (h / a) ** 2 + ((k * Math.sin(angle)) / b) ** 2 + (l / c) ** 2 - (2 * h * l * Math.cos(angle)) / (a * c);
  return Math.sin(angle) / Math.sqrt(sum);
}

describe("TbMnO3 in Pbnm: (0,q,0), R. Kajimoto et al., Phys. Rev. B 70 (2004) 012401; q = 0.28", () => {
  const cell: Cell = { a: 5.3, b: 5.86, c: 7.4, alpha: 90, beta: 90, gamma: 90 };
  const d = [6.977, 5.475, 5.138, 4.441, 4.22, 3.893, 3.808];

  test("q is refined from 0.275 and its uncertainty holds it", () => {
    const found = indexed("P b n m", cell, "0,0.275,0", spacings(d, 0.004, 2004));
    expect(found.matched).toBe(7);
    expect(Math.abs((refined(found)[1] as number) - 0.28)).toBeLessThan(3 * (found.k.uncertainties?.[0] as number));
    expect(found.k.uncertainties?.[0]).toBeLessThan(0.002);
    expect(found.evidence.reading).toBe("found");
    expect(found.nearFractions.map(({ fraction }) => fraction)).not.toContainEqual([1, 4]);
  });

  test("lines (0 q 1), (0 1−q 1), (1 q 0), (1 1−q 0) are named so", () => {
    const { assignments } = indexed("P b n m", cell, "0,0.28,0", spacings(d));
    expect(assignments.slice(0, 4).map(({ h, sign }) => [...h, sign])).toEqual([
      [0, 0, 1, 1],
      [0, 1, 1, -1],
      [1, 0, 0, 1],
      [1, 1, 0, -1],
    ]);
  });
});

describe("CuCrO2 in R-3m: (0.329,0.329,0), not 1/3; H. Kadowaki et al., J. Phys. Condens. Matter 2 (1990) 4485; M. Frontzek et al. (2011)", () => {
  const cell: Cell = { a: 2.97, b: 2.97, c: 17.1, alpha: 90, beta: 90, gamma: 120 };
  const d = [4.514, 4.285, 3.931];

  test("good positions tell it from 1/3", () => {
    const found = indexed("R -3 m :H", cell, "0.331,0.331,0", spacings(d, 0.004));
    expect(found.matched).toBe(3);
    expect(refined(found)[0]).toBeCloseTo(0.329, 3);
    expect(found.nearFractions).toEqual([]);
  });

  test("blunt ones do not, and 1/3 is offered", () => {
    const found = indexed("R -3 m :H", cell, "0.331,0.331,0", spacings(d, 0.06));
    expect(found.nearFractions.map(({ parameter, fraction }) => [parameter, ...fraction])).toContainEqual(["u", 1, 3]);
  });
});

test("Cr in Im-3m: (1−δ,0,0) with δ = 0.048, the six satellites about two positions; positions computed", () => {
  const cell: Cell = { a: 2.884, b: 2.884, c: 2.884, alpha: 90, beta: 90, gamma: 90 };
  const found = indexed("I m -3 m", cell, "0.957,0,0", spacings([3.0294, 2.8807, 2.7519], 0.003));
  expect(found.matched).toBe(3);
  expect(refined(found)[0]).toBeCloseTo(0.952, 3);
});

test("BiFeO3 in R3c: the 101 line is a triplet that needs ΔQ/Q of 0.5 %, I. Sosnowska, T. Peterlin-Neumaier & E. Steichele, J. Phys. C 15 (1982) 4835", () => {
  const cell: Cell = { a: 5.58, b: 5.58, c: 13.87, alpha: 90, beta: 90, gamma: 120 };
  const d = [4.591, 4.563, 4.536];
  const fine = indexed("R 3 c :H", cell, "0.0045,0.0045,0", spacings(d, 0.002));
  expect(fine.matched).toBe(3);
  expect(new Set(fine.assignments.map(({ q }) => q)).size).toBe(3);
  const commensurate = indexed("R 3 c :H", cell, "0,0,0", spacings(d, 0.002));
  expect(commensurate.evidence.value).toBeLessThan(fine.evidence.value);
  // At the resolution of a common powder scan k = 0 does as well: all three lines are one.
  expect(indexed("R 3 c :H", cell, "0,0,0", spacings(d, 0.02)).matched).toBe(3);
});

test("MnWO4 in P2/c: (−1/4,1/2,1/2) and (−0.214,1/2,0.457), G. Lautenschläger et al., Phys. Rev. B 48 (1993) 6087", () => {
  const cell: Cell = { a: 4.83, b: 5.76, c: 4.995, alpha: 90, beta: 91.17, gamma: 90 };
  const locked = indexed("P 1 2/c 1", cell, "-1/4,1/2,1/2", spacings([7.066, 6.993, 4.936, 4.861]));
  expect([locked.matched, locked.total]).toEqual([4, 4]);
  const running = indexed("P 1 2/c 1", cell, "-0.21,1/2,0.46", spacings([7.515, 6.817, 4.822, 4.707], 0.01));
  expect(running.matched).toBe(4);
  expect(refined(running)[0]).toBeCloseTo(-0.214, 2);
  expect(refined(running)[2]).toBeCloseTo(0.457, 2);
});
