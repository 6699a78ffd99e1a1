import type { BranchRecord, RunRecord } from "../records/run.js";
import { isNamed } from "../svg/group-of-record.js";
import { carriedSets, hasMoments } from "../svg/moment-data.js";

export type DrawnRun = Pick<RunRecord, "group" | "cell" | "search" | "branches">;

/** The drawing of the peaks, or null where there are none. */
export function peakFigureName({ search }: DrawnRun): string | null {
  return search !== null && search.peaks.list.length > 0 ? "peaks.svg" : null;
}

/** The drawing of the zone, or null without a cell or a named group. */
export function zoneFigureName({ group, cell }: DrawnRun): string | null {
  return cell !== null && isNamed(group) ? "zone.svg" : null;
}

/** The drawings of the moments of a branch, by index: one for each physical set of irreps that a site has. */
export function momentFigureNames(record: DrawnRun, index: number): string[] {
  const branch = record.branches[index];
  if (branch === undefined || !hasMoments(record, branch)) return [];
  return carriedSets(branch).map((_, set) => `branch-${index + 1}-moments-${set + 1}.svg`);
}

/** Configurations whose intensities are drawn. */
export const shownWeights = 3;

/** The drawing of observed against calculated intensities of a branch. */
export function weightsFigureName({ weigh }: Pick<BranchRecord, "weigh">, index: number): string | null {
  return weigh === null || weigh.ranking.length === 0 ? null : `branch-${index + 1}-weights.svg`;
}

/** Names of all drawings of a run, known before anything is drawn. */
export function figureNames(record: DrawnRun): string[] {
  return [
    peakFigureName(record),
    zoneFigureName(record),
    ...record.branches.flatMap((branch, index) => [
      ...momentFigureNames(record, index),
      weightsFigureName(branch, index),
    ]),
  ].filter((name) => name !== null);
}
