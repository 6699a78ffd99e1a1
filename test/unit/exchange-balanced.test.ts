import { balancedModel, constantMoments, type ExchangeModel, groundOf } from "@kvane/core/exchange";
import { describe, expect, it } from "vitest";
import { concaveMaximum } from "#core/exchange/concave-maximum.js";
import { nearestInHull } from "#core/exchange/nearest-in-hull.js";
import { cellOf, modelOf } from "../support/exchange-models.js";
import { seeded } from "../support/random.js";

const three = ["A 0 0 0", "B 1/2 1/2 0", "C 1/2 1/2 1/2"];

function threeKinds(constants: readonly number[]): Promise<ExchangeModel> {
  return modelOf(
    "P 4/m m m",
    cellOf(4, 4, 5),
    three,
    Object.fromEntries(constants.map((j, index) => [String(index + 1), j])),
  );
}

describe("the maximum of a concave function", () => {
  it.each([
    ["smooth", (x: number) => ({ value: -((x - 0.3) ** 2), slope: -2 * (x - 0.3) }), 0.3],
    ["a kink", (x: number) => (x < 1.7 ? { value: x, slope: 1 } : { value: 1.7 - 3 * (x - 1.7), slope: -3 }), 1.7],
    [
      "a kink of curves",
      (x: number) =>
        x < 2
          ? { value: -((x - 3) ** 2), slope: -2 * (x - 3) }
          : { value: -1 - (x - 2) ** 2 - (x - 2), slope: -2 * (x - 2) - 1 },
      2,
    ],
    ["far away", (x: number) => ({ value: -Math.abs(x + 1e4), slope: x < -1e4 ? 1 : -1 }), -1e4],
  ])("%s", (_what, at, place) => {
    expect(concaveMaximum(at, 0, 0.25, 1e-13)).toBeCloseTo(place, 9);
  });
});

describe("the nearest point of a hull", () => {
  it("is no farther than any weighted mean, for random vectors", () => {
    const random = seeded(31);
    for (let round = 0; round < 60; round++) {
      const vectors = Array.from({ length: 1 + (round % 5) }, () =>
        [0, 1, 2].map(() => 2 * random.next() - 1 + (round % 3) * 0.4),
      );
      const length = Math.hypot(...nearestInHull(vectors));
      for (let trial = 0; trial < 200; trial++) {
        const weights = vectors.map(() => -Math.log(random.next()));
        const total = weights.reduce((sum, one) => sum + one, 0);
        const mean = [0, 1, 2].map((a) =>
          vectors.reduce((sum, one, n) => sum + ((weights[n] as number) / total) * (one[a] as number), 0),
        );
        expect(Math.hypot(...mean)).toBeGreaterThanOrEqual(length - 1e-12);
      }
    }
  });
});

describe("site potentials", () => {
  it("of a frustrated spinel sit where two k are equally low, and both are told", async () => {
    const model = await balancedModel(
      await modelOf("F d -3 m:2", cellOf(10, 10, 10), ["A 3/8 3/8 3/8", "B 0 0 0"], { 1: 0.9, 2: 1 }),
    );
    const { energy, set } = await groundOf(model);
    expect(set.vectors).toHaveLength(2);
    // Worked out anew on a grid of k and ν: −2.38148.
    expect(energy).toBeCloseTo(-2.3814815, 6);
    expect(constantMoments(model, set.vectors, 1e-8).answer).toBe("not found");
  }, 60_000);

  it("make room for cones: one k along the axis, another one about it, at the energy of the bound", async () => {
    const constants = { "1a": 0.288, "1b": 0.428, "2": 0.901, "3a": 0.305, "3b": 0.36, "4a": 0.464 };
    const plain = await modelOf("P 4/m m m", cellOf(5.1, 5.1, 4), ["A 0 0 0", "B 1/2 1/2 1/2"], constants);
    const model = await balancedModel(plain);
    const { energy, set } = await groundOf(model);
    const { answer, k, spins } = constantMoments(model, set.vectors, 1e-8);
    expect([answer, k.length, spins]).toEqual(["reached", 2, "non-coplanar"]);
    // The plain bound of neither k is reached: potentials and both k are needed.
    const bare = await groundOf(plain);
    expect(bare.energy).toBeLessThan(energy - 1e-3);
    expect(constantMoments(plain, bare.set.vectors, 1e-8).answer).not.toBe("reached");
  }, 60_000);

  // Concave in ν: a maximum is one when no small step leads up. The energies are certified minima.
  it.each([
    [[-0.69, -0.278, 0.032, 0.102]],
    [[0.479, -0.158, 0.64, 0.469]],
    [[-0.289, 0.591, 1.024, -0.169]],
    [[0.187, -0.435, 0.349, 1.084]],
  ])(
    "of three kinds of atoms %j are at the maximum of the bound",
    async (constants) => {
      const model = await balancedModel(await threeKinds(constants));
      const { energy } = await groundOf(model);
      const random = seeded(77);
      for (let trial = 0; trial < 9; trial++) {
        const step = [0, 1, 2].map(() => random.next() - 0.5);
        const mean = step.reduce((sum, one) => sum + one, 0) / 3;
        const size = [1e-4, 1e-3, 0.03][trial % 3] as number;
        const potentials = model.potentials.map((one, atom) => one + size * ((step[atom] as number) - mean));
        expect((await groundOf({ ...model, potentials })).energy).toBeLessThanOrEqual(energy + 1e-9);
      }
    },
    120_000,
  );
});

describe("a minimum in a narrow hollow beside a flat line", () => {
  it("is found with coarse boxes too, and its k is told", async () => {
    const model = {
      ...(await threeKinds([0.187, -0.435, 0.349, 1.084])),
      potentials: [-0.24932549315970293, 0.12447361397929442, 0.12485187918040853],
    };
    for (const options of [{}, { mostLeaves: 120, leafShare: 1e-3 }]) {
      const { energy, set } = await groundOf(model, options);
      expect(energy).toBeCloseTo(-2.2926686506, 9);
      expect(set.vectors).toHaveLength(1);
      expect(set.dimension).toBe(0);
    }
  }, 60_000);
});
