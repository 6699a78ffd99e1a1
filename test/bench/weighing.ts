import { lineForms, type MomentSpace, magneticFormFactor, modeSpace, quadraticForm } from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { exactWaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { parseGroup, siteOrbit } from "@kvane/core/spacegroups";
import { type IntensityData, weigh } from "@kvane/core/weighing";
import { seeded } from "../support/random.js";
import { processorTime } from "./clocks.js";
import { median, pairedRatios } from "./paired.js";
import type { Part, Row } from "./part.js";

interface Study {
  readonly amplitudes: number;
  readonly candidates: number;
  readonly lines: number;
  readonly starts: number;
}

const usual: Study = { amplitudes: 6, candidates: 30, lines: 60, starts: 24 };

const cases: readonly (readonly [string, Partial<Study>])[] = [
  ["120 lines", { lines: 120 }],
  ["240 lines", { lines: 240 }],
  ["3 amplitudes", { amplitudes: 3 }],
  ["12 amplitudes", { amplitudes: 12 }],
  ["8 starts", { starts: 8 }],
  ["96 starts", { starts: 96 }],
  ["10 candidates", { candidates: 10 }],
];

/** How the cost of weighing grows with lines, amplitudes, starts and candidates. */
export const weighing: Part = {
  name: "weighing",
  measure: async ({ few }) => {
    const group = parseGroup("P n m a");
    const weighTime = weighingOf(group);
    await weighTime({ ...usual, candidates: 3 });
    const rows: Row[] = [];
    const references: number[] = [];
    for (const [what, change] of cases) {
      const { ratios, reference } = await pairedRatios(
        few,
        () => weighTime({ ...usual, ...change }),
        () => weighTime(usual),
      );
      rows.push({ what: `weighing, ${what}`, over: "usual weighing", ratios });
      references.push(reference);
    }
    const took = `took ${(median(references) / 1000).toFixed(1)} s of the processor`;
    return { rows, notes: [`usual weighing: 30 candidates with 6 amplitudes on 60 lines, up to 24 starts; ${took}`] };
  },
};

/** Processor time of weighing one study in the group, its making left out. */
function weighingOf(group: ReturnType<typeof parseGroup>): (study: Study) => Promise<number> {
  const cell = { a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90 };
  const k = exactWaveVector([
    [0, 1],
    [1, 2],
    [0, 1],
  ]);
  const irreps = smallIrreps(group, k);
  const formFactor = magneticFormFactor({ ion: "Fe3+" });

  /** Arrangements of both irreps on sites 4a and 4c with the first `size` amplitudes. */
  function candidates(size: number, count: number): MomentSpace[] {
    const random = seeded(11);
    return Array.from({ length: count }, (_, index) => {
      const position = [0, 1, 2].map(() => [1 + random.below(40), 101] as const);
      const [x, y, z] = position as [readonly [number, number], readonly [number, number], readonly [number, number]];
      const modes = siteModes(group, irreps, siteOrbit(group, { label: `Fe${index}`, position: [x, y, z] }, null));
      const space = modeSpace(group, cell, [{ modes, formFactor }], ["Γ1", "Γ2"]);
      return { ...space, id: `candidate ${index + 1}`, basis: space.basis.slice(0, size) };
    });
  }

  function dataFor(space: MomentSpace, count: number): IntensityData {
    const random = seeded(12);
    const lines = lineForms(group, cell, k, space, { qMax: 5.5 }).slice(0, count);
    const amplitudes = space.basis.map(() => 1 + random.next());
    const values = lines.map(({ matrix }) => quadraticForm(matrix, amplitudes));
    const strongest = Math.max(...values);
    return {
      sample: "powder",
      geometry: { kind: "none" },
      scale: 1,
      nuclear: [],
      displacement: 0,
      resolution: 1e-5,
      data: lines.map(({ line }, index) => ({
        label: `${index}`,
        q: line.q,
        hkl: null,
        observed: (values[index] as number) * (1 + 0.06 * (random.next() - 0.5)),
        uncertainty: 0.03 * (values[index] as number) + 0.003 * strongest,
      })),
    };
  }

  return ({ amplitudes, candidates: count, lines, starts }) => {
    const spaces = candidates(amplitudes, count);
    const data = dataFor(spaces[0] as MomentSpace, lines);
    return processorTime(() => weigh(group, cell, k, data, spaces, { starts }));
  };
}
