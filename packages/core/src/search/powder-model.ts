import { numericWaveVector, usedParameters, type WaveVector } from "../kvectors/index.js";
import { roundNumber, toNumber } from "../numbers/index.js";
import {
  averagedReciprocalMetric,
  distinctPositions,
  reciprocalFrame,
  type SatelliteLine,
  satelliteLister,
} from "../reflections/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { densityHalfWindow, lowerBound, peakLogOdds, powderRatio } from "./evidence.js";
import type { CorrectionLimit, Explanation, PeakModel } from "./explanation.js";
import { deWolff, smithSnyder } from "./figures-of-merit.js";
import type { AcceptedInterval } from "./peak-pairs.js";
import { solveFlat } from "./solve-flat.js";
import type { Assignment, IndexedLine } from "./types.js";
import type { PowderPeak } from "./used-peaks.js";

/** Largest zero shift (degrees 2θ) and relative change of the cell that are refined with k. */
export interface CorrectionLimits {
  readonly zeroShift: number;
  readonly cellScale: number;
}

/** What powder positions, whatever unit they came in, say about k. */
export function powderModel(
  group: SpaceGroup,
  cell: Cell,
  peaks: readonly PowderPeak[],
  wavelengthAngstrom: number | null,
  limits: CorrectionLimits,
): PeakModel {
  const corrections = (["zeroShift", "cellScale"] as const)
    .map((name) => ({ name, limit: limits[name] }))
    .filter(({ limit }) => limit > 0);
  const intervals = peaks.map((peak) => acceptedInterval(peak, limits));
  const widest = Math.max(...peaks.map((peak) => peak.halfWidth));
  const highest = Math.max(...intervals.map(({ high }) => high));
  // Beyond the last peak as far as its density window and the tolerance of a comparison reach.
  const qMax = highest + Math.max(densityHalfWindow, 2 * widest);
  const lister = satelliteLister(group, cell);
  const metric = averagedReciprocalMetric(group, cell).map((entry) => 4 * Math.PI * Math.PI * entry);
  const tolerance = median(peaks.map((peak) => peak.halfWidth));
  const primitiveMetric = reciprocalFrame(group, cell).metric.map((entry) => 4 * Math.PI * Math.PI * entry);
  return {
    total: peaks.length,
    strayShares: peaks.map(({ strayShare }) => strayShare),
    repeated: peaks.filter(({ repeats }) => repeats).map(({ index }) => index),
    numbersPerPeak: 1,
    tolerance,
    metric,
    primitiveMetric,
    kTolerance: tolerance,
    blur: Math.max(2 * tolerance, Math.sqrt(2 * highest * tolerance)),
    range: { lowest: Math.min(...peaks.map((peak) => peak.q)), highest },
    corrections,
    explain: (k, values = [], widened = false) => {
      const corrected = correctedPeaks(peaks, corrections, values);
      return explainPowder(
        lister(k, { qMax }),
        widened ? corrected.map((peak, index) => widenedPeak(peak, intervals[index] as AcceptedInterval)) : corrected,
        wavelengthAngstrom,
      );
    },
    equations: (k, assignments, values) => powderEquations(k, assignments, values, peaks, metric, corrections),
    samePositions: ({ predicted: a }, { predicted: b }) =>
      covers(a, b, highest + tolerance, tolerance) && covers(b, a, highest + tolerance, tolerance),
    solve: (form, budget, host) =>
      solveFlat(group, form, { metric: primitiveMetric, intervals, leafRadius: tolerance }, budget, host),
  };
}

/**
 * Computed Q that a peak would accept for some zero shift z and scale σ of the cell within their limits:
 * `|Q − z·∂Q/∂2θ − q/(1 + σ)| ≤ halfWidth`.
 */
function acceptedInterval(peak: PowderPeak, limits: CorrectionLimits): AcceptedInterval {
  const reach = peak.halfWidth + limits.zeroShift * peak.slope;
  return {
    q: peak.q,
    low: (peak.q - reach) * (1 - (peak.q > reach ? limits.cellScale : 0)),
    high: (peak.q + reach) * (1 + limits.cellScale),
    uncertainty: peak.uncertainty,
  };
}

/** The peaks as they stand against the cell as given: `(Q − z·∂Q/∂2θ)(1 + σ)`. */
function correctedPeaks(
  peaks: readonly PowderPeak[],
  corrections: readonly CorrectionLimit[],
  values: readonly number[],
): readonly PowderPeak[] {
  const { shift, scale } = named(corrections, values);
  if (shift === 0 && scale === 0) return peaks;
  return peaks.map((peak) => ({
    ...peak,
    q: (peak.q - shift * peak.slope) * (1 + scale),
    uncertainty: peak.uncertainty * (1 + scale),
    halfWidth: peak.halfWidth * (1 + scale),
  }));
}

function widenedPeak(peak: PowderPeak, { low, high }: AcceptedInterval): PowderPeak {
  return { ...peak, halfWidth: Math.max(peak.halfWidth, peak.q - low, high - peak.q) };
}

function named(
  corrections: readonly CorrectionLimit[],
  values: ArrayLike<number>,
): { readonly shift: number; readonly scale: number } {
  const of = (name: CorrectionLimit["name"]): number =>
    corrections.reduce((value, entry, index) => (entry.name === name ? (values[index] ?? 0) : value), 0);
  return { shift: of("zeroShift"), scale: of("cellScale") };
}

