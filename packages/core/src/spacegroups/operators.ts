import {
  addVectors,
  type IntegerMatrix,
  invert,
  lcm,
  matrixFrom,
  multiplyMatrices,
  negateVector,
  overCommonDenominator,
  type RationalMatrix,
  type RationalVector,
  timesColumn,
  vectorFrom,
} from "../numbers/index.js";
import type { SymmetryOperator } from "./types.js";

/** Translations are kept in 24ths wherever that is enough: all tabulated settings need no finer ones. */
export const usualTranslationDenominator = 24;

/** An operator as an exact matrix and column. */
export interface ExactOperator {
  readonly matrix: RationalMatrix;
  readonly column: RationalVector;
}

/**
 * The record of `{R|t}`. Denominators are canonical (lowest for `R`, the smallest multiple of 24 that serves for
 * `t`), so that equal operators are equal records.
 */
export function operatorFrom(matrix: RationalMatrix, column: RationalVector): SymmetryOperator {
  const rotation = overCommonDenominator(matrix.flat());
  const translation = overCommonDenominator(column);
  const denominator = lcm(translation.denominator, usualTranslationDenominator);
  const factor = denominator / translation.denominator;
  return {
    rotation: rotation.numerators,
    rotationDenominator: rotation.denominator,
    translation: translation.numerators.map((entry) => entry * factor + 0) as [number, number, number],
    translationDenominator: denominator,
  };
}

/** `R` as an exact matrix. */
export function rotationOf(operator: SymmetryOperator): RationalMatrix {
  return matrixFrom(operator.rotation, operator.rotationDenominator);
}

/** `t` as an exact column. */
export function translationOf(operator: SymmetryOperator): RationalVector {
  return vectorFrom(operator.translation, operator.translationDenominator);
}

export const identityOperator: SymmetryOperator = {
  rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1],
  rotationDenominator: 1,
  translation: [0, 0, 0],
  translationDenominator: usualTranslationDenominator,
};

/** The product `a b`: `b` acts first. `{R₁|t₁}{R₂|t₂} = {R₁R₂ | R₁t₂ + t₁}`; the translation is not reduced. */
export function composeOperators(a: SymmetryOperator, b: SymmetryOperator): SymmetryOperator {
  const matrix = rotationOf(a);
  return operatorFrom(
    multiplyMatrices(matrix, rotationOf(b)),
    addVectors(timesColumn(matrix, translationOf(b)), translationOf(a)),
  );
}

/** The inverse `{R⁻¹ | −R⁻¹t}`; the translation is not reduced. */
export function invertOperator(a: SymmetryOperator): SymmetryOperator {
  const matrix = invert(rotationOf(a));
  return operatorFrom(matrix, negateVector(timesColumn(matrix, translationOf(a))));
}

/** The image `R x + t` of a position, not reduced. */
export function applyOperator(operator: SymmetryOperator, position: RationalVector): RationalVector {
  return addVectors(timesColumn(rotationOf(operator), position), translationOf(operator));
}

/** True when the rotation part is the identity. */
export function isTranslation(operator: SymmetryOperator): boolean {
  return sameIntegers(operator.rotation, identityOperator.rotation) && operator.rotationDenominator === 1;
}

export function sameIntegers(a: IntegerMatrix, b: IntegerMatrix): boolean {
  return a.length === b.length && a.every((entry, index) => entry === b[index]);
}
