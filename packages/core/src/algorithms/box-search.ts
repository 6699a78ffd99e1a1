/** A question that is asked of boxes in one to three dimensions: may this one hold a solution? */
export interface BoxProblem {
  /** Centre of the root box, one number a dimension. */
  readonly centre: ArrayLike<number>;
  /** Half-widths of the root box. */
  readonly half: ArrayLike<number>;
  /** A box whose half-diagonal is at most this is a leaf. */
  readonly leafRadius: number;
  /** How many halvings below a leaf an open leaf is pursued. */
  readonly levelsBelowLeaf: number;
  /**
   * Whether the box may hold a solution; a false answer is a proof that it holds none. Boxes come depth first: whatever
   * was noted for `level − 1` is of the box that this one is half of.
   */
  readonly admits: (level: number, centre: Float64Array, half: Float64Array) => boolean;
  /** Gets each leaf that is admitted; true when it is settled, false to split it further. */
  readonly settles: (level: number, centre: Float64Array, half: Float64Array) => boolean;
  /** Gets each admitted box of the last level that nothing settled. */
  readonly leavesOpen: (level: number, centre: Float64Array, half: Float64Array) => void;
}

/** A search that can be interrupted between any two boxes. */
export interface BoxSearch {
  /** Visits at most `count` boxes; true when the whole root box is done. */
  readonly advance: (count: number) => boolean;
  readonly boxes: () => number;
  /** Share of the root box's volume that is neither excluded nor inside a leaf. */
  readonly unexplored: () => number;
  /** Half-widths of the boxes of a level. */
  readonly halfAt: (level: number) => Float64Array;
  readonly leafLevel: number;
}

/** Levels beyond which halving a box is only rounding. */
export const mostLevels = 200;

/**
 * Branch and bound by binary splits of the longest edge (E. R. Hansen & G. W. Walster, Global Optimization Using
 * Interval Analysis, 2004, section 11): all boxes of one level have one shape, so shapes are worked out once and the
 * walk is a binary count without allocation.
 */
export function boxSearch(problem: BoxProblem): BoxSearch {
  const { centre, leafRadius, levelsBelowLeaf, admits, settles, leavesOpen } = problem;
  const dimension = centre.length;
  const { halves, axes, leafLevel } = levelsOf(problem.half, leafRadius, levelsBelowLeaf);
  const lastLevel = halves.length - 1;
  const centres = halves.map(() => new Float64Array(dimension));
  const tried = new Uint8Array(halves.length);
  centres[0]?.set(Array.from(centre));
  let level = -1;
  let begun = false;
  let boxes = 0;
  let closed = 0;

  /** Looks at a box; whether it is to be split. */
  const enter = (at: number): boolean => {
    const [middle, half] = [centres[at] as Float64Array, halves[at] as Float64Array];
    boxes += 1;
    if (admits(at, middle, half)) {
      const settled = at >= leafLevel && settles(at, middle, half);
      if (!settled && at < lastLevel) return true;
      if (!settled) leavesOpen(at, middle, half);
    }
    closed += 2 ** -at;
    return false;
  };
  const descend = (): void => {
    const child = level + 1;
    const axis = axes[level] as number;
    const middle = centres[child] as Float64Array;
    const from = centres[level] as Float64Array;
    for (let at = 0; at < dimension; at++) middle[at] = from[at] as number;
    const side = tried[level] === 0 ? -1 : 1;
    middle[axis] = (middle[axis] as number) + side * ((halves[child] as Float64Array)[axis] as number);
    tried[level] = (tried[level] as number) + 1;
    if (!enter(child)) return;
    tried[child] = 0;
    level = child;
  };
  return {
    advance: (count) => {
      const until = boxes + count;
      if (!begun) {
        begun = true;
        if (enter(0)) level = 0;
      }
      while (level >= 0 && boxes < until) {
        if (tried[level] === 2) level -= 1;
        else descend();
      }
      while (level >= 0 && tried[level] === 2) level -= 1;
      return level < 0;
    },
    boxes: () => boxes,
    unexplored: () => (begun ? Math.max(0, 1 - closed) : 1),
    halfAt: (at) => halves[at] as Float64Array,
    leafLevel,
  };
}

function levelsOf(
  root: ArrayLike<number>,
  leafRadius: number,
  below: number,
): { halves: Float64Array[]; axes: number[]; leafLevel: number } {
  const halves = [Float64Array.from(root)];
  const axes: number[] = [];
  let leafLevel = -1;
  for (let level = 0; level < mostLevels; level++) {
    const half = halves[level] as Float64Array;
    if (leafLevel < 0 && Math.hypot(...half) <= leafRadius) leafLevel = level;
    if (leafLevel >= 0 && level >= leafLevel + below) break;
    const axis = half.indexOf(Math.max(...half));
    axes.push(axis);
    const next = half.slice();
    next[axis] = (next[axis] as number) / 2;
    halves.push(next);
  }
  return { halves, axes, leafLevel: leafLevel < 0 ? halves.length - 1 : leafLevel };
}
