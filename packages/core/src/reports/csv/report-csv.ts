import type { AtlasRecord } from "../records/atlas.js";
import type { Envelope } from "../records/common.js";
import type { CompatibilityRecord } from "../records/compatibility.js";
import type { ModesRecord } from "../records/modes.js";
import type { SatellitesRecord } from "../records/satellites.js";
import type { SearchRecord } from "../records/search.js";
import { atlasCsv, compatibilityCsv, modesCsv, satellitesCsv, searchCsv } from "./tables.js";

/** The commands whose answer has a table. */
export const commandsWithTable: readonly string[] = [
  "atlas",
  "compatibility",
  "modes",
  "satellites",
  "index",
  "locate",
];

/** The answer's table as CSV, or null where the command has none or the answer no result. */
export function reportCsv({ command, result }: Envelope): string | null {
  if (result === null) return null;
  if (command === "atlas") return atlasCsv(result as AtlasRecord);
  if (command === "compatibility") return compatibilityCsv(result as CompatibilityRecord);
  if (command === "modes") return modesCsv(result as ModesRecord);
  if (command === "satellites") return satellitesCsv(result as SatellitesRecord);
  if (command === "index" || command === "locate") return searchCsv(result as SearchRecord);
  return null;
}
