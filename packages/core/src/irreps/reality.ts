import type { WaveVector } from "../kvectors/index.js";
import {
  addCyclotomic,
  addVectors,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicToRational,
  cyclotomicZero,
  equalCyclotomic,
  isConstantForm,
  type LinearForm,
  multiplyCyclotomic,
  reduceOrder,
  rootOfUnity,
} from "../numbers/index.js";
import { composeOperators, invertOperator, type SymmetryOperator } from "../spacegroups/index.js";
import { rotateColumn, translationColumn, waveTimesColumn } from "./setting.js";
import type { Reality } from "./types.js";

/**
 * What the test of reality needs: operators about the mean origin of the little co-group (so that every phase is a
 * short root of unity), the little group's element number of a rotation, and the reversing operators (kR ≡ −k).
 */
export interface RealityContext {
  readonly k: WaveVector;
  readonly elements: readonly SymmetryOperator[];
  readonly reversing: readonly SymmetryOperator[];
  readonly elementOf: (operator: SymmetryOperator) => number;
}

/**
 * Herring's test (Phys. Rev. 52 (1937) 361): `(1/n) Σ χ(h²)` over one h per coset with `kR ≡ −k` is 1, −1 or 0 for the
 * irrep of the whole space group being real, pseudoreal or complex.
 *
 * @param character characters of Δ by element number
 */
export function herringReality(context: RealityContext, character: readonly Cyclotomic[]): Reality {
  let sum = cyclotomicZero;
  for (const operator of context.reversing) {
    const square = composeOperators(operator, operator);
    const translation = addVectors(rotateColumn(operator, translationColumn(operator)), translationColumn(operator));
    const phase = constantTurns(waveTimesColumn(context.k, translation));
    sum = addCyclotomic(sum, multiplyCyclotomic(phase, character[context.elementOf(square)] as Cyclotomic));
  }
  const value = cyclotomicToRational(reduceOrder(sum));
  const count = context.elements.length;
  if (value?.[1] === 1 && value[0] === count) return "real";
  if (value?.[1] === 1 && value[0] === -count) return "pseudoreal";
  if (value?.[0] === 0) return "complex";
  throw new Error("Herring's sum is none of 1, -1 and 0");
}

/**
 * Characters, by element number, of the irrep `D(g₀⁻¹ g g₀)*` of the same little group, g₀ the first reversing
 * operator: the irrep to which the complex conjugate belongs.
 */
export function conjugateCharacter(context: RealityContext, character: readonly Cyclotomic[]): Cyclotomic[] {
  const [reverse] = context.reversing;
  if (!reverse) throw new Error("−k is not in the star");
  const back = invertOperator(reverse);
  return context.elements.map((element) => {
    const image = composeOperators(composeOperators(back, element), reverse);
    const together = addVectors(translationColumn(image), translationColumn(element));
    const phase = conjugateCyclotomic(constantTurns(waveTimesColumn(context.k, together)));
    return multiplyCyclotomic(phase, conjugateCyclotomic(character[context.elementOf(image)] as Cyclotomic));
  });
}

export function sameCharacter(a: readonly Cyclotomic[], b: readonly Cyclotomic[]): boolean {
  return a.every((value, index) => equalCyclotomic(value, b[index] as Cyclotomic));
}

/** e^{2πi·form} of a form whose letters cancel, as they do wherever k meets −k. */
function constantTurns(form: LinearForm): Cyclotomic {
  if (!isConstantForm(form)) throw new Error("a phase between k and −k depends on a free parameter");
  return rootOfUnity(form.constant);
}
