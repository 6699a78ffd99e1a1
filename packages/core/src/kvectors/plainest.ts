import { modulo, overCommonDenominator, type Rational, rational, safe } from "../numbers/index.js";
import { fromPrimitiveRow, type SpaceGroup } from "../spacegroups/index.js";
import { rotateRow, toIntegerForm } from "./integer-form.js";
import type { WaveVector } from "./types.js";
import { exactComponents, exactWaveVector } from "./wave-vector.js";

/**
 * Of all k equivalent to an exact one (other arms, −k, shifts by L*) the one that reads most plainly: fewest non-zero
 * components, then smallest sum of squares, then fewest minus signs, then first in lexicographic order. No metric
 * enters, so the choice does not depend on the cell.
 */
export function plainestRepresentative(group: SpaceGroup, k: WaveVector): WaveVector {
  if (exactComponents(k) === null) throw new TypeError("only an exact k has a plainest representative");
  const form = toIntegerForm(group.lattice, k);
  const dual = dualBasis(group);
  const steps = neighbourSteps(dual.rows.map((row) => row.map((entry) => safe(entry * form.denominator))));
  const seen = new Set<string>();
  let best: readonly number[] | null = null;
  for (const rotation of group.primitive.rotations)
    for (const sign of [1, -1]) {
      const image = rotateRow(form.base, rotation).map((entry) => centred(sign * entry, form.denominator));
      const key = image.join(" ");
      if (seen.has(key)) continue;
      seen.add(key);
      const plain = descend(combine(image, dual.rows), steps);
      if (best === null || plainer(plain, best)) best = plain;
    }
  const [a, b, c] = (best as readonly number[]).map((entry) =>
    rational(entry, safe(form.denominator * dual.denominator)),
  );
  return exactWaveVector([a as Rational, b as Rational, c as Rational]);
}

/** The dual of the primitive basis in the setting's reciprocal axes, as integer rows over one denominator. */
export interface DualBasis {
  readonly rows: readonly (readonly number[])[];
  readonly denominator: number;
}

export function dualBasis(group: SpaceGroup): DualBasis {
  const unit = (index: number): readonly Rational[] =>
    fromPrimitiveRow(group.lattice, [
      rational(index === 0 ? 1 : 0),
      rational(index === 1 ? 1 : 0),
      rational(index === 2 ? 1 : 0),
    ]);
  const { numerators, denominator } = overCommonDenominator([0, 1, 2].flatMap(unit));
  return { rows: [numerators.slice(0, 3), numerators.slice(3, 6), numerators.slice(6, 9)], denominator };
}

/** The remainder in (−modulus/2, modulus/2]. */
function centred(value: number, modulus: number): number {
  const rest = modulo(value, modulus);
  return 2 * rest > modulus ? rest - modulus : rest;
}

/** `Σ weights[i] rows[i]`. */
export function combine(weights: readonly number[], rows: readonly (readonly number[])[]): number[] {
  return [0, 1, 2].map((axis) =>
    safe(weights.reduce((sum, weight, index) => sum + weight * (rows[index]?.[axis] as number), 0)),
  );
}

/** Combinations of the rows with coefficients −2 … 2. */
export function neighbourSteps(rows: readonly (readonly number[])[]): readonly (readonly number[])[] {
  return rows.reduce<readonly (readonly number[])[]>(
    (steps, row) => steps.flatMap((step) => [-2, -1, 0, 1, 2].map((times) => combine([1, times], [step, row]))),
    [[0, 0, 0]],
  );
}

/** Goes to the plainest neighbour until there is none. */
export function descend(start: readonly number[], steps: readonly (readonly number[])[]): readonly number[] {
  let best = start;
  // One array for all neighbours; only those that are taken are kept.
  const next = [0, 0, 0];
  for (;;) {
    const from = best;
    for (const step of steps) {
      for (let axis = 0; axis < 3; axis++) next[axis] = (from[axis] as number) + (step[axis] as number);
      if (plainer(next, best)) best = [...next];
    }
    if (best === from) return best;
  }
}

/** Fewer non-zero entries, then smaller sum of squares, then fewer minus signs, then first in lexicographic order. */
export function plainer(a: readonly number[], b: readonly number[]): boolean {
  const zeros = nonZeros(b) - nonZeros(a);
  if (zeros !== 0) return zeros > 0;
  const squares = sumOfSquares(b) - sumOfSquares(a);
  if (squares !== 0) return squares > 0;
  const signs = minusSigns(b) - minusSigns(a);
  if (signs !== 0) return signs > 0;
  for (let axis = 0; axis < 3; axis++) if (a[axis] !== b[axis]) return (a[axis] as number) < (b[axis] as number);
  return false;
}

/** How many entries are not zero. */
export function nonZeros(row: readonly number[]): number {
  let count = 0;
  for (const entry of row) if (entry !== 0) count += 1;
  return count;
}

/** How many entries are negative. */
export function minusSigns(row: readonly number[]): number {
  let count = 0;
  for (const entry of row) if (entry < 0) count += 1;
  return count;
}

export function sumOfSquares(row: readonly number[]): number {
  let sum = 0;
  for (const entry of row) sum += entry * entry;
  return sum;
}
