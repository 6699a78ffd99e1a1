import type { LittleGroupRecord } from "../records/common.js";
import type { StarRecord } from "../records/star.js";
import { fields, numbered, section } from "./layout.js";
import { dimensionText, groupText, kForm, kShort, kText, minusKText } from "./names.js";

export function starText(record: StarRecord): string[] {
  return [
    ...section("Wave vector", starFields(record)),
    ...section(`Star (arms modulo the reciprocal lattice, ${record.arms.length})`, numbered(record.arms.map(kForm))),
    ...littleGroupSection(record.littleGroup),
  ];
}

/** The lines that say what kind of k it is; the report of the whole job shows the same ones. */
export function starFields(record: StarRecord): string[] {
  return fields([
    ["Group", groupText(record.group)],
    ["k", kText(record.k)],
    ...reducedFields(record),
    ...kindFields(record),
    ["−k", minusKText(record.minusK)],
    ["Little co-group", `${record.littleGroup.symbol}, order ${record.littleGroup.order}`],
  ]);
}

/** The plainest way to write k, where k is written otherwise. */
export function reducedFields({ k, reduced }: Pick<StarRecord, "k" | "reduced">): [string, string][] {
  return kForm(k) === kForm(reduced) ? [] : [["Equivalent to", kShort(reduced)]];
}

/** One line, or two where it matters whether k and −k are taken as one. */
export function kindFields(record: StarRecord): [string, string][] {
  const alone = `${dimensionText(record.dimension)} ${kForm(record.manifold)}`;
  const withMinusK = `${dimensionText(record.dimensionPM)} ${kForm(record.manifoldPM)}`;
  if (alone === withMinusK) return [["Kind", alone]];
  return [
    ["Kind", `${alone} under the point group`],
    ["Kind with −k", `${withMinusK} when k and −k are taken as one`],
  ];
}

export function littleGroupSection(group: LittleGroupRecord): string[] {
  return section(
    `Little group (one operator per coset of the lattice, ${group.operators.length})`,
    numbered(group.operators),
  );
}
