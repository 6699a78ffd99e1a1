import {
  add,
  addVectors,
  dot,
  isInteger,
  multiply,
  type Rational,
  type RationalVector,
  rational,
  rowTimes,
  subtract,
  subtractVectors,
} from "../numbers/index.js";
import {
  composeOperators,
  invertOperator,
  isLatticeVector,
  type Lattice,
  rotationOf,
  type SymmetryOperator,
  translationOf,
} from "../spacegroups/index.js";

/**
 * A magnetic superspace operator of a structure with one wave vector k: beside `{R|t}` and the time reversal it acts on
 * the phase `x₄ = k·x` as `x₄' = ε x₄ + H·x + δ`, where `k R = ε k + H` (docs/conventions.md, Superspace; J. M.
 * Perez-Mato and others, J. Phys.: Condens. Matter 24 (2012) 163201). Axes are the parent's, H a row of reciprocal
 * components.
 */
export interface SuperspaceOperator {
  readonly operator: SymmetryOperator;
  readonly timeReversal: 1 | -1;
  readonly epsilon: 1 | -1;
  /** H, a vector of the reciprocal lattice: zero but for k on a face of its zone. */
  readonly shift: RationalVector;
  /** δ in turns. */
  readonly delta: Rational;
}

/**
 * The product `a b`, `b` acting first; nothing is reduced: `ε = ε₁ε₂`, `H = ε₁H₂ + H₁R₂`, `δ = ε₁δ₂ + H₁·t₂ + δ₁`.
 */
export function composeSuperspace(a: SuperspaceOperator, b: SuperspaceOperator): SuperspaceOperator {
  const sign = rational(a.epsilon);
  const carried = rowTimes(a.shift, rotationOf(b.operator));
  return {
    operator: composeOperators(a.operator, b.operator),
    timeReversal: a.timeReversal === b.timeReversal ? 1 : -1,
    epsilon: a.epsilon === b.epsilon ? 1 : -1,
    shift: addVectors(scaled(sign, b.shift), carried),
    delta: add(add(multiply(sign, b.delta), dot(a.shift, translationOf(b.operator))), a.delta),
  };
}

/** The inverse, nothing reduced: `H' = −ε H R⁻¹`, `δ' = −ε (δ − H·R⁻¹t)`. */
export function invertSuperspace(a: SuperspaceOperator): SuperspaceOperator {
  const operator = invertOperator(a.operator);
  const sign = rational(-a.epsilon);
  const carried = rowTimes(a.shift, rotationOf(operator));
  return {
    operator,
    timeReversal: a.timeReversal,
    epsilon: a.epsilon,
    shift: scaled(sign, carried),
    delta: multiply(sign, add(a.delta, dot(a.shift, translationOf(operator)))),
  };
}

/**
 * True when the two are equal up to a translation of the lattice and whole turns of the phase. (A lattice translation
 * leaves x₄ alone: it moves the origin of the wave with the crystal.)
 */
export function sameSuperspaceOperator(lattice: Lattice, a: SuperspaceOperator, b: SuperspaceOperator): boolean {
  return (
    a.timeReversal === b.timeReversal &&
    a.epsilon === b.epsilon &&
    a.operator.rotationDenominator === b.operator.rotationDenominator &&
    a.operator.rotation.every((entry, index) => entry === b.operator.rotation[index]) &&
    subtractVectors(a.shift, b.shift).every(([numerator]) => numerator === 0) &&
    isInteger(subtract(a.delta, b.delta)) &&
    isLatticeVector(lattice, subtractVectors(translationOf(a.operator), translationOf(b.operator)))
  );
}

function scaled(factor: Rational, [x, y, z]: RationalVector): RationalVector {
  return [multiply(factor, x), multiply(factor, y), multiply(factor, z)];
}
