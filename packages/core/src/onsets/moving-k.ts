import { nearFractionStandardUncertainties, roundNumber } from "../numbers/index.js";
import { chiSquaredTail, fitPolynomial, median, noiseOf } from "./statistics.js";
import type { KAgainstTemperature, Plateau, ScanSeries } from "./types.js";

const fewestPoints = 5;
const fewestOnPlateau = 4;
const leastProbability = 0.01;
const largestDenominator = 8;
/** Of polynomials that count as one smooth curve. */
const smoothestDegree = 4;
/** In χ²: what a level stretch must gain over one smooth curve. */
const leastGain = 6;

/**
 * Does a component of k stay, slide, or lock in? Constant: all values scatter about their mean as their uncertainties
 * say. Else level stretches are sought; one on a simple fraction n/m, m ≤ 8, is a lock-in.
 */
export function movingK(series: ScanSeries): KAgainstTemperature {
  const { name, temperatures, values } = series;
  const given = series.uncertainties !== null;
  const scatter = noiseOf(values);
  const floor = 1e-9;
  const su = series.uncertainties ?? values.map(() => Math.max(scatter, floor));
  const base = { name, uncertaintySource: given ? "given" : "scatter" } as const;
  if (values.length < fewestPoints) return { ...base, behaviour: "undecided", plateaus: [], slope: null };
  const all = run(values, su, 0, values.length);
  if (all.probability >= leastProbability || (!given && !movesBeyondScatter(temperatures, values)))
    return { ...base, behaviour: "constant", plateaus: [plateau(temperatures, all)], slope: null };
  const plateaus = plateausOf({ temperatures, values, su }).map((one) => plateau(temperatures, one));
  const moving = temperatures.flatMap((one, n) =>
    plateaus.some(({ from, to }) => one >= from && one <= to) ? [] : [n],
  );
  return {
    ...base,
    behaviour: plateaus.some(({ fraction }) => fraction !== null) ? "lock-in" : "sliding",
    plateaus,
    slope:
      moving.length < 3
        ? null
        : slopeOf(
            moving.map((n) => temperatures[n] as number),
            moving.map((n) => values[n] as number),
            moving.map((n) => su[n] as number),
          ),
  };
}

/**
 * Whether a smooth curve explains more than a constant where the scatter itself is unknown, by Schwarz's criterion
 * N ln(χ²₀/χ²) − p ln N: second differences of a few points tell the scatter too roughly for a test of χ².
 */
function movesBeyondScatter(temperatures: readonly number[], values: readonly number[]): boolean {
  const data = { temperatures, values, su: values.map(() => 1) };
  const count = values.length;
  const level = deviations(data, 0);
  // A curve through nearly all points would explain anything.
  const degrees = Math.min(smoothestDegree, new Set(temperatures).size - 3);
  return Array.from({ length: degrees }, (_, n) => n + 1).some((degree) => {
    const gain = count * Math.log(level / Math.max(deviations(data, degree), Number.MIN_VALUE));
    return gain - degree * Math.log(count) > leastGain;
  });
}

interface Run {
  readonly start: number;
  readonly end: number;
  readonly mean: number;
  readonly su: number;
  /** Median uncertainty of a single value. */
  readonly single: number;
  readonly chiSquared: number;
  readonly probability: number;
}

function run(values: readonly number[], su: readonly number[], start: number, end: number): Run {
  const own = values.slice(start, end);
  const weights = su.slice(start, end).map((one) => 1 / one ** 2);
  const total = weights.reduce((sum, one) => sum + one, 0);
  const mean = own.reduce((sum, one, n) => sum + one * (weights[n] as number), 0) / total;
  const chiSquared = own.reduce((sum, one, n) => sum + (one - mean) ** 2 * (weights[n] as number), 0);
  return {
    start,
    end,
    mean,
    su: Math.sqrt(1 / total),
    single: median(su.slice(start, end)),
    chiSquared,
    probability: chiSquaredTail(chiSquared, own.length - 1),
  };
}