function explainPowder(
  lines: readonly SatelliteLine[],
  peaks: readonly PowderPeak[],
  wavelengthAngstrom: number | null,
): Explanation {
  const positions = distinctPositions(lines);
  const all = Float64Array.from(lines, (line) => line.q);
  const assignments: Assignment[] = [];
  const unmatched: number[] = [];
  const ratios = Float64Array.from(peaks, (peak) => powderRatio(peak.q, peak.uncertainty, positions));
  let logOdds = 0;
  let chiSquared = 0;
  for (const [at, peak] of peaks.entries()) {
    logOdds += peakLogOdds(ratios[at] as number, peak.strayShare);
    const assignment = assign(peak, lines, all);
    if (assignment === null) unmatched.push(peak.index);
    else {
      assignments.push(assignment);
      if (!peak.repeats) chiSquared += (assignment.residual / peak.uncertainty) ** 2;
    }
  }
  const repeated = new Set(peaks.filter(({ repeats }) => repeats).map(({ index }) => index));
  const matches = assignments.map(({ q, residual }) => ({ observed: q + residual, calculated: q }));
  return {
    assignments,
    unmatched,
    uncertainties: new Map(peaks.map(({ index, uncertainty }) => [index, uncertainty])),
    logOdds,
    ratios,
    rootMeanSquare: Math.sqrt(mean(assignments.map(({ residual }) => residual * residual))),
    largest: Math.max(0, ...assignments.map(({ residual }) => Math.abs(residual))),
    chiSquared,
    observations: assignments.filter(({ peak }) => !repeated.has(peak)).length,
    predicted: positions,
    deWolff: deWolff(matches, positions),
    smithSnyder: smithSnyder(matches, positions, wavelengthAngstrom),
  };
}

/** The nearest line within the half-width, the others there as alternatives; null when there is none. */
function assign(peak: PowderPeak, lines: readonly SatelliteLine[], all: Float64Array): Assignment | null {
  const near: (IndexedLine & { readonly q: number })[] = [];
  for (let index = lowerBound(all, peak.q - peak.halfWidth); index < lines.length; index++) {
    const { h, sign, arm, q } = lines[index] as SatelliteLine;
    if (q > peak.q + peak.halfWidth) break;
    near.push({ h, sign, arm, residual: roundNumber(peak.q - q, peak.q), q });
  }
  // Equal distances keep the order of the lines.
  near.sort((a, b) => Math.abs(a.residual) - Math.abs(b.residual));
  const [first, ...others] = near;
  if (!first) return null;
  return {
    ...first,
    peak: peak.index,
    residualHkl: null,
    alternatives: others.map(({ h, sign, arm, residual }) => ({ h, sign, arm, residual })),
  };
}

/** `Q_i = |H_i ± k|/(1 + σ) + z·∂Q_i/∂2θ` as equations for the letters of k and the corrections. */
function powderEquations(
  k: WaveVector,
  assignments: readonly Assignment[],
  values: Float64Array,
  peaks: readonly PowderPeak[],
  metric: readonly number[],
  corrections: readonly CorrectionLimit[],
): { residuals: Float64Array; jacobian: Float64Array } {
  const letters = usedParameters(k);
  const numeric = numericWaveVector({ ...k, values: [...values.slice(0, letters.length)] }) as readonly number[];
  const { shift, scale } = named(corrections, values.slice(letters.length));
  const directions = letters.map((letter) =>
    k.components.map((form) => toNumber(form.coefficients[letter as 0 | 1 | 2])),
  );
  const byIndex = new Map(peaks.map((peak) => [peak.index, peak]));
  const columns = directions.length + corrections.length;
  const residuals = new Float64Array(assignments.length);
  const jacobian = new Float64Array(assignments.length * columns);
  assignments.forEach(({ peak: peakIndex, h, sign }, row) => {
    const peak = byIndex.get(peakIndex) as PowderPeak;
    // A row of zeros: the same observation counts once.
    if (peak.repeats) return;
    const side = sign === -1 ? -1 : 1;
    const vector = h.map((entry, axis) => entry + side * (numeric[axis] as number));
    const covariant = [0, 1, 2].map((axis) =>
      vector.reduce((sum, entry, other) => sum + entry * (metric[3 * other + axis] as number), 0),
    );
    const q = Math.sqrt(covariant.reduce((sum, entry, axis) => sum + entry * (vector[axis] as number), 0));
    residuals[row] = (peak.q - q / (1 + scale) - shift * peak.slope) / peak.uncertainty;
    const slopes = [
      ...directions.map(
        (direction) =>
          (side * direction.reduce((sum, entry, axis) => sum + entry * (covariant[axis] as number), 0)) /
          (q * (1 + scale)),
      ),
      ...corrections.map(({ name }) => (name === "zeroShift" ? peak.slope : -q / (1 + scale) ** 2)),
    ];
    slopes.forEach((slope, column) => {
      jacobian[row * columns + column] = slope / peak.uncertainty;
    });
  });
  return { residuals, jacobian };
}

/** Whether every position of `a` up to `reach` has one of `b` within the tolerance. */
function covers(a: Float64Array, b: Float64Array, reach: number, tolerance: number): boolean {
  for (const q of a) {
    if (q > reach) break;
    const index = lowerBound(b, q - tolerance);
    if (index === b.length || (b[index] as number) > q + tolerance) return false;
  }
  return true;
}

function mean(values: readonly number[]): number {
  return values.length === 0 ? 0 : values.reduce((sum, value) => sum + value, 0) / values.length;
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] as number;
}
