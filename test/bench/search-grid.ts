import { defaultSearchOptions } from "@kvane/core/search";
import { peakModel } from "#core/search/peak-model.js";
import { searchKinds } from "#core/search/search-kind.js";
import { gridSearch } from "../support/grid-twin.js";
import { reciprocalAxes } from "../support/line-twin.js";
import { processorTime } from "./clocks.js";
import { median } from "./paired.js";
import type { Part, Row } from "./part.js";
import { type Problem, problemOf, searchTime, usual } from "./search-problem.js";

const tolerances = [0.006, 0.004, 0.003, 0.002];

/** The certified search against a dense grid written with the same care (`test/support/grid-twin.ts`). */
export const searchGrid: Part = {
  name: "search-grid",
  measure: async ({ few }) => {
    await searchTime(problemOf(usual, 9), 5);
    const rows: Row[] = [];
    for (const tolerance of tolerances)
      for (const unmatched of [0, 1]) rows.push(...(await comparison(tolerance, unmatched, few)));
    const notes = [
      "grid: half-diagonal = tolerance, a leaf of the search, with one table of H for the zone; three free parameters, P -1, 500 Å³, 15 peaks",
      "grid in cubes: the same grid with a table for every cube of 16³ points, in itself a bound over boxes",
      "all kinds: the whole answer, with points, lines and planes, candidates refined, weighed and compared",
    ];
    return { rows, notes };
  },
};

async function comparison(tolerance: number, unmatched: number, seeds: number): Promise<Row[]> {
  const plain: number[] = [];
  const cubes: number[] = [];
  const whole: number[] = [];
  for (let seed = 1; seed <= seeds; seed++) {
    const problem = problemOf({ ...usual, unmatched, tolerance }, seed);
    const general = await generalTime(problem, 8);
    plain.push((await gridTime(problem, tolerance, Number.POSITIVE_INFINITY)) / general);
    cubes.push((await gridTime(problem, tolerance)) / general);
    whole.push((await searchTime(problem, 6)) / general);
  }
  const at = `${tolerance} Å⁻¹, ${unmatched} unmatched`;
  const over = "branch and bound over general k";
  return [
    { what: `grid, ${at}`, over, ratios: plain },
    { what: `grid in cubes, ${at}`, over, ratios: cubes },
    { what: `all kinds, ${at}`, over, ratios: whole },
  ];
}

/** Branch and bound over general k alone, regions and polished solutions included: what a grid over general k does. */
async function generalTime(problem: Problem, repeats: number): Promise<number> {
  const options = { ...defaultSearchOptions, unmatched: problem.unmatched };
  const { model } = peakModel(problem.group, problem.cell, problem.list, options);
  const general = searchKinds(problem.group, 3).find(({ dimension }) => dimension === 3);
  if (general === undefined) throw new Error("a group without a general kind");
  const budget = { wanted: model.total - problem.unmatched, boxes: 5_000_000 };
  const times: number[] = [];
  for (let repeat = 0; repeat < repeats; repeat++)
    times.push(await processorTime(() => model.solve(general.form, budget, {})));
  return median(times.slice(1));
}

function gridTime({ cell, list, unmatched, tolerance }: Problem, radius: number, edge?: number): Promise<number> {
  const peaks = list.peaks.map(({ q }) => ({ q: q as number, halfWidth: tolerance }));
  return processorTime(() => gridSearch({ axes: reciprocalAxes(cell), peaks, unmatched, radius }, radius, edge));
}
