import { formatCyclotomic } from "./cyclotomic-text.js";
import {
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicToComplex,
  isCyclotomicZero,
  multiplyCyclotomic,
  rootOfUnity,
  unitComplex,
} from "./cyclotomics.js";
import { modulo } from "./integers.js";
import {
  constantForm,
  formatForm,
  isConstantForm,
  type LinearForm,
  negateForm,
  parameterNames,
} from "./linear-forms.js";
import { formatRational, fractionalPart, isZero, type Rational } from "./rationals.js";

/** An exact phase: a linear form in u, v, w, in turns. Its number is e^{2πi·form}. */
export type Phase = LinearForm;

/** `e^{2πi·phase} · factor`, exact. */
export interface PhasedNumber {
  readonly phase: Phase;
  readonly factor: Cyclotomic;
}

/** Above this denominator a constant phase is printed beside the factor and not multiplied into it. */
const largestFoldedOrder = 48;

/** `e^{2πi·phase}` with the constant part reduced modulo 1. */
export function reducePhase(phase: Phase): Phase {
  return { constant: fractionalPart(phase.constant), coefficients: phase.coefficients };
}

export function conjugatePhased(a: PhasedNumber): PhasedNumber {
  return { phase: negateForm(a.phase), factor: conjugateCyclotomic(a.factor) };
}

/**
 * The value as `[real, imaginary]` floats at the given parameter values (null where the phase has none to put in).
 * Constant phases are reduced exactly before the cosine is taken.
 */
export function phasedToComplex(a: PhasedNumber, values: readonly number[] | null): [number, number] | null {
  if (isCyclotomicZero(a.factor)) return [0, 0];
  const [real, imaginary] = cyclotomicToComplex(a.factor);
  const turns = phaseTurns(a.phase, values);
  if (turns === null) return null;
  if (turns === 0) return [real, imaginary];
  const [cosine, sine] = unitComplex(turns);
  return [real * cosine - imaginary * sine, real * sine + imaginary * cosine];
}

/** The phase in turns, modulo 1; null when it has parameters without values. */
export function phaseTurns(phase: Phase, values: readonly number[] | null): number | null {
  const [numerator, denominator] = phase.constant;
  let turns = modulo(numerator, denominator) / denominator;
  for (let index = 0; index < 3; index++) {
    const [top, bottom] = phase.coefficients[index as 0 | 1 | 2];
    if (top === 0) continue;
    const value = values?.[index];
    if (value === undefined) return null;
    turns += (top / bottom) * value;
  }
  return turns;
}

/** `-1`, `(1+i)/2`, `e^{2πi·u/2}`, `-e^{2πi·(u/2+3/17)}`. */
export function formatPhased(a: PhasedNumber): string {
  if (isCyclotomicZero(a.factor)) return "0";
  const constant = fractionalPart(a.phase.constant);
  const folds = constant[1] <= largestFoldedOrder;
  const factor = folds ? multiplyCyclotomic(a.factor, rootOfUnity(constant)) : a.factor;
  const factorText = formatCyclotomic(factor);
  const phaseText = formatPhase({ constant: folds ? [0, 1] : constant, coefficients: a.phase.coefficients });
  if (phaseText === "1") return factorText;
  if (factorText === "1") return phaseText;
  if (factorText === "-1") return `-${phaseText}`;
  const needsBrackets = /[+-]/.test(
    factorText
      .replaceAll(/\{[^}]*\}/g, "")
      .replaceAll(/\([^)]*\)/g, "")
      .slice(1),
  );
  return `${needsBrackets ? `(${factorText})` : factorText}·${phaseText}`;
}

/** `1`, `e^{2πi·u/2}`, `e^{2πi·(u+v/3)}`; the constant is printed as it stands. */
export function formatPhase(phase: Phase): string {
  if (isConstantForm(phase)) return isZero(phase.constant) ? "1" : `e^{2πi·${formatRational(phase.constant)}}`;
  return exponentialText(formatForm(phase, parameterNames));
}

/** `e^{2πi·u/2}`, `e^{-2πi·u/2}`, `e^{2πi·(u+v/3)}` for the text of a phase in turns. */
export function exponentialText(turns: string): string {
  if (/[+-]/.test(turns.slice(1))) return `e^{2πi·(${turns})}`;
  return turns.startsWith("-") ? `e^{-2πi·${turns.slice(1)}}` : `e^{2πi·${turns}}`;
}

/** A constant phase of `turns`. */
export function phaseOf(turns: Rational): Phase {
  return constantForm(turns);
}
