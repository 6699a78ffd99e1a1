import { defaultIntensityShare, weakIntensityShare } from "../numbers/index.js";
import type { PeakKind } from "../search/index.js";
import { isMeasurable, measurableText } from "./measurable.js";
import { type PeakListOptions, readPeakTable } from "./peak-list.js";
import { note, problemList, throwProblems } from "./problem-list.js";

/** One integrated intensity, or |F|². */
export interface ListedIntensity {
  /** `(1 0 1/2)` as numbers, or `peak 3`. */
  readonly label: string;
  /** Å⁻¹; null for reflections by h k l. */
  readonly q: number | null;
  /** Fractional indices of H ± k; null for positions. */
  readonly hkl: readonly [number, number, number] | null;
  readonly observed: number;
  readonly uncertainty: number;
  /** Component along Q of the polarization of the incident beam, −1 to 1; null where the list does not say it. */
  readonly polarization: number | null;
  /** Line of the file, from 1. */
  readonly line: number;
}

/** A list of integrated intensities or |F|² as it was read. */
export interface IntensityList {
  readonly kind: PeakKind;
  readonly wavelengthAngstrom: number | null;
  readonly intensities: readonly ListedIntensity[];
  /** Where the uncertainties come from, in words for the reader. */
  readonly uncertaintySource: string;
}

/**
 * Reads integrated intensities: a list of peaks (`parsePeakList`) in which every row has an intensity, by position for a
 * powder or by h k l. An intensity of 0 says that a line was looked for and not seen. A column `polarization` tells the
 * component along Q = k_i − k_f of the polarization of the incident beam.
 *
 * Uncertainties that are missing become 10 % of the intensity and 1 % of the strongest, added in squares, and that is told.
 *
 * Throws as `parsePeakList` does, and `invalid-peak` for every row without an intensity.
 */
export function parseIntensityList(text: string, options: PeakListOptions): IntensityList {
  const { list, polarizations } = readPeakTable(text, options);
  const { peaks, kind, wavelengthAngstrom } = list;
  const problems = problemList(options.file);
  // A list without any intensity is one mistake, not one in every row.
  const none = peaks.every(({ intensity }) => intensity === null);
  for (const { intensity, line } of none ? peaks.slice(0, 1) : peaks)
    if (intensity === null)
      note(problems, "invalid-peak", none ? "the list has no intensities" : "the row has no intensity", {
        where: { line, column: 1 },
        expected: "an intensity behind the position, or in a column that the header names",
        found: "none",
        remedy: "fill it in, or write a header such as: d intensity intensity-su",
      });
  for (const { intensity, intensityUncertainty, line } of peaks)
    for (const value of [intensity ?? 0, intensityUncertainty ?? 0])
      if (!isMeasurable(value))
        note(problems, "invalid-peak", "the row has an intensity or uncertainty that nobody measures", {
          where: { line, column: 1 },
          expected: measurableText,
          found: String(value),
          remedy: "correct the value, or give all intensities in another unit",
        });
  throwProblems(problems);
  const strongest = peaks.reduce((most, { intensity }) => Math.max(most, Math.abs(intensity ?? 0)), 0);
  const missing = peaks.filter(({ intensityUncertainty }) => intensityUncertainty === null).length;
  return {
    kind,
    wavelengthAngstrom,
    intensities: peaks.map(({ index, q, hkl, intensity, intensityUncertainty, line }) => ({
      label: hkl === null ? `peak ${index + 1}` : `(${hkl.join(" ")})`,
      q,
      hkl: hkl === null ? null : [hkl[0] ?? 0, hkl[1] ?? 0, hkl[2] ?? 0],
      observed: intensity ?? 0,
      uncertainty:
        intensityUncertainty ?? Math.hypot(defaultIntensityShare * (intensity ?? 0), weakIntensityShare * strongest),
      polarization: polarizations[index] ?? null,
      line,
    })),
    uncertaintySource: sourceText(missing, peaks.length),
  };
}

function sourceText(missing: number, total: number): string {
  if (missing === 0) return "given in the file";
  const byDefault = `${100 * defaultIntensityShare} % of the intensity and ${100 * weakIntensityShare} % of the strongest by default`;
  return missing === total
    ? `${byDefault}, as the file gives none`
    : `given in the file; ${byDefault} for the ${missing} of ${total} intensities without one`;
}
