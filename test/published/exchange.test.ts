import { balancedModel, constantMoments, type Ground, groundOf, phaseDiagram } from "@kvane/core/exchange";
import { formatWaveVector, numericWaveVector } from "@kvane/core/kvectors";
import { describe, expect, it } from "vitest";
import { cellOf, latticeModel, type lattices, modelOf } from "../support/exchange-models.js";

/**
 * Closed forms of classical models. Each citation is from memory, `memory 90` unless another figure stands beside it, but the
 * energies and k are elementary: they follow from the sums of cosines that the comments give.
 */

const turn = 2 * Math.PI;

async function ground(name: keyof typeof lattices, constants: Readonly<Record<string, number>>): Promise<Ground> {
  return groundOf(await latticeModel(name, constants));
}

function numbers(found: Ground): readonly number[] {
  return numericWaveVector((found.set.vectors[0] as Ground["set"]["vectors"][number]).k) ?? [];
}

function forms(found: Ground): string[] {
  return found.set.vectors.map(({ k }) => formatWaveVector(k));
}

/** Energy proven to 1e-6 of the constants. */
function expectProven({ energy, certificate }: Ground, value: number): void {
  expect(energy).toBeCloseTo(value, 9);
  expect(certificate.exhaustive).toBe(true);
  expect(energy - certificate.lowerBound).toBeLessThan(1e-6);
}

describe("chain J1–J2", () => {
  // cos 2πk = −J1/4J2 for J2 > |J1|/4, else 1/2 or 0; E/N = −J1²/8J2 − J2.
  it.each([
    [1, 0.5],
    [1, 0.26],
    [1, 3],
    [-1, 0.4],
    [-1, 2],
  ])("of J1 = %d, J2 = %d is a spiral", async (j1, j2) => {
    const found = await ground("chain", { 1: j1, 2: j2 });
    expectProven(found, -(j1 * j1) / (8 * j2) - j2);
    expect(Math.cos(turn * (numbers(found)[2] as number))).toBeCloseTo(-j1 / (4 * j2), 6);
    expect(found.certificate.freeDirections).toBe(2);
  });

  it("is not one for small J2", async () => {
    expect(numbers(await ground("chain", { 1: 1, 2: 0.2 }))[2]).toBe(0.5);
    expect(numbers(await ground("chain", { 1: -1, 2: 0.2 }))[2]).toBe(0);
  });
});

