import type { PeakChartData } from "../svg/peak-chart-data.js";

/** One peak in words: where it is, and what the candidate makes of it. */
export function peakText(data: PeakChartData, index: number, candidate: number): string {
  const peak = data.peaks[index];
  const chosen = data.candidates[candidate];
  if (peak === undefined) return "";
  const position = `Peak ${peak.number} at ${peak.x.toFixed(data.decimals)}`;
  const uncertainty = peak.su > 0 ? ` ± ${peak.su.toFixed(data.decimals)}` : "";
  const found = chosen?.assigned[index] ?? null;
  const taken =
    chosen === undefined
      ? ""
      : found === null
        ? "; not matched by this candidate"
        : `; ${found.line} at ${found.x.toFixed(data.decimals)}, off by ${found.offset.toFixed(2).replace("-", "−")} s.u.`;
  const notes = [
    ...(peak.setAside ? ["set aside"] : []),
    ...(peak.onNuclear ? ["on a nuclear line"] : []),
    ...(peak.onHalfWavelength ? ["on a λ/2 image"] : []),
  ];
  return `${position}${uncertainty}${taken}${notes.length > 0 ? ` (${notes.join(", ")})` : ""}`;
}
