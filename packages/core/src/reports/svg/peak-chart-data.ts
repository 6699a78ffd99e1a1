import { satelliteLines } from "../../reflections/index.js";
import { lengthInMetric, reciprocalMetric } from "../../spacegroups/index.js";
import type { CellRecord } from "../records/common.js";
import type { RunRecord } from "../records/run.js";
import type { AssignmentRecord, CandidateRecord, PeakRecord, PeaksRecord } from "../records/search.js";
import { kShort } from "../text/names.js";
import { lineText } from "../text/satellites-text.js";
import { groupOf, waveVectorOf } from "./group-of-record.js";
import { type PeakAxis, peakAxis } from "./peak-axis.js";

/** A peak on the chart; x in the unit of the axis. */
export interface ChartPeak {
  readonly number: number;
  readonly x: number;
  readonly su: number;
  /** Share of the height of its panel, from the intensity where all peaks have one. */
  readonly height: number;
  readonly setAside: boolean;
  readonly onNuclear: boolean;
  readonly onHalfWavelength: boolean;
}

/** A candidate on the chart: where it has satellites, and how each peak lies to them. */
export interface ChartCandidate {
  readonly name: string;
  readonly summary: string;
  /** Positions of the predicted lines, ascending in Q. */
  readonly ticks: readonly number[];
  /** What they are, such as `(1 0 0) + k`; empty for long lists. */
  readonly lines: readonly string[];
  /** For each peak the line it was taken for with observed less computed in standard uncertainties; null: not matched. */
  readonly assigned: readonly ({ readonly x: number; readonly line: string; readonly offset: number } | null)[];
}

/** All that the peak chart shows, as plain data: the page draws it anew from this. */
export interface PeakChartData {
  readonly label: string;
  readonly decimals: number;
  readonly from: number;
  readonly to: number;
  readonly peaks: readonly ChartPeak[];
  readonly candidates: readonly ChartCandidate[];
  /** Candidates that the search has beyond those shown. */
  readonly more: number;
}

/** Candidates that the chart shows, beside those that are followed. */
const shownCandidates = 6;
/** Lines of a candidate that are named. */
const namedLines = 1500;

/** The chart of a run; null without a search. */
export function peakChartData(record: RunRecord): PeakChartData | null {
  const { search } = record;
  if (search === null || search.peaks.list.length === 0) return null;
  const { peaks, cell } = search;
  const axis = peakAxis(peaks);
  const qs = peaks.list.map((peak) => observedQ(peak, cell));
  const shown = search.candidates
    .map((candidate, index) => ({ candidate, index }))
    .filter(({ index }) => index < shownCandidates || record.branches.some((branch) => branch.candidate === index));
  const drawn = chartPeaks(record, peaks, axis, qs);
  const ends = drawn.flatMap(({ x, su }) => [x - su, x + su]);
  const [low, high] = [Math.min(...ends), Math.max(...ends)];
  const margin = 0.04 * (high - low || high);
  const limit = 1.05 * Math.max(...qs);
  const [from, to] = [Math.max(0, low - margin), high + margin];
  return {
    label: axis.label,
    decimals: axis.decimals,
    from,
    to,
    peaks: drawn,
    candidates: shown.map(({ candidate, index }) => chartCandidate(record, candidate, index, axis, limit)),
    more: search.candidates.length - shown.length,
  };
}

/** Å⁻¹. */
function observedQ({ q, hkl }: PeakRecord, cell: CellRecord): number {
  return q ?? 2 * Math.PI * lengthInMetric(reciprocalMetric(cell), hkl ?? [0, 0, 0]);
}

function chartPeaks(record: RunRecord, peaks: PeaksRecord, axis: PeakAxis, qs: readonly number[]): ChartPeak[] {
  const intensities = peaks.list.map(({ intensity }) => intensity);
  const strongest = Math.max(0, ...intensities.map((one) => one ?? 0));
  const measured = strongest > 0 && intensities.every((one) => one !== null);
  const aside = new Set(record.search?.setAside.map(({ peak }) => peak));
  const lies = (peak: number, on: string) =>
    record.coincidences.some((one) => one.peak === peak && one.overlaps.some((overlap) => overlap.with === on));
  return peaks.list.map((peak, index) => {
    const q = qs[index] as number;
    const share = Math.max(0, (peak.intensity ?? 0) / strongest);
    return {
      number: peak.index + 1,
      x: (peaks.kind === "hkl" ? null : peak.position) ?? axis.fromQ(q) ?? q,
      // The uncertainty of indices is no length; such a peak is drawn without a bar.
      su: peaks.kind === "hkl" ? 0 : peak.uncertainty * axis.slope(q),
      height: measured ? 0.2 + 0.8 * share : 0.6,
      setAside: aside.has(peak.index),
      onNuclear: lies(peak.index, "nuclear"),
      onHalfWavelength: lies(peak.index, "half wavelength"),
    };
  });
}

function chartCandidate(
  record: RunRecord,
  candidate: CandidateRecord,
  index: number,
  axis: PeakAxis,
  limit: number,
): ChartCandidate {
  const list = record.search?.peaks.list ?? [];
  const lines = predicted(record, candidate, limit).flatMap((line) => {
    const x = axis.fromQ(line.q);
    return x === null ? [] : [{ x, text: line.text }];
  });
  const byPeak = new Map(candidate.assignments.map((one) => [one.peak, one]));
  return {
    name: `${index + 1}  k = ${kShort(candidate.k)}`,
    summary: `${candidate.matched} of ${candidate.total} matched, ${candidate.evidence.reading}`,
    ticks: lines.map(({ x }) => rounded(x)),
    lines: lines.length > namedLines ? [] : lines.map(({ text }) => text),
    assigned: list.map((peak) => {
      const found = byPeak.get(peak.index);
      if (found === undefined) return null;
      const x = rounded(axis.fromQ(found.q) ?? found.q);
      return { x, line: lineText(found), offset: rounded(offsetOf(found, peak.uncertainty)) };
    }),
  };
}

/** The satellites of a candidate; where the group has no name, those that peaks were taken for. */
function predicted(record: RunRecord, candidate: CandidateRecord, limit: number): { q: number; text: string }[] {
  const search = record.search as NonNullable<RunRecord["search"]>;
  const group = groupOf(record.group);
  const lines =
    group === null || candidate.k.numeric === null
      ? [...candidate.assignments].sort((a, b) => a.q - b.q)
      : satelliteLines(group, search.cell, waveVectorOf(candidate.k), { qMax: limit });
  return lines.map((line) => ({ q: line.q, text: lineText({ h: [...line.h], sign: line.sign }) }));
}

/** Observed less computed in standard uncertainties, with its sign; of three indices the one that is off most. */
function offsetOf({ residual, residualHkl }: AssignmentRecord, uncertainty: number): number {
  if (!(uncertainty > 0)) return 0;
  const parts = residualHkl ?? [residual];
  return parts.reduce((most, part) => (Math.abs(part) > Math.abs(most) ? part : most), 0) / uncertainty;
}

/** A fiftieth of a thousandth of a degree is finer than any screen. */
function rounded(value: number): number {
  return Math.round(value * 1e5) / 1e5 + 0;
}
