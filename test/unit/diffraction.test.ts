import {
  arrangementWith,
  clusterLines,
  displacementFactor,
  extinctionRules,
  extinctionTest,
  integratedIntensity,
  lorentzFactor,
  type MomentArrangement,
  magneticFormFactor,
  magneticStructureFactor,
  modeSpace,
  nuclearSquares,
  nuclearStructureFactor,
  scatteringGeometry,
  simulatedPattern,
  type Triple,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { parseWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { sumVanishes } from "#core/diffraction/unity-sums.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { site, wave } from "../support/written.js";

const cubic = { a: 2 * Math.PI, b: 2 * Math.PI, c: 2 * Math.PI, alpha: 90, beta: 90, gamma: 90 };

describe("Lorentz and displacement factors: International Tables C, sections 6.1.1 and 6.2", () => {
  test("closed forms", () => {
    // λ = 2 Å, Q = π/√2 ·... : sin θ = Qλ/4π.
    const q = 2 * Math.PI * 0.5;
    const theta = Math.asin((q * 2) / (4 * Math.PI));
    expect(lorentzFactor({ kind: "powder", wavelengthAngstrom: 2 }, q)).toBeCloseTo(
      1 / (Math.sin(theta) * Math.sin(2 * theta)),
      12,
    );
    expect(lorentzFactor({ kind: "single crystal", wavelengthAngstrom: 2 }, q)).toBeCloseTo(
      1 / Math.sin(2 * theta),
      12,
    );
    expect(lorentzFactor({ kind: "time of flight", twoThetaDeg: 90 }, q)).toBeCloseTo(2 ** 4 * Math.SQRT1_2, 12);
    expect(lorentzFactor({ kind: "none" }, q)).toBe(1);
    // Beyond the reach of the wavelength.
    expect(lorentzFactor({ kind: "powder", wavelengthAngstrom: 2 }, 2.01 * Math.PI)).toBe(0);
    // B = 8π² u², e^{−Q² u²}.
    expect(displacementFactor(8 * Math.PI ** 2 * 0.01, 3)).toBeCloseTo(Math.exp(-9 * 0.01), 12);
    expect(() => lorentzFactor({ kind: "powder", wavelengthAngstrom: 0 }, 1)).toThrowError(/wavelength/);
  });
});

describe("lines of one peak and the simulated pattern", () => {
  test("lines within the resolution are one peak, along the chain", () => {
    expect(clusterLines([1, 1.05, 1.12, 1.3], 0.08)).toEqual([
      { lines: [0, 1, 2], qMin: 1, qMax: 1.12 },
      { lines: [3], qMin: 1.3, qMax: 1.3 },
    ]);
  });

  test("the area of the pattern is the integrated intensity", () => {
    const lines = [
      { q: 1.5, square: 2 },
      { q: 2.2, square: 5 },
    ];
    const options = {
      wavelengthAngstrom: 2.4,
      fromDeg: 10,
      toDeg: 120,
      stepDeg: 0.05,
      widthDeg: 0.4,
      displacement: 0.7,
    };
    const pattern = simulatedPattern(lines, options);
    const area = pattern.intensities.reduce((sum, value) => sum + value * 0.05, 0);
    const expected = lines.reduce(
      (sum, line) => sum + integratedIntensity(line, { kind: "powder", wavelengthAngstrom: 2.4 }, 0.7),
      0,
    );
    expect(area).toBeCloseTo(expected, 6);
    const highest = pattern.intensities.indexOf(Math.max(...pattern.intensities));
    const at = (360 / Math.PI) * Math.asin((2.2 * 2.4) / (4 * Math.PI));
    expect(Math.abs(10 + 0.05 * highest - at)).toBeLessThan(0.05);
    expect(() => simulatedPattern(lines, { ...options, stepDeg: 0 })).toThrowError(/range/);
  });
});

describe("nuclear structure factors", () => {
  test("rock salt: all even b₁ + b₂, all odd b₁ − b₂, per primitive cell", () => {
    const group = groupOf("F m -3 m");
    const atoms = [
      { nucleus: "Mn", position: [0, 0, 0] },
      { nucleus: 5.8, position: [0.5, 0.5, 0.5] },
    ] as const;
    const geometry = scatteringGeometry(group, cubic);
    expect(nuclearStructureFactor(geometry, atoms, [1, 1, 1])[0]).toBeCloseTo(0.1 * (-3.75 - 5.8), 2);
    expect(nuclearStructureFactor(geometry, atoms, [2, 0, 0])[0]).toBeCloseTo(0.1 * (-3.75 + 5.8), 2);
    const lines = nuclearSquares(group, cubic, atoms, { qMax: 2.1 });
    expect(lines.map(({ line }) => line.multiplicity)).toEqual([8, 6]);
    expect(lines[0]?.square).toBeCloseTo(8 * nuclearStructureFactor(geometry, atoms, [1, 1, 1])[0] ** 2, 10);
  });
});

/** A spiral along c with moments in the plane, turning one way or the other. */
function spiral(hand: 1 | -1): MomentArrangement {
  const { k } = spiralWave();
  return {
    atoms: [{ site: "M", position: [0, 0, 0], formFactor: magneticFormFactor({ constant: 1 }) }],
    waves: [{ k, halfLattice: false, operator: 0, components: [{ real: [0.5, 0, 0], imaginary: [0, 0.5 * hand, 0] }] }],
  };
}

function spiralWave(): { readonly k: WaveVector } {
  return {
    k: {
      components: [
        {
          constant: [0, 1],
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
        {
          constant: [0, 1],
          coefficients: [
            [1, 1],
            [0, 1],
            [0, 1],
          ],
        },
      ],
      values: [0.17],
      uncertainties: [null],
    },
  };
}

describe("polarised neutrons", () => {
  test("the chiral term of a spiral is ± its whole intensity along the axis, and turns sign with the hand: Blume 1963", () => {
    const geometry = scatteringGeometry(groupOf("P 4"), cubic);
    const q: Triple = [0, 0, 0.17];
    const right = magneticStructureFactor(geometry, spiral(1), q);
    const left = magneticStructureFactor(geometry, spiral(-1), q);
    expect(right.square).toBeGreaterThan(0);
    expect(Math.abs(right.chirality)).toBeCloseTo(right.square, 12);
    expect(left.chirality).toBeCloseTo(-right.chirality, 12);
    // F⊥ = p (1, i, 0)/2: i (F* × F)·Q̂ = i (1·i − (−i)·1)/4 p² = −p²/2.
    expect(right.chirality).toBeLessThan(0);
    // In the plane only one component is left: no chiral term.
    expect(magneticStructureFactor(geometry, spiral(1), [1, 0, 0.17 - 0.17]).chirality).toBeCloseTo(0, 12);
  });
});

describe("sums of roots of unity", () => {
  test("agree with floats on random sums, of large orders too", () => {
    const random = seeded(77);
    let zeros = 0;
    for (let round = 0; round < 400; round++) {
      const order = random.pick([1, 2, 3, 4, 5, 6, 8, 12, 15, 24, 30, 400, 1200, 10_000, 9_973]);
      const terms = Array.from({ length: 1 + random.below(6) }, () => ({
        turns: [random.below(order), order] as const,
        coefficient: [random.below(5) - 2, 1 + random.below(3)] as const,
      }));
      // Half of them completed to a sum that vanishes: all p-th roots of one of the terms.
      const [first] = terms;
      if (first && round % 2 === 0) {
        const prime = random.pick([2, 3, 5]);
        terms.length = 0;
        for (let step = 0; step < prime; step++)
          terms.push({ turns: [first.turns[0] * prime + step * order, order * prime], coefficient: [2, 3] });
      }
      let [re, im] = [0, 0];
      for (const { turns, coefficient } of terms) {
        const angle = (2 * Math.PI * (turns[0] % turns[1])) / turns[1];
        re += (coefficient[0] / coefficient[1]) * Math.cos(angle);
        im += (coefficient[0] / coefficient[1]) * Math.sin(angle);
      }
      const vanishes = Math.hypot(re, im) < 1e-11;
      if (vanishes) zeros += 1;
      expect(sumVanishes(terms), JSON.stringify(terms)).toBe(vanishes);
    }
    expect(zeros).toBeGreaterThan(150);
  });
});

describe("extinction rules", () => {
  const rulesOf = (name: string, k: string | WaveVector, at: string): Readonly<Record<string, readonly string[]>> => {
    const group = groupOf(name);
    const modes = siteModes(
      group,
      smallIrreps(group, typeof k === "string" ? wave(k) : k),
      siteOrbit(group, site("M", at), null),
    );
    return Object.fromEntries(
      extinctionRules(group, [modes]).map(({ label, rules }) => [label, rules.map(({ text }) => text)]),
    );
  };

  test("P 3_1 1 2 at k = 0: each twofold axis along Q leaves F along Q for Γ1, on all of its three lines", () => {
    expect(rulesOf("P 31 1 2", "0 0 0", "407/997 263/997 413/997")["Γ1"]?.map((rule) => rule.split("+")[0])).toEqual(
      expect.arrayContaining(["all (h 0 0)", "all (0 k 0)"]),
    );
  });

  test("FeO: moments along [111] leave (1/2 1/2 1/2) and its odd multiples dark (Shull, Strauser & Wollan, Phys. Rev. 83 (1951) 333)", () => {
    const rules = Object.values(rulesOf("F m -3 m", "1/2 1/2 1/2", "0 0 0"));
    expect(rules).toContainEqual(["all (h h h)+k"]);
    expect(rules).toContainEqual([]);
  });

  test("perovskite B site in Pbnm: the reflections of F, G, C and A (Bertaut in Magnetism III, 1963)", () => {
    const rules = Object.values(rulesOf("P b n m", "0 0 0", "1/2 0 0")).map(([first]) => first);
    // {A_x G_y C_z} has no F: dark where h + k and l are even; and so on.
    expect(rules).toContain("l = 2n and h+k = 2n for (h k l)+k");
    expect(rules).toContain("l = 2n and h+k = 2n+1 for (h k l)+k");
    expect(rules).toContain("l = 2n+1 and h+k = 2n+1 for (h k l)+k");
    expect(rules).toContain("l = 2n+1 and h+k = 2n for (h k l)+k");
  });

  test("YBa2Cu3O6: the double layer out of phase leaves (h k 0)+k dark", () => {
    expect(Object.values(rulesOf("P 4/m m m", "1/2 1/2 0", "0 0 0.361"))).toContainEqual(["all (h k 0)+k"]);
  });

  test("with a letter left open in k the rules are those of the whole line", () => {
    const open = rulesOf(
      "P b n m",
      { components: parseWaveVector("0,u,0").components, values: null, uncertainties: null },
      "1/2 0 0",
    );
    const fixed = rulesOf("P b n m", "0 2/7 0", "1/2 0 0");
    expect(Object.values(open).flat().length).toBeGreaterThan(0);
    expect(Object.values(open)).toEqual(Object.values(fixed));
  });

  test("accidental zeros at special coordinates are found though no rule says them", () => {
    // z = 1/4 of (0 0 z) and (0 0 −z) in P4/mmm: 2 cos 2π l/4 is 0 for odd l.
    const group = groupOf("P 4/m m m");
    const modes = siteModes(group, smallIrreps(group, wave("0 0 0")), siteOrbit(group, site("M", "0 0 1/4"), null));
    const exact = extinctionTest(group, [modes]);
    const labels = exact.labels.filter((label) => exact.vector([1, 0, 1]).includes(label));
    expect(labels.length).toBeGreaterThan(0);
    const general = siteModes(
      group,
      smallIrreps(group, wave("0 0 0")),
      siteOrbit(group, site("M", "0 0 0.2513"), null),
    );
    for (const label of labels) expect(extinctionTest(group, [general]).vector([1, 0, 1])).not.toContain(label);
  });
});

describe("the arrangement of amplitudes", () => {
  test("is linear, and its unit is μB", () => {
    const group = groupOf("P n m a");
    const cell = { a: 10.2, b: 6.1, c: 4.7, alpha: 90, beta: 90, gamma: 90 };
    const modes = siteModes(group, smallIrreps(group, wave("0 1/2 0")), siteOrbit(group, site("M", "0 0 0"), null));
    const space = modeSpace(group, cell, [{ modes, formFactor: magneticFormFactor({ ion: "Fe3+" }) }], ["Γ1"]);
    for (const { components } of space.basis) {
      const sizes = (components[0] ?? []).map(({ real, imaginary }) => Math.hypot(...real, ...imaginary));
      expect(Math.max(...sizes)).toBeCloseTo(1, 12);
    }
    const one = arrangementWith(space, [1, 0, 0, 0, 0, 0]);
    const two = arrangementWith(space, [2, 0, 0, 0, 0, 0]);
    expect(two.waves[0]?.components[0]?.real[0]).toBeCloseTo(2 * (one.waves[0]?.components[0]?.real[0] ?? 0), 12);
    expect(structuredClone(space)).toEqual(space);
    expect(JSON.parse(JSON.stringify(space))).toEqual(space);
  });
});
