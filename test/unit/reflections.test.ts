import { KvaneError } from "@kvane/core/errors";
import { parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import {
  distinctPositions,
  dToQ,
  nuclearLines,
  overlapsOf,
  qToTwoThetaDeg,
  satelliteLines,
  satelliteReflections,
  twoThetaDegToQ,
} from "@kvane/core/reflections";
import { parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { lengthOf, reciprocalAxes } from "../support/line-twin.ts";
import { wave } from "../support/written.ts";

const cubic = (a: number) => ({ a, b: a, c: a, alpha: 90, beta: 90, gamma: 90 });
const orthorhombic = { a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90 };

function errorOf(action: () => unknown): KvaneError {
  try {
    action();
  } catch (error) {
    if (error instanceof KvaneError) return error;
    throw error;
  }
  throw new Error("nothing was thrown");
}

describe("positions", () => {
  test("Bragg's law: λ = 2 d sin θ", () => {
    // d = 2 Å, λ = 2 Å: sin θ = 1/2, 2θ = 60°.
    expect(qToTwoThetaDeg(dToQ(2), 2)).toBeCloseTo(60, 12);
    expect(twoThetaDegToQ(60, 2)).toBeCloseTo(Math.PI, 12);
    expect(dToQ(dToQ(3.7))).toBeCloseTo(3.7, 12);
  });

  test("no angle beyond 180°", () => {
    expect(qToTwoThetaDeg((4 * Math.PI) / 1.5, 1.5)).toBeCloseTo(180, 6);
    expect(qToTwoThetaDeg(1.0001 * ((4 * Math.PI) / 1.5), 1.5)).toBeNull();
  });

  test("distinct positions are merged within rounding and no further", () => {
    const q = [2, 1, 1 + 5e-8, 1 + 1e-3, 2];
    expect([...distinctPositions(q.map((value) => ({ q: value })))]).toEqual([1, 1 + 1e-3, 2]);
    expect([...distinctPositions([])]).toEqual([]);
  });
});

describe("nuclear lines", () => {
  test("multiplicities of the cubic forms (International Tables A, face forms of m-3m)", () => {
    const lines = nuclearLines(parseGroup("P m -3 m"), cubic(4), { qMax: 6.5 });
    const found = Object.fromEntries(lines.map(({ h, multiplicity }) => [h.join(""), multiplicity]));
    expect(found).toMatchObject({ 100: 6, 110: 12, 111: 8, 210: 24, 211: 24, 221: 24, 300: 6, 321: 48 });
  });

  test("the Laue class counts: m-3 has two forms {210}, -3m of P 3 m 1 is hexagonal in multiplicity 12", () => {
    const two = nuclearLines(parseGroup("P 2 3"), cubic(4), { qMax: 3.6 }).filter(
      ({ h }) => h.map(Math.abs).sort().join("") === "012",
    );
    expect(two.map(({ multiplicity }) => multiplicity)).toEqual([12, 12]);
    const hexagonal = { a: 5, b: 5, c: 7, alpha: 90, beta: 90, gamma: 120 };
    const lines = nuclearLines(parseGroup("P 3 m 1"), hexagonal, { qMax: 4 });
    expect(lines.find(({ h }) => h.join("") === "211")?.multiplicity).toBe(12);
  });

  // General reflection conditions as International Tables A prints them for the group; no special positions.
  const conditions: readonly [
    string,
    { a: number; b: number; c: number; alpha: number; beta: number; gamma: number },
    (h: number, k: number, l: number) => boolean,
  ][] = [
    ["P n m a", orthorhombic, (h, k, l) => (h === 0 && (k + l) % 2 !== 0) || (l === 0 && h % 2 !== 0)],
    [
      "P 1 21/c 1",
      { a: 5.1, b: 6.2, c: 7.3, alpha: 90, beta: 98, gamma: 90 },
      (h, k, l) => (k === 0 && l % 2 !== 0) || (h === 0 && l === 0 && k % 2 !== 0),
    ],
    [
      "P 21 21 21",
      orthorhombic,
      (h, k, l) =>
        (k === 0 && l === 0 && h % 2 !== 0) ||
        (h === 0 && l === 0 && k % 2 !== 0) ||
        (h === 0 && k === 0 && l % 2 !== 0),
    ],
    ["P 63/m m c", { a: 5, b: 5, c: 8, alpha: 90, beta: 90, gamma: 120 }, (h, k, l) => isHhl(h, k) && l % 2 !== 0],
    [
      "I 41/a m d :2",
      { a: 5, b: 5, c: 9, alpha: 90, beta: 90, gamma: 90 },
      (h, k, l) => (l === 0 && h % 2 !== 0) || (isDiagonal(h, k) && (2 * Math.abs(h) + l) % 4 !== 0),
    ],
    [
      "F d -3 m :2",
      cubic(8),
      (h, k, l) =>
        [h, k, l].some(
          (entry, at) => entry === 0 && [h, k, l].reduce((sum, x, i) => (i === at ? sum : sum + x), 0) % 4 !== 0,
        ),
    ],
    ["P 41", { a: 5, b: 5, c: 9, alpha: 90, beta: 90, gamma: 90 }, (h, k, l) => h === 0 && k === 0 && l % 4 !== 0],
  ];

  // hh(-2h)l and its equivalents: two of h, k, −h−k are equal.
  function isHhl(h: number, k: number): boolean {
    return h === k || h === -h - k || k === -h - k;
  }
  function isDiagonal(h: number, k: number): boolean {
    return Math.abs(h) === Math.abs(k);
  }

  test.each(conditions)("absences of %s", (symbol, cell, forbidden) => {
    const lines = nuclearLines(parseGroup(symbol), cell, { qMax: 7 });
    expect(lines.length).toBeGreaterThan(20);
    const wrong = lines.filter(({ h, extinct }) => extinct !== forbidden(...h));
    expect(wrong).toEqual([]);
    expect(lines.some(({ extinct }) => extinct)).toBe(true);
  });

  test("centring leaves lines out altogether: -h+k+l = 3n for R on hexagonal axes", () => {
    const lines = nuclearLines(
      parseGroup("R -3 c :H"),
      { a: 5.034, b: 5.034, c: 13.75, alpha: 90, beta: 90, gamma: 120 },
      { qMax: 5 },
    );
    for (const { h } of lines) expect((-h[0] + h[1] + h[2]) % 3 === 0, h.join(" ")).toBe(true);
    // h -h 0 l: l = 2n.
    expect(lines.find(({ h }) => h.join(" ") === "0 0 3")?.extinct).toBe(true);
    expect(lines.find(({ h }) => h.join(" ") === "0 0 6")?.extinct).toBe(false);
  });

  test("atoms at a general position scatter nothing into an extinct line and something into every other", () => {
    for (const symbol of ["P n m a", "I -4 2 d", "P 42/n :2", "F d d 2", "P a -3", "R -3 c :H", "I 41/a :1"]) {
      const group = parseGroup(symbol);
      const cell =
        group.pointGroup.includes("3") && symbol.startsWith("R")
          ? { a: 6, b: 6, c: 8, alpha: 90, beta: 90, gamma: 120 }
          : symbol.startsWith("P a")
            ? cubic(7)
            : symbol.includes("4")
              ? { a: 6, b: 6, c: 8, alpha: 90, beta: 90, gamma: 90 }
              : orthorhombic;
      const x = [0.1234, 0.2719, 0.3817];
      for (const { h, extinct } of nuclearLines(group, cell, { qMax: 4.5 })) {
        let real = 0;
        let imaginary = 0;
        for (const { rotation, translation, translationDenominator } of group.operators) {
          const image = [0, 1, 2].map((row) =>
            x.reduce(
              (sum, entry, column) => sum + (rotation[3 * row + column] as number) * entry,
              (translation[row] as number) / translationDenominator,
            ),
          );
          const phase = 2 * Math.PI * image.reduce((sum, entry, axis) => sum + entry * (h[axis] as number), 0);
          real += Math.cos(phase);
          imaginary += Math.sin(phase);
        }
        expect(Math.hypot(real, imaginary) < 1e-9, `${symbol} ${h.join(" ")}`).toBe(extinct);
      }
    }
  });
});

describe("satellites", () => {
  test("a line is written as H and the sign next to it, without needless minus signs", () => {
    const { k } = placeWaveVector(parseGroup("P m m m"), parseWaveVector("0,0,0.213"));
    const lines = satelliteLines(parseGroup("P m m m"), orthorhombic, k, { qMax: 2.5 }).filter(
      ({ h }) => h[0] === 0 && h[1] === 0,
    );
    expect(
      lines.map(({ h, sign, multiplicity, multiplicityAllArms }) => [...h, sign, multiplicity, multiplicityAllArms]),
    ).toEqual([
      [0, 0, 0, 1, 2, 2],
      [0, 0, 1, -1, 2, 2],
      [0, 0, 1, 1, 2, 2],
      [0, 0, 2, -1, 2, 2],
    ]);
  });

  test("one domain and all arms: the eight ±(1/2,1/2,1/2) of a face-centred cubic lattice are four arms of two", () => {
    const [first] = satelliteLines(parseGroup("F m -3 m"), cubic(4.43), wave("1/2 1/2 1/2"), { qMax: 2 });
    expect(first).toMatchObject({ h: [0, 0, 0], sign: 0, multiplicity: 2, multiplicityAllArms: 8 });
  });

  test("representatives lie where the line says", () => {
    const cell = { a: 4.684, b: 3.423, c: 5.129, alpha: 90, beta: 99.5, gamma: 90 };
    const k = [0.506, 0, -0.483];
    const placed = placeWaveVector(parseGroup("C 1 2/c 1"), parseWaveVector(k.join(","))).k;
    const axes = reciprocalAxes(cell);
    const lines = satelliteLines(parseGroup("C 1 2/c 1"), cell, placed, { qMax: 5, qMin: 1 });
    expect(lines.length).toBeGreaterThan(50);
    for (const { h, sign, q, d } of lines) {
      expect(q).toBeGreaterThanOrEqual(1);
      expect(q * d).toBeCloseTo(2 * Math.PI, 9);
      expect(
        lengthOf(
          axes,
          h.map((entry, axis) => entry + sign * (k[axis] as number)),
        ),
      ).toBeCloseTo(q, 9);
    }
  });

  test("k = 0 gives the nuclear positions, without Q = 0", () => {
    const group = parseGroup("P n m a");
    const satellites = satelliteLines(group, orthorhombic, wave("0 0 0"), { qMax: 4 });
    const nuclear = nuclearLines(group, orthorhombic, { qMax: 4 });
    expect(satellites.map(({ h, q, multiplicity }) => ({ h, q, multiplicity }))).toEqual(
      nuclear.map(({ h, q, multiplicity }) => ({ h, q, multiplicity })),
    );
    expect(nuclear.every(({ q }) => q > 0)).toBe(true);
  });

  test("plain data: survives structuredClone and JSON", () => {
    const lines = satelliteReflections(parseGroup("F m -3 m"), cubic(4.43), wave("1/2 1/2 1/2"), {
      qMax: 3,
      wavelengthAngstrom: 1.057,
    });
    expect(structuredClone(lines)).toEqual(lines);
    expect(JSON.parse(JSON.stringify(lines))).toEqual(lines);
  });

  test("open letters, impossible limits, endless lists and foreign cells are refused", () => {
    const group = parseGroup("P n m a");
    const open = placeWaveVector(group, parseWaveVector("0,u,0")).k;
    expect(errorOf(() => satelliteLines(group, orthorhombic, open, { qMax: 3 })).problems[0]).toMatchObject({
      code: "k-needs-values",
      found: "(0, u, 0)",
    });
    for (const limits of [
      { qMax: 0 },
      { qMax: Number.NaN },
      { qMax: Number.POSITIVE_INFINITY },
      { qMax: 2, qMin: 3 },
      { qMax: 2, qMin: -1 },
    ])
      expect(errorOf(() => satelliteLines(group, orthorhombic, wave("0 1/2 0"), limits)).code).toBe("invalid-argument");
    expect(errorOf(() => nuclearLines(group, orthorhombic, { qMax: 500 })).code).toBe("invalid-argument");
    expect(errorOf(() => nuclearLines(parseGroup("P m -3 m"), orthorhombic, { qMax: 3 })).code).toBe(
      "cell-contradicts-group",
    );
  });
});

describe("overlaps", () => {
  const group = parseGroup("P n m a");

  test("k = 0: every line lies on its own nuclear line, and the absent ones are said to be absent", () => {
    const [first, second] = satelliteReflections(group, orthorhombic, wave("0 0 0"), { qMax: 1.6, resolution: 1e-4 });
    // 1 0 0 is absent in P n m a (h00: h = 2n); its λ/2 image would come from 2 0 0.
    expect(first?.overlaps).toEqual([
      { with: "nuclear", h: [1, 0, 0], q: first?.q, separation: 0, allowed: false },
      { with: "half wavelength", h: [2, 0, 0], q: first?.q, separation: 0, allowed: true },
    ]);
    expect(second?.h).toEqual([0, 1, 0]);
  });

  test("half the wavelength: k = (1/2,0,0) lines carry images of lines 2H + 2k", () => {
    const lines = satelliteReflections(group, orthorhombic, wave("1/2 0 0"), { qMax: 2, resolution: 1e-6 });
    for (const line of lines) {
      const image = line.overlaps.find((one) => one.with === "half wavelength");
      expect(image?.q).toBeCloseTo(line.q, 9);
    }
    // (1/2 0 0) is the image of 1 0 0, which the a glide forbids.
    expect(lines[0]?.overlaps).toMatchObject([{ with: "half wavelength", h: [1, 0, 0], allowed: false }]);
    expect(lines[0]?.twoThetaDeg).toBeNull();
  });

  test("within the resolution and no further, with the signed separation", () => {
    const nuclear = [
      { h: [1, 0, 0], q: 1, d: 6, multiplicity: 2, extinct: false },
      { h: [0, 1, 0], q: 2.1, d: 3, multiplicity: 2, extinct: true },
      { h: [0, 0, 1], q: 2.5, d: 3, multiplicity: 2, extinct: true },
    ] as const;
    expect(overlapsOf(1.02, nuclear, 0.05).list).toEqual([
      { with: "nuclear", h: [1, 0, 0], q: 1, separation: -0.02, allowed: true },
      { with: "half wavelength", h: [0, 1, 0], q: 1.05, separation: 0.03, allowed: false },
    ]);
    expect(overlapsOf(1.02, nuclear, 0.01)).toEqual({ list: [], more: 0 });
  });

  test("of many the allowed and nearest are kept, and the other allowed ones counted", () => {
    const line = (q: number, extinct: boolean) =>
      ({ h: [Math.round(1000 * q), 0, 0], q, d: 1, multiplicity: 2, extinct }) as const;
    const nuclear = [line(0.97, false), line(0.98, false), line(0.99, false), line(1, true), line(1.02, false)];
    const { list, more } = overlapsOf(1, nuclear, 0.05, 2);
    expect(list.map(({ h }) => h[0])).toEqual([980, 990]);
    expect(more).toBe(2);
    // As many as there are: the extinct one is named where there is room.
    expect(overlapsOf(1, nuclear, 0.05, 5)).toMatchObject({ list: { length: 5 }, more: 0 });
  });

  test("lists that would fill the memory are refused, with what they would hold", () => {
    const hexagonal = { a: 7.61, b: 7.61, c: 6.52, alpha: 90, beta: 90, gamma: 120 };
    const p63mmc = parseGroup("194");
    const listTo = (qMax: number) => () => satelliteReflections(p63mmc, hexagonal, wave("0.1 0.2 0.3"), { qMax });
    // 4/3 π q³ V/(2π)³ vectors H + k of a general k, none equivalent to another: 58 798 within 22 Å⁻¹.
    expect(errorOf(listTo(22)).message).toMatch(/58\d{3} satellites/);
    expect(errorOf(listTo(45)).message).toContain("more than 250000 lines");
  });
});
