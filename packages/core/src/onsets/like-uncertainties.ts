import { median, noiseOf } from "./statistics.js";
import type { ScanSeries } from "./types.js";

const fewestPoints = 8;
/** Factor within which the scatter of a series must agree with the numbers of the next. */
const likeness = 1.45;
/** The same for each half, whose scatter is known less well. */
const halfLikeness = 1.8;
/** Noise of uncertainties as a share of themselves: counting errors of more than ten counts have less. */
const smoothness = 0.25;

/**
 * Whether the numbers of one series may be the standard uncertainties of another at the same temperatures: above zero,
 * smooth, and everywhere as large as the other one scatters, or all equal.
 */
export function likeUncertainties(numbers: ScanSeries, of: ScanSeries): boolean {
  const { values } = numbers;
  const count = values.length;
  if (count < fewestPoints || count !== of.values.length || values.some((value) => value <= 0)) return false;
  if (numbers.temperatures.some((one, n) => one !== of.temperatures[n])) return false;
  if (values.every((value) => value === values[0])) return true;
  if (noiseOf(values) > smoothness * median(values)) return false;
  // Second differences of white noise have the variance 6 σ²; the median is that of a Gaussian.
  const steps = of.values
    .slice(2)
    .map(
      (value, n) =>
        Math.abs(value - 2 * (of.values[n + 1] as number) + (of.values[n] as number)) / (values[n + 1] as number),
    );
  const near = (part: readonly number[], factor: number) => {
    const ratio = median(part) / 0.6745 / Math.sqrt(6);
    return ratio < factor && ratio > 1 / factor;
  };
  const middle = steps.length >> 1;
  return (
    near(steps, likeness) && [steps.slice(0, middle), steps.slice(middle)].every((part) => near(part, halfLikeness))
  );
}
