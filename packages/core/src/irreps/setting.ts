import type { WaveVector } from "../kvectors/index.js";
import {
  addForms,
  addVectors,
  type LinearForm,
  matrixFrom,
  overCommonDenominator,
  type RationalVector,
  scaleForm,
  subtractVectors,
  timesColumn,
  vectorFrom,
  zeroForm,
} from "../numbers/index.js";
import type { SymmetryOperator } from "../spacegroups/index.js";

/** k·x as an exact form in turns. */
export function waveTimesColumn(k: WaveVector, column: RationalVector): LinearForm {
  return k.components.reduce(
    (sum, component, axis) => addForms(sum, scaleForm(column[axis as 0 | 1 | 2], component)),
    zeroForm,
  );
}

/** The translation of an operator as an exact column. */
export function translationColumn(operator: SymmetryOperator): RationalVector {
  return vectorFrom(operator.translation, operator.translationDenominator);
}

/** R x, exact. */
export function rotateColumn(operator: SymmetryOperator, column: RationalVector): RationalVector {
  return timesColumn(matrixFrom(operator.rotation, operator.rotationDenominator), column);
}

/** The operator about another origin p: `{R | t + (R − 1) p}`. */
export function aboutPoint(operator: SymmetryOperator, point: RationalVector): SymmetryOperator {
  const column = subtractVectors(addVectors(translationColumn(operator), rotateColumn(operator, point)), point);
  const { numerators, denominator } = overCommonDenominator(column);
  return { ...operator, translation: numerators as [number, number, number], translationDenominator: denominator };
}
