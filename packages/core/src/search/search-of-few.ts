import { breathe, type WorkHost } from "../algorithms/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { type Weighed, weigher } from "./candidate.js";
import type { PeakModel } from "./explanation.js";
import { searchKinds, solutionsOf } from "./search-kind.js";
import type { SearchOptions } from "./types.js";

/** Peaks that must match beyond the free components of a kind: with fewer, its solutions say nothing. */
const leastSpare = 3;

/** Of a longer list planes and general k would take too long: half of its peaks fit many of them. */
const longList = 60;

export interface SearchOfFew {
  /** By falling evidence. */
  readonly weighed: readonly Weighed[];
  readonly boxes: number;
  readonly exhaustive: boolean;
}

/**
 * The k that match at least `wanted` of the peaks of a model, kind by kind, each kind with a budget of its own. Kinds of
 * more dimensions than the demand can restrict are left out, points aside.
 */
export async function searchOfFew(
  group: SpaceGroup,
  options: SearchOptions,
  model: PeakModel,
  wanted: number,
  boxesOfKind: number,
  what: string,
  host: WorkHost,
): Promise<SearchOfFew> {
  const kinds = searchKinds(group, options.maxDimension).filter(
    ({ dimension }) =>
      dimension === 0 ||
      (dimension + leastSpare <= wanted * model.numbersPerPeak && (dimension === 1 || model.total <= longList)),
  );
  const dimensions = Math.log(new Set(kinds.map(({ dimension }) => dimension)).size);
  const weigh = weigher(group, model);
  const weighed: Weighed[] = [];
  let boxes = 0;
  let exhaustive = true;
  for (const [index, kind] of kinds.entries()) {
    await breathe(host);
    host.progress?.(index, kinds.length, what);
    const findings = await solutionsOf(kind, model, { wanted, boxes: boxesOfKind }, host);
    boxes += findings.boxes;
    exhaustive &&= findings.unexplored === 0;
    const charges = { dimensions, kinds: Math.log(kind.kindsOfDimension) };
    for (const { k } of findings.solutions) {
      const one = weigh(k, charges);
      if (one.candidate.matched >= wanted) weighed.push(one);
    }
  }
  host.progress?.(kinds.length, kinds.length, what);
  weighed.sort((a, b) => b.candidate.evidence.value - a.candidate.evidence.value);
  return { weighed, boxes, exhaustive };
}
