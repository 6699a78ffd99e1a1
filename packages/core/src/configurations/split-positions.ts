import {
  addVectors,
  formatRational,
  invert,
  type RationalVector,
  subtractVectors,
  timesColumn,
} from "../numbers/index.js";
import {
  latticeFromVectors,
  latticeVectors,
  latticeVectorsOfCell,
  rotationOf,
  type SiteOrbit,
  type SpaceGroup,
  translationOf,
} from "../spacegroups/index.js";
import { reduceToCell } from "./child-cell.js";
import type { ConfigurationCell } from "./types.js";

/**
 * The atoms of a parent orbit as the magnetic group splits them, whatever they carry: one position of each orbit in the
 * child cell, in [0, 1), with the number of its atoms there.
 */
export function splitPositions(
  group: SpaceGroup,
  { cellFromParent, operators, centrings }: ConfigurationCell,
  orbit: SiteOrbit,
): readonly { readonly position: RationalVector; readonly multiplicity: number }[] {
  const inverse = invert(cellFromParent.matrix);
  const inChild = (x: RationalVector): RationalVector => timesColumn(inverse, subtractVectors(x, cellFromParent.shift));
  // All vectors of the parent lattice, as they lie in the child cell.
  const parentVectors = latticeVectorsOfCell(
    latticeFromVectors(latticeVectors(group.lattice).map((vector) => timesColumn(inverse, vector))),
  );
  const rest = new Map<string, RationalVector>();
  for (const position of orbit.positions)
    for (const vector of parentVectors) {
      const atom = reduceToCell(addVectors(inChild(position), vector));
      rest.set(textOf(atom), atom);
    }
  const split: { position: RationalVector; multiplicity: number }[] = [];
  for (const position of [...rest.values()]) {
    if (!rest.has(textOf(position))) continue;
    const images = new Set<string>();
    for (const { operator } of operators)
      for (const centring of centrings) {
        const moved = addVectors(timesColumn(rotationOf(operator), position), translationOf(operator));
        images.add(textOf(reduceToCell(addVectors(moved, translationOf(centring.operator)))));
      }
    for (const image of images) rest.delete(image);
    split.push({ position, multiplicity: images.size });
  }
  return split;
}

function textOf(position: RationalVector): string {
  return position.map(formatRational).join(" ");
}
