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
 * Least squares of the flat's coordinates from the middle of a leaf, each peak with the nearest of its surviving H; peaks
 * that end outside their interval are dropped one by one, the worst first, as long as too few match.
 */
export function polishLeaf(
  table: PairTable,
  pairs: SurvivingPairs,
  centre: Float64Array,
  settings: PolishSettings,
): PolishedPoint {
  const used = new Uint8Array(table.peaks.length).fill(1);
  let best: PolishedPoint | null = null;
  for (let dropped = 0; dropped <= settings.drops; dropped++) {
    const point = settle(table, pairs, centre, used, settings);
    if (best === null || point.matched > best.matched) best = point;
    if (best.matched >= settings.wanted || point.worst < 0) break;
    used[point.worst] = 0;
  }
  return best as PolishedPoint;
}

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
  used: Uint8Array,
  settings: PolishSettings,
): PolishedPoint & { readonly worst: number } {
  const dimension = centre.length;
  const t = centre.slice();
  const normal = new Float64Array(dimension * dimension);
  const gradient = new Float64Array(dimension);
  for (let round = 0; round < rounds; round++) {
    normal.fill(0);
    gradient.fill(0);
    table.peaks.forEach((peak, index) => {
      if (used[index] === 0) return;
      const vector = nearestVector(table, pairs, index, t);
      if (vector < 0) return;
      addEquation(table.vectors, vector, t, peak.q, peak.uncertainty, normal, gradient);
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
  return { t, ...judge(table, pairs, t, used, settings) };
}

function judge(table: PairTable, pairs: SurvivingPairs, t: Float64Array, used: Uint8Array, settings: PolishSettings) {
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
      if (inside) matched += 1;
      const residual = (q - peak.q) / peak.uncertainty;
      if (!inside && used[index] === 1 && Math.abs(residual) > excess) {
        excess = Math.abs(residual);
        worst = index;
      }
      const density = Math.max(0.5, settings.density * peak.q * peak.q);
      odds +=
        ((1 - settings.strayShare) * Math.exp(-0.5 * residual * residual)) /
        (Math.sqrt(2 * Math.PI) * peak.uncertainty * density);
    }
    score += Math.log(odds);
  });
  return { matched, score, worst };
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
  uncertainty: number,
  normal: Float64Array,
  gradient: Float64Array,
): void {
  const dimension = t.length;
  const q = Math.max(Number.MIN_VALUE, lengthAt(vectors, vector, t));
  const weight = 1 / (uncertainty * uncertainty);
  for (let a = 0; a < dimension; a++) {
    const slope = ((vectors[vector + a] as number) + (t[a] as number)) / q;
    gradient[a] = (gradient[a] as number) + weight * slope * (wanted - q);
    for (let b = 0; b <= a; b++) {
      const other = ((vectors[vector + b] as number) + (t[b] as number)) / q;
      normal[a * dimension + b] = (normal[a * dimension + b] as number) + weight * slope * other;
    }
  }
}
