import {
  addVectors,
  invert,
  mapVector,
  multiplyMatrices,
  type RationalMatrix,
  rational,
  subtract,
  timesColumn,
} from "../numbers/index.js";
import { composeBasisChanges, formatBasisChange, parseBasisChange } from "./basis-changes.js";
import { assembleGroup } from "./build-group.js";
import { latticeFrom, latticeVectors } from "./lattices.js";
import { operatorFrom, rotationOf, translationOf } from "./operators.js";
import { type PrimitiveElement, toPrimitiveElements } from "./primitive-elements.js";
import type { BasisChange, SpaceGroup, SymmetryOperator } from "./types.js";

/**
 * The same group in the axes `(a',b',c') = (a,b,c) P` with the origin at p: `R' = P⁻¹RP`, `t' = P⁻¹(t + (R − 1)p)`,
 * `L' = P⁻¹L` (International Tables A, section 1.5.2). The name stays, its `basisChange` grows by the change. Integer
 * vectors need not belong to the new lattice.
 *
 * @throws `singular-basis` when det P = 0
 */
export function changeBasis(group: SpaceGroup, change: BasisChange): SpaceGroup {
  const inverse = invert(change.matrix);
  const lattice = latticeFrom(latticeVectors(group.lattice).map((vector) => timesColumn(inverse, vector)));
  const basisChange = composeBasisChanges(parseBasisChange(group.name.basisChange), change);
  const { elements, denominator } = toPrimitiveElements(
    lattice,
    group.operators.map((operator) => changeOperator(operator, change, inverse)),
  );
  // Conjugation keeps closure and unimodularity, so that nothing has to be closed again.
  return assembleGroup(lattice, elements as readonly PrimitiveElement[], denominator, {
    ...group.name,
    basisChange: formatBasisChange(basisChange),
  });
}

/**
 * One operator in other axes: `R' = P⁻¹RP`, `t' = P⁻¹(t + (R − 1)p)`, not reduced.
 *
 * @param inverse P⁻¹, where the caller has it already
 */
export function changeOperator(
  operator: SymmetryOperator,
  change: BasisChange,
  inverse: RationalMatrix = invert(change.matrix),
): SymmetryOperator {
  const rotation = rotationOf(operator);
  const difference = rotation.map((row, index) =>
    mapVector(row, (entry, column) => subtract(entry, rational(index === column ? 1 : 0))),
  ) as unknown as RationalMatrix;
  return operatorFrom(
    multiplyMatrices(multiplyMatrices(inverse, rotation), change.matrix),
    timesColumn(inverse, addVectors(translationOf(operator), timesColumn(difference, change.shift))),
  );
}
