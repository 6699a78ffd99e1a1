import { defaultSearchOptions, locate, type PeakList } from "@kvane/core/search";
import { angleList } from "../support/peak-lists.js";
import { seeded } from "../support/random.js";
import { type CaseOptions, ranksFirst, type SearchCase, searchCase } from "../support/search-cases.js";

/** Lists as they are usual: one arm of a random kind in a random group and cell, noise of 0.03° at 2.41 Å. */
export const ordinary: CaseOptions = {
  least: 5,
  most: 14,
  strays: 0,
  seen: 0.7,
  volumes: [60, 900],
  uncertainty: 0.03,
};

/** One sort of made lists, and the share of lists in which the true k must come first or tied first. */
export interface ListSort {
  readonly name: string;
  readonly options: CaseOptions;
  readonly unmatched: number;
  /** Peaks anywhere: no k is true. */
  readonly chance: boolean;
  readonly leastFirst: number;
}

export const sorts: readonly ListSort[] = [
  { name: "ordinary", options: { ...ordinary, strays: 1 }, unmatched: 1, chance: false, leastFirst: 0.95 },
  {
    name: "hard: half of the lines, two strays",
    options: { ...ordinary, seen: 0.5, strays: 2 },
    unmatched: 2,
    chance: false,
    leastFirst: 0.85,
  },
  {
    name: "zero shift 0.03°, refined",
    options: { ...ordinary, strays: 1, zeroShift: 0.03 },
    unmatched: 1,
    chance: false,
    leastFirst: 0.85,
  },
  { name: "chance", options: ordinary, unmatched: 1, chance: true, leastFirst: 0 },
];

/** As many peaks as the list has, anywhere in its range. */
function chanceList(made: SearchCase, seed: number): PeakList {
  const random = seeded(9_000_000 + seed);
  const highest = Math.max(...made.list.peaks.map(({ position, q }) => angleOf(q ?? position ?? 1)));
  const angles = made.list.peaks.map(() => 6 + (highest - 6) * random.next());
  return angleList(
    angles.sort((a, b) => a - b),
    ordinary.uncertainty,
    2.41,
  );
}

function angleOf(q: number): number {
  return (360 / Math.PI) * Math.asin(Math.min(1, (q * 2.41) / (4 * Math.PI)));
}

/** How often the evidence was right, by its reading. */
export interface Rates {
  readonly lists: number;
  /** Above 3, 0 to 3, below 0: lists, and those with the true k first or tied first. */
  readonly all: readonly [number, number, number];
  readonly right: readonly [number, number, number];
  /** Lists whose search was stopped by a budget. */
  readonly stopped: number;
}

/** Searches `count` made lists of a sort, all kinds of k. */
export async function ratesOf({ options, unmatched, chance }: ListSort, seed: number, count: number): Promise<Rates> {
  const right: [number, number, number] = [0, 0, 0];
  const all: [number, number, number] = [0, 0, 0];
  let stopped = 0;
  for (let index = 0; index < count; index++) {
    const made = searchCase(seed + index, options);
    const list = chance ? chanceList(made, seed + index) : made.list;
    const zeroShift = options.zeroShift === undefined ? 0 : 0.06;
    const result = await locate(made.group, made.cell, list, {
      ...defaultSearchOptions,
      unmatched,
      zeroShift,
      severalVectors: false,
    });
    const value = result.candidates[0]?.evidence.value ?? -1;
    const reading = value > 3 ? 0 : value >= 0 ? 1 : 2;
    all[reading] += 1;
    if (!result.certificate.exhaustive) stopped += 1;
    if (!chance && ranksFirst(made, result)) right[reading] += 1;
  }
  return { lists: count, all, right, stopped };
}

/** What the rates fall short of: E > 3 right in 98 %, the share of first places of the sort, chance above 0 in 3 %. */
export function shortOf(sort: ListSort, { lists, all, right }: Rates): readonly string[] {
  if (sort.chance)
    return all[0] + all[1] > 0.03 * lists ? [`${sort.name}: ${all[0] + all[1]} of ${lists} exceed 0`] : [];
  const first = right[0] + right[1] + right[2];
  return [
    ...(right[0] < 0.98 * all[0] ? [`${sort.name}: E > 3 right in ${right[0]} of ${all[0]}`] : []),
    ...(first < sort.leastFirst * lists ? [`${sort.name}: first in ${first} of ${lists}`] : []),
  ];
}

export const rateColumns = ["E > 3", "0 to 3", "below 0", "first", "stopped"];

export function rateCells(sort: ListSort, { lists, all, right, stopped }: Rates): readonly string[] {
  const cell = (count: number, of: number): string => (sort.chance ? String(of) : `${count} of ${of}`);
  const first = sort.chance ? "–" : `${right[0] + right[1] + right[2]} of ${lists}`;
  return [...all.map((of, index) => cell(right[index] as number, of)), first, String(stopped)];
}
