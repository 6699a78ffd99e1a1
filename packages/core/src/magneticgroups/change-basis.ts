import { invert, timesColumn } from "../numbers/index.js";
import { type BasisChange, changeOperator, latticeFromVectors, latticeVectors } from "../spacegroups/index.js";
import { assembleMagneticGroup } from "./build.js";
import { toMagneticElements } from "./elements.js";
import type { MagneticGroup } from "./types.js";

/**
 * The same group in the axes `(a',b',c') = (a,b,c) P` with the origin at p, as `changeBasis` of the room `spacegroups`;
 * time reversal stays. Integer vectors need not belong to the new lattice.
 *
 * @throws `singular-basis` when det P = 0
 */
export function changeMagneticBasis(group: MagneticGroup, change: BasisChange): MagneticGroup {
  const inverse = invert(change.matrix);
  const lattice = latticeFromVectors(latticeVectors(group.lattice).map((vector) => timesColumn(inverse, vector)));
  const { elements, denominator } = toMagneticElements(
    lattice,
    group.operators.map(({ operator, timeReversal }) => ({
      operator: changeOperator(operator, change, inverse),
      timeReversal,
    })),
  );
  return assembleMagneticGroup(lattice, elements, denominator);
}
