import {
  canonicalPlacement,
  equivalentWaveVectors,
  exactWaveVector,
  firstZoneRepresentative,
  formatWaveVector,
  isHalfLattice,
  littleGroup,
  manifold,
  parseWaveVector,
  placeWaveVector,
  specialPoints,
  star,
  type WaveVector,
  waveVectorToJson,
} from "@kvane/core/kvectors";
import { parseGroup, tabulatedSettings } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { parseRational, type Rational } from "#core/numbers/index.js";
import { seeded } from "../support/random.js";

const k = (text: string, group = "1"): WaveVector => placeWaveVector(parseGroup(group), parseWaveVector(text)).k;
const formOf = (group: string, text: string, withInversion: boolean): string =>
  formatWaveVector(manifold(parseGroup(group), k(text, group), { withInversion }).form);

describe("reading a wave vector", () => {
  it("takes fractions, integers and short decimals exactly, other decimals as measured", () => {
    expect(parseWaveVector("0,1/2,0.25").measured).toEqual([false, false, false]);
    expect(parseWaveVector("0.3333, 0.5, 0.472").measured).toEqual([true, false, true]);
    expect(formatWaveVector(k("(0, 1/2, 0.75)"))).toBe("(0, 1/2, 3/4)");
  });

  it("puts 0.3333 onto the point and says so; 0.333 stays measured with the remedy", () => {
    const group = parseGroup("P 6/m m m");
    const near = placeWaveVector(group, parseWaveVector("0.3333,0.3333,0"));
    expect(waveVectorToJson(near.k)).toEqual({
      components: ["1/3", "1/3", "0"],
      values: {},
      su: {},
      numeric: [0.333333333333, 0.333333333333, 0],
    });
    expect(near.assumed).toHaveLength(1);
    const far = placeWaveVector(group, parseWaveVector("0.333,0.333,0"));
    expect(waveVectorToJson(far.k).components).toEqual(["u", "u", "0"]);
    expect(far.assumed).toEqual([]);
    expect(far.warnings[0]?.code).toBe("measured-k-ambiguous");
    expect(far.warnings[0]?.remedy).toContain("write 1/3,1/3,0");
  });

  it("keeps a measured value on its line and plane, and exact components of a general k exact", () => {
    expect(waveVectorToJson(k("0,0.472,0", "P n m a"))).toEqual({
      components: ["0", "u", "0"],
      values: { u: 0.472 },
      su: {},
      numeric: [0, 0.472, 0],
    });
    expect(waveVectorToJson(k("-0.214,1/2,0.457", "P 1 2/c 1")).components).toEqual(["u", "1/2", "v"]);
    expect(waveVectorToJson(k("0.4876,0.2813,0.2029", "P -1")).components).toEqual(["u", "v", "w"]);
    expect(waveVectorToJson(k("0.2011,0,0", "P 1")).components).toEqual(["u", "0", "0"]);
    expect(waveVectorToJson(k("0.32901,0.32899,0", "R -3 m:H")).components).toEqual(["u", "u", "0"]);
  });

  it("refuses text, wrong counts and mixtures with the column", () => {
    for (const text of ["0,1/2", "0,a,0", "", "0,1/2,0,0", "0,,0", "0.31,u,0", "1/0,0,0"])
      expect(() => parseWaveVector(text), text).toThrowError(expect.objectContaining({ code: "invalid-k" }));
    expect(() => parseWaveVector("0,1/2,q")).toThrowError(
      expect.objectContaining({
        problems: [expect.objectContaining({ where: expect.objectContaining({ column: 7 }) })],
      }),
    );
  });
});

