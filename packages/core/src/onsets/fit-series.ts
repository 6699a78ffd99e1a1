import { choleskyFactor, choleskyInverse } from "../algorithms/index.js";
import { roundNumber } from "../numbers/index.js";
import {
  bestLaw,
  betaGrid,
  type LawAt,
  lawAtBeta,
  lawAtTransition,
  profileUncertainty,
  type ScanPoints,
  transitionGrid,
} from "./power-law.js";
import { chiSquaredTail, fitPolynomial, median, noiseOf } from "./statistics.js";
import type { Measured, OnsetOptions, PowerLaw, ScanSeries, SeriesOnset } from "./types.js";

/** A series with its fit and what a common fit of several needs. */
export interface FittedSeries {
  readonly onset: SeriesOnset;
  /** χ² (already divided by its scale) as a function of T_N; null without an onset. */
  readonly profile: ((transition: number) => number) | null;
}

const fewestPoints = 8;
const fewestBelow = 5;
const fewestAbove = 2;
/** Ranges of (T_N − T)/T_N that are tried, the widest first. */
const ranges = [1, 0.7, 0.5, 0.35, 0.25, 0.18, 0.12];
/** Probability of χ² below which a law does not fit its range. */
const leastProbability = 0.03;
/** In χ²: what an onset must gain beyond the usual price ln N a parameter, for T_N may lie anywhere. */
const onsetMargin = 6;

/** What a peak does with temperature, and the power law where it has an onset. */
export function fitSeries(series: ScanSeries, options: OnsetOptions = {}): FittedSeries {
  const count = series.temperatures.length;
  const undecided = (evidence: number): FittedSeries => ({
    onset: plain(series, "undecided", evidence),
    profile: null,
  });
  if (count < fewestPoints) return undecided(0);
  const given = series.uncertainties !== null;
  const [low, high] = limitsOf(series.temperatures);
  const points = series.uncertainties
    ? { temperatures: series.temperatures, values: series.values, su: series.uncertainties }
    : weighed({ temperatures: series.temperatures, values: series.values, su: scatterOf(series) }, low, high);
  const { su } = points;
  const law = bestLaw(points, low, high);
  const middle = (series.temperatures[0] as number) / 2 + (series.temperatures.at(-1) as number) / 2;
  const span = (series.temperatures.at(-1) as number) - (series.temperatures[0] as number);
  const x = series.temperatures.map((one) => (one - middle) / span);
  const [constant, line, parabola] = [0, 1, 2].map((degree) => fitPolynomial(x, series.values, su, degree));
  const price = Math.log(count);
  // Without given uncertainties, or with too small ones, the best description sets the scale.
  const scale = Math.max(
    given ? 1 : 0,
    Math.min(law.chiSquared / (count - 4), (parabola?.chiSquared ?? 0) / (count - 3)),
  );
  const gain = (chiSquared: number, parameters: number) =>
    scale === 0 ? 0 : (chiSquared - law.chiSquared) / scale - (4 - parameters) * price;
  const smooth = Math.min(...[constant, line, parabola].map((one, degree) => gain(one?.chiSquared ?? 0, degree + 1)));
  const evidence = roundNumber(Number((smooth - onsetMargin).toPrecision(6)));
  if (evidence > 0) return withLaw(series, points, { law, given, evidence, options });
  const tilt =
    ((constant?.chiSquared ?? 0) - Math.min(line?.chiSquared ?? 0, (parabola?.chiSquared ?? 0) + price * scale)) /
    (scale || 1);
  if (tilt > price + 9) return { onset: plain(series, "gradual", evidence), profile: null };
  const [level, levelSu] = [constant?.coefficients[0] ?? 0, (constant?.su[0] ?? 0) * Math.sqrt(scale)];
  return { onset: plain(series, Math.abs(level) > 4 * levelSu ? "constant" : "absent", evidence), profile: null };
}

function plain({ name }: ScanSeries, behaviour: SeriesOnset["behaviour"], evidence: number): SeriesOnset {
  return { name, behaviour, evidence, fit: null, onBackground: false };
}

/** The same for all points: from the second differences, for nothing is known of the law yet. */
function scatterOf({ values }: ScanSeries): number[] {
  const scatter = noiseOf(values);
  const size = Math.max(...values.map(Math.abs), Number.MIN_VALUE);
  return values.map(() => Math.max(scatter, 1e-9 * size));
}

