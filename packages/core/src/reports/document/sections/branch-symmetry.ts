import { counted, kForm, kText, minusKText } from "../../text/names.js";
import { kindFields, reducedFields } from "../../text/star-text.js";
import { type DocumentSection, fieldsBlock, listBlock, moreBlock, paragraphBlock } from "../blocks.js";
import type { BranchSource } from "../run-document.js";

/** What kind of k it is, its star and its little group. */
export function branchSymmetry({ branch: { star }, prefix }: BranchSource): DocumentSection {
  return {
    id: `${prefix}-symmetry`,
    title: "Little group",
    parts: [],
    blocks: [
      ...fieldsBlock([
        ["k", kText(star.k)],
        ...reducedFields(star),
        ...kindFields(star),
        ["−k", minusKText(star.minusK)],
        ["Star", `${counted(star.arms.length, "arm")}: ${star.arms.map(kForm).join("; ")}`],
        ["Little co-group", `${star.littleGroup.symbol}, order ${star.littleGroup.order}`],
      ]),
      ...moreBlock(`Operators of the little group (${star.littleGroup.operators.length})`, [
        paragraphBlock("One for each coset of the lattice; the numbers are those of the characters below."),
        ...listBlock(star.littleGroup.operators, { ordered: true, short: true }),
      ]),
    ],
  };
}
