import {
  coordinateNames,
  formatForm,
  type LinearForm,
  parseThreeForms,
  type RationalMatrix,
  type VariableNames,
  vectorOf,
} from "../numbers/index.js";
import { operatorFrom, rotationOf, translationOf } from "./operators.js";
import type { SymmetryOperator } from "./types.js";

/**
 * Reads a coordinate triplet such as `-x, y+1/2, -z` (International Tables A, section 1.5; letters in either case,
 * terms in any order). Translations are kept as written.
 *
 * @param column place of the first character, for errors
 * @throws `syntax` with the column
 */
export function parseTriplet(text: string, column = 1): SymmetryOperator {
  const { matrix, constants } = formsToMatrix(parseThreeForms(text, coordinateNames, column));
  return operatorFrom(matrix, constants);
}

/** The triplet of an operator, letters before the constant: `-x,y+1/2,-z`. `parseTriplet` reads it back. */
export function formatTriplet(operator: SymmetryOperator): string {
  return formatMatrix(rotationOf(operator), translationOf(operator), coordinateNames);
}

/** Rows of coefficients and the constants of three linear forms. */
export function formsToMatrix(forms: readonly [LinearForm, LinearForm, LinearForm]) {
  const matrix: RationalMatrix = [forms[0].coefficients, forms[1].coefficients, forms[2].coefficients];
  return { matrix, constants: vectorOf(forms[0].constant, forms[1].constant, forms[2].constant) };
}

/** Three forms as one text, row by row. */
export function formatMatrix(
  matrix: RationalMatrix,
  constants: readonly [LinearForm["constant"], LinearForm["constant"], LinearForm["constant"]],
  names: VariableNames,
): string {
  return matrix
    .map((row, index) => formatForm({ coefficients: row, constant: constants[index as 0 | 1 | 2] }, names))
    .join(",");
}
