import type { WorkHost } from "../algorithms/index.js";
import { type MomentSpace, type ScatteringGeometry, scatteringGeometry } from "../diffraction/index.js";
import { roundNumber } from "../numbers/index.js";
import type { BoundedFit } from "./bounded-fit.js";
import { commonPhaseDirection, withChosenPhase } from "./common-phase.js";
import { type FitCovariance, fitCovariance, propagated } from "./fit-covariance.js";
import type { DataFrame, FitForms } from "./fit-forms.js";
import { calculated, type FitLayout, fitLayout, readParameters, residualModel } from "./fit-model.js";
import { fittedMoments, largestMoments } from "./moments.js";
import { boundsOf, type Minima, multiStart } from "./multi-start.js";
import { profileUncertainty } from "./profile-uncertainty.js";
import { normalNumbers, seededNumbers } from "./random.js";
import type {
  DomainFraction,
  FittedAmplitude,
  FittedMinimum,
  IntensityData,
  WeighedCandidate,
  WeighOptions,
} from "./types.js";

/** A candidate's fit before it is compared with others. */
export interface OneFit {
  readonly space: MomentSpace;
  readonly forms: FitForms;
  readonly layout: FitLayout;
  readonly minima: Minima;
  readonly result: Omit<WeighedCandidate, "rank" | "amplitudes" | "sameAs" | "identicalTo" | "separations">;
  /**
   * The amplitudes with their uncertainties. With `follow` those that derivatives say nothing of are followed one by one,
   * which takes many fits and is for the candidates that matter.
   */
  readonly amplitudes: (follow: boolean) => readonly FittedAmplitude[];
}

/** Fits one candidate and works out what is said of it. */
export async function weighOne(
  frame: DataFrame,
  space: MomentSpace,
  forms: FitForms,
  options: WeighOptions,
  host: WorkHost,
): Promise<OneFit> {
  const { data } = frame;
  const layout = fitLayout(forms, data, options.domains === "free");
  const minima = await multiStart(forms, layout, data, { ...options, from: options.from[space.id] ?? null }, host);
  const parameters = Float64Array.from(minima.best.parameters);
  parameters.set(withChosenPhase(space, parameters));
  const model = residualModel(forms, layout, data);
  const steps = stepSizes(layout, parameters);
  const covariance = fitCovariance(model(parameters), layout.size, steps);
  const here = sightOf(space, parameters, covariance);
  const generic = genericSight(space, layout, parameters, steps, model, options.seed);
  const rank = Math.max(here.rank, generic.rank);
  const seen = space.basis.map((_, index) => isSeen(generic, index));
  const { amplitudes, fractions, scale } = readParameters(layout, parameters);
  const { values } = calculated(forms, layout, parameters);
  const count = data.data.length;
  const relative = isRelative(layout, data);
  const geometry: ScatteringGeometry = scatteringGeometry(frame.group, frame.cell);
  const moments = fittedMoments(frame.group, geometry, space, amplitudes, covariance, here.unseen, relative);
  const rFactor = rFactorOf(data, values);
  const chiSquared = minima.best.chiSquared;
  const largestIntensity = Math.max(...values, 0);
  return {
    space,
    forms,
    layout,
    minima,
    result: {
      id: space.id,
      chiSquared: roundNumber(chiSquared, count),
      reducedChiSquared: count > rank ? roundNumber(chiSquared / (count - rank), 1) : null,
      rFactor: roundNumber(rFactor, 1),
      parameters: rank,
      criterion: roundNumber(chiSquared + rank * Math.log(count), count),
      freePhase: commonPhaseDirection(space, parameters) !== null,
      moments,
      factorToLimit: relative ? factorToLimit(moments) : null,
      scale: relative ? null : roundNumber(scale),
      scaleUncertainty: layout.fitsScale
        ? roundNumber(propagated(covariance, unitVector(layout.size, layout.size - 1)))
        : null,
      domains: domainFractions(forms, layout, fractions, parameters, covariance, steps),
      calculated: Array.from(values, (value) => roundNumber(value, largestIntensity)),
      covariance: Array.from({ length: layout.amplitudes }, (_, row) =>
        Array.from({ length: layout.amplitudes }, (__, column) =>
          roundNumber(covariance.matrix[row * layout.size + column] as number),
        ),
      ),
      minima: differentMinima(space, seen.every(Boolean) ? minima.equals : [minima.best], layout, model, (values) =>
        sizesOfMinimum(frame, geometry, space, values, relative),
      ),
      hits: minima.hits,
      starts: minima.starts,
    },
    amplitudes: (follow) =>
      fittedAmplitudes(space, layout, parameters, covariance, model, chiSquared, { here, generic, follow }),
  };
}

