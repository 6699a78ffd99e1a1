import type { SearchRecord } from "../records/search.js";
import { peaksText } from "./flag-text.js";
import { paragraph } from "./layout.js";
import { decimals, kShort } from "./names.js";

/** Sets of several vectors that are printed. */
const shownVectorFinds = 3;

/** Harmonics, sums and second vectors, the best few; or that nothing gains by them. */
export function severalVectorLines(record: SearchRecord): string[] {
  const { severalVectors } = record;
  if (severalVectors === null) return [];
  const { found, stages } = severalVectors;
  const tried = stages.filter((one) => one.tried > 0).map(({ stage }) => stage);
  const open = stages.some(({ exhaustive }) => !exhaustive) ? " (not exhaustive: a budget for each kind)" : "";
  if (found.length === 0)
    return paragraph(
      tried.length === 0
        ? "More than one vector: there was nothing to try."
        : `More than one vector: ${tried.join(", ")} tried${open}; nothing explains more.`,
    );
  return [
    ...paragraph(`More than one vector (${tried.join(", ")} tried${open}):`),
    ...found.slice(0, shownVectorFinds).flatMap((find) => {
      const members = find.members.map(
        ({ name, k, peaks }) => `${name} = ${kShort(k)} (${peaksText(peaks, record.peaks.list.length)})`,
      );
      return paragraph(
        `${find.matched} of ${find.total} peaks by ${members.join(" and ")}: evidence ${decimals(find.evidence.value, 1)}, ${find.evidence.reading}, ${decimals(find.gain, 1)} better than the best single vector, ${kShort(severalVectors.single.k)}.`,
      );
    }),
  ];
}
