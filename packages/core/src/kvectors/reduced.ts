import { isZero, type LinearForm, rational, subtract, toNumber } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { descend, dualBasis, neighbourSteps } from "./plainest.js";
import type { WaveVector } from "./types.js";
import { parameterValues } from "./wave-vector.js";

/** Components are compared as whole millionths, so that rounding decides nothing. */
const million = 1e6;

/** A k further out than that is left as it is: its squares in millionths would not be exact. */
const furthest = 40;

/**
 * The k + H, H ∈ L*, that reads most plainly: fewest non-zero components, then smallest sum of squares, then fewest minus
 * signs. Neither the arm nor the sign of k changes; open letters count as 0. k itself where none is plainer.
 */
export function reducedRepresentative(group: SpaceGroup, k: WaveVector): WaveVector {
  const values = parameterValues(k) ?? [];
  const start = k.components.map((form) => Math.round(componentOf(form, values) * million));
  if (start.some((entry) => Math.abs(entry) > furthest * million)) return k;
  const dual = dualBasis(group);
  const steps = neighbourSteps(dual.rows.map((row) => row.map((entry) => (entry * million) / dual.denominator)));
  const plain = descend(start, steps);
  const shift = plain.map((entry, axis) =>
    rational(Math.round((((start[axis] as number) - entry) * dual.denominator) / million), dual.denominator),
  );
  if (shift.every(isZero)) return k;
  const [a, b, c] = k.components.map(
    (form, axis): LinearForm => ({
      ...form,
      constant: subtract(form.constant, shift[axis] ?? form.constant),
    }),
  );
  return { ...k, components: [a as LinearForm, b as LinearForm, c as LinearForm] };
}

function componentOf({ constant, coefficients }: LinearForm, values: readonly number[]): number {
  return coefficients.reduce(
    (sum, coefficient, letter) => (coefficient[0] === 0 ? sum : sum + toNumber(coefficient) * (values[letter] ?? 0)),
    toNumber(constant),
  );
}
