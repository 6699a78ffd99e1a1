import { usedParameters } from "../kvectors/index.js";
import { roundNumber, toNumber } from "../numbers/index.js";
import { averagedReciprocalMetric, reciprocalFrame } from "../reflections/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { latticeDensity, latticeRounding, type SignedArm, signedArms, type Triple } from "./crystal-arms.js";
import { crystalRatio, peakLogOdds } from "./evidence.js";
import type { Explanation, PeakModel } from "./explanation.js";
import { solveCrystal } from "./solve-crystal.js";
import type { Assignment } from "./types.js";
import type { CrystalPeak } from "./used-peaks.js";

const unitMetric: readonly number[] = [1, 0, 0, 0, 1, 0, 0, 0, 1];

/**
 * What fractional h k l say about k. Every domain may be present, so a peak may belong to any arm of the star; index by
 * index it must lie within the half-width.
 */
export function crystalModel(group: SpaceGroup, cell: Cell, peaks: readonly CrystalPeak[]): PeakModel {
  const metric = averagedReciprocalMetric(group, cell);
  const space: CrystalSpace = {
    nearest: latticeRounding(group),
    density: latticeDensity(group),
    lengthOf: (row) => 2 * Math.PI * Math.sqrt(Math.max(0, quadratic(metric, row))),
  };
  const sorted = peaks.map((peak) => peak.halfWidth).sort((a, b) => a - b);
  const tolerance = sorted[sorted.length >> 1] as number;
  const primitiveMetric = reciprocalFrame(group, cell).metric.map((entry) => 4 * Math.PI * Math.PI * entry);
  // |Δ| ≤ Σ |Δ_i| |a*_i|: the cube of the tolerance lies in that ball, and balls stay balls when turned.
  const edges = [0, 4, 8].reduce((sum, index) => sum + 2 * Math.PI * Math.sqrt(metric[index] as number), 0);
  const targets = peaks.map(({ hkl, halfWidth }) => ({ hkl, reach: halfWidth * edges }));
  return {
    total: peaks.length,
    strayShares: peaks.map(({ strayShare }) => strayShare),
    repeated: peaks.filter(({ repeats }) => repeats).map(({ index }) => index),
    numbersPerPeak: 3,
    tolerance,
    metric: unitMetric,
    primitiveMetric,
    kTolerance: Math.max(...targets.map(({ reach }) => reach)),
    blur: 2 * Math.max(...targets.map(({ reach }) => reach)),
    // A separation in Q says nothing where vectors are measured.
    range: { lowest: 0, highest: 0 },
    corrections: [],
    explain: (k) => explainCrystal(signedArms(group, k), peaks, space),
    equations: (k, assignments, values) =>
      crystalEquations(signedArms(group, { ...k, values: [...values] }), usedParameters(k), assignments, peaks),
    samePositions: ({ predicted: a }, { predicted: b }) =>
      covers(a, b, space, tolerance) && covers(b, a, space, tolerance),
    solve: async (form, budget) => solveCrystal(group, form, targets, primitiveMetric, budget),
  };
}

interface CrystalSpace {
  readonly nearest: (row: Triple) => Triple;
  /** Vectors of L* per r.l.u.³. */
  readonly density: number;
  /** Å⁻¹ from r.l.u. */
  readonly lengthOf: (row: Triple) => number;
}

