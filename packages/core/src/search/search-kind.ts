import { specialPoints, type WaveVector } from "../kvectors/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";

/** One kind of k under the point group extended by −1: what the search takes up at a time. */
export interface SearchKind {
  readonly dimension: 0 | 1 | 2 | 3;
  /** Parametric form; its letters span the kind. */
  readonly form: WaveVector;
  /** How many kinds of this dimension the group has. */
  readonly kindsOfDimension: number;
}

/** The k of one kind that may explain the peaks, and what it took to know that there are no others. */
export interface KindSolutions {
  readonly solutions: readonly WaveVector[];
  readonly boxes: number;
}

/** Largest dimension of the kinds that `searchKinds` gives. */
export const largestSearchedDimension = 0;

/** The kinds that are searched: all special points. */
export function searchKinds(group: SpaceGroup): readonly SearchKind[] {
  const points = specialPoints(group);
  return points.map(({ k }) => ({ dimension: 0, form: k, kindsOfDimension: points.length }));
}

/** A point is its own and only solution; it counts as one box. */
export function solutionsOf(kind: SearchKind): KindSolutions {
  return { solutions: [kind.form], boxes: 1 };
}
