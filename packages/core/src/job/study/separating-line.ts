import type { WaveVector } from "../../kvectors/index.js";
import { matchStandardUncertainties, sameLineInverseAngstrom } from "../../numbers/index.js";
import { distinctPositions, satelliteLines } from "../../reflections/index.js";
import { type StudyInputs, satelliteLimit } from "./read-study.js";

/** A satellite that one of two k has and the other has not. */
export interface SeparatingLine {
  /** Å⁻¹. */
  readonly q: number;
  /** 0 when the first k has it, 1 when the second. */
  readonly of: 0 | 1;
  /** The nearest line of the other k, Å⁻¹. */
  readonly nearest: number;
}

/** How far beyond the range of the data it is looked, as a factor in Q. */
const reach = 1.3;

/**
 * The satellite to look at: the first in Q that stands beyond the uncertainties of the list from every line of the other
 * k, or else the one that stands furthest, in the range of the data or somewhat beyond. Null when all lie together, as
 * they do where the metric is more symmetric than the Laue class.
 */
export function separatingLine(inputs: StudyInputs, a: WaveVector, b: WaveVector): SeparatingLine | null {
  const { group, cell, peaks, wavelengthAngstrom } = inputs;
  if (cell === null) return null;
  const end = wavelengthAngstrom === null ? Number.POSITIVE_INFINITY : (4 * Math.PI) / wavelengthAngstrom;
  const qMax = Math.min(reach * satelliteLimit(inputs), end);
  const positions = [a, b].map((k) => distinctPositions(satelliteLines(group, cell, k, { qMax })));
  const lines = ([0, 1] as const)
    .flatMap((of) => linesApart(positions[of] as Float64Array, positions[1 - of] as Float64Array, of))
    // Lines of the other k beyond the limit are not known, and may be nearer.
    .filter(({ q, nearest }) => distanceOf({ q, nearest }) <= qMax - q)
    .sort((one, other) => one.q - other.q);
  const blunt =
    matchStandardUncertainties * Math.max(...(peaks?.list.peaks ?? []).map((peak) => peak.uncertainty ?? 0));
  const clear = lines.find((line) => distanceOf(line) > blunt);
  return clear ?? lines.sort((one, other) => distanceOf(other) - distanceOf(one))[0] ?? null;
}

function linesApart(own: Float64Array, others: Float64Array, of: 0 | 1): SeparatingLine[] {
  return [...own]
    .map((q) => ({ q, of, nearest: nearestOf(others, q) }))
    .filter((line) => distanceOf(line) > 10 * sameLineInverseAngstrom);
}

function distanceOf({ q, nearest }: Pick<SeparatingLine, "q" | "nearest">): number {
  return Math.abs(nearest - q);
}

function nearestOf(positions: Float64Array, q: number): number {
  return positions.reduce(
    (best, one) => (Math.abs(one - q) < Math.abs(best - q) ? one : best),
    Number.POSITIVE_INFINITY,
  );
}
