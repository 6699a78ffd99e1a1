import type { WorkHost } from "../algorithms/index.js";
import { atlas, specialPoints, type WaveVector } from "../kvectors/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import type { KindBudget, KindFindings, PeakModel } from "./explanation.js";

/** One kind of k under the point group extended by −1: what the search takes up at a time. */
export interface SearchKind {
  readonly dimension: 0 | 1 | 2 | 3;
  /** Parametric form; its letters span the kind. */
  readonly form: WaveVector;
  /** How many kinds of this dimension the group has. */
  readonly kindsOfDimension: number;
}

/** The kinds that are searched, points first, then lines, planes and general k up to the largest dimension. */
export function searchKinds(group: SpaceGroup, maxDimension: 0 | 1 | 2 | 3): readonly SearchKind[] {
  const points = specialPoints(group).map(({ k }) => ({
    dimension: 0 as const,
    form: k,
  }));
  const others =
    maxDimension === 0
      ? []
      : atlas(group, { withInversion: true })
          .filter(({ dimensionPM }) => dimensionPM > 0 && dimensionPM <= maxDimension)
          .map(({ k, dimensionPM }) => ({ dimension: dimensionPM, form: k }))
          .sort((a, b) => a.dimension - b.dimension);
  const all: readonly Omit<SearchKind, "kindsOfDimension">[] = [...points, ...others];
  return all.map((kind) => ({
    ...kind,
    kindsOfDimension: all.filter(({ dimension }) => dimension === kind.dimension).length,
  }));
}

/** The k of a kind that may explain the peaks. A point is its own and only solution; it counts as one box. */
export async function solutionsOf(
  kind: SearchKind,
  model: PeakModel,
  budget: KindBudget,
  host: WorkHost,
): Promise<KindFindings> {
  if (kind.dimension > 0) return model.solve(kind.form, budget, host);
  return {
    solutions: [{ k: kind.form, matched: 0, region: -1 }],
    regions: [],
    boxes: 1,
    smallestBox: 0,
    leaves: 1,
    unexplored: 0,
    stopped: null,
    complete: true,
  };
}
