import { invertUnimodular } from "../numbers/index.js";
import { pointGroupSymbol, type SpaceGroup } from "../spacegroups/index.js";
import { commonDenominator, fromIntegerForm, reciprocalDifference, rotateForm, toIntegerForm } from "./integer-form.js";
import type { LittleGroup, Star, WaveVector } from "./types.js";

/**
 * The little group of k: the operators whose rotation R obeys `k R − k ∈ L*` (equivalently `k R⁻¹ ≡ k`), for all
 * values of the parameters that k leaves open (Bradley & Cracknell, 1972, chapter 3).
 */
export function littleGroup(group: SpaceGroup, k: WaveVector): LittleGroup {
  const form = toIntegerForm(group.lattice, k);
  const operators: number[] = [];
  const shifts: [number, number, number][] = [];
  group.primitive.rotations.forEach((rotation, index) => {
    const shift = reciprocalDifference(rotateForm(form, rotation), form);
    if (shift === null) return;
    operators.push(index);
    shifts.push(shift);
  });
  return {
    operators,
    shifts,
    symbol: pointGroupSymbol(operators.map((index) => group.primitive.rotations[index] as readonly number[])),
  };
}

/**
 * The star of k. Arm i is exactly `k R⁻¹` with R of the operator `representatives[i]`, the first in the group's order
 * that reaches it; arms are distinct modulo L*.
 */
export function star(group: SpaceGroup, k: WaveVector): Star {
  const form = toIntegerForm(group.lattice, k);
  const arms = [form];
  const representatives = [0];
  const reversing: number[] = [];
  group.primitive.rotations.forEach((rotation, index) => {
    if (reciprocalDifference(form, rotateForm(form, rotation), -1) !== null) reversing.push(index);
    const image = rotateForm(form, invertUnimodular(rotation));
    if (arms.some((arm) => reciprocalDifference(image, arm) !== null)) return;
    arms.push(image);
    representatives.push(index);
  });
  const equivalent = reciprocalDifference(form, form, -1) !== null;
  return {
    arms: arms.map((arm) => fromIntegerForm(group, arm, k)),
    representatives,
    minusK: equivalent ? "equivalent" : reversing.length > 0 ? "in star" : "not in star",
    reversing,
  };
}

/** Whether two wave vectors differ by a vector of L*, for all values of open parameters. */
export function equivalentWaveVectors(group: SpaceGroup, a: WaveVector, b: WaveVector): boolean {
  const [left, right] = commonDenominator(toIntegerForm(group.lattice, a), toIntegerForm(group.lattice, b));
  return reciprocalDifference(left, right) !== null;
}

/** Whether 2k is a vector of L*, so that k ≡ −k and real Fourier components describe the order. */
export function isHalfLattice(group: SpaceGroup, k: WaveVector): boolean {
  const form = toIntegerForm(group.lattice, k);
  return reciprocalDifference(form, form, -1) !== null;
}