function rFactorOf({ data }: IntensityData, values: Float64Array): number {
  let [observed, residue] = [0, 0];
  data.forEach((one, index) => {
    if (one.holds === "nuclear") return;
    observed += Math.abs(one.observed);
    residue += Math.abs(one.observed - (values[index] as number));
  });
  return observed > 0 ? residue / observed : 0;
}

/** Relative to the largest. Minima whose amplitudes agree within this but for signs are one. */
const sameAmplitudes = 1e-2;

const mostMinima = 8;

function differentMinima(
  space: MomentSpace,
  fits: readonly BoundedFit[],
  layout: FitLayout,
  model: ReturnType<typeof residualModel>,
  sizes: (amplitudes: readonly number[]) => Pick<FittedMinimum, "largest" | "aboveLimit">,
): FittedMinimum[] {
  const kept: FittedMinimum[] = [];
  for (const { parameters, chiSquared } of fits) {
    if (kept.length === mostMinima) break;
    const own = Float64Array.from(parameters);
    own.set(withChosenPhase(space, parameters));
    const amplitudes = Array.from(own.subarray(0, layout.amplitudes));
    const scale = Math.max(...amplitudes.map(Math.abs), 0);
    const known = kept.some((other) =>
      other.amplitudes.every(
        (value, index) => Math.abs(Math.abs(value) - Math.abs(amplitudes[index] as number)) <= sameAmplitudes * scale,
      ),
    );
    if (known) continue;
    const covariance = fitCovariance(model(own), layout.size, stepSizes(layout, own));
    kept.push({
      chiSquared: roundNumber(chiSquared, layout.size),
      amplitudes: amplitudes.map((value) => roundNumber(value, scale)),
      ...sizes(amplitudes),
      uncertainties: amplitudes.map((_, index) =>
        roundNumber(propagated(covariance, unitVector(layout.size, index)), scale),
      ),
    });
  }
  return kept;
}

function sizesOfMinimum(
  { group }: DataFrame,
  geometry: ScatteringGeometry,
  space: MomentSpace,
  amplitudes: readonly number[],
  relative: boolean,
): Pick<FittedMinimum, "largest" | "aboveLimit"> {
  const sizes = largestMoments(group, geometry, space, amplitudes);
  const scale = Math.max(...sizes, 0);
  const limits = space.atoms.map(({ formFactor }) => formFactor.largestMoment);
  return {
    largest: sizes.map((size) => roundNumber(size, scale)),
    aboveLimit: !relative && sizes.some((size, atom) => size > (limits[atom] ?? Number.POSITIVE_INFINITY)),
  };
}

function unitVector(size: number, index: number): Float64Array {
  const unit = new Float64Array(size);
  unit[index] = 1;
  return unit;
}

/** Sizes are relative where neither a scale nor nuclear lines are there. */
export function isRelative(layout: FitLayout, data: IntensityData): boolean {
  return data.scale === null && !layout.fitsScale;
}

function stepSizes(layout: FitLayout, parameters: Float64Array): Float64Array {
  const size = Math.hypot(...parameters.subarray(0, layout.amplitudes)) || 1;
  return Float64Array.from({ length: layout.size }, (_, index) =>
    index < layout.amplitudes
      ? size
      : index < layout.amplitudes + layout.fractions
        ? 1
        : (parameters[index] as number) || 1,
  );
}

/** Directions that the data do not see, the common phase aside, and how many they see. */
interface Sight {
  readonly rank: number;
  readonly unseen: readonly Float64Array[];
}

/** At a random point: at a minimum with an amplitude of 0 fewer may be seen, and on a circle of equal fits others. */
function genericSight(
  space: MomentSpace,
  layout: FitLayout,
  parameters: Float64Array,
  steps: Float64Array,
  model: ReturnType<typeof residualModel>,
  seed: number,
): Sight {
  const uniform = seededNumbers(seed + 7919);
  const normal = normalNumbers(uniform);
  const point = parameters.map((value, index) =>
    index < layout.amplitudes
      ? normal() * (steps[index] as number)
      : index < layout.amplitudes + layout.fractions
        ? 0.2 + 0.6 * uniform()
        : value,
  );
  return sightOf(space, point, fitCovariance(model(point), layout.size, steps));
}

