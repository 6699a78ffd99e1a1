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

export interface PolishSettings {
  /** Peaks that must match. */
  readonly wanted: number;
  /** How many peaks may be dropped on the way. */
  readonly drops: number;
  /** Lines per Å⁻¹ are `density · q²`. */
  readonly density: number;
  readonly strayShare: number;
}

export interface LeafPolisher {
  /** A point near the middle of a leaf where enough peaks match, or the best that was met. */
  readonly polish: (pairs: SurvivingPairs, centre: Float64Array) => PolishedPoint;
  /** The middle of a box as it is. */
  readonly judge: (pairs: SurvivingPairs, centre: Float64Array) => PolishedPoint;
}

const mostRounds = 6;

/** Share of the smallest uncertainty: a step below it is small enough here, since candidates are refined again. */
const stepShare = 0.01;

/** Share of the curvature added so that a direction which no peak fixes stays where it is. */
const ridge = 1e-6;

/** How often the weights of peaks outside their intervals are raised, and by which factor. */
const mostRaises = 2;
const raise = 4;

/** Å⁻¹. A computed position this little outside the interval is on its end. */
const roundingOfQ = 1e-10;

/**
 * First least squares, each peak with the nearest of its surviving H. Where that leaves a peak just outside its interval,
 * its weight is raised; where that does not help either, the worst peak is dropped and all begins anew. The middle itself
 * is tried last. Working arrays are made once for a kind.
 */
export function leafPolisher(table: PairTable, dimension: number, settings: PolishSettings): LeafPolisher {
  const count = table.peaks.length;
  const steps = stepOf(table, dimension);
  const weights = new Float64Array(count);
  const state = { matched: 0, score: 0, worst: -1, outside: new Uint8Array(count) };

  const settle = (pairs: SurvivingPairs, centre: Float64Array, t: Float64Array): void => {
    t.set(centre);
    for (let round = 0; round < mostRounds; round++) if (steps.take(pairs, weights, t)) break;
    judgeInto(table, pairs, t, weights, settings, state);
  };
  const judge = (pairs: SurvivingPairs, centre: Float64Array): PolishedPoint => {
    judgeInto(table, pairs, centre, weights, settings, state);
    return { t: centre.slice(), matched: state.matched, score: state.score };
  };
  const polish = (pairs: SurvivingPairs, centre: Float64Array): PolishedPoint => {
    weights.fill(1);
    const t = new Float64Array(dimension);
    let best: PolishedPoint | null = null;
    for (let dropped = 0; dropped <= settings.drops; dropped++) {
      let worst = -1;
      for (let raised = 0; raised <= mostRaises; raised++) {
        settle(pairs, centre, t);
        if (best === null || state.matched > best.matched)
          best = { t: t.slice(), matched: state.matched, score: state.score };
        if (best.matched >= settings.wanted) return best;
        if (raised === 0) worst = state.worst;
        if (state.worst < 0) break;
        for (let peak = 0; peak < count; peak++)
          if (state.outside[peak] === 1) weights[peak] = raise * (weights[peak] as number);
      }
      if (worst < 0) break;
      for (let peak = 0; peak < count; peak++) weights[peak] = weights[peak] === 0 || peak === worst ? 0 : 1;
    }
    const middle = judge(pairs, centre);
    return best === null || middle.matched > best.matched ? middle : best;
  };
  return { polish, judge };
}

interface Judgement {
  matched: number;
  score: number;
  /** The peak furthest outside its interval among those with weight, −1 when there is none. */
  worst: number;
  readonly outside: Uint8Array;
}

function judgeInto(
  table: PairTable,
  pairs: SurvivingPairs,
  t: Float64Array,
  weights: Float64Array,
  settings: PolishSettings,
  into: Judgement,
): void {
  into.matched = 0;
  into.score = 0;
  into.worst = -1;
  let excess = 0;
  for (let index = 0; index < table.peaks.length; index++) {
    const peak = table.peaks[index] as PairTable["peaks"][number];
    const vector = nearestVector(table, pairs, index, peak.q, t);
    let odds = settings.strayShare;
    into.outside[index] = 0;
    if (vector >= 0) {
      const q = Math.sqrt(squareAt(table.vectors, vector, t));
      const residual = Math.abs(q - peak.q) / peak.uncertainty;
      if (q >= peak.low - roundingOfQ && q <= peak.high + roundingOfQ) into.matched += 1;
      else {
        into.outside[index] = 1;
        if (residual > excess && (weights[index] as number) > 0) {
          excess = residual;
          into.worst = index;
        }
      }
      const density = Math.max(0.5, settings.density * peak.q * peak.q);
      odds +=
        ((1 - settings.strayShare) * Math.exp(-0.5 * residual * residual)) /
        (Math.sqrt(2 * Math.PI) * peak.uncertainty * density);
    }
    into.score += Math.log(odds);
  }
}

