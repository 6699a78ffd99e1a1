import type { Envelope } from "../records/common.js";
import type { ExchangeRecord } from "../records/exchange.js";
import type { OnsetRecord } from "../records/onset.js";
import { standaloneSvg } from "./figure.js";
import { onsetChart } from "./onset-chart.js";
import { phaseDiagramChart } from "./phase-diagram.js";

/** The answer's drawing as a file, or null where the command has none or the answer nothing to draw. */
export function svgOf({ command, result }: Envelope): string | null {
  if (result === null) return null;
  if (command === "onset") return standaloneSvg(onsetChart(result as OnsetRecord));
  if (command !== "exchange") return null;
  const { diagram } = result as ExchangeRecord;
  return diagram === null ? null : standaloneSvg(phaseDiagramChart(diagram));
}