describe("square lattice J1–J2–J3", () => {
  // A. Moreo, E. Dagotto, T. Jolicoeur and J. Riera, Phys. Rev. B 42 (1990) 6283; M. P. Gelfand, R. R. P. Singh and D. A.
  // Huse, Phys. Rev. B 40 (1989) 10801; J. Ferrer, Phys. Rev. B 47 (1993) 8769; classical phases.
  const energy = (j2: number, j3: number, x: number, y: number) =>
    Math.cos(x) + Math.cos(y) + 2 * j2 * Math.cos(x) * Math.cos(y) + j3 * (Math.cos(2 * x) + Math.cos(2 * y));

  it.each([
    [0, 0.1],
    [0.3, 0.05],
    [0.2, 0],
    [-0.5, 0.2],
  ])("J2 = %d, J3 = %d: Néel", async (j2, j3) => {
    const found = await ground("square", { 1: 1, 2: j2, 3: j3 });
    expectProven(found, energy(j2, j3, Math.PI, Math.PI));
    expect(forms(found)).toEqual(["(1/2, 1/2, 0)"]);
  });

  it.each([
    [0.7, 0],
    [0.8, 0.1],
    [1.5, 0.3],
  ])("J2 = %d, J3 = %d: stripes", async (j2, j3) => {
    const found = await ground("square", { 1: 1, 2: j2, 3: j3 });
    expectProven(found, energy(j2, j3, 0, Math.PI));
    expect(forms(found)).toEqual(["(0, 1/2, 0)"]);
  });

  // cos q = −1/(2 J2 + 4 J3) along (q, q).
  it.each([
    [0.2, 0.2],
    [0, 0.5],
    [0, 2],
    [0.3, 0.4],
  ])("J2 = %d, J3 = %d: spiral (q, q)", async (j2, j3) => {
    const cosine = -1 / (2 * j2 + 4 * j3);
    const q = Math.acos(cosine);
    const found = await ground("square", { 1: 1, 2: j2, 3: j3 });
    expectProven(found, energy(j2, j3, q, q));
    const [x, y] = numbers(found) as [number, number];
    expect(Math.cos(turn * x)).toBeCloseTo(cosine, 6);
    expect(x).toBeCloseTo(Math.abs(y), 9);
  });

  // cos q = (2 J2 − 1)/4 J3 along (q, 1/2).
  it.each([
    [0.7, 0.2],
    [0.5, 0.1],
    [0.6, 0.1],
  ])("J2 = %d, J3 = %d: spiral (q, 1/2)", async (j2, j3) => {
    const cosine = (2 * j2 - 1) / (4 * j3);
    const found = await ground("square", { 1: 1, 2: j2, 3: j3 });
    expectProven(found, energy(j2, j3, Math.acos(cosine), Math.PI));
    const inside = numbers(found).filter((entry) => entry !== 0);
    expect(inside).toHaveLength(2);
    expect(inside).toContain(0.5);
    expect(Math.cos(turn * (inside.find((entry) => entry !== 0.5) ?? 0.25))).toBeCloseTo(cosine, 6);
  });

  // Boundaries: J3 = 1/4 − J2/2; J3 = J2/2 from (1/4, 1/8) on; J3 = (2 J2 − 1)/4; J2 = 1/2 without J3.
  it.each([
    ["3", { 1: 1, 2: 0.1, 3: 0 }, 0, 0.4, [[0.2, false]]],
    [
      "2",
      { 1: 1, 2: 0, 3: 0.2 },
      0,
      1,
      [
        [0.1, false],
        [0.4, true],
        [0.9, false],
      ],
    ],
    ["2", { 1: 1, 2: 0, 3: 0 }, 0.2, 0.9, [[0.5, true]]],
  ] as const)("boundaries along J%s of %o", async (axis, constants, from, to, expected) => {
    const model = await latticeModel("square", constants);
    const { boundaries } = await phaseDiagram(model, [{ name: axis, classes: [axis], from, to, count: 8 }]);
    expect(boundaries?.map(({ sudden }) => sudden)).toEqual(expected.map(([, sudden]) => sudden));
    for (const [index, [value]] of expected.entries())
      expect(Math.abs((boundaries?.[index]?.value ?? 0) - value)).toBeLessThan(1e-6);
  });

  it("with J2 = J1/2 alone has lines of minima", async () => {
    const found = await ground("square", { 1: 1, 2: 0.5 });
    expect(found.energy).toBeCloseTo(-1, 9);
    expect(found.set.dimension - found.certificate.freeDirections).toBe(1);
    expect(forms(found)).toContain("(0, 1/2, 0)");
    expect(forms(found)).toContain("(1/2, 1/2, 0)");
  });
});

describe("triangular lattice", () => {
  it("has the 120° structure, reached by coplanar spins", async () => {
    const model = await latticeModel("triangular", { 1: 1 });
    const found = await groundOf(model);
    expectProven(found, -1.5);
    expect(forms(found)).toEqual(["(1/3, 1/3, 0)"]);
    expect(constantMoments(model, found.set.vectors, 1e-8)).toMatchObject({ answer: "reached", spins: "coplanar" });
  });

  // T. Jolicoeur, E. Dagotto, E. Gagliano and S. Bacci, Phys. Rev. B 42 (1990) 4800 (`memory 85`): 120° up to J2 = 1/8, then k at the
  // middle of an edge up to J2 = 1, then incommensurate.
  it("changes at J2 = J1/8 and J2 = J1", async () => {
    const model = await latticeModel("triangular", { 1: 1, 2: 0 });
    const diagram = await phaseDiagram(model, [{ name: "2", classes: ["2"], from: 0.05, to: 1.3, count: 6 }]);
    expect(diagram.boundaries?.map(({ value, sudden }) => [Number(value.toFixed(6)), sudden])).toEqual([
      [0.125, true],
      [1, false],
    ]);
    expect(diagram.points.map(({ phase }) => diagram.phases[phase]?.forms[0])).toEqual([
      "(1/3, 1/3, 0)",
      ...Array(3).fill("(0, 1/2, 0)"),
      ...Array(2).fill(diagram.phases[diagram.points[5]?.phase ?? 0]?.forms[0]),
    ]);
  });
});

