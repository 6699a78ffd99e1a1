import { nearFractionStandardUncertainties, roundNumber } from "../numbers/index.js";
import { chiSquaredTail, fitPolynomial, median, noiseOf } from "./statistics.js";
import type { KAgainstTemperature, Plateau, ScanSeries } from "./types.js";

const fewestPoints = 5;
const fewestOnPlateau = 4;
const leastProbability = 0.01;
const largestDenominator = 8;

/**
 * Does a component of k stay, slide, or lock in? Constant: all values scatter about their mean as their uncertainties
 * say. Else plateaus are sought, the longest first: a run of temperatures whose values do so while the values beyond
 * its end leave it, and in which a straight line is flatter than outside by three s.u. A plateau on a simple fraction
 * n/m, m ≤ 8, is a lock-in.
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
  if (all.probability >= leastProbability)
    return { ...base, behaviour: "constant", plateaus: [plateau(temperatures, all)], slope: null };
  const plateaus = plateausOf(temperatures, values, su);
  const moving = temperatures.flatMap((one, n) =>
    plateaus.some(({ from, to }) => one >= from && one <= to) ? [] : [n],
  );
  return {
    ...base,
    behaviour: plateaus.some(({ fraction }) => fraction !== null) ? "lock-in" : "sliding",
    plateaus,
    slope: moving.length < 3 ? null : slopeOf(moving.map((n) => temperatures[n] as number), moving.map((n) => values[n] as number), moving.map((n) => su[n] as number)),
  };
}

interface Run {
  readonly start: number;
  readonly end: number;
  readonly mean: number;
  readonly su: number;
  /** Median uncertainty of a single value. */
  readonly single: number;
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

function plateausOf(temperatures: readonly number[], values: readonly number[], su: readonly number[]): Plateau[] {
  const found: Run[] = [];
  const count = values.length;
  for (let length = count - 1; length >= fewestOnPlateau; length--)
    for (let start = 0; start + length <= count; start++) {
      const one = run(values, su, start, start + length);
      if (found.some((other) => one.start < other.end && other.start < one.end)) continue;
      if (one.probability >= leastProbability && flatter(temperatures, values, su, one)) found.push(one);
    }
  return found.sort((a, b) => a.start - b.start).map((one) => plateau(temperatures, one));
}

/** Whether k is level within the run and moves just outside it. */
function flatter(
  temperatures: readonly number[],
  values: readonly number[],
  su: readonly number[],
  { start, end }: Run,
): boolean {
  const part = (from: number, to: number) =>
    slopeOf(temperatures.slice(from, to), values.slice(from, to), su.slice(from, to));
  const inside = part(start, end);
  if (inside === null || Math.abs(inside.value) > 2.5 * (inside.su ?? 0)) return false;
  const length = Math.max(4, end - start);
  // The neighbours on either side, with the last points of the run as their foot.
  const sides = [
    part(Math.max(0, start - length), start + 1),
    part(end - 1, Math.min(values.length, end + length)),
  ].filter((one) => one !== null);
  return sides.some(
    ({ value, su: error }) => Math.abs(value - inside.value) > 3 * Math.hypot(error ?? 0, inside.su ?? 0),
  );
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
