import { matrixText } from "../../text/irreps-text.js";
import { type DocumentSection, moreBlock, paragraphBlock, tableBlock } from "../blocks.js";
import type { BranchSource } from "../run-document.js";

/** The small irreps with their characters, and matrices where they are more than numbers. */
export function irrepsSection({ branch: { irreps }, prefix }: BranchSource): DocumentSection {
  const count = irreps.littleGroup.operators.length;
  const relation = irreps.minusKRelation;
  return {
    id: `${prefix}-irreps`,
    title: "Irreducible representations",
    parts: [],
    blocks: [
      ...tableBlock(
        "Small irreps of the little group",
        ["irrep", ">dimension", "reality", "conjugate", ">physical dimension"],
        irreps.irreps.map((irrep) => [
          irrep.label,
          String(irrep.dimension),
          irrep.reality,
          irrep.conjugateOf ?? "–",
          String(irrep.physicalDimension),
        ]),
      ),
      ...moreBlock("Characters", [
        ...tableBlock(
          "Characters, by the number of the operator",
          ["irrep", ...Array.from({ length: count }, (_, index) => `>${index + 1}`)],
          irreps.irreps.map(({ label, exact }) => [label, ...exact.characters]),
        ),
      ]),
      ...moreBlock(
        "Matrices",
        irreps.irreps
          .filter(({ dimension }) => dimension > 1)
          .flatMap(({ label, exact }) =>
            tableBlock(
              `Matrices of ${label}, row | row`,
              [">", "operator", "matrix"],
              exact.matrices.map((matrix, index) => [
                String(index + 1),
                irreps.littleGroup.operators[index] ?? "",
                matrixText(matrix),
              ]),
            ),
          ),
      ),
      ...(relation === null || irreps.minusK === "equivalent"
        ? []
        : moreBlock("Relation between k and −k", [
            paragraphBlock(`g₀ = ${relation.operator} takes k to −k; D(g₀⁻¹ g g₀)* = N⁻¹ D′(g) N, D′ the partner.`),
            ...tableBlock(
              "N for each irrep, row | row",
              ["irrep", "partner", "N"],
              relation.links.map(({ label, partner, exact }) => [label, partner, matrixText(exact)]),
            ),
          ])),
    ],
  };
}
