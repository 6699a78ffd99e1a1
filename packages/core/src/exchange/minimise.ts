import {
  boxSearch,
  breathe,
  type HermitianMatrix,
  hermitianAbove,
  hermitianEigen,
  hermitianMatrix,
  type WorkHost,
} from "../algorithms/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { fillInteraction, type Interaction, type LowestBranch, lowestBranch, remainderOf } from "./interaction.js";
import { type Descent, descend } from "./polish.js";
import { beyondWalls, type ZoneWedge, zoneWedge } from "./wedge.js";

/** Times the limit of leaves at which a level is given up. */
const overflow = 2;

/** A box that may hold a minimum. */
export interface Leaf {
  readonly centre: Float64Array;
  readonly half: Float64Array;
}

/** What the branch and bound over one asymmetric part of the zone gave. */
export interface ZoneMinimum {
  readonly wedge: ZoneWedge;
  readonly branch: (x: ArrayLike<number>) => LowestBranch;
  /** Lowest eigenvalue found, and where; unit spins. */
  readonly value: number;
  readonly x: Float64Array;
  /** No k has a lower eigenvalue than this. */
  readonly lowerBound: number;
  readonly leaves: readonly Leaf[];
  readonly boxes: number;
  /** Half-diagonal of the leaves, Å⁻¹. */
  readonly leafRadius: number;
  /** A length of the zone, Å⁻¹. */
  readonly size: number;
  readonly stopped: string | null;
}

/** Limits of one search; all count work, not time. */
export interface MinimiseOptions {
  /** Leaves at which refinement ends: a line or surface of minima has ever more of them. */
  readonly mostLeaves?: number;
  readonly mostBoxes?: number;
  /** Share of the zone's size at which leaves are small enough. */
  readonly leafShare?: number;
  /** Energies within this share of Σ|J| count as one minimum. */
  readonly energyShare: number;
  /** The asymmetric part of the zone, where it was made before for the same frame. */
  readonly wedge?: ZoneWedge;
}

/**
 * The lowest eigenvalue of J(k) over the whole zone, by branch and bound with proof. For k in a box about c
 * `J(k) = J(c) + Σ δ_a ∂_a J(c) + R` with `‖R‖` at most the largest row sum of |J| φ²/2 (φ: change of a bond's phase).
 * The lowest eigenvalue of the linear part is a concave function of δ, hence least at a corner, and Weyl's inequality
 * takes care of R (R. A. Horn & C. R. Johnson, Matrix Analysis, theorem 4.3.1): a box whose corners all lie higher than
 * the best k by more than ‖R‖ is dropped. The rest is split, level after level, so that the bound closes like the square
 * of the box.
 */
export async function minimiseZone(
  group: SpaceGroup,
  interaction: Interaction,
  options: MinimiseOptions,
  host: WorkHost = {},
): Promise<ZoneMinimum> {
  const { mostLeaves = 1500, mostBoxes = 1_000_000, leafShare = 1e-5 } = options;
  const wedge = options.wedge ?? zoneWedge(group, interaction.frame);
  const branch = lowestBranch(interaction);
  const size = Math.hypot(...wedge.half);
  const tolerance = options.energyShare * interaction.scale;
  let best = lowestOf(seededDescents(branch, wedge, size, interaction.scale));
  let leaves: Leaf[] = [{ centre: Float64Array.from(wedge.centre), half: Float64Array.from(wedge.half) }];
  const test = boxTest(interaction, wedge);
  let boxes = 0;
  let stopped: string | null = null;
  let radius = size;
  while (radius > leafShare * size) {
    radius /= 2;
    const kept: Leaf[] = [];
    let deepest = { value: Number.POSITIVE_INFINITY, centre: best.x };
    for (const root of leaves) {
      const search = boxSearch({
        centre: root.centre,
        half: root.half,
        leafRadius: radius,
        levelsBelowLeaf: 0,
        admits: (_, centre, half) => test.mayHold(centre, half, best.value + tolerance),
        settles: (_, centre, half) => {
          const { value } = branch(centre);
          if (value < best.value - tolerance) best = descend(branch, centre, size, interaction.scale);
          kept.push({ centre: centre.slice(), half });
          if (value < deepest.value) deepest = { value, centre: centre.slice() };
          return true;
        },
        leavesOpen: () => {},
      });
      while (!search.advance(500)) await breathe(host);
      boxes += search.boxes();
      if (boxes > mostBoxes || kept.length > overflow * mostLeaves) break;
      await breathe(host);
    }
    // A lower minimum may lie in a box whose centre is higher than the best k.
    const beside = descend(branch, deepest.centre, size, interaction.scale);
    if (beside.value < best.value) best = beside;
    if (boxes > mostBoxes) stopped = `the budget of ${mostBoxes} boxes was spent`;
    // A level that was not gone through is given up: the boxes of the one before still cover every minimum.
    if (stopped !== null || kept.length > overflow * mostLeaves) break;
    leaves = kept;
    if (kept.length > mostLeaves) break;
  }
  const lowerBound = Math.min(best.value, ...leaves.map(({ centre, half }) => test.lowerBound(centre, half)));
  const leafRadius = Math.hypot(...(leaves[0]?.half ?? [0]));
  return { wedge, branch, ...best, lowerBound, leaves, boxes, leafRadius, size, stopped };
}

