import type { RunRecord } from "../../records/run.js";
import type { CandidateRecord, PeakRecord, PeaksRecord } from "../../records/search.js";
import { peakChart, wholeView } from "../../svg/peak-chart.js";
import { peakChartData } from "../../svg/peak-chart-data.js";
import { decimals, kShort, plain } from "../../text/names.js";
import { lineText, overlapText } from "../../text/satellites-text.js";
import { offsetOf } from "../../text/search-text.js";
import { type Block, type DocumentSection, moreBlock, paragraphBlock, tableBlock } from "../blocks.js";
import { peakFigureName } from "../figure-names.js";
import type { DocumentSource } from "../run-document.js";

/** Rows of a table of peaks that are not folded away. */
const openRows = 40;

/** Observed positions against the satellites of each candidate, as a chart and as a table. */
export function peaksSection({ record, data }: DocumentSource): DocumentSection | null {
  const { peaks, search } = record;
  if (peaks === null) return null;
  const chart = peakChartData(record);
  const file = peakFigureName(record);
  if (chart !== null) data["peaks"] = chart;
  const table = peakTable(record, peaks);
  return {
    id: "peaks",
    title: "Peaks and satellites",
    parts: [],
    blocks: [
      ...(chart === null || file === null
        ? []
        : [
            {
              kind: "figure",
              figure: {
                id: "figure-peaks",
                caption: `Observed positions (bars: ±1 s.u.), predicted satellites of ${chart.candidates.length === 1 ? "the candidate" : `${chart.candidates.length} candidates`} with those that peaks were taken for longer, and residuals with the limit of a match (broken lines).${chart.more > 0 ? ` ${chart.more} further candidates are in the table above.` : ""}${corrected(record) ? " The ticks are those of the cell as given, without the refined corrections." : ""}`,
                parts: [peakChart(chart, wholeView(chart))],
                legend: null,
                file,
                live: { kind: "peaks", data: "peaks" },
              },
            } as const,
          ]),
      ...(peaks.list.length > openRows ? moreBlock(`All ${peaks.list.length} peaks`, table) : table),
      ...(search !== null && search.setAside.length > 0
        ? [
            paragraphBlock(
              `Set aside: ${search.setAside.map(({ peak, because }) => `peak ${peak + 1} (${because})`).join(", ")}.`,
            ),
          ]
        : []),
    ],
  };
}

function corrected({ search }: RunRecord): boolean {
  return (search?.candidates ?? []).some(({ corrections }) => corrections.some(({ value }) => value !== 0));
}

function peakTable(record: RunRecord, peaks: PeaksRecord): Block[] {
  const crystal = peaks.kind === "hkl";
  const followed = record.branches.flatMap(({ candidate }) => {
    const found = candidate === null ? undefined : record.search?.candidates[candidate];
    return found === undefined || candidate === null ? [] : [{ candidate: found, number: candidate + 1 }];
  });
  const intensities = peaks.list.some(({ intensity }) => intensity !== null);
  const columns = [
    ">peak",
    crystal ? ">h k l" : ">position",
    ...(crystal ? [] : [">Q / Å⁻¹", ">s.u. / Å⁻¹"]),
    ...(intensities ? [">intensity"] : []),
    ...followed.flatMap(({ number }) =>
      followed.length > 1 ? [`candidate ${number}: line`, ">off / s.u."] : ["line", ">off / s.u."],
    ),
    "also on it",
  ];
  const places = Math.max(0, ...peaks.list.map(({ position }) => (plain(position ?? 0).split(".")[1] ?? "").length));
  return tableBlock(
    followed.length === 1
      ? `Peaks as satellites of k = ${kShort((followed[0] as { candidate: CandidateRecord }).candidate.k)}`
      : "Peaks",
    columns,
    peaks.list.map((peak) => [
      String(peak.index + 1),
      crystal ? (peak.hkl ?? []).map((entry) => decimals(entry, 4)).join(" ") : decimals(peak.position, places),
      ...(crystal ? [] : [decimals(peak.q, 5), decimals(peak.uncertainty, 5)]),
      ...(intensities ? [peak.intensity === null ? "–" : plain(peak.intensity)] : []),
      ...followed.flatMap(({ candidate }) => assignmentCells(candidate, peak)),
      overlapsOn(record, peak.index),
    ]),
  );
}

function assignmentCells(candidate: CandidateRecord, peak: PeakRecord): string[] {
  const found = candidate.assignments.find((one) => one.peak === peak.index);
  if (found === undefined) return ["not matched", "–"];
  const others = found.alternatives.length;
  return [
    `${lineText(found)}${others > 0 ? ` or ${others} more` : ""}`,
    decimals(offsetOf(found, peak.uncertainty), 2),
  ];
}

function overlapsOn({ coincidences }: RunRecord, peak: number): string {
  const overlaps = coincidences.filter((one) => one.peak === peak).flatMap((one) => one.overlaps);
  const shown = overlaps.slice(0, 2).map(overlapText);
  return `${shown.join(", ")}${overlaps.length > 2 ? ` and ${overlaps.length - 2} more` : ""}`;
}
