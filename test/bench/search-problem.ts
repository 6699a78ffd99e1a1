import { defaultSearchOptions, locate, type PeakList } from "@kvane/core/search";
import { type Cell, parseGroup, type SpaceGroup } from "@kvane/core/spacegroups";
import { twinLines } from "../support/line-twin.js";
import { normal, powderList } from "../support/peak-lists.js";
import { seeded } from "../support/random.js";
import { randomCell } from "../support/random-cells.js";
import { processorTime } from "./clocks.js";
import { median } from "./paired.js";

/** A made peak list in its cell. */
export interface Problem {
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly list: PeakList;
  readonly unmatched: number;
  /** Half-width of a match, Å⁻¹. */
  readonly tolerance: number;
}

/** What the list should be like. */
export interface Wish {
  readonly symbol: string;
  /** Å³ */
  readonly volume: number;
  readonly peaks: number;
  readonly unmatched: number;
  readonly tolerance: number;
}

/** Three free parameters: the case that the others are held against. */
export const usual: Wish = { symbol: "P -1", volume: 500, peaks: 15, unmatched: 0, tolerance: 0.003 };

/** Lines of a random k of a random cell with errors, and as many stray peaks as may stay unmatched. */
export function problemOf({ symbol, volume, peaks, unmatched, tolerance }: Wish, seed: number): Problem {
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

/** Processor time of the whole answer: all kinds of k searched, candidates refined, weighed and compared. */
export async function searchTime({ group, cell, list, unmatched }: Problem, repeats: number): Promise<number> {
  const times: number[] = [];
  for (let repeat = 0; repeat < repeats; repeat++)
    times.push(await processorTime(() => locate(group, cell, list, { ...defaultSearchOptions, unmatched })));
  return median(times.slice(1));
}
