import type { AtlasRecord } from "../records/atlas.js";
import type { CheckRecord } from "../records/check.js";
import type { Envelope } from "../records/common.js";
import type { CompatibilityRecord } from "../records/compatibility.js";
import type { ConfigurationsRecord } from "../records/configurations.js";
import type { DecomposeRecord } from "../records/decompose.js";
import type { ExchangeRecord } from "../records/exchange.js";
import type { ExportRecord } from "../records/export.js";
import type { IrrepsRecord } from "../records/irreps.js";
import type { ModesRecord } from "../records/modes.js";
import type { OnsetRecord } from "../records/onset.js";
import type { OpsRecord } from "../records/ops.js";
import type { RunRecord } from "../records/run.js";
import type { SatellitesRecord } from "../records/satellites.js";
import type { SearchRecord } from "../records/search.js";
import type { ExplainRecord, HelpRecord } from "../records/simple.js";
import type { StarRecord } from "../records/star.js";
import type { StudyRecord } from "../records/study.js";
import type { WeighRecord } from "../records/weigh.js";
import { atlasText } from "./atlas-text.js";
import { checkText } from "./check-text.js";
import { assumedLines, cautionLines, conventionLines, warningLines } from "./closing-text.js";
import { compatibilityText } from "./compatibility-text.js";
import { configurationsText } from "./configurations-text.js";
import { decomposeText } from "./decompose-text.js";
import { exchangeText } from "./exchange-text.js";
import { irrepsText } from "./irreps-text.js";
import { onPage, plainBlanks } from "./layout.js";
import { modesText } from "./modes-text.js";
import { onsetText } from "./onset-text.js";
import { opsText } from "./ops-text.js";
import { runFullText, runShortText } from "./run-text.js";
import { satellitesText } from "./satellites-text.js";
import { indexText, locateText } from "./search-text.js";
import { explainText, helpText } from "./simple-text.js";
import { starText } from "./star-text.js";
import { weighText } from "./weigh-text.js";

/**
 * The answer as text of at most 100 columns, ended by a line feed: the result, then warnings, what was assumed, the
 * conventions and the cautions, each once. Empty when the answer has no result.
 *
 * @param options.full for `run` everything that was computed, not only the page that fits a terminal
 * @param options.width columns of a terminal that has fewer than 100; not below 60
 */
export function reportText(
  answer: Envelope,
  options: { readonly full?: boolean; readonly width?: number | null } = {},
): string {
  if (answer.result === null) return "";
  return onPage(options.width ?? null, () => writtenReport(answer, options.full ?? false));
}

function writtenReport(answer: Envelope, full: boolean): string {
  // The text is a file of its own; what was assumed stands in it as comments.
  if (answer.command === "study") return (answer.result as StudyRecord).study;
  if (answer.command === "export") return (answer.result as ExportRecord).cif;
  const lines = [
    ...bodyLines(answer, full),
    ...warningLines(answer.warnings),
    ...assumedLines(answer.assumed),
    ...conventionLines(answer),
    ...cautionLines(answer.command),
  ];
  while (lines.at(-1) === "") lines.pop();
  return `${plainBlanks(lines.join("\n"))}\n`;
}

/** The command names the shape of the result. */
function bodyLines({ command, result }: Envelope, full: boolean): string[] {
  switch (command) {
    case "ops":
      return opsText(result as OpsRecord);
    case "atlas":
      return atlasText(result as AtlasRecord);
    case "compatibility":
      return compatibilityText(result as CompatibilityRecord);
    case "star":
      return starText(result as StarRecord);
    case "irreps":
      return irrepsText(result as IrrepsRecord);
    case "modes":
      return modesText(result as ModesRecord);
    case "decompose":
      return decomposeText(result as DecomposeRecord);
    case "configurations":
      return configurationsText(result as ConfigurationsRecord);
    case "satellites":
      return satellitesText(result as SatellitesRecord);
    case "index":
      return indexText(result as SearchRecord);
    case "locate":
      return locateText(result as SearchRecord);
    case "weigh":
      return weighText(result as WeighRecord);
    case "exchange":
      return exchangeText(result as ExchangeRecord);
    case "onset":
      return onsetText(result as OnsetRecord);
    case "check":
      return checkText(result as CheckRecord);
    case "run":
      return full ? runFullText(result as RunRecord) : runShortText(result as RunRecord);
    case "report":
      return runFullText(result as RunRecord);
    case "explain":
      return explainText(result as ExplainRecord);
    case "help":
      return helpText(result as HelpRecord);
    default:
      return [];
  }
}
