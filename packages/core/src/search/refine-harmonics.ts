import { gaussNewton, type WeightedResiduals } from "../algorithms/index.js";
import type { WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import { multipleOf } from "./derived-vectors.js";
import type { Explanation, PeakModel } from "./explanation.js";
import type { TunedSet } from "./tuned-set.js";
import { tuningCharge } from "./tuning-charge.js";

/** Rounds of assigning and refining; they settle within a few. */
const mostRounds = 10;

/** A vector and its harmonics, refined together. */
export interface RefinedHarmonics {
  readonly k: WaveVector;
  /** Of k itself and of each order asked for. */
  readonly explanations: readonly Explanation[];
  /** The charge for tuning the letters against all orders; null without letters, or where they were not refined. */
  readonly tuning: (set: TunedSet | null) => number | null;
}

/**
 * Least squares of the letters of k against the peaks on its own lines and on those of m·k for the given orders, since a
 * harmonic moves m times as far as k. A peak on lines of both counts where it is nearer. The corrections stay as they are.
 */
export function refineHarmonics(
  model: PeakModel,
  start: WaveVector,
  orders: readonly number[],
  corrections: readonly number[],
): RefinedHarmonics {
  let k = start;
  let explanations = explain(model, k, orders, corrections);
  for (let round = 0; round < mostRounds && (k.values ?? []).length > 0; round++) {
    const next = fitted(model, k, orders, explanations, corrections);
    if (next === null) break;
    const explained = explain(model, next, orders, corrections);
    if (matchedBy(explained) < matchedBy(explanations)) break;
    const settled = next.values?.every((value, letter) => value === k.values?.[letter]);
    k = next;
    explanations = explained;
    if (settled === true) break;
  }
  return {
    k,
    explanations,
    tuning: (set) =>
      set === null
        ? null
        : tuningCharge(set, jointEquations(model, k, orders, explanations, corrections, k.values ?? []).jacobian),
  };
}

function explain(
  model: PeakModel,
  k: WaveVector,
  orders: readonly number[],
  corrections: readonly number[],
): readonly Explanation[] {
  return [1, ...orders].map((order) => model.explain(order === 1 ? k : multipleOf(k, order), corrections));
}

function matchedBy(explanations: readonly Explanation[]): number {
  return new Set(explanations.flatMap(({ assignments }) => assignments.map(({ peak }) => peak))).size;
}

/** The peaks of each order that no other order explains better, as equations for the letters of k. */
function jointEquations(
  model: PeakModel,
  k: WaveVector,
  orders: readonly number[],
  explanations: readonly Explanation[],
  corrections: readonly number[],
  letters: readonly number[],
): WeightedResiduals {
  const count = letters.length;
  const columns = count + corrections.length;
  const values = Float64Array.from([...letters, ...corrections]);
  const parts = [1, ...orders].map((order, index) =>
    model.equations(order === 1 ? k : multipleOf(k, order), ownAssignments(explanations, index), values),
  );
  return {
    residuals: Float64Array.from(parts.flatMap((part) => [...part.residuals])),
    jacobian: Float64Array.from(
      parts.flatMap((part) =>
        Array.from(part.residuals, (_, row) => [...part.jacobian.slice(row * columns, row * columns + count)]).flat(),
      ),
    ),
  };
}

function ownAssignments(explanations: readonly Explanation[], index: number): Explanation["assignments"] {
  return (explanations[index] as Explanation).assignments.filter(
    ({ peak, residual }) =>
      !explanations.some(({ assignments }, other) =>
        assignments.some(
          (one) =>
            one.peak === peak &&
            (Math.abs(one.residual) < Math.abs(residual) || (one.residual === residual && other < index)),
        ),
      ),
  );
}

function fitted(
  model: PeakModel,
  k: WaveVector,
  orders: readonly number[],
  explanations: readonly Explanation[],
  corrections: readonly number[],
): WaveVector | null {
  const letters = (k.values ?? []).length;
  const fit = gaussNewton([...(k.values ?? [])], (trial) =>
    jointEquations(model, k, orders, explanations, corrections, [...trial]),
  );
  if (fit === null) return null;
  return {
    components: k.components,
    values: Array.from(fit.parameters, (value) => roundNumber(value)),
    uncertainties: Array.from(fit.parameters, (_, letter) =>
      roundNumber(Math.sqrt(fit.covariance[letter * (letters + 1)] as number)),
    ),
  };
}
