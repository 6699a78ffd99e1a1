import { matchStandardUncertainties } from "../../numbers/index.js";
import { nuclearLines, overlapsOf } from "../../reflections/index.js";
import { overlapRecord, type RunRecord } from "../../reports/index.js";
import type { StudyInputs } from "./read-study.js";

/**
 * The powder peaks that lie on a nuclear line which is not extinct, or on the image of one through half the wavelength.
 * They stay in the list: satellites lie there too.
 */
export function coincidencesOf({ group, cell, peaks, options }: StudyInputs): RunRecord["coincidences"] {
  const powder = (peaks?.list.peaks ?? []).flatMap(({ index, q, uncertainty }) =>
    q === null ? [] : [{ index, q, reach: options.tolerance ?? matchStandardUncertainties * (uncertainty ?? 0) }],
  );
  if (cell === null || powder.length === 0) return [];
  const last = Math.max(...powder.map(({ q, reach }) => q + reach));
  const nuclear = nuclearLines(group, cell, { qMax: 2 * last });
  return powder.flatMap(({ index, q, reach }) => {
    // As far as a match reaches, like the flags of the search.
    const overlaps = overlapsOf(q, nuclear, reach).list.filter(({ allowed }) => allowed);
    return overlaps.length > 0 ? [{ peak: index, overlaps: overlaps.map(overlapRecord) }] : [];
  });
}
