import { type Problem, problem } from "../errors/index.js";
import {
  exactComponents,
  isReciprocalLatticeVector,
  manifold,
  specialPoints,
  star,
  type WaveVector,
} from "../kvectors/index.js";
import {
  chiSquaredStandardDeviations,
  matchStandardUncertainties,
  roundNumber,
  sameLineInverseAngstrom,
} from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { evidenceOf } from "./evidence.js";
import type { Explanation, PeakModel } from "./explanation.js";
import { nearFractions } from "./near-fractions.js";
import { type Refined, refineWaveVector } from "./refine.js";
import { type TunedSet, tunedSet } from "./tuned-set.js";
import { tuningCharge } from "./tuning-charge.js";
import type { Candidate, EvidenceCharges, ResidualStatistics } from "./types.js";

/** What a candidate is charged for the search that led to it. */
export type SearchCharges = Pick<EvidenceCharges, "dimensions" | "kinds">;

/** A candidate before it is compared with the others, with what it predicts. */
export interface Weighed {
  readonly candidate: Candidate;
  readonly explanation: Explanation;
}

/** Weighs one k after another; `charges` are those of the search, null for a k that was given. */
export type Weigher = (start: WaveVector, charges: SearchCharges | null) => Weighed;

/**
 * Refines k, weighs it against the peaks and describes it. Of a k that was given, a special point is charged like the
 * search over the points, so that both give one value, and any other k nothing but the tuning of its letters. What
 * depends on the kind of k alone is worked out once for all k with the same `components` record.
 */
export function weigher(group: SpaceGroup, model: PeakModel): Weigher {
  const kinds = new WeakMap<WaveVector["components"], { arms: number; onNuclearLines: boolean }>();
  const kindOf = (k: WaveVector) => {
    const known = kinds.get(k.components);
    if (known !== undefined) return known;
    const made = {
      arms: star(group, k).arms.length,
      onNuclearLines: isNuclear(group, k),
    };
    kinds.set(k.components, made);
    return made;
  };
  return (start, charges) => {
    const refined = refineWaveVector(model, start);
    const { k, explanation, refinement, corrections } = refined;
    const kind = kindOf(k);
    const flat = manifold(group, k, { withInversion: true });
    const tuning = tuningOf(group, model, refined, charges !== null);
    const letters = refinement?.determined ? (k.values ?? []).length : 0;
    const residuals = statisticsOf(explanation, letters + corrections.length);
    const candidate: Candidate = {
      k,
      manifold: flat,
      arms: kind.arms,
      onNuclearLines: kind.onNuclearLines,
      evidence: evidenceOf(
        explanation.logOdds,
        {
          ...(charges ?? chargesOfGiven(group, flat.dimension)),
          tuning,
        },
        spareObservations(explanation, k),
      ),
      matched: explanation.assignments.length,
      total: model.total,
      deWolff: explanation.deWolff,
      smithSnyder: explanation.smithSnyder,
      nearFractions: nearFractions(k),
      tiedWith: [],
      assignments: explanation.assignments,
      unmatched: explanation.unmatched,
      residuals,
      refinement,
      corrections,
      region: null,
      merged: [],
      separations: [],
      warnings: [...warningsOf(refined, residuals), ...sharedLineWarning(explanation)],
    };
    return { candidate, explanation };
  };
}

/** One k on its own. */
export function weigh(group: SpaceGroup, model: PeakModel, start: WaveVector, charges: SearchCharges | null): Weighed {
  return weigher(group, model)(start, charges);
}

/** Matched numbers beyond the letters; a single peak, of a powder or with three indices, has none to spare. */
function spareObservations({ assignments, observations }: Explanation, k: WaveVector): number {
  return assignments.length < 2 ? 0 : observations - (k.values ?? []).length;
}

function chargesOfGiven(group: SpaceGroup, dimension: number): SearchCharges {
  return { dimensions: 0, kinds: dimension === 0 ? Math.log(specialPoints(group).length) : 0 };
}

