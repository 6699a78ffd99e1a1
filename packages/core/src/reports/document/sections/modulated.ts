import type { ModulatedRecord } from "../../records/configurations.js";
import { modulatedFields, modulatedFreeText } from "../../text/modulated-text.js";
import { positionText } from "../../text/names.js";
import { allowedText } from "../../text/property-text.js";
import { type Block, fieldsBlock, listBlock, paragraphBlock, tableBlock } from "../blocks.js";

/** One line for each modulated configuration. */
export function modulatedTable(all: readonly ModulatedRecord[]): Block[] {
  return [
    ...tableBlock(
      "Modulated configurations and their superspace groups",
      ["id", "direction", "point group", ">operators", ">index", ">free", "polarization"],
      all.map((one) => [
        one.id,
        one.direction + (one.needsSecondOrderParameter ? " *" : ""),
        one.magneticGroup.pointGroup,
        String(one.magneticGroup.superspace.operators.length),
        String(one.index),
        modulatedFreeText(one),
        allowedText(one.polarization),
      ]),
    ),
    ...(all.some(({ needsSecondOrderParameter }) => needsSecondOrderParameter)
      ? [paragraphBlock("* Phases between copies are free: this needs a second order parameter of the same symmetry.")]
      : []),
  ];
}

/** Everything about one modulated configuration. */
export function modulatedDetails(one: ModulatedRecord): Block[] {
  const { superspace } = one.magneticGroup;
  return [
    ...fieldsBlock(modulatedFields(one)),
    ...tableBlock(
      "Modulations M = C cos 2πx₄ + S sin 2πx₄ with x₄ = k·x, along a, b, c of the parent; the mean moment is zero",
      ["site", ">atoms", "position", "C of the irreps", "S of the irreps", "C of the operators", "S of the operators"],
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
    paragraphBlock("Superspace operators:"),
    ...listBlock(superspace.operators, { short: true }),
    paragraphBlock("Centrings:"),
    ...listBlock(superspace.centrings, { short: true }),
  ];
}
