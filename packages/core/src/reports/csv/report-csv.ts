import type { AtlasRecord } from "../records/atlas.js";
import type { Envelope } from "../records/common.js";
import type { CompatibilityRecord } from "../records/compatibility.js";
import type { ConfigurationsRecord } from "../records/configurations.js";
import type { ExchangeRecord } from "../records/exchange.js";
import type { ModesRecord } from "../records/modes.js";
import type { OnsetRecord } from "../records/onset.js";
import type { SatellitesRecord } from "../records/satellites.js";
import type { SearchRecord } from "../records/search.js";
import type { WeighRecord } from "../records/weigh.js";
import { exchangeCsv, onsetCsv } from "./exchange-and-onset-csv.js";
import { atlasCsv, compatibilityCsv, configurationsCsv, modesCsv, satellitesCsv, searchCsv } from "./tables.js";
import { weighCsv } from "./weigh-table.js";

/** The answer's table as CSV, or null where the command has none or the answer no result. */
export function csvOf({ command, result }: Envelope): string | null {
  if (result === null) return null;
  if (command === "atlas") return atlasCsv(result as AtlasRecord);
  if (command === "compatibility") return compatibilityCsv(result as CompatibilityRecord);
  if (command === "modes") return modesCsv(result as ModesRecord);
  if (command === "configurations") return configurationsCsv(result as ConfigurationsRecord);
  if (command === "satellites") return satellitesCsv(result as SatellitesRecord);
  if (command === "index" || command === "locate") return searchCsv(result as SearchRecord);
  if (command === "weigh") return weighCsv(result as WeighRecord);
  if (command === "exchange") return exchangeCsv(result as ExchangeRecord);
  if (command === "onset") return onsetCsv(result as OnsetRecord);
  return null;
}