describe("stars, manifolds and equivalence", () => {
  it("finds manifolds in the tables' parametric form, under P and under P with −1", () => {
    // Fm-3m: the lines and the plane of the cubic face-centred zone as drawn in Bradley & Cracknell (1972), fig. 3.14.
    expect(formOf("F m -3 m", "0,0,1/3", false)).toBe("(0, 0, u)");
    expect(formOf("F m -3 m", "1/5,1/5,1/5", false)).toBe("(u, u, u)");
    expect(formOf("F m -3 m", "1/2,1/2,1/2", false)).toBe("(1/2, 1/2, 1/2)");
    expect(formOf("F m -3 m", "1/5,1/5,1/7", false)).toBe("(u, u, v)");
    // Polar Pmc21: Γ lies on a line of the point group mm2, and is a point when −1 is added.
    expect(formOf("P m c 21", "0,0,0", false)).toBe("(0, 0, u)");
    expect(formOf("P m c 21", "0,0,0", true)).toBe("(0, 0, 0)");
    expect(formOf("P 1", "1/5,0,0", true)).toBe("(u, v, w)");
  });

  it("tells CuO's (1/2,0,-1/2), on a plane of C2/c, from a point: 2k is not in L*", () => {
    const group = parseGroup("C 1 2/c 1");
    const vector = k("1/2,0,-1/2");
    expect(isHalfLattice(group, vector)).toBe(false);
    expect(manifold(group, vector, { withInversion: true }).dimension).toBe(2);
    // With the C lattice (0,0,1) is in L*, so the other sign of c names the same k; (1/2,0,0) does not.
    expect(equivalentWaveVectors(group, vector, k("1/2,0,1/2"))).toBe(true);
    expect(equivalentWaveVectors(group, vector, k("1/2,0,0"))).toBe(false);
  });

  it("obeys the orbit–stabilizer rule on random k of every group", () => {
    const random = seeded(7);
    for (const setting of tabulatedSettings().filter((row) => row.standard)) {
      const group = parseGroup(`hall:${setting.hall}`);
      const vector = exactWaveVector(
        [0, 1, 2].map(() => [random.below(13) - 6, random.pick([1, 2, 3, 4, 5])]).map(reduced) as never,
      );
      const { arms, minusK, reversing } = star(group, vector);
      expect(arms.length * littleGroup(group, vector).operators.length).toBe(group.operators.length);
      expect(reversing.length > 0).toBe(minusK !== "not in star");
      const placed = canonicalPlacement(group, vector);
      expect(arms.some((arm) => equivalentWaveVectors(group, arm, placed.canonical))).toBe(true);
    }
  });

  it("has the same canonical place for equivalent k", () => {
    const random = seeded(8);
    for (const number of ["14", "62", "146", "199", "225", "227:2"]) {
      const group = parseGroup(number);
      for (let round = 0; round < 5; round++) {
        const vector = exactWaveVector(
          [0, 1, 2].map(() => [random.below(13) - 6, random.pick([1, 2, 3, 5])]).map(reduced) as never,
        );
        const [a, b, c] = vector.components;
        // 6 times an integer vector is in L* of every lattice type.
        const shifted = exactWaveVector([
          addInteger(a.constant, 6),
          addInteger(b.constant, -6),
          addInteger(c.constant, 12),
        ]);
        expect(canonicalPlacement(group, shifted)).toEqual(canonicalPlacement(group, vector));
      }
    }
  });

  it("shortens k into the first zone of the cell", () => {
    const group = parseGroup("F m -3 m");
    const cell = { a: 4, b: 4, c: 4, alpha: 90, beta: 90, gamma: 90 };
    expect(formatWaveVector(firstZoneRepresentative(group, cell, k("3/2,1/2,1/2")))).toBe("(1/2, -1/2, -1/2)");
    expect(formatWaveVector(firstZoneRepresentative(group, cell, k("0,0,7/4")))).toBe("(0, 0, -1/4)");
    const rhombohedral = parseGroup("R -3 m:H");
    const tall = { a: 3, b: 3, c: 20, alpha: 90, beta: 90, gamma: 120 };
    expect(formatWaveVector(firstZoneRepresentative(rhombohedral, tall, k("1,0,5/2")))).toBe("(0, 0, 3/2)");
  });
});

function reduced([numerator, denominator]: number[]): Rational {
  return parseRational(`${numerator}/${denominator}`) as Rational;
}

function addInteger([numerator, denominator]: Rational, step: number): Rational {
  return [numerator + step * denominator, denominator];
}

describe("special points", () => {
  const names = (symbol: string): string[] =>
    specialPoints(parseGroup(symbol))
      .map((point) => formatWaveVector(point.k))
      .sort();

  it("are those of the zones in Bradley & Cracknell (1972), table 3.6, up to the arm chosen", () => {
    expect(names("P m -3 m")).toEqual(["(0, 0, 0)", "(0, 0, 1/2)", "(0, 1/2, 1/2)", "(1/2, 1/2, 1/2)"]);
    expect(names("F m -3 m")).toEqual(["(0, 0, 0)", "(0, 0, 1)", "(0, 1/2, 1)", "(1/2, 1/2, 1/2)"]);
    expect(names("I m -3 m")).toEqual(["(0, 0, 0)", "(0, 0, 1)", "(0, 1/2, 1/2)", "(1/2, 1/2, 1/2)"]);
    expect(names("P 6/m m m")).toEqual([
      "(0, 0, 0)",
      "(0, 0, 1/2)",
      "(0, 1/2, 0)",
      "(0, 1/2, 1/2)",
      "(1/3, 1/3, 0)",
      "(1/3, 1/3, 1/2)",
    ]);
    expect(names("P 1")).toHaveLength(8);
    expect(names("R -3 m:H")).toContain("(0, 0, 3/2)");
  });

  it("obey the sum rule: the arms with 2k in L* add up to 8 (they are L*/2 modulo L*)", () => {
    for (const setting of tabulatedSettings().filter((row) => row.standard)) {
      const group = parseGroup(`hall:${setting.hall}`);
      const half = specialPoints(group).filter((point) => isHalfLattice(group, point.k));
      expect(
        half.reduce((sum, point) => sum + point.armPairs, 0),
        setting.hall,
      ).toBe(8);
    }
  });

  it("miss no isolated k: every k with a denominator up to 8 that is isolated is equivalent to a listed one", () => {
    const random = seeded(9);
    for (const number of ["5", "23", "82", "122", "146", "155", "196", "199", "214", "220", "228:2"]) {
      const group = parseGroup(number);
      const points = specialPoints(group);
      for (let round = 0; round < 60; round++) {
        const denominator = random.pick([2, 3, 4, 6, 8]);
        const vector = exactWaveVector(
          [0, 1, 2].map(() => reduced([random.below(2 * denominator), denominator])) as never,
        );
        if (manifold(group, vector, { withInversion: true }).dimension !== 0) continue;
        const reversed = exactWaveVector(
          vector.components.map((form) => [0 - form.constant[0], form.constant[1]] as const) as never,
        );
        const images = [...star(group, vector).arms, ...star(group, reversed).arms];
        expect(points.some((point) => images.some((arm) => equivalentWaveVectors(group, arm, point.k)))).toBe(true);
      }
    }
  });
});
