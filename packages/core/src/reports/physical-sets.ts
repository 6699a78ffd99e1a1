import type { IrrepRecord } from "./records/irreps.js";

/**
 * Labels of irreps in the sets that real moments need. Where 2k is a reciprocal lattice vector real moments carry a
 * complex irrep only together with its conjugate, so the two are one choice (Bradley & Cracknell 1972, chapter 3:
 * physically irreducible representations). Elsewhere each irrep stands alone.
 */
export function physicalSets(record: {
  readonly minusK: string;
  readonly irreps: readonly Pick<IrrepRecord, "label" | "conjugateOf">[];
}): readonly (readonly string[])[] {
  const { irreps, minusK } = record;
  if (minusK !== "equivalent") return irreps.map(({ label }) => [label]);
  const order = new Map(irreps.map(({ label }, index) => [label, index]));
  return irreps.flatMap(({ label, conjugateOf }, index): string[][] => {
    if (conjugateOf === null || conjugateOf === label) return [[label]];
    return (order.get(conjugateOf) ?? index) < index ? [] : [[label, conjugateOf]];
  });
}
