import type { RationalVector } from "./matrices.js";
import { dot, mapVector, zeroVector } from "./matrices.js";
import { add, equal, formatRational, isZero, multiply, negate, one, type Rational, zero } from "./rationals.js";

/**
 * An exact linear form in three named variables, `constant + c₁·x + c₂·y + c₃·z`. The names (x y z of a coordinate,
 * u v w of a wave vector, a b c of a change of basis) are given where text is read or written.
 */
export interface LinearForm {
  readonly constant: Rational;
  readonly coefficients: RationalVector;
}

export type VariableNames = readonly [string, string, string];

export const coordinateNames: VariableNames = ["x", "y", "z"];
export const parameterNames: VariableNames = ["u", "v", "w"];
export const axisNames: VariableNames = ["a", "b", "c"];

export const zeroForm: LinearForm = { constant: zero, coefficients: zeroVector };

export function constantForm(constant: Rational): LinearForm {
  return { constant, coefficients: zeroVector };
}

export function addForms(a: LinearForm, b: LinearForm): LinearForm {
  return {
    constant: add(a.constant, b.constant),
    coefficients: mapVector(a.coefficients, (entry, index) => add(entry, b.coefficients[index as 0 | 1 | 2])),
  };
}

export function scaleForm(factor: Rational, form: LinearForm): LinearForm {
  return {
    constant: multiply(factor, form.constant),
    coefficients: mapVector(form.coefficients, (entry) => multiply(factor, entry)),
  };
}

export function subtractForms(a: LinearForm, b: LinearForm): LinearForm {
  return addForms(a, scaleForm([-1, 1], b));
}

export function equalForms(a: LinearForm, b: LinearForm): boolean {
  return (
    equal(a.constant, b.constant) &&
    a.coefficients.every((entry, index) => equal(entry, b.coefficients[index] as Rational))
  );
}

/** True when no variable occurs. */
export function isConstantForm(form: LinearForm): boolean {
  return form.coefficients.every(isZero);
}

/** The form's exact value at exact values of the variables. */
export function evaluateForm(form: LinearForm, values: RationalVector): Rational {
  return add(form.constant, dot(form.coefficients, values));
}

/** The form's value at floating-point values of the variables. */
export function evaluateFormNumber(form: LinearForm, values: readonly number[]): number {
  return form.coefficients.reduce(
    (sum, [numerator, denominator], index) =>
      numerator === 0 ? sum : sum + (numerator / denominator) * (values[index] ?? Number.NaN),
    form.constant[0] / form.constant[1],
  );
}

/**
 * The form as text: variables in order, then the constant; `"0"`, `"-x+1/2"`, `"2u"`, `"u/2+v"`. Reading it back gives
 * the same form.
 */
export function formatForm(form: LinearForm, names: VariableNames): string {
  let text = "";
  form.coefficients.forEach((coefficient, index) => {
    if (isZero(coefficient)) return;
    const [numerator, denominator] = coefficient;
    const size = Math.abs(numerator) === 1 ? "" : String(Math.abs(numerator));
    const sign = numerator < 0 ? "-" : text === "" ? "" : "+";
    text += `${sign}${size}${names[index]}${denominator === 1 ? "" : `/${denominator}`}`;
  });
  if (!isZero(form.constant) || text === "")
    text += `${form.constant[0] >= 0 && text !== "" ? "+" : ""}${formatRational(form.constant)}`;
  return text;
}

/** The variable alone: `variableForm(1)` is the second variable. */
export function variableForm(index: number): LinearForm {
  return { constant: zero, coefficients: mapVector(zeroVector, (_, position) => (position === index ? one : zero)) };
}

/** `-form`. */
export function negateForm(form: LinearForm): LinearForm {
  return { constant: negate(form.constant), coefficients: mapVector(form.coefficients, negate) };
}
