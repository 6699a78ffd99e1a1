import type { WeightedResiduals } from "../algorithms/index.js";
import { type Bounds, boundedFit, quickPatience } from "./bounded-fit.js";

/** In units of the largest amplitude: beyond that an amplitude is not determined. */
const furthest = 4;
const firstStep = 1e-3;
const bisections = 8;

/**
 * How far an amplitude can go from its best value until χ² has risen by 1, all other parameters following; the larger of both
 * ways. Intensities depend on a small amplitude through its square, so that derivatives say nothing of it there. Null when χ² does
 * not rise by 1 within four times the largest amplitude.
 *
 * @param scale the largest amplitude
 */
export function profileUncertainty(
  index: number,
  best: Float64Array,
  chiSquared: number,
  bounds: Bounds,
  model: (parameters: Float64Array) => WeightedResiduals,
  scale: number,
): number | null {
  const rise = (away: number): number => {
    const start = Float64Array.from(best);
    start[index] = (best[index] as number) + away;
    const held = Float64Array.from(start, (value, at) => (at === index ? value : (bounds.lower[at] as number)));
    const top = Float64Array.from(start, (value, at) => (at === index ? value : (bounds.upper[at] as number)));
    return boundedFit(start, { lower: held, upper: top }, model, quickPatience).chiSquared - chiSquared;
  };
  let largest = 0;
  for (const side of [1, -1]) {
    let [inside, outside] = [0, firstStep * scale];
    while (rise(side * outside) < 1) {
      inside = outside;
      outside *= 2;
      if (outside > furthest * scale) return null;
    }
    for (let step = 0; step < bisections; step++) {
      const middle = (inside + outside) / 2;
      if (rise(side * middle) < 1) inside = middle;
      else outside = middle;
    }
    largest = Math.max(largest, (inside + outside) / 2);
  }
  return largest;
}