/** Times by which the scatter of strong and weak points must differ before weights follow it. */
const unevenScatter = 1.6;

/**
 * Weights from the scatter about a first fit: where strong points scatter more than weak ones, as counts do, the
 * uncertainty is taken as a straight line in the intensity.
 */
function weighed(points: ScanPoints, low: number, high: number): ScanPoints {
  let current = points;
  for (let round = 0; round < 2; round++) {
    const law = bestLaw(current, low, high);
    const rows = current.temperatures.map((temperature, n) => {
      const below = 1 - temperature / law.transition;
      const calculated = law.background + (below > 0 ? law.amplitude * below ** (2 * law.beta) : 0);
      return { calculated, residual: Math.abs((current.values[n] as number) - calculated) };
    });
    const sorted = [...rows].sort((a, b) => a.calculated - b.calculated);
    const third = Math.floor(sorted.length / 3);
    if (third < 5) return current;
    const [weak, strong] = [sorted.slice(0, third), sorted.slice(-third)].map((part) => ({
      level: median(part.map(({ calculated }) => calculated)),
      scatter: median(part.map(({ residual }) => residual)) / 0.6745,
    })) as [Level, Level];
    const ratio = strong.scatter / weak.scatter;
    if (!(ratio > unevenScatter || ratio < 1 / unevenScatter) || strong.level === weak.level) return current;
    const floor = 0.5 * Math.min(weak.scatter, strong.scatter);
    const slope = (strong.scatter - weak.scatter) / (strong.level - weak.level);
    current = {
      ...current,
      su: rows.map(({ calculated }) => Math.max(floor, weak.scatter + slope * (calculated - weak.level))),
    };
  }
  return current;
}

interface Level {
  readonly level: number;
  readonly scatter: number;
}

/** T_N lies where a few points are below and above. */
function limitsOf(temperatures: readonly number[]): [number, number] {
  const low = temperatures[Math.min(fewestBelow - 2, temperatures.length - 1)] as number;
  const high = temperatures.at(-fewestAbove) as number;
  return [low, Math.max(high, low + 1e-6)];
}

interface Found {
  readonly law: LawAt;
  readonly given: boolean;
  readonly evidence: number;
  readonly options: OnsetOptions;
}

function withLaw(series: ScanSeries, points: ScanPoints, { law, given, evidence, options }: Found): FittedSeries {
  const chosen = chosenRange(points, law, given, options);
  const { law: best, points: used, scale } = chosen;
  const fit = describe(used, best, scale, chosen.fits, given);
  const profile = (transition: number) => lawAtTransition(used, transition).chiSquared / scale;
  const { background } = fit;
  return {
    onset: {
      name: series.name,
      behaviour: best.amplitude > 0 ? "onset" : "loss",
      evidence,
      fit,
      onBackground: background.su !== null && background.value > 3 * background.su,
    },
    profile,
  };
}

/** The widest range below T_N that the law fits; a narrow one that it does not fit is told as such. */
function chosenRange(points: ScanPoints, first: LawAt, given: boolean, options: OnsetOptions) {
  const wanted = options.reducedRange === undefined ? ranges : [options.reducedRange];
  const tried = wanted.flatMap((range) => {
    const used = within(points, first.transition, range);
    const below = used.temperatures.filter((one) => one < first.transition).length;
    if (below < fewestBelow || used.temperatures.length < fewestPoints) return [];
    const [low, high] = limitsOf(used.temperatures);
    const [near, far] = around(used.temperatures, first.transition);
    const law = bestLaw(used, Math.max(low, near), Math.min(high, far));
    return [{ law, points: used, degrees: used.temperatures.length - 4 }];
  });
  const all = tried.length > 0 ? tried : [{ law: first, points, degrees: points.temperatures.length - 4 }];
  // The scatter of the narrowest range is that of the data: there the law fits if it does anywhere.
  const narrowest = all.at(-1) as (typeof all)[number];
  const unit = given ? 1 : Math.max(narrowest.law.chiSquared / narrowest.degrees, Number.MIN_VALUE);
  const fitting = all.find(({ law, degrees }) => chiSquaredTail(law.chiSquared / unit, degrees) >= leastProbability);
  const chosen = fitting ?? narrowest;
  const own = chosen.law.chiSquared / chosen.degrees;
  return { ...chosen, fits: fitting !== undefined, scale: given ? Math.max(1, own) : Math.max(own, Number.MIN_VALUE) };
}

