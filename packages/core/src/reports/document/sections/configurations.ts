import {
  type ConfigurationRecord,
  type ConfigurationsRecord,
  commensurateOnes,
  modulatedOnes,
} from "../../records/configurations.js";
import { armsText, configurationFields, freeText } from "../../text/configurations-text.js";
import { counted, positionText } from "../../text/names.js";
import { allowedText } from "../../text/property-text.js";
import {
  type Block,
  type DocumentSection,
  fieldsBlock,
  listBlock,
  moreBlock,
  paragraphBlock,
  tableBlock,
} from "../blocks.js";
import type { BranchSource } from "../run-document.js";
import { configurationMoments } from "./configuration-moments.js";
import { configurationRelations } from "./configuration-relations.js";
import { modulatedDetails, modulatedTable } from "./modulated.js";

/** Configurations that are described one by one; the tables and files have all of them. */
const described = 24;

/** The spin configurations of this k with their magnetic groups, the relations between these, and the moments. */
export function configurationsSection(source: BranchSource): DocumentSection | null {
  const { branch, prefix } = source;
  const { configurations: record } = branch;
  if (record === null || record.configurations.length === 0) return null;
  const further = record.configurations.length - described;
  return {
    id: `${prefix}-configurations`,
    title: "Configurations",
    parts: [configurationRelations(source, record), configurationMoments(source, record)].filter(
      (part) => part !== null,
    ),
    blocks: [
      paragraphBlock(
        `Every arrangement of ${armsText(record.arms)} up to equivalence, by the direction of its order parameter.`,
      ),
      ...(record.kind === "incommensurate" ? modulatedTable(modulatedOnes(record)) : table(commensurateOnes(record))),
      ...record.bounded.map((what) => paragraphBlock(`Left out because of the limit: ${what}.`)),
      ...descriptions(record),
      ...(further > 0
        ? [paragraphBlock(`${counted(further, "further configuration")} in result.json and its CSV table.`)]
        : []),
    ],
  };
}

function table(all: readonly ConfigurationRecord[]): Block[] {
  return tableBlock(
    "Configurations and their magnetic groups",
    ["id", "direction", "magnetic group", ">index", ">free", "equal sizes", "net moment", "polarization"],
    all.map((one) => [
      one.id,
      one.direction,
      `${one.magneticGroup.bns.symbol} (${one.magneticGroup.bns.number})`,
      String(one.index),
      freeText(one),
      one.constantMoment ?? "",
      allowedText(one.netMoment),
      allowedText(one.polarization),
    ]),
  );
}

function descriptions(record: ConfigurationsRecord): Block[] {
  return [
    ...commensurateOnes(record)
      .slice(0, described)
      .flatMap((one) =>
        moreBlock(`${one.id}, ${one.magneticGroup.bns.symbol}: cell, sites and operators`, details(one)),
      ),
    ...modulatedOnes(record)
      .slice(0, described)
      .flatMap((one) =>
        moreBlock(`${one.id}, ${one.magneticGroup.pointGroup}: sites and superspace operators`, modulatedDetails(one)),
      ),
  ];
}

function details(one: ConfigurationRecord): Block[] {
  const { magneticGroup: group } = one;
  return [
    ...fieldsBlock(configurationFields(one)),
    ...tableBlock(
      "Magnetic sites in the child cell",
      ["site", "of", ">atoms", "position", "moment of the irreps", "form of the group"],
      one.sites.map((site) => [
        site.label,
        site.parentSite,
        String(site.multiplicity),
        positionText(site.positionLattice),
        site.momentLattice,
        site.symmformLattice,
      ]),
    ),
    paragraphBlock("Operators of the child cell, with time reversal:"),
    ...listBlock(group.operators, { short: true }),
    ...(group.centrings.length > 1
      ? [paragraphBlock("Centrings:"), ...listBlock(group.centrings, { short: true })]
      : []),
  ];
}
