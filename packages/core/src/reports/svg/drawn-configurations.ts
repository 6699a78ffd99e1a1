import type { AnyConfiguration, ConfigurationRecord, ConfigurationsRecord } from "../records/configurations.js";

/** Configurations whose moments are drawn; the tables and files have all of them. */
const mostDrawn = 12;

/** Moments of one drawing: more cannot be told apart. */
export const mostMoments = 400;

/** Configurations of one graph: more make it illegible. */
export const mostNodes = 30;

/** Which configurations of a branch are drawn, known before anything is. */
export interface DrawnConfigurations {
  readonly drawn: readonly AnyConfiguration[];
  /** Left out because one cell has too many moments. */
  readonly tooLarge: readonly string[];
  /** Left out because there are drawings enough. */
  readonly further: number;
}

/** Nothing is drawn without a cell or without numbers for k. */
export function drawnConfigurations(record: ConfigurationsRecord | null): DrawnConfigurations {
  if (record === null || record.cell === null || record.k.numeric === null)
    return { drawn: [], tooLarge: [], further: 0 };
  const shown = record.configurations.slice(0, mostDrawn);
  const fits = (one: AnyConfiguration) => one.sites.length > 0 && momentCount(one) <= mostMoments;
  return {
    drawn: shown.filter(fits),
    tooLarge: shown.filter((one) => !fits(one)).map(({ id }) => id),
    further: record.configurations.length - shown.length,
  };
}

/** Whether the subgroup relations of a branch are drawn. */
export function hasGraph(record: ConfigurationsRecord | null): record is ConfigurationsRecord {
  const count = record?.configurations.length ?? 0;
  return count > 1 && count <= mostNodes;
}

/** Magnetic atoms in one cell of a configuration: its child cell, or the cell of the parent where it is modulated. */
export function momentCount(one: AnyConfiguration): number {
  const listed = one.sites.reduce((sum, { multiplicity }) => sum + multiplicity, 0);
  if (!("superspace" in one.magneticGroup)) return listed;
  // The atoms of a modulated one are counted in the primitive cell; the first three places of a centring are in space.
  const { centrings } = one.magneticGroup.superspace;
  return listed * new Set(centrings.map((text) => text.split(",").slice(0, 3).join())).size;
}

/** The magnetic space group's symbol, or the point group of a modulated one. */
export function groupSymbol(one: AnyConfiguration): string {
  return "superspace" in one.magneticGroup
    ? one.magneticGroup.pointGroup
    : (one as ConfigurationRecord).magneticGroup.bns.symbol;
}
