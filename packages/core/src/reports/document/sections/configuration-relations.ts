import type { ConfigurationsRecord } from "../../records/configurations.js";
import { configurationGraph, relationTexts, severalParameters } from "../../svg/configuration-graph.js";
import { hasGraph, mostNodes } from "../../svg/drawn-configurations.js";
import { type DocumentSection, listBlock, moreBlock, paragraphBlock } from "../blocks.js";
import { graphFigureName } from "../figure-names.js";
import type { BranchSource } from "../run-document.js";

/** Which magnetic group is in which: the graph, and the same in words. */
export function configurationRelations(
  { branch, index, prefix }: BranchSource,
  record: ConfigurationsRecord,
): DocumentSection | null {
  if (record.configurations.length < 2) return null;
  const id = `${prefix}-subgroups`;
  const relations = listBlock(relationTexts(record));
  return {
    id,
    title: "Subgroup relations",
    parts: [],
    blocks: hasGraph(record)
      ? [
          {
            kind: "figure",
            figure: {
              id: `${id}-graph`,
              caption: `Groups by their index in the parent${record.kind === "incommensurate" ? ", a shift of the wave's phase taken as no change" : ""}. An arrow leads to a subgroup, up to conjugation, with none of the list in between; grey ones lead from the parent to the groups that are in no other${record.configurations.some(severalParameters) ? "; a dashed frame stands for more than one order parameter" : ""}.`,
              parts: [configurationGraph(record)],
              legend: null,
              file: graphFigureName(branch, index) ?? "",
              live: null,
              scrolls: true,
            },
          },
          ...moreBlock("The same in words", relations),
        ]
      : [
          paragraphBlock(`No graph: of more than ${mostNodes} configurations it could not be read.`),
          ...moreBlock("Each configuration and the groups that it is in", relations),
        ],
  };
}
