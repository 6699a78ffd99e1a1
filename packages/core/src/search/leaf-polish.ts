import { choleskyFactor, choleskySolve } from "../algorithms/index.js";
import type { SurvivingPairs } from "./pair-filter.js";
import type { PairTable } from "./peak-pairs.js";

/** A point of the flat that explains peaks, found from a leaf. */
export interface PolishedPoint {
  readonly t: Float64Array;
  /** Peaks whose interval a computed position comes into at `t`. */
  readonly matched: number;
  /** Summed log-odds with the smooth density of lines: good for an order, not for a verdict. */
  readonly score: number;
}

const rounds = 6;

/** Share of the curvature added so that a direction which no peak fixes stays where it is. */
const ridge = 1e-6;

/**
 * A point near the middle of a leaf where enough peaks match. First least squares, each peak with the nearest of its
 * surviving H. Where that leaves a peak just outside its interval, its weight is raised; where that does not help either,
 * the worst peak is dropped and all begins anew. The middle itself is tried last.
 */
export function polishLeaf(
  table: PairTable,
  pairs: SurvivingPairs,
  centre: Float64Array,
  settings: PolishSettings,
): PolishedPoint {
  const weights = new Float64Array(table.peaks.length).fill(1);
  let best: PolishedPoint | null = null;
  for (let dropped = 0; dropped <= settings.drops; dropped++) {
    let worst = -1;
    for (let raised = 0; raised <= mostRaises; raised++) {
      const t = settle(table, pairs, centre, weights);
      const point = judge(table, pairs, t, weights, settings);
      if (best === null || point.matched > best.matched) best = { t, ...point };
      if (best.matched >= settings.wanted) return best;
      if (raised === 0) worst = point.worst;
      if (point.worst < 0) break;
      for (const index of point.outside) weights[index] = (weights[index] as number) * raise;
    }
    if (worst < 0) break;
    weights.forEach((weight, index) => {
      weights[index] = weight === 0 || index === worst ? 0 : 1;
    });
  }
  const middle = judgePoint(table, pairs, centre, settings);
  return best === null || middle.matched > best.matched ? middle : best;
}

/** The middle of a box as it is. */
export function judgePoint(
  table: PairTable,
  pairs: SurvivingPairs,
  centre: Float64Array,
  settings: PolishSettings,
): PolishedPoint {
  const { matched, score } = judge(table, pairs, centre, null, settings);
  return { t: centre.slice(), matched, score };
}

/** How often the weights of peaks outside their intervals are raised, and by which factor. */
const mostRaises = 2;
const raise = 4;

export interface PolishSettings {
  /** Peaks that must match. */
  readonly wanted: number;
  /** How many peaks may be dropped on the way. */
  readonly drops: number;
  /** Lines per Å⁻¹ are `density · q²`. */
  readonly density: number;
  readonly strayShare: number;
}

function settle(
  table: PairTable,
  pairs: SurvivingPairs,
  centre: Float64Array,
  weights: Float64Array,
): Float64Array {
  const dimension = centre.length;
  const t = centre.slice();
  const normal = new Float64Array(dimension * dimension);
  const gradient = new Float64Array(dimension);
  for (let round = 0; round < rounds; round++) {
    normal.fill(0);
    gradient.fill(0);
    table.peaks.forEach((peak, index) => {
      const weight = weights[index] as number;
      const vector = weight === 0 ? -1 : nearestVector(table, pairs, index, t);
      if (vector >= 0) addEquation(table.vectors, vector, t, peak.q, weight / peak.uncertainty ** 2, normal, gradient);
    });
    let trace = 0;
    for (let a = 0; a < dimension; a++) trace += normal[a * dimension + a] as number;
    for (let a = 0; a < dimension; a++)
      normal[a * dimension + a] = (normal[a * dimension + a] as number) + ridge * trace + Number.MIN_VALUE;
    const factor = choleskyFactor(normal, dimension, 0);
    if (factor === null) break;
    const step = choleskySolve(factor, gradient);
    let length = 0;
    for (let a = 0; a < dimension; a++) {
      t[a] = (t[a] as number) + (step[a] as number);
      length += (step[a] as number) ** 2;
    }
    if (length < 1e-20) break;
  }
  return t;
}

function judge(
  table: PairTable,
  pairs: SurvivingPairs,
  t: Float64Array,
  weights: Float64Array | null,
  settings: PolishSettings,
): { matched: number; score: number; worst: number; outside: readonly number[] } {
  const outside: number[] = [];
  let matched = 0;
  let score = 0;
  let worst = -1;
  let excess = 0;
  table.peaks.forEach((peak, index) => {
    const vector = nearestVector(table, pairs, index, t);
    let odds = settings.strayShare;
    if (vector >= 0) {
      const q = lengthAt(table.vectors, vector, t);
      const inside = q >= peak.low - roundingOfQ && q <= peak.high + roundingOfQ;
      const residual = (q - peak.q) / peak.uncertainty;
      if (inside) matched += 1;
      else if (weights !== null && (weights[index] as number) > 0) {
        outside.push(index);
        if (Math.abs(residual) > excess) {
          excess = Math.abs(residual);
          worst = index;
        }
      }
      const density = Math.max(0.5, settings.density * peak.q * peak.q);
      odds +=
        ((1 - settings.strayShare) * Math.exp(-0.5 * residual * residual)) /
        (Math.sqrt(2 * Math.PI) * peak.uncertainty * density);
    }
    score += Math.log(odds);
  });
  return { matched, score, worst, outside };
}

/** Å⁻¹. A computed position this little outside the interval is on its end. */
const roundingOfQ = 1e-10;

function lengthAt(vectors: Float64Array, vector: number, t: Float64Array): number {
  let square = vectors[vector + 3] as number;
  for (let a = 0; a < t.length; a++) square += ((vectors[vector + a] as number) + (t[a] as number)) ** 2;
  return Math.sqrt(square);
}

/** Place in the table of the surviving H whose |H + k| is nearest to the peak; −1 when none survives. */
function nearestVector(table: PairTable, pairs: SurvivingPairs, peak: number, t: Float64Array): number {
  const { arena, offsets, base } = pairs;
  const wanted = (table.peaks[peak] as { readonly q: number }).q;
  let best = -1;
  let least = Number.POSITIVE_INFINITY;
  const end = offsets[base + peak + 1] as number;
  for (let at = offsets[base + peak] as number; at < end; at++) {
    const vector = 4 * (arena[at] as number);
    const difference = Math.abs(lengthAt(table.vectors, vector, t) - wanted);
    if (difference < least) {
      least = difference;
      best = vector;
    }
  }
  return best;
}

function addEquation(
  vectors: Float64Array,
  vector: number,
  t: Float64Array,
  wanted: number,
  weight: number,
  normal: Float64Array,
  gradient: Float64Array,
): void {
  const dimension = t.length;
  const q = Math.max(Number.MIN_VALUE, lengthAt(vectors, vector, t));
  for (let a = 0; a < dimension; a++) {
    const slope = ((vectors[vector + a] as number) + (t[a] as number)) / q;
    gradient[a] = (gradient[a] as number) + weight * slope * (wanted - q);
    for (let b = 0; b <= a; b++) {
      const other = ((vectors[vector + b] as number) + (t[b] as number)) / q;
      normal[a * dimension + b] = (normal[a * dimension + b] as number) + weight * slope * other;
    }
  }
}