describe("honeycomb lattice J1–J2", () => {
  // E. Rastelli, A. Tassi and L. Reatto, Physica B 97 (1979) 1; A. Mulder, R. Ganesh, L. Capriotti and A. Paramekanti, Phys.
  // Rev. B 81 (2010) 214419: beyond J2 = J1/6 all k of a ring cos a + cos b + cos(a+b) = ((J1/2J2)² − 3)/2.
  it.each([0.2, 0.3, 0.45])("of J2 = %d has a ring of minima and is reached on it", async (j2) => {
    const model = await latticeModel("honeycomb", { 1: 1, 2: j2 });
    const found = await groundOf(model);
    expect(found.energy).toBeCloseTo(-1 / (8 * j2) - 1.5 * j2, 9);
    expect(found.energy - found.certificate.lowerBound).toBeLessThan(1e-4);
    expect(found.set.dimension - found.certificate.freeDirections).toBe(1);
    expect(found.set.vectors.length).toBeGreaterThan(1);
    for (const { k } of found.set.vectors) {
      const [a, b] = (numericWaveVector(k) ?? []).map((entry) => turn * entry) as [number, number];
      expect(Math.cos(a) + Math.cos(b) + Math.cos(a + b)).toBeCloseTo(((1 / (2 * j2)) ** 2 - 3) / 2, 6);
    }
    expect(constantMoments(model, found.set.vectors, 1e-8).answer).toBe("reached");
  });

  // The ring |γ| = J1/2J2, γ = 1 + exp(−ia) + exp(ib), has |γ| = 1 at the middle of an edge: there it passes from around Γ to
  // around K, at J2 = J1/2 (the same papers). It must not depend on the grid.
  it("changes from ring to ring at J2 = J1/2", async () => {
    const model = await latticeModel("honeycomb", { 1: 1, 2: 0 });
    const range = { name: "2", classes: ["2"], from: 0.4, to: 0.62, count: 3 };
    const { boundaries } = await phaseDiagram(model, [range]);
    expect(boundaries?.map(({ sudden }) => sudden)).toEqual([false]);
    expect(Math.abs((boundaries?.[0]?.value ?? 0) - 0.5)).toBeLessThan(2e-5);
  }, 120_000);

  it("of small J2 is Néel with k = 0", async () => {
    const found = await ground("honeycomb", { 1: 1, 2: 0.15 });
    expectProven(found, -1.5 + 0.45);
    expect(forms(found)).toEqual(["(0, 0, 0)"]);
    expect(found.set.dimension).toBe(found.certificate.freeDirections);
  });
});

describe("kagome lattice", () => {
  // A. B. Harris, C. Kallin and A. J. Berlinsky, Phys. Rev. B 45 (1992) 2899.
  it("of J1 alone prefers no k at all", async () => {
    const found = await ground("kagome", { 1: 1 });
    expect(found.energy).toBeCloseTo(-1, 9);
    expect(found.set.dimension).toBe(3);
  });
  it.each([
    [0.1, "(0, 0, 0)", -1.1],
    [-0.1, "(1/3, 1/3, 0)", -1.2],
  ])("of J2 = %d J1 has k = %s", async (j2, k, energy) => {
    const model = await latticeModel("kagome", { 1: 1, 2: j2 });
    const found = await groundOf(model);
    expectProven(found, energy);
    expect(forms(found)).toEqual([k]);
    expect(constantMoments(model, found.set.vectors, 1e-8)).toMatchObject({ answer: "reached", spins: "coplanar" });
  });
});

