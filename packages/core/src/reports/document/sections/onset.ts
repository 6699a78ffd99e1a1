import type { OnsetRecord } from "../../records/onset.js";
import { onsetChart } from "../../svg/onset-chart.js";
import { plain } from "../../text/names.js";
import { behaviourText, commonText, measuredText, plateauText, sentences } from "../../text/onset-text.js";
import { type Block, type DocumentSection, fieldsBlock, tableBlock } from "../blocks.js";
import { onsetFigureName } from "../figure-names.js";
import type { DocumentSource } from "../run-document.js";

/** Which peaks set in together, and what each column of the scan does. */
export function onsetSection({ record }: DocumentSource): DocumentSection | null {
  const { onset } = record;
  const file = onsetFigureName(record);
  if (onset === null || file === null) return null;
  return {
    id: "onset",
    title: "Temperature scan",
    parts: [],
    blocks: [
      ...fieldsBlock([
        ["File", onset.file],
        ["Transitions", onset.transitions.length === 0 ? "none within the range" : String(onset.transitions.length)],
      ]),
      ...tableBlock(
        "Transitions: peaks of different rows have no common T_N at 0.1 %",
        [">T_N / K", "peaks", "common onset"],
        onset.transitions.map((one) => [
          measuredText(one.temperature),
          one.peaks.map((index) => onset.peaks[index]?.name ?? "").join(", "),
          commonText(one),
        ]),
      ),
      {
        kind: "figure",
        figure: {
          id: "figure-onset",
          caption: "The scan (points, ±1 s.u.), the fitted laws and the temperatures of onset (dashed).",
          parts: [onsetChart(onset)],
          legend: null,
          file,
          live: null,
        },
      },
      ...peakBlocks(onset),
    ],
  };
}

function peakBlocks({ peaks, k }: OnsetRecord): Block[] {
  return [
    ...tableBlock(
      "Fits of I = I₀ (1 − T/T_N)^2β + background, each over the widest range that the law describes",
      ["peak", ">T_N / K", ">β", ">(T_N−T)/T_N to", ""],
      peaks.flatMap(({ name, fit }) =>
        fit === null
          ? []
          : [
              [
                name,
                measuredText(fit.transition),
                measuredText(fit.beta),
                plain(Number(fit.reducedRange.toFixed(3))),
                fit.fits ? "" : "fits badly: T_N and β are doubtful",
              ],
            ],
      ),
    ),
    ...tableBlock(
      "Peaks without an onset",
      ["peak", "what it does"],
      peaks.filter(({ fit }) => fit === null).map(({ name, behaviour }) => [name, sentences[behaviour] ?? behaviour]),
    ),
    ...tableBlock(
      "k against temperature",
      ["component", "it", "level"],
      k.map((one) => [one.name, behaviourText(one), plateauText(one)]),
    ),
  ];
}