/** A few points on either side of a temperature: the range of the fit changes T_N no more than that. */
function around(temperatures: readonly number[], transition: number): [number, number] {
  const at = temperatures.filter((one) => one <= transition).length;
  return [
    temperatures[Math.max(0, at - 6)] as number,
    temperatures[Math.min(temperatures.length - 1, at + 5)] as number,
  ];
}

function within({ temperatures, values, su }: ScanPoints, transition: number, range: number): ScanPoints {
  const kept = temperatures.flatMap((one, n) => (1 - one / transition <= range ? [n] : []));
  return {
    temperatures: kept.map((n) => temperatures[n] as number),
    values: kept.map((n) => values[n] as number),
    su: kept.map((n) => su[n] as number),
  };
}

function describe(points: ScanPoints, law: LawAt, scale: number, fits: boolean, given: boolean): PowerLaw {
  const { temperatures } = points;
  const chiSquared = law.chiSquared / scale;
  const transitionSu = profileUncertainty(
    (transition) => lawAtTransition(points, transition).chiSquared / scale,
    law.transition,
    chiSquared,
    transitionGrid(temperatures, law.transition),
  );
  const reach = transitionSu === null ? 0.1 * law.transition : 4 * transitionSu;
  const betaSu = profileUncertainty(
    (beta) => lawAtBeta(points, beta, law.transition, reach).chiSquared / scale,
    law.beta,
    chiSquared,
    betaGrid(law.beta),
  );
  const linear = linearUncertainties(points, law, scale);
  const first = temperatures[0] as number;
  return {
    transition: measured(law.transition, transitionSu),
    beta: measured(law.beta, betaSu),
    amplitude: measured(law.amplitude, linear.amplitude),
    background: measured(law.background, linear.background),
    chiSquared: roundNumber(given ? law.chiSquared : chiSquared),
    degreesOfFreedom: temperatures.length - 4,
    uncertaintySource: given ? "given" : "scatter",
    points: temperatures.length,
    pointsBelow: temperatures.filter((one) => one < law.transition).length,
    from: first,
    to: temperatures.at(-1) as number,
    reducedRange: roundNumber(Math.max(0, 1 - first / law.transition)),
    fits,
  };
}

function measured(value: number, su: number | null): Measured {
  return { value: roundNumber(value), su: su === null ? null : roundNumber(su) };
}

/** Of amplitude and background: their own, and what T_N and β bring in through a second profile in the amplitude. */
function linearUncertainties(points: ScanPoints, law: LawAt, scale: number) {
  const steps = [
    [1e-4 * law.transition, 0],
    [0, 1e-3 * law.beta],
  ] as const;
  // Normal matrix of all four parameters from numerical derivatives, damped where T_N sits on a point.
  const columns: number[][] = [
    points.temperatures.map((one) => (one < law.transition ? (1 - one / law.transition) ** (2 * law.beta) : 0)),
    points.temperatures.map(() => 1),
    ...steps.map(([dT, dBeta]) => {
      const at = (sign: number) => {
        const [transition, beta] = [law.transition + sign * dT, law.beta + sign * dBeta];
        return points.temperatures.map((one) =>
          one < transition ? law.amplitude * (1 - one / transition) ** (2 * beta) : 0,
        );
      };
      const [up, down] = [at(1), at(-1)];
      return up.map((entry, n) => (entry - (down[n] as number)) / (2 * (dT || dBeta)));
    }),
  ];
  const normal = columns.flatMap((a) =>
    columns.map((b) =>
      a.reduce((sum, entry, n) => sum + (entry * (b[n] as number)) / (points.su[n] as number) ** 2, 0),
    ),
  );
  const covariance = inverseOf(normal);
  const su = (index: number) =>
    covariance === null ? null : Math.sqrt(Math.max(0, (covariance[index * 4 + index] as number) * scale));
  return { amplitude: su(0), background: su(1) };
}

function inverseOf(normal: readonly number[]): Float64Array | null {
  const factor = choleskyFactor(normal, 4, 1e-13);
  return factor && choleskyInverse(factor, 4);
}