describe("cubic lattices", () => {
  // J. S. Smart, Effective Field Theories of Magnetism (1966), chapter 6; C. L. Henley, J. Appl. Phys. 61 (1987) 3962.
  it.each([
    [-0.2, "(0, 0, 1)"],
    [0.2, "(0, 1/2, 1)"],
    [0.8, "(1/2, 1/2, 1/2)"],
  ])("face-centred, J2 = %d J1: k = %s", async (j2, k) => {
    const found = await ground("faceCentred", { 1: 1, 2: j2 });
    expect(forms(found)).toEqual([k]);
    expect(found.energy - found.certificate.lowerBound).toBeLessThan(1e-6);
  });
  it("face-centred, J1 alone: the lines (0, 1, u)", async () => {
    const found = await ground("faceCentred", { 1: 1 });
    expect(found.set.dimension).toBe(1);
    expect(found.set.manifolds.map((k) => formatWaveVector(k))).toEqual(["(0, 1, u)"]);
    expect(found.energy).toBeCloseTo(-2, 9);
  });
  it("body-centred: J2 = 2/3 J1 divides first and second kind", async () => {
    const model = await latticeModel("bodyCentred", { 1: 1, 2: 0 });
    const { boundaries } = await phaseDiagram(model, [{ name: "2", classes: ["2"], from: 0.3, to: 1.1, count: 3 }]);
    expect(boundaries).toHaveLength(1);
    expect(Math.abs((boundaries?.[0]?.value ?? 0) - 2 / 3)).toBeLessThan(1e-6);
  });
  // D. Bergman, J. Alicea, E. Gull, S. Trebst and L. Balents, Nature Phys. 3 (2007) 487: a surface beyond J2 = J1/8, on
  // which E/N = −J1²/8J2 − 2 J2.
  it("diamond, J2 = 0.2 J1: a surface of spirals", async () => {
    const found = await ground("diamond", { 1: 1, 2: 0.2 });
    expect(found.set.dimension).toBe(2);
    // λ = J2 (|A|² − 4) − J1 |A| with the sum A over the four neighbours, least at |A| = J1/2J2.
    expect(found.energy).toBeCloseTo(-1 / (8 * 0.2) - 2 * 0.2, 9);
  });
  it("pyrochlore, J1 alone: no k is preferred, E/N = −J1", async () => {
    const found = await ground("pyrochlore", { 1: 1 });
    expect(found.energy).toBeCloseTo(-1, 9);
    expect(found.set.dimension).toBe(3);
  });
});

describe("sites that symmetry does not relate", () => {
  it("a perovskite-like ferrimagnet of A and three B reaches its energy", async () => {
    const plain = await modelOf("P m -3 m", cellOf(4, 4, 4), ["A 0 0 0", "B 1/2 0 0"], { 1: 1, 2: 0.1 });
    const found = await groundOf(await balancedModel(plain));
    // 6 antiparallel bonds A–B and 12 parallel B–B a cell of four spins.
    expect(found.energy).toBeCloseTo((-6 + 12 * 0.1) / 4, 9);
    expect((await groundOf(plain)).energy).toBeLessThan(found.energy - 0.1);
  });

  // D. H. Lyons, T. A. Kaplan, K. Dwight and N. Menyuk, Phys. Rev. 126 (1962) 540: in a cubic spinel the collinear
  // ferrimagnet is the ground state up to u = 4 J_BB S_B / 3 J_AB S_A = 8/9, here J_BB = 2/3 J_AB.
  it.each([
    [0.64, true],
    [0.69, false],
  ])("a spinel with J_BB = %d J_AB is a collinear ferrimagnet: %s", async (ratio, collinear) => {
    const sites = ["A 3/8 3/8 3/8", "B 0 0 0"];
    const model = await balancedModel(await modelOf("F d -3 m:2", cellOf(10, 10, 10), sites, { 1: ratio, 2: 1 }));
    const found = await groundOf(model);
    // 24 bonds A–B and 12 bonds B–B a cell of two A and four B.
    const neel = (-24 + 12 * ratio) / 6;
    if (collinear) expect(found.energy).toBeCloseTo(neel, 9);
    else expect(found.energy).toBeLessThan(neel - 1e-4);
    if (collinear) expect(constantMoments(model, found.set.vectors, 1e-7)).toMatchObject({ answer: "reached" });
  });
});
