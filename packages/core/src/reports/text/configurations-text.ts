import type {
  ConfigurationRecord,
  ConfigurationSiteRecord,
  ConfigurationsRecord,
  PropertyRecord,
} from "../records/configurations.js";
import { fields, flow, paragraph, section, table } from "./layout.js";
import { counted, groupText, kForm, kText, positionText } from "./names.js";

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
      configurationTable(record.configurations),
      boundedLines(record),
    ),
    ...record.configurations.flatMap((one) => configurationSection(one)),
  ];
}

export function armsText(arms: ConfigurationsRecord["arms"]): string {
  if (arms === "pair") return "one ±k pair";
  if (arms === "all") return "all arms of the star";
  return `arms ${arms.map((arm) => arm + 1).join(", ")} of the star`;
}

function boundedLines({ bounded }: ConfigurationsRecord): string[] {
  return bounded.length === 0
    ? []
    : ["", ...bounded.flatMap((what) => paragraph(`Left out because of the limit: ${what}.`))];
}

/** One line each: irreps, direction, magnetic group, free parameters and what may come with the order. */
export function configurationTable(configurations: readonly ConfigurationRecord[]): string[] {
  if (configurations.length === 0) return paragraph("none: no irrep of this k carries moments on the sites");
  return table(
    [
      { title: "id" },
      { title: "direction" },
      { title: "magnetic group" },
      { title: "index", align: "right" },
      { title: "free", align: "right" },
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
      one.constantMoment ?? "",
      allowedText(one.netMoment),
      allowedText(one.polarization),
    ]),
  );
}

/** Parameters under the irreps, and under the group where these are more. */
export function freeText({ freeParameters: { irreps, group }, freePhases }: ConfigurationRecord): string {
  const phases = freePhases > 0 ? ` + ${counted(freePhases, "phase")}` : "";
  return `${irreps === group ? irreps : `${irreps} of ${group}`}${phases}`;
}

/** The non-zero components; `–` where nothing is allowed, blank where it was not worked out. */
export function allowedText(property: PropertyRecord | null): string {
  if (property === null) return "";
  const shown = property.form.every((entry) => entry === "0") ? "–" : `(${property.form.join(", ")})`;
  return property.inParent && !property.induced && shown !== "–" ? `${shown} as before` : shown;
}

function configurationSection(one: ConfigurationRecord): string[] {
  const { magneticGroup: group } = one;
  return section(
    `${one.id}, direction ${one.direction}`,
    fields([
      ["Irreps", one.irreps.join(" and ") + (one.severalIrreps ? " at once: more than one order parameter" : "")],
      [
        "Magnetic group",
        `${group.bns.symbol}, BNS ${group.bns.number}, OG ${group.og.number}, type ${roman(group.type)}, point group ${group.pointGroup}`,
      ],
      ["Cell", `(${group.cellFromParent}) of the parent; to the BNS setting (${group.toBns})`],
      [
        "Domains",
        `${one.domains.total} in all, ${counted(one.domains.k, "wave vector")}, ${counted(one.domains.orientation, "orientation")} apart from time reversal and translations`,
      ],
      ["Free parameters", parameterText(one)],
      ...(one.subgroupOf.length > 0 ? [["Subgroup of", one.subgroupOf.join(", ")] as const] : []),
      ...propertyFields(one),
    ]),
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

export function parameterText({ freeParameters: { irreps, group }, secondaryIrreps }: ConfigurationRecord): string {
  const more = secondaryIrreps.map(({ label, k, parameters }) => `${label} of k = ${kForm(k)} (${parameters})`);
  return `${irreps} of the irreps listed, ${group} of the magnetic group${more.length > 0 ? `, which lets in ${more.join(", ")}` : ""}`;
}

export function propertyFields(one: ConfigurationRecord): [string, string][] {
  const entry = (name: string, property: PropertyRecord | null, width: number): [string, string][] => {
    if (property === null) return [];
    if (property.form.every((value) => value === "0")) return [[name, "not allowed"]];
    const rows = Array.from({ length: property.form.length / width }, (_, row) =>
      property.form.slice(row * width, (row + 1) * width).join(" "),
    );
    const origin = property.induced ? "" : property.inParent ? " (in the parent already)" : "";
    return [[name, (rows.length === 1 ? `(${property.form.join(", ")})` : rows.join(" | ")) + origin]];
  };
  return [
    ...entry("Net moment", one.netMoment, 3),
    ...entry("Polarization", one.polarization, 3),
    ...entry("Magnetoelectric", one.magnetoelectric, 3),
    ...entry("Piezomagnetic", one.piezomagnetic, 6),
  ];
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
