import { configurationsOf } from "@kvane/core/configurations";
import { arrangementEnergy, exchangeLevels, groundOf } from "@kvane/core/exchange";
import { smallIrreps } from "@kvane/core/irreps";
import { type exactWaveVector, numericWaveVector, parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { cellOf, modelOf } from "../support/exchange-models.js";
import { againstTwin, randomModel, twinBonds, twinEigenvalue } from "../support/exchange-twin.js";
import { seeded } from "../support/random.js";

describe("random models of one to three sublattices", () => {
  it.each([1, 2, 3, 5, 8, 13, 21, 34])("seed %d: the certified minimum agrees with a dense grid", async (seed) => {
    const made = await randomModel(8_000_000 + seed);
    const { energy, certificate } = await groundOf(made.model);
    expect(againstTwin(made, { energy, ...certificate }, 12)).toEqual([]);
    expect(energy - certificate.lowerBound).toBeLessThan(1e-5);
  });

  it("the grid twin would notice a wrong energy", async () => {
    const made = await randomModel(8_000_001);
    const { energy, certificate } = await groundOf(made.model);
    expect(againstTwin(made, { ...certificate, energy: energy - 0.01 }, 12)).not.toEqual([]);
    expect(againstTwin(made, { ...certificate, energy: energy + 0.01 }, 12)).not.toEqual([]);
    expect(againstTwin(made, { exhaustive: true, energy, lowerBound: energy + 0.01 }, 12)).not.toEqual([]);
  });

  it("the lowest level at any k is that of the twin", async () => {
    const random = seeded(8_100_000);
    for (let seed = 0; seed < 12; seed++) {
      const { model, twin, name } = await randomModel(8_200_000 + seed);
      const k = placeWaveVector(
        model.table.group,
        parseWaveVector([0, 1, 2].map(() => random.next().toFixed(7)).join(",")),
      ).k;
      const lowest = exchangeLevels(model, k, 1e-9).levels[0]?.energy ?? 0;
      expect(lowest, name).toBeCloseTo(
        twinEigenvalue(twin.atoms.length, twinBonds(twin), numericWaveVector(k) ?? []) / 2,
        6,
      );
    }
  });
});

describe("levels of J(k)", () => {
  const cases: readonly [string, readonly string[], string][] = [
    ["P n m a", ["A 0 0 0", "B 0.137 1/4 0.308"], "0,0,0"],
    ["P n m a", ["A 0 0 0", "B 0.137 1/4 0.308"], "1/2,0,1/2"],
    ["P n m a", ["A 0.1 0.2 0.3"], "0,0.317,0"],
    ["I 41/a m d:2", ["A 0 0 1/2"], "1/2,1/2,1/2"],
    ["P 63/m c m", ["A 0.24 0 1/4"], "1/3,1/3,0"],
    ["P 21 3", ["A 0.137 0.137 0.137"], "1/2,1/2,1/2"],
  ];
  it.each(cases)("%s %j at %s: each level is a sum of whole irreps", async (symbol, sites, text) => {
    const cell = symbol.startsWith("P 6")
      ? cellOf(7, 7, 5, 90, 90, 120)
      : symbol.startsWith("I 4")
        ? cellOf(7, 7, 9)
        : symbol === "P 21 3"
          ? cellOf(8, 8, 8)
          : cellOf(9.4, 6.9, 8.2);
    const model = await modelOf(symbol, cell, sites, { 1: 1, 2: -0.37, 3: 0.61, 4: 0.23 });
    const k = placeWaveVector(model.table.group, parseWaveVector(text)).k;
    const { levels } = exchangeLevels(model, k, 1e-9);
    const size = model.table.atoms.length;
    expect(levels.reduce((sum, { degeneracy }) => sum + degeneracy, 0)).toBe(size);
    for (const { degeneracy, irreps, magneticIrreps, weights } of levels) {
      const dimension = (counts: typeof irreps) =>
        counts.reduce((sum, one) => sum + one.dimension * one.multiplicity, 0);
      expect(dimension(irreps)).toBe(degeneracy);
      // Times an axial vector: three directions of the spins.
      expect(dimension(magneticIrreps)).toBe(3 * degeneracy);
      expect(weights.reduce((sum, one) => sum + one, 0)).toBeCloseTo(degeneracy, 9);
    }
    // The irreps of moments over all levels are those of the magnetic representation.
    const { group } = model.table;
    const all = new Map<string, number>();
    for (const { magneticIrreps } of levels)
      for (const { label, multiplicity } of magneticIrreps) all.set(label, (all.get(label) ?? 0) + multiplicity);
    const expected = new Map<string, number>();
    const representations = smallIrreps(group, k);
    for (const orbit of orbitsOf(model.table.atoms))
      for (const { irrep, multiplicity } of siteModes(group, representations, siteOrbit(group, orbit, cell)).irreps)
        if (multiplicity > 0) expected.set(irrep.label, (expected.get(irrep.label) ?? 0) + multiplicity);
    expect([...all].sort()).toEqual([...expected].sort());
  });
});

function orbitsOf(
  atoms: readonly {
    readonly label: string;
    readonly index: number;
    readonly position: Parameters<typeof exactWaveVector>[0];
  }[],
) {
  return atoms.filter(({ index }) => index === 0).map(({ label, position }) => ({ label, position }));
}

describe("energies of arrangements", () => {
  it.each([
    ["P n m a", cellOf(9.4, 6.9, 8.2), ["A 0 0 0"], "0,1/2,0"],
    ["P n m a", cellOf(9.4, 6.9, 8.2), ["A 0 0 0", "B 0.137 1/4 0.308"], "0,0,0"],
    ["I 4/m m m", cellOf(4, 4, 11), ["A 0 0 0"], "1/2,1/2,0"],
    ["P 6/m m m", cellOf(6, 6, 8, 90, 90, 120), ["A 1/2 0 0"], "0,0,1/2"],
  ] as const)(
    "%s %o %j at %s, summed bond by bond, lie between the levels of J(k)",
    async (symbol, cell, sites, text) => {
      const model = await modelOf(symbol, cell, sites, { 1: 1, 2: -0.37, 3: 0.61 });
      const { group, atoms } = model.table;
      const k = placeWaveVector(group, parseWaveVector(text)).k;
      const { levels } = exchangeLevels(model, k, 1e-9);
      const irreps = smallIrreps(group, k);
      const modes = orbitsOf(atoms).map((site) => siteModes(group, irreps, siteOrbit(group, site, cell)));
      const { configurations } = await configurationsOf(group, irreps, modes, cell);
      expect(configurations.length).toBeGreaterThan(0);
      for (const one of configurations) {
        const energy = arrangementEnergy(model, one);
        if (energy === null) continue;
        // An irrep of moments occurs in the levels whose sites it comes from: its arrangements have no other energies.
        const own = levels.filter(({ magneticIrreps }) =>
          magneticIrreps.some(({ label }) => one.irreps.includes(label)),
        );
        const [lowest, highest] = [Math.min(...own.map((l) => l.energy)), Math.max(...own.map((l) => l.energy))];
        expect(energy.lowest, one.id).toBeGreaterThan(lowest - 1e-8);
        expect(energy.highest, one.id).toBeLessThan(highest + 1e-8);
        if (own.length === 1) expect(energy.lowest, one.id).toBeCloseTo(lowest, 8);
      }
    },
  );
});
