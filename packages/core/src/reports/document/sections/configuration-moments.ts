import type { AnyConfiguration, ConfigurationsRecord } from "../../records/configurations.js";
import { type ConfigurationPicture, configurationPictures } from "../../svg/configuration-pictures.js";
import { drawnConfigurations, mostMoments } from "../../svg/drawn-configurations.js";
import { boxProjections, siteLegend } from "../../svg/moment-drawing.js";
import { counted, decimals, kShort } from "../../text/names.js";
import { type Block, type DocumentSection, moreBlock, paragraphBlock } from "../blocks.js";
import { configurationFigureName } from "../figure-names.js";
import type { BranchSource } from "../run-document.js";

/** An example of each configuration as moments in its cell: projections, and in a page a view that can be turned. */
export function configurationMoments(
  { index, prefix, data }: BranchSource,
  record: ConfigurationsRecord,
): DocumentSection | null {
  const { drawn, tooLarge, further } = drawnConfigurations(record);
  if (drawn.length === 0 && tooLarge.length === 0) return null;
  const id = `${prefix}-configuration-moments`;
  const pictures = configurationPictures(record);
  if (pictures.length > 0) data[id] = pictures;
  // Where an ion is not known, so is not what its moment could be.
  const sized = record.parentSites.every(({ magnetic, largestMoment }) => !magnetic || largestMoment !== null);
  const figures = pictures.map((picture, place): Block => {
    const one = drawn[place] as AnyConfiguration;
    return {
      kind: "figure",
      figure: {
        id: `${id}-${place + 1}`,
        caption: captionOf(one, picture, sized),
        parts: boxProjections(picture, picture.vectors, `${one.id}: moments`),
        legend: siteLegend(picture),
        file: configurationFigureName(one.id, index),
        live: null,
      },
    };
  });
  return {
    id,
    title: "Moments of the configurations",
    parts: [],
    blocks: [
      ...(pictures.length > 0 ? [paragraphBlock(introduction(record)), liveBlock(id)] : []),
      ...figures.slice(0, 1),
      ...figures
        .slice(1)
        .flatMap((figure, place) => moreBlock(`${pictures[place + 1]?.name ?? ""}: moments`, [figure])),
      ...(tooLarge.length > 0
        ? [paragraphBlock(`Not drawn, with more than ${mostMoments} moments in a cell: ${tooLarge.join(", ")}.`)]
        : []),
      ...(further > 0 ? [paragraphBlock(`${counted(further, "further configuration")} not drawn.`)] : []),
    ],
  };
}

function introduction({ kind, k }: ConfigurationsRecord): string {
  return `Examples, not results: one generic choice of the free amplitudes of each configuration, the one of its magnetic CIF. ${
    kind === "incommensurate"
      ? `Cells are those of the parent, along the wave k = ${kShort(k)}, which never repeats exactly.`
      : "Each is drawn in its own magnetic cell, all in one orientation of the parent."
  }`;
}

function liveBlock(id: string): Block {
  return {
    kind: "live",
    id: `${id}-view`,
    label: "Moments of a configuration that can be turned",
    view: { kind: "configurations", data: id },
  };
}

function captionOf(one: AnyConfiguration, { cells, largest }: ConfigurationPicture, sized: boolean): string {
  const where =
    "cellFromParent" in one.magneticGroup
      ? `the cell (${one.magneticGroup.cellFromParent}) of the parent`
      : `${cells.join(" × ")} cells of the parent`;
  const longest = sized ? ` The longest moment is ${decimals(largest, 1)} μB.` : " The sizes are arbitrary.";
  return `${one.id}, direction ${one.direction}: ${where}, seen from the ends of its a, b and c. Arrows begin at their atoms; ⊙ points to the eye, ⊗ away from it; what is far is paler.${longest}`;
}
