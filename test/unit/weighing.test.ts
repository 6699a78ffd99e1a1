import {
  arrangementWith,
  domainForm,
  lineForms,
  lorentzFactor,
  type MomentSpace,
  magneticFormFactor,
  modeSpace,
  type NuclearAtom,
  nuclearSquares,
  prepareSpace,
  quadraticForm,
  scatteringGeometry,
  type Triple,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { type SiteModes, siteModes } from "@kvane/core/modes";
import { type Cell, siteOrbit } from "@kvane/core/spacegroups";
import { type IntensityData, weigh } from "@kvane/core/weighing";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { gaussian } from "../support/weigh-cases.js";
import { site, wave } from "../support/written.js";

const wavelengthAngstrom = 1.5;
const geometry = { kind: "powder", wavelengthAngstrom } as const;

interface Setting {
  readonly modes: SiteModes;
  readonly spaces: readonly MomentSpace[];
}

function settingOf(group: string, cell: Cell, k: string, at: string, ion: string): Setting {
  const parsed = groupOf(group);
  const modes = siteModes(parsed, smallIrreps(parsed, wave(k)), siteOrbit(parsed, site("M", at), null));
  const formFactor = magneticFormFactor({ ion });
  const spaces = modes.irreps
    .filter(({ multiplicity }) => multiplicity > 0)
    .map(({ irrep }) => modeSpace(parsed, cell, [{ modes, formFactor }], [irrep.label]));
  return { modes, spaces };
}

/** Exact powder intensities of one arrangement, with uncertainties of 3 % and 0.3 % of the strongest. */
function powder(
  group: string,
  cell: Cell,
  k: string,
  space: MomentSpace,
  amplitudes: readonly number[],
  scale: number | null,
  qMax = 4,
): IntensityData {
  const peaks = new Map<number, { label: string; q: number; value: number }>();
  for (const { line, matrix } of lineForms(groupOf(group), cell, wave(k), space, { qMax })) {
    const value = (scale ?? 30) * quadraticForm(matrix, amplitudes) * lorentzFactor(geometry, line.q);
    // Lines such as (333) and (511) of a cubic crystal are one peak.
    const key = Math.round(1e6 * line.q);
    const known = peaks.get(key);
    peaks.set(
      key,
      known ? { ...known, value: known.value + value } : { label: `(${line.h.join(" ")})`, q: line.q, value },
    );
  }
  const values = [...peaks.values()];
  const strongest = Math.max(...values.map(({ value }) => value));
  return {
    sample: "powder",
    geometry,
    scale,
    nuclear: [],
    displacement: 0,
    resolution: 0.004,
    data: values.map(({ label, q, value }) => ({
      label,
      q,
      hkl: null,
      observed: value,
      uncertainty: Math.hypot(0.03 * value, 0.003 * strongest),
    })),
  };
}

const rockSalt: Cell = { a: 4.43, b: 4.43, c: 4.43, alpha: 90, beta: 90, gamma: 90 };

describe("weighing", () => {
  test("moments in the (111) sheet strike out the irrep along [111], with the peak named", async () => {
    const { spaces } = settingOf("F m -3 m", rockSalt, "1/2 1/2 1/2", "0 0 0", "Mn2+");
    const sheet = spaces.find(({ basis }) => basis.length === 2) as MomentSpace;
    const axial = spaces.find(({ basis }) => basis.length === 1) as MomentSpace;
    const data = powder("F m -3 m", rockSalt, "1/2 1/2 1/2", sheet, [3, 1], 20);
    const result = await weigh(groupOf("F m -3 m"), rockSalt, wave("1/2 1/2 1/2"), data, spaces);
    expect(result.ranking.map(({ id }) => id)).toEqual([sheet.id]);
    expect(result.struckOut).toEqual([{ id: axial.id, peaks: ["(0 0 0)"], satellites: ["(0 0 0) + k"] }]);
    expect(result.relative).toBe(false);
    const [best] = result.ranking;
    // A powder of a cubic crystal does not tell the direction in the sheet: Shirane, Acta Cryst. 12 (1959) 282.
    expect(best?.parameters).toBe(1);
    expect(best?.amplitudes.map(({ determined }) => determined)).toEqual([false, false]);
    expect(best?.chiSquared).toBeLessThan(1e-6);
    const moment = arrangementWith(sheet, [3, 1]).waves[0]?.components[0]?.real as Triple;
    expect(best?.moments[0]?.size).toBeCloseTo(Math.hypot(...moment), 5);
    expect(best?.moments[0]?.limit).toBe(5);
  });

  test("without a scale sizes are relative, and what follows from a full moment is offered", async () => {
    const { spaces } = settingOf("F m -3 m", rockSalt, "1/2 1/2 1/2", "0 0 0", "Mn2+");
    const sheet = spaces.find(({ basis }) => basis.length === 2) as MomentSpace;
    const data = powder("F m -3 m", rockSalt, "1/2 1/2 1/2", sheet, [3, 1], null);
    const { relative, ranking, remarks } = await weigh(
      groupOf("F m -3 m"),
      rockSalt,
      wave("1/2 1/2 1/2"),
      data,
      spaces,
    );
    expect(relative).toBe(true);
    expect(remarks.some((text) => text.includes("relative"))).toBe(true);
    const [best] = ranking;
    expect(best?.scale).toBeNull();
    expect((best?.factorToLimit ?? 0) * (best?.moments[0]?.largest ?? 0)).toBeCloseTo(5, 9);
  });

  test("nuclear lines of the same measurement fix the scale and the moment in μB", async () => {
    const group = groupOf("P 42/m n m");
    const cell: Cell = { a: 4.873, b: 4.873, c: 3.31, alpha: 90, beta: 90, gamma: 90 };
    const { spaces } = settingOf("P 42/m n m", cell, "0 0 0", "0 0 0", "Mn2+");
    const axial = spaces.filter(({ basis }) => basis.length === 1);
    // The one without (h k l), h + k + l even: antiferromagnetic.
    const truth = axial.find((space) =>
      lineForms(group, cell, wave("0 0 0"), space, { qMax: 1.4 }).some(({ matrix }) => (matrix[0] as number) > 0.01),
    ) as MomentSpace;
    const fluorine = 0.305;
    const nuclear: readonly NuclearAtom[] = [
      { nucleus: "Mn", position: [0, 0, 0] },
      { nucleus: "Mn", position: [0.5, 0.5, 0.5] },
      ...(
        [
          [fluorine, fluorine, 0],
          [-fluorine, -fluorine, 0],
          [0.5 - fluorine, 0.5 + fluorine, 0.5],
          [0.5 + fluorine, 0.5 - fluorine, 0.5],
        ] as const
      ).map((position) => ({ nucleus: "F", position })),
    ];
    const squares = nuclearSquares(group, cell, nuclear, { qMax: 4 });
    const plain = powder("P 42/m n m", cell, "0 0 0", truth, [4.6], 12);
    const data: IntensityData = {
      ...plain,
      scale: null,
      nuclear,
      data: plain.data.map((datum) => {
        const found = squares.find(({ line }) => Math.abs(line.q - (datum.q as number)) < 1e-6);
        return {
          ...datum,
          holds: "both",
          observed: datum.observed + 12 * (found?.square ?? 0) * lorentzFactor(geometry, datum.q as number),
        };
      }),
    };
    const { ranking, relative } = await weigh(group, cell, wave("0 0 0"), data, spaces);
    expect(relative).toBe(false);
    expect(ranking[0]?.id).toBe(truth.id);
    expect(ranking[0]?.scale).toBeCloseTo(12, 4);
    expect(ranking[0]?.moments[0]?.size).toBeCloseTo(4.6, 4);
  });

  test("fractions of domains of a crystal are fitted with the amplitudes", async () => {
    const k = wave("1/2 0 0");
    const tetragonal = groupOf("P 4/m m m");
    const cell: Cell = { a: 4, b: 4, c: 6, alpha: 90, beta: 90, gamma: 90 };
    const { spaces } = settingOf("P 4/m m m", cell, "1/2 0 0", "0 0 0", "Fe3+");
    const space = spaces[0] as MomentSpace;
    const prepared = prepareSpace(scatteringGeometry(tetragonal, cell), space);
    const random = seeded(3);
    const reflections: Triple[] = [];
    for (let h = 0; h < 3; h++)
      for (let kk = 0; kk < 3; kk++) for (let l = 0; l < 4; l++) reflections.push([h + 0.5, kk, l], [h, kk + 0.5, l]);
    // The fourfold axis is in the list of operators; the domain of the arm (0 1/2 0) has 30 %.
    const fourfold = tetragonal.operators.findIndex(({ rotation }) => rotation.join() === "0,-1,0,1,0,0,0,0,1");
    const data: IntensityData = {
      sample: "single crystal",
      geometry: { kind: "single crystal", wavelengthAngstrom: 0.9 },
      scale: 40,
      nuclear: [],
      displacement: 0,
      resolution: 0.01,
      data: reflections.map((hkl) => {
        const square = (operator: number): number =>
          quadraticForm(domainForm(tetragonal, prepared, hkl, operator), [3.7]);
        const q = 2 * Math.PI * Math.hypot(hkl[0] / 4, hkl[1] / 4, hkl[2] / 6);
        const value =
          40 *
          (0.7 * square(0) + 0.3 * square(fourfold)) *
          lorentzFactor({ kind: "single crystal", wavelengthAngstrom: 0.9 }, q);
        const uncertainty = 0.02 * value + 1e-3;
        return { label: hkl.join(" "), q: null, hkl, observed: value + uncertainty * gaussian(random), uncertainty };
      }),
    };
    const { ranking } = await weigh(tetragonal, cell, k, data, [space], { domains: "free" });
    const [best] = ranking;
    expect(best?.domains).toHaveLength(2);
    const own = best?.domains.find(({ alike }) => alike.includes(0));
    expect(Math.abs((own?.fraction ?? 0) - 0.7)).toBeLessThan(4 * (own?.uncertainty ?? 0));
    expect(own?.uncertainty).toBeLessThan(0.02);
    expect(Math.abs((best?.moments[0]?.size ?? 0) - 3.7)).toBeLessThan(4 * (best?.moments[0]?.sizeUncertainty ?? 0));
    const equal = await weigh(tetragonal, cell, k, data, [space], { domains: "equal" });
    expect(equal.ranking[0]?.chiSquared).toBeGreaterThan(100);
  });

  test("two irreps with the same powder pattern are shown as one family", async () => {
    // h-YMnO3 with x(Mn) = 1/3: the in-plane arrangements form pairs with identical intensities (Muñoz et al., Phys. Rev. B 62
    // (2000) 9498; Howard et al., Acta Cryst. B69 (2013) 534, read in arXiv 2305.05254).
    const cell: Cell = { a: 6.14, b: 6.14, c: 11.4, alpha: 90, beta: 90, gamma: 120 };
    const { spaces } = settingOf("P 63 c m", cell, "0 0 0", "1/3 0 0", "Mn3+");
    const planar = spaces.filter(({ basis }) => basis.length <= 2);
    for (const truth of planar.filter(({ basis }) => basis.length === 1)) {
      const data = powder("P 63 c m", cell, "0 0 0", truth, [2.9], 10);
      const { ranking } = await weigh(groupOf("P 63 c m"), cell, wave("0 0 0"), data, spaces);
      const own = ranking.find(({ id }) => id === truth.id);
      expect(own?.chiSquared).toBeLessThan(1e-6);
      expect(own?.identicalTo.length).toBeGreaterThan(0);
      expect(own?.sameAs).toEqual(expect.arrayContaining([...(own?.identicalTo ?? [])].slice(0, 1)));
      expect(own?.separations.length).toBeGreaterThan(0);
    }
  });

  test("the same seed gives the same bytes", async () => {
    const { spaces } = settingOf(
      "P n m a",
      { a: 10, b: 6, c: 4.7, alpha: 90, beta: 90, gamma: 90 },
      "0 0 0",
      "0 0 0",
      "Fe3+",
    );
    const cell = { a: 10, b: 6, c: 4.7, alpha: 90, beta: 90, gamma: 90 };
    const truth = spaces[1] as MomentSpace;
    const data = powder(
      "P n m a",
      cell,
      "0 0 0",
      truth,
      truth.basis.map((_, index) => 2 - index),
      10,
      3,
    );
    const once = await weigh(groupOf("P n m a"), cell, wave("0 0 0"), data, spaces);
    const again = await weigh(groupOf("P n m a"), cell, wave("0 0 0"), data, [...spaces].reverse());
    expect(JSON.stringify(again.ranking)).toBe(JSON.stringify(once.ranking));
    expect(await weigh(groupOf("P n m a"), cell, wave("0 0 0"), data, spaces)).toEqual(once);
    expect(structuredClone(once)).toEqual(once);
  });

  test("what cannot be weighed is refused", async () => {
    const { spaces } = settingOf("F m -3 m", rockSalt, "1/2 1/2 1/2", "0 0 0", "Mn2+");
    const data = powder(
      "F m -3 m",
      rockSalt,
      "1/2 1/2 1/2",
      spaces.find(({ basis }) => basis.length === 2) as MomentSpace,
      [1, 1],
      null,
    );
    const group = groupOf("F m -3 m");
    const k = wave("1/2 1/2 1/2");
    await expect(weigh(group, rockSalt, k, { ...data, data: [] }, spaces)).rejects.toThrow(/no intensities/);
    const far = { ...data, data: data.data.map((datum) => ({ ...datum, q: (datum.q as number) + 0.3 })) };
    await expect(weigh(group, rockSalt, k, { ...far, resolution: 0.001 }, spaces)).rejects.toThrow(/no peak/);
    const bare = { ...data, data: data.data.map((datum) => ({ ...datum, uncertainty: 0 })) };
    await expect(weigh(group, rockSalt, k, bare, spaces)).rejects.toThrow(/uncertainty/);
  });
});

describe("polarised neutrons on a crystal", () => {
  test("the two hands of a spiral are domains whose fractions polarised intensities give", async () => {
    const group = groupOf("P 4/m");
    const cell: Cell = { a: 5, b: 5, c: 7, alpha: 90, beta: 90, gamma: 90 };
    const modes = siteModes(group, smallIrreps(group, wave("0 0 1/5")), siteOrbit(group, site("M", "0 0 0"), null));
    const formFactor = magneticFormFactor({ ion: "Mn2+" });
    const spaces = modes.irreps
      .filter(({ multiplicity }) => multiplicity > 0)
      .map(({ irrep }) => modeSpace(group, cell, [{ modes, formFactor }], [irrep.label]));
    // Circular in the plane: S ∝ (1, ±i, 0).
    const circular = spaces.find(
      ({ basis }) => Math.abs(basis[0]?.components[0]?.[0]?.imaginary[1] ?? 0) > 0.1,
    ) as MomentSpace;
    const prepared = prepareSpace(scatteringGeometry(group, cell), circular);
    const inversion = group.operators.findIndex(({ rotation }) => rotation.join() === "-1,0,0,0,-1,0,0,0,-1");
    const data: IntensityData = {
      sample: "single crystal",
      geometry: { kind: "none" },
      scale: 25,
      nuclear: [],
      displacement: 0,
      resolution: 0.01,
      data: (
        [
          [0, 0, 0.2],
          [0, 0, 0.8],
          [1, 0, 0.2],
          [1, 1, 0.8],
          [0, 0, 1.2],
        ] as const
      ).flatMap((hkl) =>
        [-0.9, 0.9].map((polarization) => {
          const of = (operator: number): number =>
            quadraticForm(domainForm(group, prepared, hkl, operator, polarization), [2.1, 0]);
          const observed = 25 * (0.8 * of(0) + 0.2 * of(inversion));
          return {
            label: `${hkl} ${polarization}`,
            q: null,
            hkl,
            observed,
            uncertainty: 0.02 * observed + 1e-3,
            polarization,
          };
        }),
      ),
    };
    const { ranking } = await weigh(group, cell, wave("0 0 1/5"), data, [circular], { domains: "free" });
    const [best] = ranking;
    expect(best?.chiSquared).toBeLessThan(1e-6);
    expect(best?.domains.map(({ alike }) => alike.length)).toEqual([4, 4]);
    expect(best?.domains.find(({ alike }) => alike.includes(0))?.fraction).toBeCloseTo(0.8, 4);
    expect(best?.freePhase).toBe(true);
    // Equal fractions of both hands cannot do it; without polarization nothing tells them apart.
    const equal = await weigh(group, cell, wave("0 0 1/5"), data, [circular], { domains: "equal" });
    expect(equal.ranking[0]?.chiSquared).toBeGreaterThan(100);
    const plain = { ...data, data: data.data.map(({ polarization: _, ...datum }) => datum) };
    const blind = await weigh(group, cell, wave("0 0 1/5"), plain, [circular], { domains: "free" });
    expect(blind.ranking[0]?.domains).toEqual([]);
  });
});
