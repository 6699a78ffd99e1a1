import { gaussNewton, type LeastSquares, type WeightedResiduals } from "../algorithms/index.js";
import { usedParameters, type WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import type { CorrectionLimit, Explanation, PeakModel } from "./explanation.js";
import type { Correction, Refinement } from "./types.js";

/** Assigning and refining in turn settles within a few rounds or not at all. */
const mostRounds = 20;

/** A k after refinement, with what it explains. */
export interface Refined {
  readonly k: WaveVector;
  readonly explanation: Explanation;
  /** Null for a k without letters. */
  readonly refinement: Refinement | null;
  /** The corrections of the model in its order, all zero where they could not be refined. */
  readonly corrections: readonly Correction[];
}

/** Where refinement stands. */
interface Fit {
  readonly k: WaveVector;
  readonly corrections: readonly Correction[];
  readonly converged: boolean;
}

/**
 * Refines the values of the letters of k, and with them the model's corrections, by weighted least squares against the
 * peaks that match, assigning anew until the assignment stays the same. Standard uncertainties are those of the
 * covariance, not scaled by χ². Where the matched peaks do not fix every letter nothing is moved.
 *
 * A correction stays within its limits: the width of its range counts as one observation of zero (the standard deviation
 * of a uniform distribution, limit/√3), and beyond a limit it is set to it and the rest refined again.
 */
export function refineWaveVector(model: PeakModel, start: WaveVector): Refined {
  const letters = usedParameters(start).length;
  const untouched = model.corrections.map((limit) => correctionAt(limit, 0, null));
  if (letters + untouched.length === 0)
    return { k: start, explanation: model.explain(start), refinement: null, corrections: [] };
  // The corrections are not known yet: at first a peak goes with a line that some value of them would bring to it.
  let explanation = model.explain(start, [], untouched.length > 0);
  let fit: Fit = { k: start, corrections: untouched, converged: true };
  let rounds = 0;
  for (let settled = false; !settled && rounds < mostRounds; ) {
    rounds += 1;
    const next = fitParameters(model, fit, explanation);
    if (next === null) {
      const notMoved = model.explain(start);
      const refinement = letters === 0 ? null : refinementOf(start, start, notMoved, false, false, rounds);
      return { k: start, explanation: notMoved, refinement, corrections: untouched };
    }
    const explained = model.explain(next.k, valuesOf(next.corrections));
    settled = assignmentKey(explained) === assignmentKey(explanation);
    fit = { ...next, converged: next.converged && settled };
    explanation = explained;
  }
  const { k, corrections, converged } = fit;
  const refinement = letters === 0 ? null : refinementOf(start, k, explanation, true, converged, rounds);
  return { k, explanation, refinement, corrections };
}

function valuesOf(corrections: readonly Correction[]): readonly number[] {
  return corrections.map(({ value }) => value);
}

function correctionAt({ name, limit }: CorrectionLimit, value: number, uncertainty: number | null): Correction {
  return {
    name,
    value: roundNumber(value),
    uncertainty: uncertainty === null ? null : roundNumber(uncertainty),
    limit,
  };
}

function fitParameters(model: PeakModel, { k, corrections }: Fit, explanation: Explanation): Fit | null {
  const letters = usedParameters(k).length;
  if (explanation.observations < Math.max(1, letters)) return null;
  const values = [...(k.values ?? []), ...valuesOf(corrections)];
  let free = values.map((_, index) => index);
  for (;;) {
    const fit = fitFree(model, k, explanation, values, free);
    if (fit === null) return null;
    free.forEach((parameter, position) => {
      values[parameter] = fit.parameters[position] as number;
    });
    const beyond = free.filter((parameter) => {
      const limit = model.corrections[parameter - letters]?.limit;
      return limit !== undefined && Math.abs(values[parameter] as number) > limit;
    });
    if (beyond.length === 0) return described(model, k, values, free, fit);
    for (const parameter of beyond)
      values[parameter] =
        Math.sign(values[parameter] as number) * (model.corrections[parameter - letters] as CorrectionLimit).limit;
    free = free.filter((parameter) => !beyond.includes(parameter));
    if (free.length === 0) return described(model, k, values, free, null);
  }
}

/** Least squares of the free ones among the values; the others stay. */
function fitFree(
  model: PeakModel,
  k: WaveVector,
  explanation: Explanation,
  values: readonly number[],
  free: readonly number[],
): LeastSquares | null {
  const letters = usedParameters(k).length;
  return gaussNewton(
    free.map((parameter) => values[parameter] as number),
    (trial) => {
      const all = Float64Array.from(values);
      free.forEach((parameter, position) => {
        all[parameter] = trial[position] as number;
      });
      const whole = model.equations(k, explanation.assignments, all);
      return withRanges(chosenColumns(whole, values.length, free), model, all, letters, free);
    },
  );
}

function chosenColumns(whole: WeightedResiduals, size: number, free: readonly number[]): WeightedResiduals {
  if (free.length === size) return whole;
  const rows = whole.residuals.length;
  const jacobian = new Float64Array(rows * free.length);
  for (let row = 0; row < rows; row++)
    free.forEach((parameter, position) => {
      jacobian[row * free.length + position] = whole.jacobian[row * size + parameter] as number;
    });
  return { residuals: whole.residuals, jacobian };
}

/** One observation of zero for each free correction. */
function withRanges(
  equations: WeightedResiduals,
  model: PeakModel,
  values: Float64Array,
  letters: number,
  free: readonly number[],
): WeightedResiduals {
  const ranged = free.flatMap((parameter, position) => (parameter < letters ? [] : [{ parameter, position }]));
  if (ranged.length === 0) return equations;
  const rows = equations.residuals.length;
  const residuals = new Float64Array(rows + ranged.length);
  const jacobian = new Float64Array((rows + ranged.length) * free.length);
  residuals.set(equations.residuals);
  jacobian.set(equations.jacobian);
  ranged.forEach(({ parameter, position }, index) => {
    const deviation = (model.corrections[parameter - letters] as CorrectionLimit).limit / Math.sqrt(3);
    residuals[rows + index] = -(values[parameter] as number) / deviation;
    jacobian[(rows + index) * free.length + position] = 1 / deviation;
  });
  return { residuals, jacobian };
}

function described(
  model: PeakModel,
  k: WaveVector,
  values: readonly number[],
  free: readonly number[],
  fit: LeastSquares | null,
): Fit {
  const letters = usedParameters(k).length;
  const uncertaintyOf = (parameter: number): number | null => {
    const position = free.indexOf(parameter);
    return position < 0 || fit === null ? null : Math.sqrt(fit.covariance[position * (free.length + 1)] as number);
  };
  const indices = values.map((_, index) => index);
  return {
    k:
      letters === 0
        ? k
        : {
            components: k.components,
            values: values.slice(0, letters).map((value) => roundNumber(value)),
            uncertainties: indices.slice(0, letters).map((index) => roundNumber(uncertaintyOf(index) as number)),
          },
    corrections: model.corrections.map((limit, index) =>
      correctionAt(limit, values[letters + index] as number, uncertaintyOf(letters + index)),
    ),
    converged: fit?.converged ?? true,
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
