import type { Envelope } from "../records/common.js";
import type { ExchangeRecord } from "../records/exchange.js";
import type { OnsetRecord } from "../records/onset.js";
import type { WeighRecord } from "../records/weigh.js";
import { standaloneSvg } from "./figure.js";
import { intensityChart } from "./intensity-chart.js";
import { onsetChart } from "./onset-chart.js";
import { patternChart } from "./pattern-chart.js";
import { phaseDiagramChart } from "./phase-diagram.js";

/** The answer's drawing as a file, or null where the command has none or the answer nothing to draw. */
export function svgOf({ command, result }: Envelope): string | null {
  if (result === null) return null;
  if (command === "onset") return standaloneSvg(onsetChart(result as OnsetRecord));
  if (command === "weigh") return weighSvg(result as WeighRecord);
  if (command !== "exchange") return null;
  const { diagram } = result as ExchangeRecord;
  return diagram === null ? null : standaloneSvg(phaseDiagramChart(diagram));
}

/** Configurations that are drawn. */
const shownWeights = 3;

/** The simulated pattern where one was asked for, else observed against calculated intensities. */
function weighSvg({ data, ranking, pattern }: WeighRecord): string | null {
  if (ranking.length === 0) return null;
  return standaloneSvg(
    pattern === null ? intensityChart(data, ranking.slice(0, shownWeights)) : patternChart(pattern, data),
  );
}
