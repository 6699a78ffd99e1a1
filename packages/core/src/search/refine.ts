import { gaussNewton } from "../algorithms/index.js";
import { usedParameters, type WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import type { Explanation, PeakModel } from "./explanation.js";
import type { Refinement } from "./types.js";

/** Assigning and refining in turn settles within a few rounds or not at all. */
const mostRounds = 20;

/** A k after refinement, with what it explains. */
export interface Refined {
  readonly k: WaveVector;
  readonly explanation: Explanation;
  /** Null for a k without letters. */
  readonly refinement: Refinement | null;
}

/**
 * Refines the values of the letters of k by weighted least squares against the peaks that match, assigning anew until
 * the assignment stays the same. Standard uncertainties are those of the covariance, not scaled by χ². Where the matched
 * peaks do not fix every letter nothing is moved.
 */
export function refineWaveVector(model: PeakModel, start: WaveVector): Refined {
  let explanation = model.explain(start);
  if (usedParameters(start).length === 0) return { k: start, explanation, refinement: null };
  let k = start;
  let converged = true;
  let rounds = 0;
  for (let settled = false; !settled && rounds < mostRounds; ) {
    rounds += 1;
    const fit = fitLetters(model, k, explanation);
    if (fit === null) {
      const notMoved = model.explain(start);
      return {
        k: start,
        explanation: notMoved,
        refinement: refinementOf(start, start, notMoved, false, false, rounds),
      };
    }
    const next = model.explain(fit.k);
    settled = assignmentKey(next) === assignmentKey(explanation);
    converged = fit.converged && settled;
    k = fit.k;
    explanation = next;
  }
  return { k, explanation, refinement: refinementOf(start, k, explanation, true, converged, rounds) };
}

function fitLetters(
  model: PeakModel,
  k: WaveVector,
  explanation: Explanation,
): { k: WaveVector; converged: boolean } | null {
  const letters = usedParameters(k).length;
  if (explanation.observations < letters) return null;
  const fit = gaussNewton(k.values ?? [], (values) => model.equations(k, explanation.assignments, values));
  if (fit === null) return null;
  return {
    k: {
      components: k.components,
      values: Array.from(fit.parameters, (value) => roundNumber(value)),
      uncertainties: Array.from(fit.parameters, (_, index) =>
        roundNumber(Math.sqrt(fit.covariance[index * letters + index] as number)),
      ),
    },
    converged: fit.converged,
  };
}

function assignmentKey(explanation: Explanation): string {
  return explanation.assignments.map(({ peak, h, sign, arm }) => [peak, ...h, sign, arm].join()).join(";");
}

function refinementOf(
  from: WaveVector,
  k: WaveVector,
  explanation: Explanation,
  determined: boolean,
  converged: boolean,
  rounds: number,
): Refinement {
  const freedom = explanation.observations - usedParameters(k).length;
  const reduced = freedom > 0 ? explanation.chiSquared / freedom : 0;
  const scaled = determined && reduced > 1 && k.uncertainties !== null;
  return {
    from,
    determined,
    converged,
    rounds,
    rescaledUncertainties: scaled
      ? (k.uncertainties ?? []).map((entry) => roundNumber((entry ?? 0) * Math.sqrt(reduced)))
      : null,
  };
}