function explainCrystal(arms: readonly SignedArm[], peaks: readonly CrystalPeak[], space: CrystalSpace): Explanation {
  const density = space.density * arms.length;
  const assignments: Assignment[] = [];
  const unmatched: number[] = [];
  const ratios = new Float64Array(peaks.length);
  let logOdds = 0;
  let chiSquared = 0;
  for (const [at, peak] of peaks.entries()) {
    const near = arms.map((arm) => nearestSatellite(arm, peak, space)).sort((a, b) => a.square - b.square);
    const ratio = crystalRatio(
      near.map(({ square }) => square),
      peak.uncertainty,
      density,
    );
    ratios[at] = ratio;
    logOdds += peakLogOdds(ratio, peak.strayShare);
    const [first, ...others] = near.filter(({ difference }) => within(difference, peak.halfWidth));
    if (!first) {
      unmatched.push(peak.index);
      continue;
    }
    chiSquared += first.square / peak.uncertainty ** 2;
    assignments.push({
      peak: peak.index,
      ...first.line,
      q: roundNumber(space.lengthOf(subtract(peak.hkl, first.difference))),
      residualHkl: rounded(first.difference),
      alternatives: others.map(({ line }) => line),
    });
  }
  const components = assignments.flatMap(({ residualHkl }) => [...(residualHkl as Triple)]);
  return {
    assignments,
    unmatched,
    uncertainties: new Map(peaks.map(({ index, uncertainty }) => [index, uncertainty])),
    logOdds,
    ratios,
    rootMeanSquare: Math.sqrt(
      components.reduce((sum, entry) => sum + entry * entry, 0) / Math.max(1, components.length),
    ),
    largest: Math.max(0, ...components.map(Math.abs)),
    chiSquared,
    observations: components.length,
    predicted: Float64Array.from(arms.flatMap(({ vector }) => [...vector])),
    deWolff: null,
    smithSnyder: null,
  };
}

function nearestSatellite(arm: SignedArm, peak: CrystalPeak, space: CrystalSpace) {
  const rest = subtract(peak.hkl, arm.vector);
  const h = space.nearest(rest);
  const difference = subtract(rest, h);
  return {
    line: { h, sign: arm.sign, arm: arm.arm, residual: roundNumber(space.lengthOf(difference)) },
    difference,
    square: difference[0] ** 2 + difference[1] ** 2 + difference[2] ** 2,
  };
}

/** `hkl = H ± arm`, index by index, as equations for the letters of k. */
function crystalEquations(
  arms: readonly SignedArm[],
  letters: readonly number[],
  assignments: readonly Assignment[],
  peaks: readonly CrystalPeak[],
): { residuals: Float64Array; jacobian: Float64Array } {
  const byIndex = new Map(peaks.map((peak) => [peak.index, peak]));
  const residuals = new Float64Array(3 * assignments.length);
  const jacobian = new Float64Array(3 * assignments.length * letters.length);
  assignments.forEach(({ peak: peakIndex, h, sign, arm }, position) => {
    const peak = byIndex.get(peakIndex) as CrystalPeak;
    const signed = arms.find((entry) => entry.arm === arm && entry.sign === sign) as SignedArm;
    for (const axis of [0, 1, 2] as const) {
      const row = 3 * position + axis;
      residuals[row] = (peak.hkl[axis] - h[axis] - signed.vector[axis]) / peak.uncertainty;
      letters.forEach((letter, column) => {
        const slope = toNumber(signed.k.components[axis].coefficients[letter as 0 | 1 | 2]);
        jacobian[row * letters.length + column] = ((sign === -1 ? -1 : 1) * slope) / peak.uncertainty;
      });
    }
  });
  return { residuals, jacobian };
}

/** Whether every vector of `a` has one of `b` within the tolerance modulo L*. */
function covers(a: Float64Array, b: Float64Array, space: CrystalSpace, tolerance: number): boolean {
  const vectors = (flat: Float64Array): Triple[] =>
    Array.from(
      { length: flat.length / 3 },
      (_, index) => [flat[3 * index], flat[3 * index + 1], flat[3 * index + 2]] as unknown as Triple,
    );
  const others = vectors(b);
  return vectors(a).every((vector) =>
    others.some((other) => {
      const rest = subtract(vector, other);
      return within(subtract(rest, space.nearest(rest)), tolerance);
    }),
  );
}

function within(difference: Triple, halfWidth: number): boolean {
  return difference.every((entry) => Math.abs(entry) <= halfWidth);
}

function subtract(a: Triple, b: Triple): Triple {
  return [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
}

function rounded(row: Triple): Triple {
  return [roundNumber(row[0]), roundNumber(row[1]), roundNumber(row[2])];
}

function quadratic(metric: readonly number[], row: Triple): number {
  let sum = 0;
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) sum += (row[i] as number) * (metric[3 * i + j] as number) * (row[j] as number);
  return sum;
}
