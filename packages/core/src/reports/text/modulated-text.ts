import type { ModulatedRecord } from "../records/configurations.js";
import { fields, flow, paragraph, section, table } from "./layout.js";
import { counted, kForm, kText, positionText } from "./names.js";
import { allowedText, propertyFields } from "./property-text.js";

/** One line each: irreps, direction, free parameters and what may come with the order. */
export function modulatedTable(configurations: readonly ModulatedRecord[]): string[] {
  if (configurations.length === 0) return paragraph("none: no irrep of this k carries moments on the sites");
  return table(
    [
      { title: "id" },
      { title: "direction" },
      { title: "point group" },
      { title: "superspace operators" },
      { title: "free", align: "right" },
      { title: "polarization" },
    ],
    configurations.map((one) => [
      one.id,
      one.direction + (one.needsSecondOrderParameter ? " *" : ""),
      one.magneticGroup.pointGroup,
      `${one.magneticGroup.superspace.operators.length}, index ${one.index}`,
      modulatedFreeText(one),
      allowedText(one.polarization),
    ]),
  ).concat(
    configurations.some(({ needsSecondOrderParameter }) => needsSecondOrderParameter)
      ? paragraph("* phases between copies are free: this needs a second order parameter of the same symmetry")
      : [],
  );
}

/** Parameters under the irreps, and under the operators where these are more. */
export function modulatedFreeText({ freeParameters: { irreps, group }, freePhases }: ModulatedRecord): string {
  const phases = freePhases > 0 ? `, ${counted(freePhases, "phase")}` : "";
  return `${irreps === group ? irreps : `${irreps} of ${group}`}${phases}`;
}

/** What fixes the phases between copies. */
export function phasesText({ needsSecondOrderParameter, freePhases, magneticGroup }: ModulatedRecord): string {
  if (needsSecondOrderParameter)
    return `${counted(freePhases, "phase")} between copies free: needs a second order parameter of the same symmetry`;
  if (freePhases > 0) return `${counted(freePhases, "phase")} between amplitudes free`;
  const reversed = magneticGroup.superspace.operators.some((operator) =>
    (operator.split(",")[3] ?? "").includes("-x4"),
  );
  return reversed ? "locked by an operator that takes k to −k" : "none but the common phase of the wave";
}

/** What one modulated configuration is, but for its sites and operators: the same in text and in a document. */
export function modulatedFields(one: ModulatedRecord): (readonly [string, string])[] {
  const { superspace, pointGroup } = one.magneticGroup;
  const more = one.secondaryIrreps.map(({ label, k, parameters }) => `${label} of k = ${kForm(k)} (${parameters})`);
  return [
    ["Irreps", one.irreps.join(" and ") + (one.severalIrreps ? " at once: more than one order parameter" : "")],
    ["Wave vector", kText(superspace.k)],
    ["Point group", `${pointGroup}, of mean properties`],
    ["Phases", phasesText(one)],
    [
      "Domains",
      `${one.domains.total} in all, ${counted(one.domains.k, "wave vector")}, ${counted(one.domains.orientation, "orientation")}`,
    ],
    [
      "Free parameters",
      `${one.freeParameters.irreps} of the irreps listed, ${one.freeParameters.group} of the operators${more.length > 0 ? `, which let in ${more.join(", ")}` : ""}`,
    ],
    ...(one.subgroupOf.length > 0 ? [["Subgroup of", one.subgroupOf.join(", ")] as const] : []),
    ...propertyFields(one),
  ];
}

export function modulatedSection(one: ModulatedRecord): string[] {
  const { superspace } = one.magneticGroup;
  return section(
    `${one.id}, direction ${one.direction}`,
    fields(modulatedFields(one)),
    [""],
    paragraph("M = C cos 2πx₄ + S sin 2πx₄ with x₄ = k·x, along a, b, c of the parent; the mean moment is zero."),
    table(
      [
        { title: "site" },
        { title: "atoms", align: "right" },
        { title: "position" },
        { title: "C of the irreps" },
        { title: "S of the irreps" },
        { title: "C of the operators" },
        { title: "S of the operators" },
      ],
      one.sites.map((site) => [
        site.label,
        String(site.multiplicity),
        positionText(site.positionLattice),
        site.cosineLattice,
        site.sineLattice,
        site.symmformCosine,
        site.symmformSine,
      ]),
    ),
    [""],
    paragraph("Superspace operators:"),
    flow(superspace.operators, 4),
    paragraph("Centrings:"),
    flow(superspace.centrings, 4),
  );
}
