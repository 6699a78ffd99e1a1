/**
 * The certified search against a dense grid written with the same care (`test/support/grid-twin.ts`), and how its cost
 * grows. All times are of this process's processor, the median of a few runs after warming up; ratios are what to keep.
 * `node test/tools/run-typescript.mjs test/bench/search.ts`
 */

import { atlas } from "@kvane/core/kvectors";
import { defaultSearchOptions, locate, type PeakList } from "@kvane/core/search";
import { type Cell, parseGroup, type SpaceGroup } from "@kvane/core/spacegroups";
import { peakModel } from "#core/search/peak-model.js";
import { searchKinds } from "#core/search/search-kind.js";
import { gridSearch } from "../support/grid-twin.js";
import { reciprocalAxes, twinLines } from "../support/line-twin.js";
import { normal, powderList } from "../support/peak-lists.js";
import { seeded } from "../support/random.js";
import { randomCell } from "../support/random-cells.js";

interface Problem {
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly list: PeakList;
  readonly unmatched: number;
  /** Half-width of a match, Å⁻¹. */
  readonly tolerance: number;
}

interface Wish {
  readonly symbol: string;
  readonly volume: number;
  readonly peaks: number;
  readonly unmatched: number;
  readonly tolerance: number;
}

const triclinic: Wish = { symbol: "P -1", volume: 500, peaks: 15, unmatched: 0, tolerance: 0.003 };

function problemOf({ symbol, volume, peaks, unmatched, tolerance }: Wish, seed: number): Problem {
  const random = seeded(seed);
  const group = parseGroup(symbol);
  const cell = randomCell(group, random, volume);
  const k = [random.next() - 0.5, random.next() - 0.5, random.next() - 0.5] as const;
  const s = tolerance / 3;
  const positions: number[] = [];
  for (let qMax = 1.2, last = 0; positions.length < peaks - unmatched; qMax *= 1.3, last = 0) {
    positions.length = 0;
    for (const { q } of twinLines(cell, [], [k], qMax)) {
      if (q - last < 2 * tolerance || q < 0.15 || random.next() > 0.7) continue;
      last = q;
      positions.push(q + s * Math.max(-2.5, Math.min(2.5, normal(random))));
      if (positions.length === peaks - unmatched) break;
    }
  }
  const highest = positions.at(-1) as number;
  for (let stray = 0; stray < unmatched; stray++) positions.push(0.3 + (highest - 0.3) * random.next());
  return { group, cell, list: powderList(positions, s), unmatched, tolerance };
}

function processorTime(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

async function timeOf(problem: Problem, repeats: number): Promise<{ ms: number; boxes: number; leaf: number }> {
  const times: number[] = [];
  let boxes = 0;
  let leaf = 0;
  for (let repeat = 0; repeat < repeats; repeat++) {
    const start = processorTime();
    const { certificate } = await locate(problem.group, problem.cell, problem.list, {
      ...defaultSearchOptions,
      unmatched: problem.unmatched,
    });
    times.push(processorTime() - start);
    boxes = certificate.boxes;
    leaf = certificate.smallestBox;
  }
  return { ms: median(times.slice(1)), boxes, leaf };
}

/** Branch and bound over general k alone, regions and polished solutions included: what a grid over general k does. */
async function generalTime(problem: Problem, repeats: number): Promise<{ ms: number; boxes: number }> {
  const options = { ...defaultSearchOptions, unmatched: problem.unmatched };
  const { model } = peakModel(problem.group, problem.cell, problem.list, options);
  const general = searchKinds(problem.group, 3).find(({ dimension }) => dimension === 3);
  if (general === undefined) throw new Error("a group without a general kind");
  const budget = { wanted: model.total - problem.unmatched, boxes: 5_000_000 };
  const times: number[] = [];
  let boxes = 0;
  for (let repeat = 0; repeat < repeats; repeat++) {
    const start = processorTime();
    boxes = (await model.solve(general.form, budget, {})).boxes;
    times.push(processorTime() - start);
  }
  return { ms: median(times.slice(1)), boxes };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] as number;
}

