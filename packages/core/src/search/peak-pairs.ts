import { visitBall } from "../reflections/index.js";
import { alongAxes, type FlatFrame, pointAt } from "./flat-frame.js";
import type { Wedge } from "./wedge.js";

/** The interval of computed Q that a peak would accept, whatever the zero shift and the cell do within their limits. */
export interface AcceptedInterval {
  /** As observed, Å⁻¹. */
  readonly q: number;
  readonly low: number;
  readonly high: number;
  readonly uncertainty: number;
}

/** What the box test reads: flat arrays, filled once for a kind. */
export interface PairTable {
  readonly peaks: readonly AcceptedInterval[];
  /** Four numbers for each H: its coordinates along up to three axes of the flat, and the square of what is across. */
  readonly vectors: Float64Array;
  /** Squares of the ends of each peak's interval. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  /** Root list: pairs of peak i are `pairs[starts[i]] … pairs[starts[i + 1] − 1]`, indices of H. */
  readonly starts: Int32Array;
  readonly pairs: Int32Array;
}

/** Share. Squares are compared this much too generously, so that rounding never excludes. */
const slack = 1e-12;

/**
 * All (peak, H) with |H + k| inside the peak's interval for some k of the root box, peaks in rising Q. Vectors with one
 * |H + k| all over the flat (mirror images in it) are listed once.
 */
export function pairTable(frame: FlatFrame, wedge: Wedge, peaks: readonly AcceptedInterval[]): PairTable {
  const sorted = [...peaks].sort((a, b) => a.q - b.q);
  const highestQ = Math.max(...sorted.map((peak) => peak.high));
  const vectors = vectorsNear(frame, wedge, highestQ);
  const lowest = Float64Array.from(sorted, ({ low }) => (low > 0 ? low * low * (1 - slack) : 0));
  const highest = Float64Array.from(sorted, ({ high }) => high * high * (1 + slack));
  const [c0 = 0, c1 = 0, c2 = 0] = wedge.centre;
  const [h0 = 0, h1 = 0, h2 = 0] = wedge.half;
  const count = vectors.length / 4;
  const starts = new Int32Array(sorted.length + 1);
  const nearest = new Float64Array(count);
  const furthest = new Float64Array(count);
  for (let at = 0; at < count; at++) {
    nearest[at] = nearestSquare(vectors, 4 * at, c0, c1, c2, h0, h1, h2);
    furthest[at] = furthestSquare(vectors, 4 * at, c0, c1, c2, h0, h1, h2);
  }
  const pairs: number[] = [];
  sorted.forEach((_, peak) => {
    for (let at = 0; at < count; at++)
      if ((nearest[at] as number) <= (highest[peak] as number) && (furthest[at] as number) >= (lowest[peak] as number))
        pairs.push(at);
    starts[peak + 1] = pairs.length;
  });
  return { peaks: sorted, vectors, lowest, highest, starts, pairs: Int32Array.from(pairs) };
}

/** Square of the least |H + κ(t)| over a box: exact, since the axes are orthonormal. */
function nearestSquare(
  v: Float64Array,
  at: number,
  c0: number,
  c1: number,
  c2: number,
  h0: number,
  h1: number,
  h2: number,
): number {
  const x0 = Math.max(0, Math.abs((v[at] as number) + c0) - h0);
  const x1 = Math.max(0, Math.abs((v[at + 1] as number) + c1) - h1);
  const x2 = Math.max(0, Math.abs((v[at + 2] as number) + c2) - h2);
  return (v[at + 3] as number) + x0 * x0 + x1 * x1 + x2 * x2;
}

function furthestSquare(
  v: Float64Array,
  at: number,
  c0: number,
  c1: number,
  c2: number,
  h0: number,
  h1: number,
  h2: number,
): number {
  const x0 = Math.abs((v[at] as number) + c0) + h0;
  const x1 = Math.abs((v[at + 1] as number) + c1) + h1;
  const x2 = Math.abs((v[at + 2] as number) + c2) + h2;
  return (v[at + 3] as number) + x0 * x0 + x1 * x1 + x2 * x2;
}

function vectorsNear(frame: FlatFrame, wedge: Wedge, highestQ: number): Float64Array {
  const radius = Math.hypot(...wedge.half);
  const middle = pointAt(frame, wedge.centre);
  const found: number[] = [];
  const seen = new Map<number, number>();
  visitBall(frame.metric, middle, (highestQ + radius) ** 2, (n1, n2, n3) => {
    const { along, across } = alongAxes(frame, [n1 + frame.origin[0], n2 + frame.origin[1], n3 + frame.origin[2]]);
    const [x0 = 0, x1 = 0, x2 = 0] = along;
    if (frame.dimension < 3) {
      const key = Math.round(1e6 * (x0 + Math.SQRT2 * x1 + 7.389 * across));
      const at = seen.get(key);
      if (at !== undefined && sameVector(found, at, x0, x1, across)) return;
      seen.set(key, found.length);
    }
    found.push(x0, x1, x2, frame.dimension === 3 ? 0 : across);
  });
  return Float64Array.from(found);
}

/** Å⁻¹. Two vectors whose coordinates differ by less are one; a pair that is kept twice costs time, never a solution. */
const sameCoordinate = 1e-9;

function sameVector(found: readonly number[], at: number, x0: number, x1: number, across: number): boolean {
  return (
    Math.abs((found[at] as number) - x0) < sameCoordinate &&
    Math.abs((found[at + 1] as number) - x1) < sameCoordinate &&
    Math.abs((found[at + 3] as number) - across) < sameCoordinate
  );
}
