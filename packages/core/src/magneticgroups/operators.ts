import { subtractVectors } from "../numbers/index.js";
import { composeOperators, invertOperator, isLatticeVector, translationOf } from "../spacegroups/index.js";
import type { MagneticGroup, MagneticOperator } from "./types.js";

/** The product `a b`: `b` acts first; time reversals multiply. The translation is not reduced. */
export function composeMagnetic(a: MagneticOperator, b: MagneticOperator): MagneticOperator {
  return {
    operator: composeOperators(a.operator, b.operator),
    timeReversal: a.timeReversal === b.timeReversal ? 1 : -1,
  };
}

/** The inverse, translation not reduced; time reversal is its own inverse. */
export function invertMagnetic({ operator, timeReversal }: MagneticOperator): MagneticOperator {
  return { operator: invertOperator(operator), timeReversal };
}

/** True when the two are equal up to a translation of the group's lattice (one without time reversal). */
export function sameMagneticOperator(
  { lattice }: Pick<MagneticGroup, "lattice">,
  a: MagneticOperator,
  b: MagneticOperator,
): boolean {
  return (
    a.timeReversal === b.timeReversal &&
    a.operator.rotationDenominator === b.operator.rotationDenominator &&
    a.operator.rotation.every((entry, index) => entry === b.operator.rotation[index]) &&
    isLatticeVector(lattice, subtractVectors(translationOf(a.operator), translationOf(b.operator)))
  );
}
