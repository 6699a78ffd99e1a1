import {
  addCyclotomic,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicToRational,
  cyclotomicZero,
  equalCyclotomic,
  type IntegerMatrix,
  type LinearForm,
  multiplyCyclotomic,
  type Rational,
  reduceOrder,
} from "../numbers/index.js";
import { constantRoot } from "./constant-root.js";
import type { LittleCoGroup } from "./little-co-group.js";
import { composePrimitive, invertPrimitive, turnsOf } from "./primitive-operators.js";
import type { Reality } from "./types.js";

/** An operator of the little group: its element number and a root of unity that belongs to its translation. */
interface PhasedElement {
  readonly element: number;
  readonly phase: Cyclotomic;
}

/**
 * What the test of reality needs, made once for all irreps. All translations are about the mean origin of the little
 * co-group, so that every phase is a short root of unity.
 */
export interface RealityContext {
  /** h² for each reversing operator h (kR ≡ −k), one per coset, with e^{2πi k·t}; empty where −k is not in the star. */
  readonly squares: readonly PhasedElement[];
  /** `g₀⁻¹ g g₀ = {R'|t'}` for each element `g = {R|t}`, g₀ the first reversing operator, with e^{2πi k·(t + t')}; else null. */
  readonly images: readonly PhasedElement[] | null;
}

/** @param kappa primitive components of k */
export function realityContext(
  kappa: readonly LinearForm[],
  coGroup: LittleCoGroup,
  reversing: readonly number[],
  elementOf: (rotation: IntegerMatrix) => number,
): RealityContext {
  const operators = reversing.map(coGroup.aboutOrigin);
  const phased = (rotation: IntegerMatrix, translation: readonly number[]): PhasedElement => ({
    element: elementOf(rotation),
    phase: constantRoot(turnsOf(kappa, translation, coGroup.originDenominator)),
  });
  const squares = operators.map((operator) => composePrimitive(operator, operator));
  const [reverse] = operators;
  const back = reverse && invertPrimitive(reverse);
  return {
    squares: squares.map(({ rotation, translation }) => phased(rotation, translation)),
    images: back
      ? coGroup.elements.map((element) => {
          const { rotation, translation } = composePrimitive(composePrimitive(back, element), reverse);
          const sum = translation.map((entry, axis) => entry + (element.translation[axis] as number));
          return phased(rotation, sum);
        })
      : null,
  };
}

/**
 * Herring's test (Phys. Rev. 52 (1937) 361): `(1/n) Σ χ(h²)` over one h per coset with `kR ≡ −k` is 1, −1 or 0 for the
 * irrep of the whole space group being real, pseudoreal or complex.
 *
 * @param character characters of Δ by element number
 */
export function herringReality({ squares }: RealityContext, character: readonly Cyclotomic[]): Reality {
  const sum = squares.reduce(
    (total, { element, phase }) => addCyclotomic(total, multiplyCyclotomic(phase, character[element] as Cyclotomic)),
    cyclotomicZero,
  );
  // A fraction that is a sum of roots of unity is whole.
  const [total] = cyclotomicToRational(reduceOrder(sum)) as Rational;
  const count = character.length;
  if (total === count) return "real";
  if (total === -count) return "pseudoreal";
  if (total === 0) return "complex";
  throw new Error("Herring's sum is none of 1, -1 and 0");
}

/**
 * Characters, by element number, of the irrep `D(g₀⁻¹ g g₀)*` of the same little group: the irrep to which the complex
 * conjugate belongs.
 */
export function conjugateCharacter(images: readonly PhasedElement[], character: readonly Cyclotomic[]): Cyclotomic[] {
  return images.map(({ element, phase }) =>
    multiplyCyclotomic(conjugateCyclotomic(phase), conjugateCyclotomic(character[element] as Cyclotomic)),
  );
}

/** Which irrep has a character: different irreps have different ones. */
export function indexOfCharacter(list: readonly (readonly Cyclotomic[])[], wanted: readonly Cyclotomic[]): number {
  const index = list.findIndex((character) =>
    character.every((value, position) => equalCyclotomic(value, wanted[position] as Cyclotomic)),
  );
  if (index < 0) throw new Error("a conjugate of an irrep is not among the irreps of its group");
  return index;
}
