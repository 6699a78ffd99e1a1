import { cifCode } from "../cif-code.js";
import type { BranchRecord, RunRecord } from "../records/run.js";
import { drawnConfigurations, hasGraph } from "../svg/drawn-configurations.js";
import { isNamed } from "../svg/group-of-record.js";
import { carriedSets, hasMoments } from "../svg/moment-data.js";

export type DrawnRun = Pick<RunRecord, "group" | "cell" | "search" | "branches" | "exchange" | "onset">;

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

/** The drawing of the subgroup relations between the configurations of a branch, or null where there is none. */
export function graphFigureName(
  { configurations }: Pick<BranchRecord, "configurations">,
  index: number,
): string | null {
  return hasGraph(configurations) ? `branch-${index + 1}-configurations.svg` : null;
}

/** The drawing of the moments of a configuration. */
export function configurationFigureName(id: string, index: number): string {
  return `branch-${index + 1}-configuration-${cifCode(id)}.svg`;
}

/** Configurations whose intensities are drawn. */
export const shownWeights = 3;

/** The drawing of observed against calculated intensities of a branch. */
export function weightsFigureName({ weigh }: Pick<BranchRecord, "weigh">, index: number): string | null {
  return weigh === null || weigh.ranking.length === 0 ? null : `branch-${index + 1}-weights.svg`;
}

/** The drawing of the simulated patterns of a branch, or null where none was asked for. */
export function patternFigureName({ weigh }: Pick<BranchRecord, "weigh">, index: number): string | null {
  return weigh?.pattern ? `branch-${index + 1}-pattern.svg` : null;
}

/** The drawing of the phase diagram, or null where no constant runs. */
export function diagramFigureName({ exchange }: Pick<DrawnRun, "exchange">): string | null {
  return exchange?.diagram ? "phase-diagram.svg" : null;
}

/** The drawing of the temperature scan, or null where there is none. */
export function onsetFigureName({ onset }: Pick<DrawnRun, "onset">): string | null {
  return onset === null ? null : "onset.svg";
}

/** Names of all drawings of a run, known before anything is drawn. */
export function figureNames(record: DrawnRun): string[] {
  return [
    peakFigureName(record),
    zoneFigureName(record),
    ...record.branches.flatMap((branch, index) => [
      ...momentFigureNames(record, index),
      graphFigureName(branch, index),
      ...drawnConfigurations(branch.configurations).drawn.map(({ id }) => configurationFigureName(id, index)),
      weightsFigureName(branch, index),
      patternFigureName(branch, index),
    ]),
    diagramFigureName(record),
    onsetFigureName(record),
  ].filter((name) => name !== null);
}
