import { addVectors, type RationalVector } from "../numbers/index.js";
import { integerSublattice, latticeVectorsOfCell, reduceByLattice } from "./lattices.js";
import { operatorFrom, rotationOf, translationOf } from "./operators.js";
import type { SpaceGroup, SymmetryOperator } from "./types.js";

/** The centring vectors of the setting in [0, 1), zero first, then by coordinates: one representative of L modulo Z³. */
export function latticeVectorsInCell(group: SpaceGroup): readonly RationalVector[] {
  return latticeVectorsOfCell(group.lattice);
}

/**
 * The operators modulo integer translations, with the centring written out: for each centring vector (zero first) all
 * operators in their order, translations in [0, 1). Where not all integer vectors belong to L, modulo L ∩ Z³.
 */
export function operatorsModuloIntegers(group: SpaceGroup): readonly SymmetryOperator[] {
  const integers = integerSublattice(group.lattice);
  return latticeVectorsInCell(group).flatMap((centring) =>
    group.operators.map((operator) =>
      operatorFrom(rotationOf(operator), reduceByLattice(integers, addVectors(translationOf(operator), centring))),
    ),
  );
}
