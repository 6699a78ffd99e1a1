import type { WaveVector } from "../kvectors/index.js";
import { addForms, type LinearForm, type RationalVector, scaleForm, vectorFrom, zeroForm } from "../numbers/index.js";
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