/** One step of least squares on up to three coordinates; true when it was too short to matter. */
function stepOf(table: PairTable, dimension: number) {
  const { vectors, peaks } = table;
  const shortest = (stepShare * Math.min(...peaks.map(({ uncertainty }) => uncertainty))) ** 2;
  const take = (pairs: SurvivingPairs, weights: Float64Array, t: Float64Array): boolean => {
    const t0 = t[0] as number;
    const t1 = dimension > 1 ? (t[1] as number) : 0;
    const t2 = dimension > 2 ? (t[2] as number) : 0;
    let a00 = 0;
    let a01 = 0;
    let a02 = 0;
    let a11 = 0;
    let a12 = 0;
    let a22 = 0;
    let g0 = 0;
    let g1 = 0;
    let g2 = 0;
    for (let index = 0; index < peaks.length; index++) {
      const weight = weights[index] as number;
      if (weight === 0) continue;
      const peak = peaks[index] as PairTable["peaks"][number];
      const v = nearestVector(table, pairs, index, peak.q, t);
      if (v < 0) continue;
      const x0 = (vectors[v] as number) + t0;
      const x1 = (vectors[v + 1] as number) + t1;
      const x2 = (vectors[v + 2] as number) + t2;
      const square = x0 * x0 + x1 * x1 + x2 * x2 + (vectors[v + 3] as number);
      if (square === 0) continue;
      const q = Math.sqrt(square);
      const w = weight / (peak.uncertainty * peak.uncertainty * square);
      const r = w * q * (peak.q - q);
      a00 += w * x0 * x0;
      a01 += w * x0 * x1;
      a02 += w * x0 * x2;
      a11 += w * x1 * x1;
      a12 += w * x1 * x2;
      a22 += w * x2 * x2;
      g0 += r * x0;
      g1 += r * x1;
      g2 += r * x2;
    }
    const added = ridge * (a00 + a11 + a22) + Number.MIN_VALUE;
    // The columns of missing dimensions are zero: with a positive diagonal their steps are zero too.
    const d0 = a00 + added;
    const l10 = a01 / d0;
    const l20 = a02 / d0;
    const d1 = a11 + added - l10 * a01;
    const b12 = a12 - l10 * a02;
    const l21 = b12 / d1;
    const d2 = a22 + added - l20 * a02 - l21 * b12;
    const y1 = g1 - l10 * g0;
    const y2 = g2 - l20 * g0 - l21 * y1;
    const s2 = dimension > 2 ? y2 / d2 : 0;
    const s1 = dimension > 1 ? y1 / d1 - l21 * s2 : 0;
    const s0 = g0 / d0 - l10 * s1 - l20 * s2;
    const length = s0 * s0 + s1 * s1 + s2 * s2;
    if (!Number.isFinite(length)) return true;
    t[0] = t0 + s0;
    if (dimension > 1) t[1] = t1 + s1;
    if (dimension > 2) t[2] = t2 + s2;
    return length < shortest;
  };
  return { take };
}

function squareAt(vectors: Float64Array, vector: number, t: Float64Array): number {
  let square = vectors[vector + 3] as number;
  for (let a = 0; a < t.length; a++) {
    const x = (vectors[vector + a] as number) + (t[a] as number);
    square += x * x;
  }
  return square;
}

/** Place in the table of the surviving H whose |H + k| is nearest to the peak; −1 when none survives. */
function nearestVector(table: PairTable, pairs: SurvivingPairs, peak: number, wanted: number, t: Float64Array): number {
  const { arena, offsets, base } = pairs;
  const start = offsets[base + peak] as number;
  const end = offsets[base + peak + 1] as number;
  if (end - start === 1) return 4 * (arena[start] as number);
  const square = wanted * wanted;
  let best = -1;
  let least = Number.POSITIVE_INFINITY;
  // Nearest by the square, which near a peak orders as the length does.
  for (let at = start; at < end; at++) {
    const vector = 4 * (arena[at] as number);
    const difference = Math.abs(squareAt(table.vectors, vector, t) - square);
    if (difference < least) {
      least = difference;
      best = vector;
    }
  }
  return best;
}
