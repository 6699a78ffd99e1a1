import {
  balancedModel,
  type ExchangeModel,
  exchangeLevels,
  groundOf,
  stationaryConstants,
  withConstants,
} from "@kvane/core/exchange";
import type { Request } from "@kvane/core/job";
import { numericWaveVector, parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import { type ExchangeRecord, reportText } from "@kvane/core/reports";
import { describe, expect, it } from "vitest";
import { askedWith } from "../support/asked.js";
import { cellOf, modelOf } from "../support/exchange-models.js";

async function asked(request: Request) {
  const envelope = await askedWith(request);
  expect(envelope.errors).toEqual([]);
  const { stationary } = envelope.result as ExchangeRecord;
  if (!stationary) throw new Error("nothing is asked of the constants");
  return { stationary, text: (await reportText(envelope)).replace(/\s+/g, " ") };
}

/** Fourth neighbours (2, 0) and second ones (1, 1) of this rectangle have one length: shell 3 is of two kinds. */
const rectangle = {
  command: "exchange",
  group: "P m m m",
  cell: `${Math.sqrt(3)} 3 40 90 90 90`,
  sites: ["M 0 0 0"],
  k: "0.29,0,0",
} satisfies Request;

describe("what a measured k asks of the constants", () => {
  it("has one row for a shell that is given as a whole, and one for each kind that is given apart", async () => {
    // Bonds of 1 a, 2 a and √(1 a² + 1 b²) have lengths √3, 2√3 and 2√3: E = 2 J1 cos q + 2 Ja cos 2q + 4 Jb cos q.
    const whole = await asked({ ...rectangle, constants: ["1 1", "3 0.3"] });
    const apart = await asked({ ...rectangle, constants: ["1 1", "3a 0.3", "3b 0.3"] });
    expect(whole.stationary.constants).toMatchObject([
      { name: "1", classes: ["1"], j: 1 },
      { name: "3", classes: ["3a", "3b"], j: 0.3 },
    ]);
    expect(apart.stationary.constants.map(({ name }) => name)).toEqual(["1", "3a", "3b"]);
    const [one] = whole.stationary.relations;
    const [each] = apart.stationary.relations;
    expect(one?.slopes[1]).toBeCloseTo((each?.slopes[1] ?? 0) + (each?.slopes[2] ?? 0), 9);
    expect(one?.text).toBe("J1 + (2 + 4 cos(2πu)) J3 = 0");
    const needed = whole.stationary.needed.find(({ name }) => name === "3");
    expect(needed?.j).toBeCloseTo(-1 / (2 + 4 * Math.cos(2 * Math.PI * 0.29)), 9);
    expect(whole.text).toContain("J3 is one constant of the bonds 3a and 3b.");
    expect(apart.text).not.toContain("is one constant");
  });

  it("says of a flat band that k is one of many, and not that it is a maximum", async () => {
    // Without third neighbours the lowest band of the kagome net is flat.
    const { stationary, text } = await asked({
      command: "exchange",
      group: "P 6/m m m",
      cell: "6 6 20 90 90 120",
      sites: ["M 1/2 0 0"],
      constants: ["1 1", "3 0.3"],
      k: "0.3,0,0",
    });
    expect(stationary.needed.find(({ name }) => name === "3")).toMatchObject({
      along: "level",
      lowest: true,
      oneOfMany: true,
    });
    expect(text).toContain("one of a continuous set of lowest k");
  });
});

describe("atoms that symmetry does not relate", () => {
  const at = async (model: ExchangeModel, k: string) =>
    stationaryConstants(model, placeWaveVector(model.table.group, parseWaveVector(k)).k, { fixedBySymmetry: false });

  it("of two kinds have their potentials balanced anew, and the constant has its minimum at k", async () => {
    const constants = { "1a": -0.182, "1b": 0.753, "2": 0.601, "3a": -0.246, "3b": 0.977 };
    const cell = cellOf(5.1, 5.1, 4);
    const sites = ["A 0 0 0", "B 1/2 1/2 1/2"];
    const made = (more: number) => modelOf("P 4/m m m", cell, sites, { ...constants, "4a": more });
    const model = await balancedModel(await made(0.954));
    const { needed, potentials } = await at(model, "0,0,0.4");
    expect(potentials).toBe("balanced anew");
    const found = needed.find(({ name }) => name === "4a");
    expect(found).toMatchObject({ along: "minimum", lowest: true, oneOfMany: false });
    // With it, and potentials that are balanced for it, the certified search ends at this k.
    const held = await groundOf(await balancedModel(await made(found?.j ?? 0)));
    expect(held.set.vectors.map(({ k }) => numericWaveVector(k)?.[2])).toContainEqual(expect.closeTo(0.4, 5));
    // With those of the given model another value comes out: they must be balanced.
    const kept = stationaryValue(model, 0.4);
    expect(Math.abs(kept - (found?.j ?? 0))).toBeGreaterThan(1e-3);
  }, 120_000);

  /** J4a at which the slope at (0, 0, u) vanishes with the potentials kept, by halving, from energies alone. */
  function stationaryValue(model: ExchangeModel, u: number): number {
    const slope = (j: number) => {
      const lowest = (z: number) => {
        const changed = withConstants(model, { "4a": j });
        const k = placeWaveVector(model.table.group, parseWaveVector(`0,0,${z.toFixed(6)}`)).k;
        return exchangeLevels(changed, k, 1e-9).levels[0]?.energy ?? 0;
      };
      return lowest(u + 1e-4) - lowest(u - 1e-4);
    };
    let [low, high] = [0.05, 0.954];
    const sign = Math.sign(slope(low));
    for (let round = 0; round < 40; round++) {
      const middle = (low + high) / 2;
      if (Math.sign(slope(middle)) === sign) low = middle;
      else high = middle;
    }
    return low;
  }

  it("of three kinds nothing is decided", async () => {
    const sites = ["A 0 0 0", "B 1/2 1/2 0", "C 1/2 1/2 1/2"];
    const model = await modelOf("P 4/m m m", cellOf(4, 4, 5), sites, { 1: 1, 2: 0.4, 3: 0.2 });
    const { needed, potentials } = await at(model, "0,0,0.3");
    expect(potentials).toBe("those of the model");
    expect(needed.every(({ lowest }) => lowest === null)).toBe(true);
  }, 60_000);
});
