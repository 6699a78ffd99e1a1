import {
  type ConfigurationRecord,
  type ConfigurationSiteRecord,
  type ConfigurationsRecord,
  commensurateOnes,
  modulatedOnes,
} from "../records/configurations.js";
import { fields, flow, paragraph, section, table } from "./layout.js";
import { modulatedSection, modulatedTable } from "./modulated-text.js";
import { counted, groupText, kForm, kText, positionText } from "./names.js";
import { allowedText, propertyFields } from "./property-text.js";

/** The list of configurations, then each with its group, cell and moments. */
export function configurationsText(record: ConfigurationsRecord): string[] {
  return [
    ...section(
      "Configurations",
      fields([
        ["Group", groupText(record.group)],
        ["k", kText(record.k)],
        ["Arms", armsText(record.arms)],
      ]),
      [""],
      record.kind === "incommensurate"
        ? modulatedTable(modulatedOnes(record))
        : configurationTable(commensurateOnes(record)),
      boundedLines(record),
      [""],
      legendLines(record),
    ),
    ...commensurateOnes(record).flatMap((one) => configurationSection(one)),
    ...modulatedOnes(record).flatMap(modulatedSection),
  ];
}

export function armsText(arms: ConfigurationsRecord["arms"]): string {
  if (arms === "pair") return "one ±k pair";
  if (arms === "all") return "all arms of the star";
  return `arms ${arms.map((arm) => arm + 1).join(", ")} of the star`;
}

/** What the columns mean, in short; `kvane help arrangements` has more. */
export function legendLines({ kind, parentSites }: ConfigurationsRecord): string[] {
  const several = parentSites.filter(({ magnetic }) => magnetic).length > 1;
  const common =
    "index: in the parent with time reversal, the number of domains; free: real parameters of the irreps, of how many that " +
    "the group allows. Net moment and polarization are Cartesian, x along a and z along c* of the parent";
  return paragraph(
    kind === "incommensurate"
      ? `${common}.`
      : `${common}; equal sizes: whether all moments of a site can be of one size${several ? "; sites: those that get moments" : ""}. Moments are along the axes of the child cell.`,
  );
}

function boundedLines({ bounded }: ConfigurationsRecord): string[] {
  return bounded.length === 0
    ? []
    : ["", ...bounded.flatMap((what) => paragraph(`Left out because of the limit: ${what}.`))];
}

/** One line each: irreps, direction, magnetic group, free parameters and what may come with the order. */
export function configurationTable(configurations: readonly ConfigurationRecord[]): string[] {
  if (configurations.length === 0) return paragraph("none: no irrep of this k carries moments on the sites");
  const labels = new Set(configurations.flatMap(({ sites }) => sites.map(({ parentSite }) => parentSite)));
  const several = labels.size > 1;
  return table(
    [
      { title: "id" },
      { title: "direction" },
      { title: "magnetic group" },
      { title: "index", align: "right" },
      { title: "free", align: "right" },
      ...(several ? [{ title: "sites" }] : []),
      { title: "equal sizes" },
      { title: "net moment" },
      { title: "polarization" },
    ],
    configurations.map((one) => [
      one.id,
      one.direction,
      `${one.magneticGroup.bns.symbol} (${one.magneticGroup.bns.number})`,
      String(one.index),
      freeText(one),
      ...(several ? [orderedSites(one).join(" ")] : []),
      one.constantMoment ?? "",
      allowedText(one.netMoment),
      allowedText(one.polarization),
    ]),
  );
}

/** The parent sites on which the irreps put moments. */
export function orderedSites({ sites }: ConfigurationRecord): string[] {
  return [
    ...new Set(sites.filter(({ momentLattice }) => momentLattice !== "(0, 0, 0)").map(({ parentSite }) => parentSite)),
  ];
}

/** Parameters under the irreps, and under the group where these are more. */
export function freeText({ freeParameters: { irreps, group }, freePhases }: ConfigurationRecord): string {
  const phases = freePhases > 0 ? ` + ${counted(freePhases, "phase")}` : "";
  return `${irreps === group ? irreps : `${irreps} of ${group}`}${phases}`;
}

/** What one configuration is, but for its sites and moments: the same in text and in a document. */
export function configurationFields(one: ConfigurationRecord): (readonly [string, string])[] {
  const { magneticGroup: group } = one;
  return [
    ["Irreps", one.irreps.join(" and ") + (one.severalIrreps ? " at once: more than one order parameter" : "")],
    [
      "Magnetic group",
      `${group.bns.symbol}, BNS ${group.bns.number}, OG ${group.og.number}, type ${roman(group.type)}, point group ${group.pointGroup}`,
    ],
    ["Cell", `(${group.cellFromParent}) of the parent; to the BNS setting (${group.toBns})`],
    [
      "Domains",
      `${one.domains.total} in all; apart from time reversal and translations ${counted(one.domains.orientation, "orientation")}, with ${counted(one.domains.k, "wave vector")} among them`,
    ],
    ["Free parameters", parameterText(one)],
    ...(one.subgroupOf.length > 0 ? [["Subgroup of", one.subgroupOf.join(", ")] as const] : []),
    ...propertyFields(one),
  ];
}

function configurationSection(one: ConfigurationRecord): string[] {
  const { magneticGroup: group } = one;
  return section(
    `${one.id}, direction ${one.direction}`,
    fields(configurationFields(one)),
    [""],
    siteTable(one.sites),
    [""],
    paragraph("Operators of the child cell, with time reversal:"),
    flow(group.operators, 4),
    ...(group.centrings.length > 1 ? [paragraph("Centrings:"), flow(group.centrings, 4)] : []),
  );
}

export function roman(type: number): string {
  return ["", "I", "II", "III", "IV"][type] ?? String(type);
}

function parameterText({ freeParameters: { irreps, group }, secondaryIrreps }: ConfigurationRecord): string {
  const more = secondaryIrreps.map(({ label, k, parameters }) => `${label} of k = ${kForm(k)} (${parameters})`);
  return `${irreps} of the irreps listed, ${group} of the magnetic group${more.length > 0 ? `, which lets in ${more.join(", ")}` : ""}`;
}

function siteTable(sites: readonly ConfigurationSiteRecord[]): string[] {
  return table(
    [
      { title: "site" },
      { title: "of" },
      { title: "atoms", align: "right" },
      { title: "position" },
      { title: "moment of the irreps" },
      { title: "form of the group" },
    ],
    sites.map((site) => [
      site.label,
      site.parentSite,
      String(site.multiplicity),
      positionText(site.positionLattice),
      site.momentLattice,
      site.symmformLattice,
    ]),
    2,
  );
}
