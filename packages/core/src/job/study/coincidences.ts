import { overlapInverseAngstrom } from "../../numbers/index.js";
import { nuclearLines, overlapsOf } from "../../reflections/index.js";
import { overlapRecord, type RunRecord } from "../../reports/index.js";
import type { StudyInputs } from "./read-study.js";

/**
 * The powder peaks that lie on a nuclear line which is not extinct, or on the image of one through half the wavelength.
 * They stay in the list: satellites lie there too.
 */
export function coincidencesOf({ group, cell, peaks }: StudyInputs): RunRecord["coincidences"] {
  const powder = (peaks?.list.peaks ?? []).flatMap(({ index, q }) => (q === null ? [] : [{ index, q }]));
  if (cell === null || powder.length === 0) return [];
  const last = Math.max(...powder.map(({ q }) => q));
  const nuclear = nuclearLines(group, cell, { qMax: 2 * (last + overlapInverseAngstrom) });
  return powder.flatMap(({ index, q }) => {
    const overlaps = overlapsOf(q, nuclear, overlapInverseAngstrom).list.filter(({ allowed }) => allowed);
    return overlaps.length > 0 ? [{ peak: index, overlaps: overlaps.map(overlapRecord) }] : [];
  });
}