function isNuclear(group: SpaceGroup, k: WaveVector): boolean {
  const components = exactComponents(k);
  return components !== null && isReciprocalLatticeVector(group, components);
}

function tuningOf(
  group: SpaceGroup,
  model: PeakModel,
  { k, explanation, refinement, corrections }: Refined,
  searched: boolean,
): number {
  // A given k that nothing moved was not tuned; one that a search came to was, however little the peaks fix it.
  if (refinement === null ? corrections.length === 0 : !refinement.determined && !searched) return 0;
  const values = [...(k.values ?? []), ...corrections.map(({ value }) => value)];
  const { jacobian } = model.equations(k, explanation.assignments, Float64Array.from(values));
  const set = refinement === null ? isolated : tunedSet(group, k, model.metric, 2 * model.tolerance);
  return tuningCharge(
    set,
    jacobian,
    corrections.map(({ limit }) => 2 * limit),
  );
}

/** A special point: nothing to tune. */
const isolated: TunedSet = { dimension: 0, gram: new Float64Array(0), volume: 1, coincidentImages: 1 };

function statisticsOf(explanation: Explanation, refinedParameters: number): ResidualStatistics {
  const degreesOfFreedom = explanation.observations - refinedParameters;
  return {
    rootMeanSquare: roundNumber(explanation.rootMeanSquare),
    largest: roundNumber(explanation.largest),
    chiSquared: roundNumber(explanation.chiSquared),
    degreesOfFreedom,
    reducedChiSquared: degreesOfFreedom > 0 ? roundNumber(explanation.chiSquared / degreesOfFreedom) : null,
  };
}

/**
 * Two peaks that are too far apart to be one line, and yet have only one and the same line within their tolerance: one
 * of them is something else.
 */
function sharedLineWarning({ assignments, uncertainties }: Explanation): readonly Problem[] {
  const single = assignments.filter(
    ({ residualHkl, alternatives }) => residualHkl === null && alternatives.length === 0,
  );
  const shared = single.filter((one) =>
    single.some((other) => {
      if (Math.abs(other.q - one.q) > sameLineInverseAngstrom) return false;
      const combined = Math.hypot(uncertainties.get(one.peak) ?? 0, uncertainties.get(other.peak) ?? 0);
      return Math.abs(one.residual - other.residual) > matchStandardUncertainties * combined;
    }),
  );
  if (shared.length === 0) return [];
  const peaks = shared.map(({ peak }) => peak + 1).join(", ");
  return [
    problem("shared-line", `peaks ${peaks} are too far apart to be one line, and have no line each`, {
      expected: "a line of this k for each peak",
      found: `${new Set(shared.map(({ q }) => q)).size} for ${shared.length} peaks`,
      remedy: "some of them are something else: look at them again, or leave out what may be an impurity",
    }),
  ];
}

function warningsOf({ refinement }: Refined, residuals: ResidualStatistics): readonly Problem[] {
  const warnings: Problem[] = [];
  if (refinement !== null && !refinement.determined)
    warnings.push(
      problem("k-not-determined", "the matched peaks do not fix the free components of k, which were left as given", {
        expected: "matched peaks whose positions depend on every free component, at least as many as there are",
        found: `${residuals.degreesOfFreedom} matched positions`,
        remedy: "give a wider tolerance, more peaks, or a k closer to the true one",
      }),
    );
  const { degreesOfFreedom: freedom, reducedChiSquared: reduced } = residuals;
  const limit = 1 + chiSquaredStandardDeviations * Math.sqrt(2 / Math.max(1, freedom));
  if (reduced !== null && reduced > limit)
    warnings.push(
      problem(
        "uncertainties-understated",
        `χ² per degree of freedom is ${reduced.toFixed(1)}: the peaks scatter more than their uncertainties say`,
        {
          expected: `at most ${limit.toFixed(1)} for ${freedom} degrees of freedom`,
          found: reduced.toFixed(2),
          remedy: `multiply the uncertainties by ${Math.sqrt(reduced).toFixed(1)}, or check the zero shift and the cell`,
        },
      ),
    );
  return warnings;
}