function gridTime(
  { cell, list, unmatched, tolerance }: Problem,
  radius: number,
  edge?: number,
): { ms: number; points: number } {
  const peaks = list.peaks.map(({ q }) => ({ q: q as number, halfWidth: tolerance }));
  const start = processorTime();
  const { points } = gridSearch({ axes: reciprocalAxes(cell), peaks, unmatched, radius }, radius, edge);
  return { ms: processorTime() - start, points };
}

function row(...cells: readonly (string | number)[]): void {
  console.log(
    cells.map((cell, index) => String(cell)[index === 0 ? "padEnd" : "padStart"](index === 0 ? 34 : 13)).join(" "),
  );
}

async function againstGrid(): Promise<void> {
  console.log(
    "Three free parameters, P-1, 500 Å³, 15 peaks: branch and bound against a dense grid, both over general k",
  );
  row("tolerance, unmatched", "search ms", "boxes", "grid ms", "points", "ratio", "cubes", "all kinds ms");
  for (const tolerance of [0.006, 0.004, 0.003, 0.002])
    for (const unmatched of [0, 1]) {
      const plain: number[] = [];
      const cubes: number[] = [];
      const whole: number[] = [];
      let last = { ms: 0, boxes: 0 };
      let grid = { ms: 0, points: 0 };
      for (let seed = 1; seed <= 3; seed++) {
        const problem = problemOf({ ...triclinic, unmatched, tolerance }, seed);
        last = await generalTime(problem, 8);
        grid = gridTime(problem, tolerance, Number.POSITIVE_INFINITY);
        plain.push(grid.ms / last.ms);
        cubes.push(gridTime(problem, tolerance).ms / last.ms);
        whole.push((await timeOf(problem, 6)).ms);
      }
      const cells = [last.ms.toFixed(1), last.boxes, grid.ms.toFixed(0), grid.points];
      const ratios = [plain, cubes].map((list) => median(list).toFixed(0));
      row(`${tolerance} Å⁻¹, ${unmatched}`, ...cells, ...ratios, median(whole).toFixed(1));
    }
  console.log("ratio: a grid of half-diagonal = tolerance (a leaf of the search), with one table of H for the zone");
  console.log("cubes: the same grid with a table for every cube of 16³ points, in itself a bound over boxes");
  console.log(
    "all kinds: the whole answer, points, lines and planes searched, candidates refined, weighed and compared\n",
  );
}

async function growth(name: string, wishes: readonly (readonly [string, Wish])[]): Promise<void> {
  row(name, "ms", "boxes");
  for (const [label, wish] of wishes) {
    const results = [];
    for (let seed = 1; seed <= 3; seed++) results.push(await timeOf(problemOf(wish, seed), 3));
    row(`  ${label}`, median(results.map(({ ms }) => ms)).toFixed(1), median(results.map(({ boxes }) => boxes)));
  }
}

// Warm up, and the atlas with it.
atlas(parseGroup("P -1"), { withInversion: true });
await timeOf(problemOf(triclinic, 9), 5);
await againstGrid();
console.log("How the cost of all kinds grows");
const one = { ...triclinic, unmatched: 1 };
await growth(
  "cell volume, Å³ (1 unmatched)",
  [100, 300, 1000, 2000, 5000, 10_000].map((volume) => [String(volume), { ...one, volume }]),
);
await growth(
  "peaks (1 unmatched)",
  [5, 10, 15, 30, 100].map((peaks) => [String(peaks), { ...one, peaks }]),
);
await growth(
  "tolerance, Å⁻¹ (1 unmatched)",
  [0.001, 0.003, 0.006, 0.012].map((tolerance) => [String(tolerance), { ...one, tolerance }]),
);
await growth(
  "unmatched",
  [0, 1, 2].map((unmatched) => [String(unmatched), { ...triclinic, unmatched }]),
);
await growth(
  "symmetry (1 unmatched)",
  ["P -1", "P 1 2/m 1", "P m m m", "P 4/m", "P 6/m m m", "P m -3 m"].map((symbol) => [symbol, { ...one, symbol }]),
);
await growth("orthorhombic, 12 peaks, 1 unmatched", [
  ["P n m a, 300 Å³", { symbol: "P n m a", volume: 300, peaks: 12, unmatched: 1, tolerance: 0.004 }],
]);
await growth("triclinic 2000 Å³, 15 peaks, 1 unmatched", [["P -1", { ...one, volume: 2000 }]]);
