import type { ScanSeries } from "@kvane/core/onsets";
import { type Random, seeded } from "./random.js";

/** What a simulated peak is made of. */
export interface MadeLaw {
  readonly transition: number;
  readonly beta: number;
  readonly amplitude: number;
  readonly background: number;
}

/** A number from the normal distribution (G. E. P. Box & M. E. Muller, Ann. Math. Stat. 29 (1958) 610). */
export function normal(random: Random): number {
  return Math.sqrt(-2 * Math.log(1 - random.next())) * Math.cos(2 * Math.PI * random.next());
}

/** The law at the temperatures from, from + step, … to, with noise of the standard deviation that `noise` gives. */
export function madeScan(
  name: string,
  law: MadeLaw,
  range: { readonly from: number; readonly to: number; readonly step: number },
  noise: (intensity: number) => number,
  random: Random,
): ScanSeries {
  const count = Math.round((range.to - range.from) / range.step);
  const temperatures = Array.from({ length: count + 1 }, (_, n) => range.from + n * range.step);
  const exact = temperatures.map((t) =>
    t < law.transition ? law.amplitude * (1 - t / law.transition) ** (2 * law.beta) + law.background : law.background,
  );
  return {
    name,
    temperatures,
    values: exact.map((one) => one + noise(one) * normal(random)),
    uncertainties: exact.map(noise),
  };
}

/** One peak with random T_N and β and 2 % noise: of the intensity at T = 0, or of each intensity with a floor. */
export function randomScan(seed: number): { readonly law: MadeLaw; readonly series: ScanSeries } {
  const random = seeded(seed);
  const law = {
    transition: 15 + 85 * random.next(),
    beta: 0.12 + 0.38 * random.next(),
    amplitude: 100,
    background: 1 + 20 * random.next(),
  };
  const step = law.transition * (0.01 + 0.02 * random.next());
  const noise = seed % 2 === 0 ? () => 2 : (intensity: number) => Math.max(0.02 * intensity, 0.2);
  return { law, series: madeScan("peak", law, { from: step, to: 1.3 * law.transition, step }, noise, random) };
}