function sightOf(space: MomentSpace, parameters: Float64Array, { rank, unseen }: FitCovariance): Sight {
  const gauge = commonPhaseDirection(space, parameters);
  return { rank, unseen: unseen.map((direction) => withoutGauge(direction, gauge)) };
}

/** Share of an unseen direction above which an amplitude counts as not determined. */
const shareUnseen = 0.05;

function isSeen({ unseen }: Sight, index: number): boolean {
  return unseen.every((direction) => Math.abs(direction[index] as number) < shareUnseen);
}

/** Above this number of amplitudes small ones are not followed one by one. */
const mostProfiled = 12;

function fittedAmplitudes(
  space: MomentSpace,
  layout: FitLayout,
  parameters: Float64Array,
  covariance: FitCovariance,
  model: ReturnType<typeof residualModel>,
  chiSquared: number,
  sights: { readonly here: Sight; readonly generic: Sight; readonly follow: boolean },
): FittedAmplitude[] {
  const gauge = commonPhaseDirection(space, parameters);
  const scale = Math.max(...parameters.subarray(0, layout.amplitudes).map(Math.abs), 0);
  return space.basis.map(({ label }, index) => {
    const value = parameters[index] as number;
    const linear = propagated(covariance, unitVector(layout.size, index));
    const seen = isSeen(sights.generic, index);
    // Near 0, and where two solutions meet, the square decides and not the derivative.
    const flat = gauge === null && (linear > Math.abs(value) || !isSeen(sights.here, index));
    const followed = sights.follow && seen && flat && layout.amplitudes <= mostProfiled;
    const uncertainty = followed
      ? profileUncertainty(index, parameters, chiSquared, boundsOf(layout), model, scale)
      : linear <= scale && isSeen(sights.here, index)
        ? linear
        : null;
    // What was followed and has no end is not determined; what was not followed is only not known.
    const determined = seen && !(followed && uncertainty === null);
    return {
      label,
      value: roundNumber(value, scale),
      uncertainty: determined && uncertainty !== null ? roundNumber(uncertainty, scale) : null,
      determined,
    };
  });
}

function withoutGauge(direction: Float64Array, gauge: Float64Array | null): Float64Array {
  if (gauge === null) return direction;
  const along = gauge.reduce((sum, entry, index) => sum + entry * (direction[index] as number), 0);
  return direction.map((entry, index) => entry - along * (gauge[index] ?? 0));
}

function domainFractions(
  forms: FitForms,
  layout: FitLayout,
  fractions: Float64Array,
  parameters: Float64Array,
  covariance: FitCovariance,
  steps: Float64Array,
): DomainFraction[] {
  if (forms.domains.length < 2) return [];
  const total = parameters
    .subarray(layout.amplitudes, layout.amplitudes + layout.fractions)
    .reduce((sum, value) => sum + value, 0);
  return forms.domains.map((alike, domain) => {
    const gradient = new Float64Array(layout.size);
    for (let other = 0; other < layout.fractions; other++)
      gradient[layout.amplitudes + other] = (Number(other === domain) - (fractions[domain] as number)) / (total || 1);
    return {
      operator: alike[0] as number,
      alike,
      fraction: roundNumber(fractions[domain] as number, 1),
      uncertainty:
        layout.fractions === 0 || isOpen(gradient, covariance, steps)
          ? null
          : roundNumber(propagated(covariance, gradient), 1),
    };
  });
}

/** Share of a gradient along a direction that the data do not see, above which the quantity is not determined. */
const openShare = 1e-3;

/** Whether a quantity changes along what the data do not see. */
function isOpen(gradient: Float64Array, { unseen }: FitCovariance, steps: Float64Array): boolean {
  const scaled = gradient.map((entry, index) => entry * (steps[index] as number));
  const size = Math.hypot(...scaled);
  return unseen.some((direction) => {
    const along = direction.reduce((sum, entry, index) => sum + entry * (scaled[index] as number), 0);
    return Math.abs(along) > openShare * size;
  });
}

/** What takes the largest moment in units of its limit to 1. */
function factorToLimit(moments: OneFit["result"]["moments"]): number | null {
  if (moments.some(({ limit }) => limit === null || limit === 0)) return null;
  const largest = Math.max(...moments.map(({ largest: own, limit }) => own / (limit as number)));
  return largest > 0 ? roundNumber(1 / largest) : null;
}