/** Descents from a few spread points and from the halves: the search prunes well from its first box on. */
export function seededDescents(
  branch: (x: ArrayLike<number>) => LowestBranch,
  wedge: ZoneWedge,
  size: number,
  scale: number,
  ends = 3 + wedge.centre.length,
): Descent[] {
  const rank = wedge.centre.length;
  // Powers of the root of x^(r+1) = x + 1 give the most even sequence, a generalization of the golden ratio.
  const root = [1.618033988749895, 1.324717957244746, 1.2207440846057596][rank - 1] as number;
  const points = Array.from({ length: 24 * rank }, (_, n) =>
    Float64Array.from(wedge.centre, (middle, a) => {
      const share = (0.5 + (n + 1) / root ** (a + 1)) % 1;
      return middle + (2 * share - 1) * (wedge.half[a] as number);
    }),
  );
  const ranked = [...wedge.halves.map((x) => Float64Array.from(x)), ...points]
    .map((x) => ({ x, value: branch(x).value }))
    .sort((a, b) => a.value - b.value);
  return ranked.slice(0, ends).map(({ x }) => descend(branch, x, size, scale));
}

function lowestOf(ends: readonly Descent[]): Descent {
  return ends.reduce((lowest, end) => (end.value < lowest.value ? end : lowest));
}

function boxTest(interaction: Interaction, wedge: ZoneWedge) {
  const { size, frame } = interaction;
  const { rank } = frame;
  const middle = hermitianMatrix(size);
  const slopes = Array.from({ length: rank }, () => hermitianMatrix(size));
  const corner = hermitianMatrix(size);
  const work = hermitianMatrix(size);
  const remainders = new Map<string, number>();
  const remainder = (half: Float64Array): number => {
    const key = half.join();
    const known = remainders.get(key);
    if (known !== undefined) return known;
    const left = remainderOf(interaction, half);
    remainders.set(key, left);
    return left;
  };
  const fillCorner = (signs: number, half: Float64Array): HermitianMatrix => {
    corner.real.set(middle.real);
    corner.imaginary.set(middle.imaginary);
    for (let a = 0; a < rank; a++) {
      const step = (signs & (1 << a) ? -1 : 1) * (half[a] as number);
      const slope = slopes[a] as HermitianMatrix;
      for (let at = 0; at < size * size; at++) {
        corner.real[at] = (corner.real[at] as number) + step * (slope.real[at] as number);
        corner.imaginary[at] = (corner.imaginary[at] as number) + step * (slope.imaginary[at] as number);
      }
    }
    return corner;
  };
  /** Sum of |slope| over a box for one atom, where everything is a number. */
  const fall = (half: Float64Array): number =>
    slopes.reduce((sum, { real }, a) => sum + Math.abs(real[0] as number) * (half[a] as number), 0);
  return {
    mayHold: (centre: Float64Array, half: Float64Array, level: number): boolean => {
      if (beyondWalls(wedge.walls, centre, half)) return false;
      fillInteraction(interaction, centre, middle, slopes);
      const limit = level + remainder(half);
      if (size === 1) return (middle.real[0] as number) - fall(half) <= limit;
      if (!hermitianAbove(middle, limit, work)) return true;
      for (let signs = 0; signs < 1 << rank; signs++)
        if (!hermitianAbove(fillCorner(signs, half), limit, work)) return true;
      return false;
    },
    lowerBound: (centre: Float64Array, half: Float64Array): number => {
      fillInteraction(interaction, centre, middle, slopes);
      if (size === 1) return (middle.real[0] as number) - fall(half) - remainder(half);
      let least = Number.POSITIVE_INFINITY;
      for (let signs = 0; signs < 1 << rank; signs++)
        least = Math.min(least, hermitianEigen(fillCorner(signs, half)).values[0] as number);
      return least - remainder(half);
    },
  };
}
