import type { AnyConfiguration, ConfigurationRecord, ConfigurationsRecord } from "./records/configurations.js";

/**
 * What stands in the way of a magnetic CIF of a configuration: the cell that a file needs, numbers for the letters of k
 * of a modulated structure, or moments too many to be written out. Null where nothing does.
 */
export function cifObstacle({ cell }: ConfigurationsRecord, one: AnyConfiguration): "cell" | "k" | "moments" | null {
  if (cell === null) return "cell";
  if ("superspace" in one.magneticGroup) return one.magneticGroup.superspace.k.numeric === null ? "k" : null;
  return (one as ConfigurationRecord).notWritten === null ? null : "moments";
}
