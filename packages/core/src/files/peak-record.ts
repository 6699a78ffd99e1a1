import { defaultIndexUncertainty, defaultRelativeUncertainty, matchStandardUncertainties } from "../numbers/index.js";
import type { Peak, PeakKind } from "../search/index.js";
import { bracketsOf } from "./peak-checks.js";
import { positionToQ, uncertaintyToQ } from "./peak-conversion.js";
import { kindUnits } from "./peak-units.js";
import type { PeakCells } from "./peak-values.js";

/** What holds for every peak of a list. */
export interface PeakScale {
  readonly kind: PeakKind;
  readonly wavelengthAngstrom: number | null;
  /** Half-width of 3 standard uncertainties in the unit of the kind; null: those of the file, else the default. */
  readonly tolerance: number | null;
}

/** The record of one row; `index` counts the peaks from 0, `line` the lines from 1. */
export function toPeak(cells: PeakCells, index: number, line: number, scale: PeakScale): Peak {
  const { kind, wavelengthAngstrom, tolerance } = scale;
  const given = tolerance === null ? givenUncertainty(cells) : tolerance / matchStandardUncertainties;
  const intensity = cells.intensity?.value ?? null;
  const intensityUncertainty = cells["intensity uncertainty"]?.value ?? cells.intensity?.uncertainty ?? null;
  if (kind === "hkl") {
    const hkl = [cells.h?.value ?? 0, cells.k?.value ?? 0, cells.l?.value ?? 0];
    const hklUncertainty = given ?? defaultIndexUncertainty;
    const powder = { q: null, uncertainty: null, position: null };
    return { index, ...powder, hkl, hklUncertainty, intensity, intensityUncertainty, line };
  }
  const position = cells.position?.value ?? Number.NaN;
  const q = positionToQ(kind, position, wavelengthAngstrom);
  const uncertainty =
    given === null ? q * defaultRelativeUncertainty : uncertaintyToQ(kind, position, given, wavelengthAngstrom);
  return { index, q, uncertainty, hkl: null, hklUncertainty: null, intensity, intensityUncertainty, position, line };
}

/** The uncertainty that the row gives, in a column or in brackets; in the unit of the kind. */
export function givenUncertainty(cells: PeakCells): number | null {
  return cells.uncertainty?.value ?? bracketsOf(cells)?.uncertainty ?? null;
}

/**
 * Where the uncertainties of a list come from, in words for the reader.
 *
 * @param given how many of the `total` peaks have one of their own
 */
export function uncertaintySource(given: number, total: number, { kind, tolerance }: PeakScale): string {
  if (tolerance !== null) {
    const text = `the tolerance of ${Number(tolerance.toPrecision(6))}${kindUnits[kind]} taken as 3 standard uncertainties`;
    return given > 0 ? `${text}, in place of those of the file` : text;
  }
  if (given === total) return "given in the file";
  const byDefault =
    kind === "hkl"
      ? `${defaultIndexUncertainty} r.l.u. by default`
      : `${100 * defaultRelativeUncertainty} % of Q by default`;
  return given === 0
    ? `${byDefault}, as the file gives none`
    : `given in the file; ${byDefault} for the ${total - given} of ${total} peaks without one`;
}
