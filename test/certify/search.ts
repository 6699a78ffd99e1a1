import { numericWaveVector } from "@kvane/core/kvectors";
import { defaultSearchOptions, locate, type SearchResult } from "@kvane/core/search";
import { gridSearch } from "../support/grid-twin.js";
import { reciprocalAxes } from "../support/line-twin.js";
import { seeded } from "../support/random.js";
import {
  inSomeRegion,
  ranksFirst,
  type SearchCase,
  searchCase,
  slowStarDistance,
  type Triple,
} from "../support/search-cases.js";
import { ordinary, rateCells, rateColumns, ratesOf, shortOf, sorts } from "./rates.js";
import type { Subject, Unit } from "./subject.js";

/** One stray peak in half of the lists. */
export function ordinaryCase(seed: number): SearchCase {
  return searchCase(seed, { ...ordinary, strays: seed % 2 });
}

export function search(made: SearchCase): Promise<SearchResult> {
  return locate(made.group, made.cell, made.list, { ...defaultSearchOptions, unmatched: 1, severalVectors: false });
}

/** The k behind the list must lie in a region of the general kind and in one of its own, or be the point itself. */
export function lostK(made: SearchCase, result: SearchResult): readonly string[] {
  if (!result.certificate.exhaustive) return [];
  const failures: string[] = [];
  for (const dimension of new Set([3, made.dimension]))
    if (dimension > 0 && !inSomeRegion(made, result.regions, dimension))
      failures.push(`${made.name}: not in a region of dimension ${dimension}`);
  if (made.dimension === 0) {
    const near = result.candidates.some(
      ({ k }) =>
        slowStarDistance(made.group, made.cell, made.centring, numericWaveVector(k) as Triple, made.k) <
        2 * made.tolerance,
    );
    if (!near) failures.push(`${made.name}: the point is no candidate`);
  }
  return failures;
}

/** Each k of the dense grid that matches enough peaks must lie in a region of the general kind. */
export async function missedByTwin(seed: number): Promise<readonly string[]> {
  const made = searchCase(1_000_000 + seed, {
    ...ordinary,
    least: 7,
    most: 11,
    strays: seed % 2,
    volumes: [40, 160],
    uncertainty: 0.08,
  });
  const result = await search(made);
  if (!result.certificate.exhaustive) return [];
  const axes = reciprocalAxes(made.cell);
  const primitive = basisOf(made.centring).map(
    (row) =>
      [0, 1, 2].map((i) =>
        row.reduce((sum, entry, axis) => sum + entry * (axes[axis]?.[i] as number), 0),
      ) as unknown as Triple,
  );
  const { found } = gridSearch(
    {
      axes: primitive,
      peaks: made.list.peaks.map(({ q, uncertainty }) => ({ q: q as number, halfWidth: 3 * (uncertainty as number) })),
      unmatched: 1,
      radius: made.tolerance,
    },
    0,
  );
  const random = seeded(seed);
  const basis = basisOf(made.centring);
  // A saturated list has thousands: a sample of those serves.
  const some = found.length <= 60 ? found : Array.from({ length: 60 }, () => random.pick(found));
  return some.flatMap((row) => {
    const k = [0, 1, 2].map((axis) =>
      row.reduce((sum, entry, index) => sum + entry * (basis[index]?.[axis] as number), 0),
    ) as unknown as Triple;
    return inSomeRegion({ ...made, k }, result.regions, 3)
      ? []
      : [`${made.name}: the grid has ${k.map((entry) => entry.toFixed(5)).join(" ")}, which lies in no region`];
  });
}

/** A basis of L* in a*, b*, c* for each of the usual centrings. */
function basisOf(centring: readonly Triple[]): readonly Triple[] {
  const [first] = centring;
  if (first === undefined)
    return [
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ];
  if (centring.length === 3)
    return [
      [-1, 1, 1],
      [1, -1, 1],
      [1, 1, -1],
    ];
  if (centring.length === 2)
    return [
      [1, 0, 1],
      [-1, 1, 1],
      [0, -1, 1],
    ];
  if (first[0] === 0.5 && first[2] === 0.5)
    return [
      [0, 1, 1],
      [1, 0, 1],
      [1, 1, 0],
    ];
  if (first[0] === 0.5)
    return [
      [1, 1, 0],
      [-1, 1, 0],
      [0, 0, 1],
    ];
  return [
    [1, 0, 0],
    [0, 1, 1],
    [0, -1, 1],
  ];
}

/** Lists of each sort for the rates of the evidence. */
const rateLists = 100;

const sweeps = {
  grid: { what: "search: no k of a dense grid over random cells, groups and lists is missed", seed: 1_000_000 },
  regions: { what: "search: the k behind a made list with noise lies in a returned region", seed: 0 },
  first: {
    what: "search: of lists with 8 peaks or more, 20 at a time, at least 18 rank the true k first or tied first",
    seed: 2_000_000,
  },
  rates: { what: "search: rates of the evidence on four sorts of lists (table below)", seed: 5_000_000 },
} as const;

/** The search for k. */
export const subject: Subject = {
  name: "search",
  sweeps,
  units: () => [
    ...seeds(200).map((seed) => unit("grid", seed, async () => missedByTwin(seed))),
    ...seeds(500).map((seed) =>
      unit("regions", seed, async () => {
        const made = ordinaryCase(seed);
        return lostK(made, await search(made));
      }),
    ),
    ...seeds(25).map((seed) =>
      unit("first", seed, async () => {
        let right = 0;
        for (let index = 0; index < 20; index++) {
          const made = searchCase(sweeps.first.seed + 20 * seed + index, { ...ordinary, least: 8, strays: index % 2 });
          if (ranksFirst(made, await search(made))) right += 1;
        }
        return right >= 18 ? [] : [`lists ${20 * seed} to ${20 * seed + 19}: ${right} of 20`];
      }),
    ),
    ...sorts.map((sort, place) => ({
      sweep: "rates",
      number: place + 1,
      run: async () => {
        const rates = await ratesOf(sort, sweeps.rates.seed + 10_000 * place, rateLists);
        const cells = rateCells(sort, rates).map((cell, column) => `${rateColumns[column]} ${cell}`);
        return { cases: rateLists, problems: shortOf(sort, rates), note: `${sort.name}: ${cells.join(", ")}` };
      },
    })),
  ],
};

function seeds(count: number): readonly number[] {
  return Array.from({ length: count }, (_, seed) => seed);
}

function unit(sweep: keyof typeof sweeps, number: number, run: () => Promise<readonly string[]>): Unit {
  return { sweep, number, run: async () => ({ cases: 1, problems: await run() }) };
}
