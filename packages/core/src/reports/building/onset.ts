import type { ScanTable } from "../../files/index.js";
import type { OnsetAnalysis, ScanSeries } from "../../onsets/index.js";
import type { OnsetRecord, PeakOnsetRecord } from "../records/onset.js";

/** The record of a temperature scan for JSON, text and CSV. */
export function onsetRecord(table: ScanTable, analysis: OnsetAnalysis): OnsetRecord {
  return {
    file: table.file,
    columns: table.columns.map(({ name, role, of }) => ({
      name,
      as: role,
      of: of === null ? null : (table.columns[of]?.name ?? null),
    })),
    rows: table.rows,
    peaks: analysis.peaks.map((peak, index) => ({ ...peak, data: dataOf(table.intensities[index]) })),
    transitions: analysis.transitions.map(({ temperature, series, probability }) => ({
      temperature,
      peaks: series,
      probability,
    })),
    k: analysis.k.map((one, index) => ({
      ...one,
      plateaus: one.plateaus.map(({ fraction, ...plateau }) => ({
        ...plateau,
        fraction: fraction === null ? null : fraction[1] === 1 ? String(fraction[0]) : fraction.join("/"),
      })),
      data: dataOf(table.k[index]),
    })),
  };
}

function dataOf(series: ScanSeries | undefined): PeakOnsetRecord["data"] {
  return {
    temperatures: series?.temperatures ?? [],
    values: series?.values ?? [],
    uncertainties: series?.uncertainties ?? null,
  };
}
