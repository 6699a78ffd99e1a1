import { fail } from "../errors/index.js";
import { coordinateNames, determinant, identityMatrix, isZero, parseThreeForms, vectorFrom } from "../numbers/index.js";
import { invertBasisChange } from "./basis-changes.js";
import { groupOnLattice } from "./build-group.js";
import type { HallGenerators } from "./hall-symbols.js";
import { integerLattice, latticeFrom, latticeVectors } from "./lattices.js";
import { formsToMatrix } from "./triplets.js";
import type { BasisChange, GroupName, SpaceGroup } from "./types.js";

/** The group of a Hall symbol without its change of basis. Throws `not-a-group` with the column of the operator. */
export function groupFromHall(hall: HallGenerators, name: Partial<GroupName> = {}): SpaceGroup {
  const lattice = latticeFrom([...latticeVectors(integerLattice), ...hall.centring]);
  return groupOnLattice(lattice, hall.operators, name, hall.columns);
}

/**
 * Reads Hall's change-of-basis operator V, the inside of the brackets behind a Hall symbol: three integers `0 0 1`
 * (a shift in 12ths) or three coordinates `x-y,x+y,z+1/4`. New coordinates are `x' = V x`, so operators become
 * `V S V⁻¹` (International Tables B, A1.4.2.3). Given back as (P, p): `P = W⁻¹`, `p = −W⁻¹w` for `V = (W|w)`.
 *
 * @throws `syntax` with the column, `singular-basis`
 */
export function parseHallOperator(inner: string, column: number): BasisChange {
  const numbers = inner.trim().split(/[\s,]+/);
  if (numbers.every((part) => /^[+-]?\d+$/.test(part))) {
    if (numbers.length !== 3)
      fail("syntax", `the shift of a Hall symbol has ${numbers.length} numbers`, {
        where: { column },
        expected: "three integers, in 12ths of the axes",
        found: inner.trim(),
      });
    return invertBasisChange({ matrix: identityMatrix, shift: vectorFrom(numbers.map(Number), 12) });
  }
  const { matrix, constants } = formsToMatrix(parseThreeForms(inner, coordinateNames, column));
  if (isZero(determinant(matrix)))
    fail("singular-basis", `the coordinates \`${inner.trim()}\` do not span space`, {
      where: { column },
      expected: "three linearly independent coordinates",
      found: inner.trim(),
    });
  return invertBasisChange({ matrix, shift: constants });
}
