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
  const steps = neighbourSteps(dual.rows, form.denominator);
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
  const [a, b, c] = (best as readonly number[]).map((entry) => rational(entry, safe(form.denominator * dual.denominator)));
  return exactWaveVector([a as Rational, b as Rational, c as Rational]);
}

/** The dual of the primitive basis in the setting's reciprocal axes, as integer rows over one denominator. */
function dualBasis(group: SpaceGroup): { rows: number[][]; denominator: number } {
  const unit = (index: number): readonly Rational[] =>
    fromPrimitiveRow(group.lattice, [rational(index === 0 ? 1 : 0), rational(index === 1 ? 1 : 0), rational(index === 2 ? 1 : 0)]);
  const { numerators, denominator } = overCommonDenominator([0, 1, 2].flatMap(unit));
  return { rows: [numerators.slice(0, 3), numerators.slice(3, 6), numerators.slice(6, 9)], denominator };
}

/** The remainder in (−modulus/2, modulus/2]. */
function centred(value: number, modulus: number): number {
  const rest = modulo(value, modulus);
  return 2 * rest > modulus ? rest - modulus : rest;
}

function combine(weights: readonly number[], rows: readonly (readonly number[])[]): number[] {
  return [0, 1, 2].map((axis) => safe(weights.reduce((sum, weight, index) => sum + weight * (rows[index]?.[axis] as number), 0)));
}

/** Vectors of L* with primitive components −2 … 2, in the integer units of the search. */
function neighbourSteps(rows: readonly (readonly number[])[], denominator: number): number[][] {
  const range = [-2, -1, 0, 1, 2];
  return range.flatMap((a) =>
    range.flatMap((b) => range.map((c) => combine([a * denominator, b * denominator, c * denominator], rows))),
  );
}

/** Goes to the plainest neighbour until there is none. */
function descend(start: readonly number[], steps: readonly (readonly number[])[]): readonly number[] {
  let best = start;
  for (;;) {
    const from = best;
    for (const step of steps) {
      const next = from.map((entry, axis) => entry + (step[axis] as number));
      if (plainer(next, best)) best = next;
    }
    if (best === from) return best;
  }
}

function plainer(a: readonly number[], b: readonly number[]): boolean {
  const zeros = count(b, (entry) => entry !== 0) - count(a, (entry) => entry !== 0);
  if (zeros !== 0) return zeros > 0;
  const squares = sumOfSquares(b) - sumOfSquares(a);
  if (squares !== 0) return squares > 0;
  const signs = count(b, (entry) => entry < 0) - count(a, (entry) => entry < 0);
  if (signs !== 0) return signs > 0;
  for (let axis = 0; axis < 3; axis++) if (a[axis] !== b[axis]) return (a[axis] as number) < (b[axis] as number);
  return false;
}

function count(row: readonly number[], test: (entry: number) => boolean): number {
  return (test(row[0] as number) ? 1 : 0) + (test(row[1] as number) ? 1 : 0) + (test(row[2] as number) ? 1 : 0);
}

function sumOfSquares(row: readonly number[]): number {
  return (row[0] as number) ** 2 + (row[1] as number) ** 2 + (row[2] as number) ** 2;
}
