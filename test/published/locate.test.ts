import { formatWaveVector } from "@kvane/core/kvectors";
import { type Candidate, defaultSearchOptions, locate, type PeakList, type SearchResult } from "@kvane/core/search";
import { type Cell, parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { equivalentRows } from "../support/equivalent-rows.ts";
import { angleList, normal, powderList } from "../support/peak-lists.ts";
import { seeded } from "../support/random.ts";

/*
 * Published propagation vectors at special points. The peak positions are computed here from the published cell (and
 * wavelength) by elementary formulas, and are marked so: no table of measured positions stands behind them. What is
 * published is the cell, the space group and the k that must come first.
 */

const cubic = (a: number): Cell => ({ a, b: a, c: a, alpha: 90, beta: 90, gamma: 90 });

/** 1/d² of an orthogonal cell, from fractional h k l. */
function orthogonal(cell: Cell, [h, k, l]: readonly number[]): number {
  return Math.hypot((h as number) / cell.a, (k as number) / cell.b, (l as number) / cell.c);
}

/** 1/d of a hexagonal cell: 4(h² + hk + k²)/3a² + l²/c². */
function hexagonal(cell: Cell, [h, k, l]: readonly number[]): number {
  const [x, y, z] = [h as number, k as number, l as number];
  return Math.sqrt((4 * (x * x + x * y + y * y)) / (3 * cell.a ** 2) + z ** 2 / cell.c ** 2);
}

const twoTheta = (inverseD: number, wavelength: number): number =>
  (360 / Math.PI) * Math.asin((inverseD * wavelength) / 2);

/**
 * The same list with normal noise of its own standard uncertainties, to two digits of 2θ as instruments print it. Noise
 * is cut at 2.5 s.u., so that every line stays within the 3 s.u. of a match.
 */
function noisyAngles(angles: readonly number[], s: number, wavelength: number, seed: number): PeakList {
  const random = seeded(seed);
  return angleList(
    angles.map((angle) => Math.round(100 * (angle + s * Math.max(-2.5, Math.min(2.5, normal(random))))) / 100),
    s,
    wavelength,
  );
}

async function search(
  symbol: string,
  cell: Cell,
  list: PeakList,
  options = defaultSearchOptions,
): Promise<SearchResult> {
  return locate(parseGroup(symbol), cell, list, options);
}

/** The first candidate, which must explain every peak, be found, tie with none and be equivalent to `expected`. */
function expectFirst(result: SearchResult, symbol: string, expected: readonly number[]): Candidate {
  const [first] = result.candidates;
  if (!first) throw new Error("no candidate");
  expect(
    equivalentRows(parseGroup(symbol), first.k, expected),
    `${formatWaveVector(first.k)} for ${expected.join(" ")}`,
  ).toBe(true);
  expect(first.matched).toBe(first.total);
  expect(first.evidence.reading).toBe("found");
  expect(first.tiedWith).toEqual([]);
  expect(result.unmatched).toEqual([]);
  return first;
}

describe("MnO, C. G. Shull & J. S. Smart, Phys. Rev. 76 (1949) 1256; C. G. Shull, W. A. Strauser & E. O. Wollan, Phys. Rev. 83 (1951) 333", () => {
  // The satellites at 80 K are the all-odd lines of a cube of 8.85 Å; a = 4.43 Å, λ = 1.057 Å. Positions computed.
  const wavelength = 1.057;
  const odd = [
    [1, 1, 1],
    [3, 1, 1],
    [3, 3, 1],
    [5, 1, 1],
    [5, 3, 1],
  ];
  const angles = odd.map((row) => twoTheta(orthogonal(cubic(8.86), row), wavelength));

  test("k = (1/2,1/2,1/2) first among the special points, every line indexed", async () => {
    const result = await search("F m -3 m", cubic(4.43), angleList(angles, 0.1, wavelength));
    const first = expectFirst(result, "F m -3 m", [0.5, 0.5, 0.5]);
    expect(first).toMatchObject({ arms: 4, onNuclearLines: false, manifold: { dimension: 0 } });
    expect(result.certificate).toMatchObject({ exhaustive: true, maxDimension: 3, minimumMatched: 4 });
    // (5 1 1) and (3 3 3) of the doubled cell are one line.
    expect(first.assignments[3]?.alternatives.length).toBe(1);
  });

  test("so with the noise of a real scan, an impurity, and the other candidates shown", async () => {
    const list = noisyAngles([...angles.slice(0, 3), 27.35, ...angles.slice(3)], 0.1, wavelength, 1951);
    const result = await search("F m -3 m", cubic(4.43), list, { ...defaultSearchOptions, belowMinimum: true });
    const [first, second] = result.candidates;
    expect(formatWaveVector((first as Candidate).k)).toBe("(1/2, 1/2, 1/2)");
    expect(first?.unmatched).toEqual([3]);
    expect(first?.evidence.reading).toBe("found");
    expect(second?.evidence.reading).toBe("not informative");
  });
});

test("NiO: k = (1/2,1/2,1/2), W. L. Roth, Phys. Rev. 110 (1958) 1333; positions computed from a = 4.177 Å", async () => {
  const d = [4.8225, 2.5185, 1.9163, 1.6075];
  const result = await search(
    "F m -3 m",
    cubic(4.177),
    powderList(
      d.map((value) => (2 * Math.PI) / value),
      d.map((value) => (2 * Math.PI * 0.003) / value),
    ),
  );
  expectFirst(result, "F m -3 m", [0.5, 0.5, 0.5]);
});

describe("La2CuO4: the centring is reversed, D. Vaknin et al., Phys. Rev. Lett. 58 (1987) 2802", () => {
  // Magnetic lines (100), (011), (120), (031) in the axes of Cmce (Cmca), which its nuclear lines never are. The cell
  // is one of about that size, rounded by us; positions computed from it.
  const cell: Cell = { a: 5.34, b: 13.1, c: 5.42, alpha: 90, beta: 90, gamma: 90 };
  const lines = [
    [1, 0, 0],
    [0, 1, 1],
    [1, 2, 0],
    [0, 3, 1],
  ];
  const angles = lines.map((row) => twoTheta(orthogonal(cell, row), 2.4));

  test("k = (1,0,0) and not k = 0, which explains none of them", async () => {
    const result = await search("C m c e", cell, noisyAngles(angles, 0.08, 2.4, 1987), {
      ...defaultSearchOptions,
      belowMinimum: true,
    });
    const first = expectFirst(result, "C m c e", [1, 0, 0]);
    expect(first.onNuclearLines).toBe(false);
    const nuclear = result.candidates.find(({ onNuclearLines }) => onNuclearLines);
    expect(nuclear?.evidence.reading).toBe("not informative");
    expect(nuclear?.matched).toBeLessThan(3);
  });

  test("so in the axes of Bmab, where the long axis is c", async () => {
    const turned: Cell = { ...cell, b: cell.c, c: cell.b };
    const result = await search("B m a b", turned, noisyAngles(angles, 0.08, 2.4, 1988));
    expectFirst(result, "B m a b", [1, 0, 0]);
  });
});

test("Sr2CuO2Cl2: k = (1/2,1/2,0) in I4/mmm, D. Vaknin et al., Phys. Rev. B 41 (1990) 1926; positions computed", async () => {
  const cell: Cell = { a: 3.972, b: 3.972, c: 15.61, alpha: 90, beta: 90, gamma: 90 };
  const angles = [0, 1, 2, 3, 4].map((l) => twoTheta(orthogonal(cell, [0.5, 0.5, l]), 2.35));
  expectFirst(await search("I 4/m m m", cell, noisyAngles(angles, 0.08, 2.35, 1990)), "I 4/m m m", [0.5, 0.5, 0]);
});

test("K jarosite: c is doubled, k = (0,0,3/2) in R-3m; M. G. Townsend, G. Longworth & E. Roudaut, Phys. Rev. B 33 (1986) 4919; T. Inami et al., Phys. Rev. B 61 (2000) 12181; positions computed", async () => {
  const cell: Cell = { a: 7.3, b: 7.3, c: 17.1, alpha: 90, beta: 90, gamma: 120 };
  // H + k with −h + k + l = 3n for H: l of the satellite is half-integer.
  const lines = [
    [0, 0, 1.5],
    [1, 0, -0.5],
    [1, 0, 2.5],
    [1, 1, 1.5],
    [2, 0, 0.5],
    [2, 0, -2.5],
  ];
  for (const [h, k, l] of lines as [number, number, number][]) expect(Math.abs((-h + k + l + 1.5) % 3)).toBe(0);
  const angles = lines.map((row) => twoTheta(hexagonal(cell, row), 2.4));
  expectFirst(await search("R -3 m :H", cell, noisyAngles(angles, 0.08, 2.4, 1986)), "R -3 m :H", [0, 0, 1.5]);
});

test("Li2CuO2: k = (0,0,1) in Immm, F. Sapina et al., Solid State Commun. 74 (1990) 779; positions computed", async () => {
  const cell: Cell = { a: 3.66, b: 2.86, c: 9.39, alpha: 90, beta: 90, gamma: 90 };
  // H + (0,0,1), h + k + l even for H: odd sums.
  const lines = [
    [0, 0, 1],
    [0, 0, 3],
    [1, 0, 0],
    [1, 0, 2],
    [0, 1, 0],
    [1, 1, 1],
  ];
  const angles = lines.map((row) => twoTheta(orthogonal(cell, row), 2.4));
  expectFirst(await search("I m m m", cell, noisyAngles(angles, 0.08, 2.4, 75)), "I m m m", [0, 0, 1]);
});

test("CsNiCl3: k = (1/3,1/3,1), D. E. Cox & V. J. Minkiewicz, Phys. Rev. B 4 (1971) 2209; positions computed", async () => {
  const cell: Cell = { a: 7.14, b: 7.14, c: 5.9, alpha: 90, beta: 90, gamma: 120 };
  const third = 1 / 3;
  const lines = [
    [third, third, 1],
    [2 * third, 2 * third, 1],
    [4 * third, third, 1],
    [third, third, 3],
    [2 * third, 2 * third, 3],
  ];
  const angles = lines.map((row) => twoTheta(hexagonal(cell, row), 2.4));
  expectFirst(await search("P 63/m m c", cell, noisyAngles(angles, 0.08, 2.4, 1971)), "P 63/m m c", [third, third, 0]);
});

test("MnF2: k = 0, R. A. Erickson, Phys. Rev. 90 (1953) 779; its lines are those of the nuclear cell, and it is said", async () => {
  const cell: Cell = { a: 4.873, b: 4.873, c: 3.31, alpha: 90, beta: 90, gamma: 90 };
  const lines = [
    [1, 0, 0],
    [1, 1, 1],
    [2, 1, 0],
    [2, 0, 1],
  ];
  const angles = lines.map((row) => twoTheta(orthogonal(cell, row), 1.08));
  const first = expectFirst(
    await search("P 42/m n m", cell, noisyAngles(angles, 0.06, 1.08, 1953)),
    "P 42/m n m",
    [0, 0, 0],
  );
  expect(first.onNuclearLines).toBe(true);
});
