import { usedParameters, type WaveVector } from "../kvectors/index.js";
import {
  add,
  divide,
  exponentialText,
  formatForm,
  formatTurns,
  isConstantForm,
  isZero,
  type LinearForm,
  multiply,
  negate,
  type Phase,
  type Rational,
  reducePhase,
  type VariableNames,
  vectorOf,
  zero,
} from "../numbers/index.js";

const componentNames: VariableNames = ["kx", "ky", "kz"];

/**
 * A phase factor in the components of k, so that its letters cannot be taken for amplitudes: `1`, `-1`, `e^{2πi/3}`,
 * `e^{2πi·ky/2}`.
 */
export function phaseText(k: WaveVector, phase: Phase): string {
  const reduced = reducePhase(phase);
  if (isConstantForm(reduced)) return formatTurns(reduced.constant);
  const form = inComponents(k, reduced);
  const moved = reducePhase(form);
  return exponentialText(formatForm(moved, componentNames));
}

/**
 * Rewrites a form in the letters of k in its components: each letter is read off the first component that holds it
 * alone, which the parametric form of a kind always has.
 */
function inComponents(k: WaveVector, phase: Phase): LinearForm {
  let constant = phase.constant;
  const coefficients: Rational[] = [zero, zero, zero];
  for (const letter of usedParameters(k)) {
    const amount = phase.coefficients[letter as 0 | 1 | 2];
    if (isZero(amount)) continue;
    const axis = k.components.findIndex((component) =>
      component.coefficients.every((entry, index) => (index === letter ? !isZero(entry) : isZero(entry))),
    );
    const component = k.components[axis];
    if (!component) throw new Error("a letter of k stands in no component alone");
    // letter = (component − constant) / coefficient
    const factor = divide(amount, component.coefficients[letter as 0 | 1 | 2]);
    coefficients[axis] = add(coefficients[axis] as Rational, factor);
    constant = add(constant, negate(multiply(factor, component.constant)));
  }
  return {
    constant,
    coefficients: vectorOf(coefficients[0] ?? zero, coefficients[1] ?? zero, coefficients[2] ?? zero),
  };
}
