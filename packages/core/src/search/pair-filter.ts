import { mostLevels } from "../algorithms/index.js";
import type { PairTable } from "./peak-pairs.js";
import type { Wedge } from "./wedge.js";

/** The box test of one kind of k, with the lists of pairs that survive in the boxes on the way down. */
export interface PairFilter {
  /** As `BoxProblem.admits`. */
  readonly admits: (level: number, centre: Float64Array, half: Float64Array) => boolean;
  /** The surviving lists of the box last admitted at a level: pairs of peak i in `arena` from start to end. */
  readonly lists: (level: number) => SurvivingPairs;
}

export interface SurvivingPairs {
  readonly arena: Int32Array;
  readonly offsets: Int32Array;
  /** Pairs of peak i are at `arena[offsets[base + i]] … arena[offsets[base + i + 1] − 1]`. */
  readonly base: number;
}

const firstLevels = 64;

/**
 * A box can be dropped when it lies outside the wedge, or when more peaks than allowed have no H left whose |H + k|
 * comes into the peak's interval anywhere in the box. Both bounds of |H + k|² over the box are exact. Only the pairs that
 * survive in a box are tried in its halves; they stand in one growing array, level after level, so that no box allocates.
 */
export function pairFilter(table: PairTable, wedge: Wedge, allowed: number): PairFilter {
  const { vectors, lowest, highest } = table;
  const count = table.peaks.length;
  const stride = count + 1;
  const two = wedge.centre.length > 1;
  const three = wedge.centre.length > 2;
  let arena = new Int32Array(4 * table.pairs.length + 64);
  let offsets = new Int32Array(stride * firstLevels);
  arena.set(table.pairs);
  // The root list stands before level 0, so level L writes row L + 1.
  offsets.set(table.starts);

  const outside = wallTest(wedge);
  // Peaks that closed a box lately are asked first.
  const order = Int32Array.from({ length: count }, (_, index) => index);
  const tooFew = (from: number, centre: Float64Array, half: Float64Array): boolean => {
    // No destructuring here: it would walk an iterator for every box.
    const c0 = centre[0] as number;
    const c1 = two ? (centre[1] as number) : 0;
    const c2 = three ? (centre[2] as number) : 0;
    const h0 = half[0] as number;
    const h1 = two ? (half[1] as number) : 0;
    const h2 = three ? (half[2] as number) : 0;
    let missing = 0;
    for (let place = 0; place < count; place++) {
      const peak = order[place] as number;
      const low = lowest[peak] as number;
      const high = highest[peak] as number;
      const end = offsets[from + peak + 1] as number;
      let at = offsets[from + peak] as number;
      for (; at < end; at++) {
        const v = 4 * (arena[at] as number);
        const x0 = Math.abs((vectors[v] as number) + c0);
        const x1 = Math.abs((vectors[v + 1] as number) + c1);
        const x2 = Math.abs((vectors[v + 2] as number) + c2);
        const across = vectors[v + 3] as number;
        const n0 = x0 > h0 ? x0 - h0 : 0;
        const n1 = x1 > h1 ? x1 - h1 : 0;
        const n2 = x2 > h2 ? x2 - h2 : 0;
        if (across + n0 * n0 + n1 * n1 + n2 * n2 > high) continue;
        const f0 = x0 + h0;
        const f1 = x1 + h1;
        const f2 = x2 + h2;
        if (across + f0 * f0 + f1 * f1 + f2 * f2 >= low) break;
      }
      if (at < end) continue;
      missing += 1;
      if (place > 0 && offsets[from + peak] !== end) {
        order[place] = order[place - 1] as number;
        order[place - 1] = peak;
      }
      if (missing > allowed) return true;
    }
    return false;
  };
  const admits = (level: number, centre: Float64Array, half: Float64Array): boolean => {
    if (outside(level, centre, half)) return false;
    const from = level * stride;
    if (tooFew(from, centre, half)) return false;
    const to = from + stride;
    if (to + stride > offsets.length) offsets = grown(offsets, to + stride);
    let write = offsets[from + count] as number;
    const needed = 2 * write - (offsets[from] as number);
    if (needed > arena.length) arena = grown(arena, needed);
    // No destructuring here: it would walk an iterator for every box.
    const c0 = centre[0] as number;
    const c1 = two ? (centre[1] as number) : 0;
    const c2 = three ? (centre[2] as number) : 0;
    const h0 = half[0] as number;
    const h1 = two ? (half[1] as number) : 0;
    const h2 = three ? (half[2] as number) : 0;
    let missing = 0;
    offsets[to] = write;
    for (let peak = 0; peak < count; peak++) {
      const low = lowest[peak] as number;
      const high = highest[peak] as number;
      const end = offsets[from + peak + 1] as number;
      const start = write;
      for (let at = offsets[from + peak] as number; at < end; at++) {
        const index = arena[at] as number;
        const v = 4 * index;
        const x0 = Math.abs((vectors[v] as number) + c0);
        const x1 = Math.abs((vectors[v + 1] as number) + c1);
        const x2 = Math.abs((vectors[v + 2] as number) + c2);
        const across = vectors[v + 3] as number;
        const n0 = x0 > h0 ? x0 - h0 : 0;
        const n1 = x1 > h1 ? x1 - h1 : 0;
        const n2 = x2 > h2 ? x2 - h2 : 0;
        if (across + n0 * n0 + n1 * n1 + n2 * n2 > high) continue;
        const f0 = x0 + h0;
        const f1 = x1 + h1;
        const f2 = x2 + h2;
        if (across + f0 * f0 + f1 * f1 + f2 * f2 < low) continue;
        arena[write] = index;
        write += 1;
      }
      if (write === start) {
        missing += 1;
        if (missing > allowed) return false;
      }
      offsets[to + peak + 1] = write;
    }
    return true;
  };
  return { admits, lists: (level) => ({ arena, offsets, base: (level + 1) * stride }) };
}

/**
 * Whether a box lies behind a wall of the wedge: one dot product a wall, and none for a box whose parent lies wholly
 * inside.
 */
function wallTest(wedge: Wedge): (level: number, centre: Float64Array, half: Float64Array) => boolean {
  const dimension = wedge.centre.length;
  const walls = wedge.walls.length;
  const normals = Float64Array.from(wedge.walls.flatMap(({ normal }) => [...normal]));
  const offsets = Float64Array.from(wedge.walls, ({ offset }) => offset * (1 + 1e-9));
  const spreads: Float64Array[] = [];
  const inside = new Uint8Array(mostLevels + 1);
  return (level, centre, half) => {
    if (level > 0 && inside[level - 1] === 1) {
      inside[level] = 1;
      return false;
    }
    let spread = spreads[level];
    if (spread === undefined) {
      spread = Float64Array.from(wedge.walls, ({ normal }) =>
        normal.reduce((sum, entry, axis) => sum + Math.abs(entry) * (half[axis] as number), 0),
      );
      spreads[level] = spread;
    }
    let all = 1;
    for (let wall = 0, at = 0; wall < walls; wall++) {
      let beyond = -(offsets[wall] as number);
      for (let axis = 0; axis < dimension; axis++, at++) beyond += (normals[at] as number) * (centre[axis] as number);
      const reach = spread[wall] as number;
      if (beyond > reach) return true;
      if (beyond > -reach) all = 0;
    }
    inside[level] = all;
    return false;
  };
}

function grown(array: Int32Array<ArrayBuffer>, least: number): Int32Array<ArrayBuffer> {
  const larger = new Int32Array(Math.max(least, 2 * array.length));
  larger.set(array);
  return larger;
}