function plateau(temperatures: readonly number[], { start, end, mean, su, single }: Run): Plateau {
  return {
    from: temperatures[start] as number,
    to: temperatures[end - 1] as number,
    points: end - start,
    mean: { value: roundNumber(mean), su: roundNumber(su) },
    // The uncertainty of a mean leaves out what all values share: half that of a single one is the least.
    fraction: simpleFraction(mean, nearFractionStandardUncertainties * Math.max(su, single / 2)),
  };
}

/** The fraction of the smallest denominator within a distance. */
function simpleFraction(value: number, within: number): readonly [number, number] | null {
  for (let denominator = 1; denominator <= largestDenominator; denominator++) {
    const numerator = Math.round(value * denominator);
    if (Math.abs(value - numerator / denominator) <= within) return [numerator + 0, denominator];
  }
  return null;
}

/**
 * Level stretches of a series that moves. A stretch counts where a constant with free curves before and behind it
 * describes all values better than one smooth curve, by G. Schwarz's criterion χ² + p ln N (Ann. Stat. 6 (1978) 461) with
 * both ends counted as parameters; then what lies before and behind is looked at in the same way.
 */
function plateausOf(data: Weighed, offset = 0): Run[] {
  const count = data.values.length;
  if (count < fewestOnPlateau + 1) return [];
  const price = Math.log(count);
  const smooth = smoothest(data, 0, count, smoothestDegree, price);
  const before = Array.from({ length: count + 1 }, (_, end) => smoothest(data, 0, end, 2, price));
  const behind = Array.from({ length: count + 1 }, (_, start) => smoothest(data, start, count, 2, price));
  let best: { readonly run: Run; readonly value: number } | null = null;
  for (let start = 0; start + fewestOnPlateau <= count; start++)
    for (let end = start + fewestOnPlateau; end <= count; end++) {
      if (start === 0 && end === count) continue;
      const one = run(data.values, data.su, start, end);
      if (one.probability < leastProbability) continue;
      const ends = (start > 0 ? 1 : 0) + (end < count ? 1 : 0);
      const value = one.chiSquared + (1 + ends) * price + (before[start] as number) + (behind[end] as number);
      if (best === null || value < best.value) best = { run: one, value };
    }
  if (best === null || best.value > smooth - leastGain) return [];
  const { start, end } = best.run;
  return [
    ...plateausOf(part(data, 0, start), offset),
    { ...best.run, start: start + offset, end: end + offset },
    ...plateausOf(part(data, end, count), offset + end),
  ];
}

interface Weighed {
  readonly temperatures: readonly number[];
  readonly values: readonly number[];
  readonly su: readonly number[];
}

function part({ temperatures, values, su }: Weighed, start: number, end: number): Weighed {
  return { temperatures: temperatures.slice(start, end), values: values.slice(start, end), su: su.slice(start, end) };
}

/** The least χ² + p ln N of polynomials up to a degree; 0 for no points. */
function smoothest(data: Weighed, start: number, end: number, degree: number, price: number): number {
  const own = part(data, start, end);
  if (own.values.length === 0) return 0;
  const distinct = new Set(own.temperatures).size;
  return Math.min(
    ...Array.from({ length: Math.min(degree, distinct - 1) + 1 }, (_, n) => deviations(own, n) + (n + 1) * price),
  );
}

/** χ² of the polynomial of a degree. */
function deviations({ temperatures, values, su }: Weighed, degree: number): number {
  const middle = ((temperatures[0] as number) + (temperatures.at(-1) as number)) / 2;
  const span = Math.max((temperatures.at(-1) as number) - (temperatures[0] as number), 1e-9);
  const x = temperatures.map((one) => (2 * (one - middle)) / span);
  return fitPolynomial(x, values, su, degree).chiSquared;
}

function slopeOf(
  temperatures: readonly number[],
  values: readonly number[],
  su: readonly number[],
): { readonly value: number; readonly su: number | null } | null {
  if (temperatures.length < 3) return null;
  const middle = temperatures.reduce((sum, one) => sum + one, 0) / temperatures.length;
  const span = (temperatures.at(-1) as number) - (temperatures[0] as number);
  const { coefficients, su: errors } = fitPolynomial(
    temperatures.map((one) => (one - middle) / span),
    values,
    su,
    1,
  );
  return { value: roundNumber((coefficients[1] as number) / span), su: roundNumber((errors[1] as number) / span) };
}
