import { configurationsOf } from "@kvane/core/configurations";
import {
  configurationSpaces,
  extinctionTest,
  lineForms,
  lineMembers,
  lorentzFactor,
  type MomentSpace,
  magneticFormFactor,
  quadraticForm,
  scatteringGeometry,
  spaceExtinctions,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { siteModes } from "@kvane/core/modes";
import { satelliteLines } from "@kvane/core/reflections";
import { type Cell, siteOrbit } from "@kvane/core/spacegroups";
import { type IntensityData, weigh } from "@kvane/core/weighing";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { site, wave } from "../support/written.js";

const geometry = { kind: "powder", wavelengthAngstrom: 1.5 } as const;

function powder(
  group: string,
  cell: Cell,
  k: string,
  space: MomentSpace,
  amplitudes: readonly number[],
): IntensityData {
  const peaks = new Map<number, { label: string; q: number; value: number }>();
  for (const { line, matrix } of lineForms(groupOf(group), cell, wave(k), space, { qMax: 4 })) {
    const value = 10 * quadraticForm(matrix, amplitudes) * lorentzFactor(geometry, line.q);
    const key = Math.round(1e6 * line.q);
    peaks.set(key, { label: `(${line.h.join(" ")})`, q: line.q, value: (peaks.get(key)?.value ?? 0) + value });
  }
  const strongest = Math.max(...[...peaks.values()].map(({ value }) => value));
  return {
    sample: "powder",
    geometry,
    scale: 10,
    nuclear: [],
    displacement: 0,
    resolution: 0.002,
    data: [...peaks.values()].map(({ label, q, value }) => ({
      label,
      q,
      hkl: null,
      observed: value,
      uncertainty: Math.hypot(0.03 * value, 0.003 * strongest),
    })),
  };
}

describe("UO2: the transverse order with all three arms, and with one arm in three domains", () => {
  // arXiv 2409.20228 (read) quotes the equality and the neutron work that settled it. One arm: 1 × 1 longitudinal and
  // 2 × 1 transverse.
  const cell = { a: 5.47, b: 5.47, c: 5.47, alpha: 90, beta: 90, gamma: 90 };

  test("a powder does not tell them apart, a crystal of one domain does", async () => {
    const group = groupOf("F m -3 m");
    const k = wave("0 0 1");
    const irreps = smallIrreps(group, k);
    const modes = siteModes(group, irreps, siteOrbit(group, site("U", "0 0 0"), null));
    const set = await configurationsOf(group, irreps, [modes], cell, { arms: "all" });
    const spaces = configurationSpaces(set, cell, [{ modes, formFactor: magneticFormFactor({ ion: "U4+" }) }]);
    const dimension = Object.fromEntries(irreps.irreps.map(({ label, dimension: own }) => [label, own]));
    // Transverse: the two-dimensional irrep; one amplitude each, on three arms and on one.
    const transverse = set.configurations.flatMap(({ id, irreps: labels }, index) => {
      const space = spaces[index] as MomentSpace;
      return labels.every((label) => dimension[label] === 2) && space.basis.length === 1 ? [{ id, space }] : [];
    });
    const three = transverse.find(({ space }) => space.waves.length === 3)?.space as MomentSpace;
    const one = transverse.find(({ space }) => space.waves.length === 1)?.space as MomentSpace;
    const { ranking } = await weigh(group, cell, k, powder("F m -3 m", cell, "0 0 1", three, [1]), [three, one]);
    expect(ranking.map(({ id }) => id).sort()).toEqual([one.id, three.id].sort());
    for (const candidate of ranking) {
      expect(candidate.chiSquared).toBeLessThan(1e-6);
      expect(candidate.identicalTo).toHaveLength(1);
      expect(candidate.separations[0]?.by).toBe("single crystal");
    }
    // Moments along <111>: √3 times the component of one arm; one arm alone has the same sum of squares.
    const sizes = ranking.map(({ moments }) => moments[0]?.size ?? 0);
    expect(sizes[0]).toBeCloseTo(sizes[1] as number, 5);
  });
});

describe("extinctions of configurations", () => {
  test.for([
    ["P b n m", "0 0 0", "1/2 0 0"],
    ["F m -3 m", "1/2 1/2 1/2", "0 0 0"],
    ["R -3 m :H", "0 0 3/2", "0 1/2 1/2"],
    ["F d -3 m :2", "0 0 0", "1/2 1/2 1/2"],
  ] as const)(
    "%s k (%s): what the irreps leave dark stays dark, and dark is what has no intensity",
    async ([name, k, at]) => {
      const group = groupOf(name);
      const cell: Cell = name.startsWith("R")
        ? { a: 7.3, b: 7.3, c: 17.1, alpha: 90, beta: 90, gamma: 120 }
        : name.startsWith("P")
          ? { a: 5.3, b: 5.86, c: 7.4, alpha: 90, beta: 90, gamma: 90 }
          : { a: 8, b: 8, c: 8, alpha: 90, beta: 90, gamma: 90 };
      const irreps = smallIrreps(group, wave(k));
      const modes = siteModes(group, irreps, siteOrbit(group, site("M", at), null));
      const set = await configurationsOf(group, irreps, [modes], cell);
      const spaces = configurationSpaces(set, cell, [{ modes, formFactor: magneticFormFactor({ ion: "Fe3+" }) }]);
      const exact = extinctionTest(group, [modes]);
      const members = lineMembers(group, wave(k));
      const lines = satelliteLines(group, cell, wave(k), { qMax: 3 });
      let dark = 0;
      for (const [index, configuration] of set.configurations.entries()) {
        const space = spaces[index] as MomentSpace;
        const tell = spaceExtinctions(scatteringGeometry(group, cell), members, space);
        const forms = lineForms(group, cell, wave(k), space, { qMax: 3 });
        lines.forEach((line, at2) => {
          const matrix = forms[at2]?.matrix as Float64Array;
          const sum = space.basis.reduce(
            (total, _, entry) => total + (matrix[entry * (space.basis.length + 1)] as number),
            0,
          );
          expect(tell.line(line)).toBe(sum < 1e-15);
          const byIrreps = configuration.irreps.every((label) => exact.line(line.h, line.sign).includes(label));
          if (byIrreps) expect(tell.line(line)).toBe(true);
          if (tell.line(line)) dark += 1;
        });
      }
      expect(dark).toBeGreaterThan(0);
    },
  );
});
