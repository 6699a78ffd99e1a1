/**
 * The cost of weighing: a study of 30 candidates with 6 amplitudes and 60 lines, then how it grows with lines, amplitudes and
 * starts. Times are of one process's processor; ratios are what to keep.
 * `node test/tools/run-typescript.mjs test/bench/weighing.ts`
 */
import { lineForms, type MomentSpace, magneticFormFactor, modeSpace, quadraticForm } from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { exactWaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { parseGroup, siteOrbit } from "@kvane/core/spacegroups";
import { type IntensityData, weigh } from "@kvane/core/weighing";
import { seeded } from "../support/random.js";

const group = parseGroup("P n m a");
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

async function seconds(size: number, count: number, lines: number, starts: number): Promise<number> {
  const spaces = candidates(size, count);
  const data = dataFor(spaces[0] as MomentSpace, lines);
  const before = process.cpuUsage();
  await weigh(group, cell, k, data, spaces, { starts });
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6;
}

await seconds(6, 3, 60, 24);
const usual = await seconds(6, 30, 60, 24);
console.log(`\nWeighing 30 candidates with 6 amplitudes on 60 lines, up to 24 starts: ${usual.toFixed(1)} s`);
const rows: readonly (readonly [string, number])[] = [
  ["120 lines", await seconds(6, 30, 120, 24)],
  ["240 lines", await seconds(6, 30, 240, 24)],
  ["3 amplitudes", await seconds(3, 30, 60, 24)],
  ["12 amplitudes", await seconds(12, 30, 60, 24)],
  ["8 starts", await seconds(6, 30, 60, 8)],
  ["96 starts", await seconds(6, 30, 60, 96)],
  ["10 candidates", await seconds(6, 10, 60, 24)],
];
for (const [name, time] of rows) console.log(`${name.padStart(16)}${(time / usual).toFixed(2).padStart(8)} of that`);
