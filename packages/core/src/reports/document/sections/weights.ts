import { withUncertainty } from "../../../numbers/index.js";
import type { WeighedRecord, WeighRecord } from "../../records/weigh.js";
import { intensityChart } from "../../svg/intensity-chart.js";
import { patternChart } from "../../svg/pattern-chart.js";
import { counted, decimals, plain } from "../../text/names.js";
import { leftOutTexts, notesOn, tieTexts } from "../../text/weigh-notes.js";
import {
  calculatedText,
  domainText,
  ionText,
  linesText,
  numbersText,
  rankingRow,
  remarksOn,
  scaleText,
  settingsOf,
  sizeText,
  struckPeaks,
  usedText,
} from "../../text/weigh-text.js";
import { namesOf } from "../../text/weigh-words.js";
import { type Block, type DocumentSection, fieldsBlock, moreBlock, paragraphBlock, tableBlock } from "../blocks.js";
import { patternFigureName, shownWeights, weightsFigureName } from "../figure-names.js";
import type { BranchSource } from "../run-document.js";

const columns = 6;

/** How well each configuration fits the intensities, and what the data do not tell. */
export function weightsSection({ branch, index, prefix }: BranchSource): DocumentSection | null {
  const { weigh } = branch;
  if (weigh === null) return null;
  const file = weightsFigureName(branch, index);
  return {
    id: `${prefix}-weights`,
    title: "Fits to intensities",
    parts: [],
    blocks: [
      ...[...leftOutTexts(weigh), ...remarksOn(weigh)].map(paragraphBlock),
      ...fieldsBlock([
        ["File", usedText(weigh)],
        ["Numbers", numbersText(weigh.data)],
        ["Uncertainties", weigh.data.uncertaintySource],
        ["Scale", scaleText(weigh)],
        ...settingsOf(weigh.data),
        ...weigh.ions.map((one) => [one.label, ionText(one)] as const),
      ]),
      ...rankingBlocks(weigh),
      ...(file === null ? [] : [figureBlock(weigh, prefix, file)]),
      ...patternBlocks(weigh, prefix, patternFigureName(branch, index)),
      ...weigh.ranking.slice(0, shownWeights).flatMap((one) => momentBlocks(weigh, one)),
      ...tieTexts(weigh).map(paragraphBlock),
      ...moreBlock("Observed and calculated intensities", comparisonBlocks(weigh)),
    ],
  };
}

function rankingBlocks(weigh: WeighRecord): Block[] {
  return [
    ...tableBlock(
      "Configurations by the Bayesian information criterion (BIC), best first; of two less than 6 apart the data prefer neither",
      [">rank", "id", "irreps", ">χ²", ">χ²/dof", ">R", ">parameters", ">BIC", "not told from"],
      weigh.ranking.map(rankingRow),
    ),
    ...tableBlock(
      "Struck out: nothing on these lines, whatever the amplitudes are",
      ["id", "irreps", "zero, but observed"],
      weigh.struckOut.map((one) => [one.id, one.irreps.join("+"), namesOf(struckPeaks(one), 6)]),
    ),
  ];
}

function figureBlock(weigh: WeighRecord, prefix: string, file: string): Block {
  const shown = weigh.ranking.slice(0, shownWeights);
  return {
    kind: "figure",
    figure: {
      id: `figure-${prefix}-weights`,
      caption: `Observed intensities (points, ±1 s.u.) and those calculated (bars) for the ${shown.length === 1 ? "configuration" : `first ${counted(shown.length, "configuration")}`}.`,
      parts: [intensityChart(weigh.data, shown)],
      legend: null,
      file,
      live: null,
    },
  };
}

function patternBlocks({ pattern, data }: WeighRecord, prefix: string, file: string | null): Block[] {
  if (pattern === null || file === null) return [];
  const figure = {
    id: `figure-${prefix}-pattern`,
    caption: `Simulated patterns of the satellites, lines of full width ${plain(pattern.widthDeg)}° at half maximum; for looking at, not for refinement.`,
    parts: [patternChart(pattern, data)],
    legend: null,
    file,
    live: null,
  };
  return [{ kind: "figure", figure }];
}

/** The moments of the first stand open, those of others are folded away. */
function momentBlocks({ relative, ranking, data }: WeighRecord, one: WeighedRecord): Block[] {
  const blocks = [
    ...tableBlock(
      `Moments of ${one.id} (${relative ? "relative" : "μB"}), along the axes, in the cell at the origin`,
      ["atom", "position", ">along a", ">along b", ">along c", ">size", ">limit / μB", "remark"],
      one.moments.map((moment) => [
        moment.label,
        moment.position.map((entry) => plain(Number(entry.toFixed(4)))).join(", "),
        ...moment.momentCrystal.map((entry) => decimals(entry, 2)),
        sizeText(moment),
        moment.limit === null ? "–" : plain(moment.limit),
        moment.aboveLimit ? "above the limit" : "",
      ]),
    ),
    ...(one.domains.length > 1 ? [paragraphBlock(domainText(one, data.domains === "free"))] : []),
    ...notesOn(one, relative).map(paragraphBlock),
  ];
  return one === ranking[0] ? blocks : moreBlock(`Moments of ${one.id} (${relative ? "relative" : "μB"})`, blocks);
}

function comparisonBlocks({ data, ranking }: WeighRecord): Block[] {
  const shown = ranking.slice(0, columns);
  return tableBlock(
    "Observed and calculated intensities",
    [data.sample === "powder" ? "peak" : "h k l", "lines", ">Q / Å⁻¹", ">observed", ...shown.map(({ id }) => `>${id}`)],
    data.list.map(({ label, lines, q, observed, su }, index) => [
      label,
      linesText(lines),
      decimals(q, 4),
      withUncertainty(observed, su),
      ...shown.map(({ calculated }) => calculatedText(calculated[index] ?? 0, su)),
    ]),
  );
}
