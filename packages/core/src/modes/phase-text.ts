import { usedParameters, type WaveVector } from "../kvectors/index.js";
import {
  exponentialText,
  formatForm,
  formatTurns,
  isConstantForm,
  isZero,
  type LinearForm,
  multiply,
  type Phase,
  type Rational,
  type RationalVector,
  rationalField,
  reducedEchelon,
  reducePhase,
  subtract,
  type VariableNames,
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
 * Rewrites a form in the letters of k in its components c: Σ x_c c has the coefficients of the form. Components of one
 * letter alone go first, so that others serve only where they must, as in (u+v, u, 0).
 */
function inComponents(k: WaveVector, phase: Phase): LinearForm {
  const letters = usedParameters(k) as readonly (0 | 1 | 2)[];
  const lettersIn = (axis: number) => letters.filter((letter) => !isZero(coefficientOf(k, axis, letter))).length;
  const alone = [0, 1, 2].filter((axis) => lettersIn(axis) === 1);
  const axes = [...alone, ...[0, 1, 2].filter((axis) => lettersIn(axis) > 1)];
  const equations = letters.map((letter) => [
    ...axes.map((axis) => coefficientOf(k, axis, letter)),
    phase.coefficients[letter],
  ]);
  const { rows, pivots } = reducedEchelon(equations, rationalField);
  if (pivots.includes(axes.length)) throw new Error("a phase depends on more than the components of k");
  let constant = phase.constant;
  const coefficients: Rational[] = [zero, zero, zero];
  pivots.forEach((pivot, index) => {
    const axis = axes[pivot] as number;
    const factor = (rows[index] as Rational[])[axes.length] as Rational;
    coefficients[axis] = factor;
    constant = subtract(constant, multiply(factor, (k.components[axis] as LinearForm).constant));
  });
  return {
    constant,
    coefficients: coefficients as unknown as RationalVector,
  };
}

function coefficientOf(k: WaveVector, axis: number, letter: 0 | 1 | 2): Rational {
  return (k.components[axis] as LinearForm).coefficients[letter];
}
