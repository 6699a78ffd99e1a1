import { breathe, type WorkHost } from "../algorithms/index.js";
import { type BoundedFit, type Bounds, boundedFit, quickPatience, thoroughPatience } from "./bounded-fit.js";
import type { FitForms } from "./fit-forms.js";
import { calculated, type FitLayout, residualModel } from "./fit-model.js";
import { normalNumbers, seededNumbers } from "./random.js";
import type { IntensityData } from "./types.js";

/** The minima of one fit. */
export interface Minima {
  readonly best: BoundedFit;
  /** Starts that ended in a minimum as deep as the best. */
  readonly hits: number;
  readonly starts: number;
  /** One of each minimum that is nearly as deep as the best, up to a common sign, the best first. */
  readonly equals: readonly BoundedFit[];
}

/** Absolute in χ². Minima that differ by less are equally deep: far below what tells fits apart. */
const sameDepth = 1e-2;
/** χ² above that of the best up to which another minimum is listed: 2 s.u. of one parameter. */
const nearlyAsDeep = 4;
/** The best minimum must have come up this often before the starts end early. */
const enoughHits = 5;
const fewestStarts = 8;

/**
 * Fits from seeded random starts. Each begins in a random direction of the amplitudes with the size that the data ask
 * for, fractions and scale near the middle.
 */
export async function multiStart(
  forms: FitForms,
  layout: FitLayout,
  data: IntensityData,
  options: { readonly starts: number; readonly seed: number; readonly from: readonly number[] | null },
  host: WorkHost,
): Promise<Minima> {
  const model = residualModel(forms, layout, data);
  const bounds = boundsOf(layout);
  const uniform = seededNumbers(options.seed);
  const normal = normalNumbers(uniform);
  const fits: BoundedFit[] = [];
  let hits = 0;
  const lowest = (): number => fits.reduce((least, fit) => Math.min(least, fit.chiSquared), Number.POSITIVE_INFINITY);
  while (fits.length < options.starts && !(hits >= enoughHits && fits.length >= fewestStarts)) {
    await breathe(host);
    const start = randomStart(forms, layout, data, uniform, normal);
    if (fits.length === 0 && options.from !== null) start.set(options.from.slice(0, layout.amplitudes));
    fits.push(boundedFit(start, bounds, model, quickPatience));
    const least = lowest();
    hits = fits.filter(({ chiSquared }) => chiSquared <= least + sameDepth).length;
  }
  const least = lowest();
  const promising = fits.filter(({ chiSquared }) => chiSquared <= least + nearlyAsDeep + sameDepth);
  const different: BoundedFit[] = [];
  for (const fit of promising.sort((a, b) => a.chiSquared - b.chiSquared)) {
    if (different.some((other) => sameUpToSign(fit, other, layout))) continue;
    await breathe(host);
    different.push(boundedFit(fit.parameters, bounds, model, thoroughPatience));
  }
  different.sort((a, b) => a.chiSquared - b.chiSquared);
  const equals = different.filter(
    (fit, index) =>
      fit.chiSquared <= (different[0] as BoundedFit).chiSquared + nearlyAsDeep &&
      !different.slice(0, index).some((other) => sameUpToSign(fit, other, layout)),
  );
  return { best: equals[0] as BoundedFit, hits, starts: fits.length, equals };
}

/** Fractions in [0, 1], scale from 0; amplitudes are free. */
export function boundsOf(layout: FitLayout): Bounds {
  const lower = new Float64Array(layout.size).fill(Number.NEGATIVE_INFINITY);
  const upper = new Float64Array(layout.size).fill(Number.POSITIVE_INFINITY);
  for (let index = layout.amplitudes; index < layout.amplitudes + layout.fractions; index++) {
    lower[index] = 0;
    upper[index] = 1;
  }
  if (layout.fitsScale) lower[layout.size - 1] = 0;
  return { lower, upper };
}

function randomStart(
  forms: FitForms,
  layout: FitLayout,
  { data }: IntensityData,
  uniform: () => number,
  normal: () => number,
): Float64Array {
  const start = new Float64Array(layout.size);
  for (let index = 0; index < layout.amplitudes; index++) start[index] = normal();
  for (let index = 0; index < layout.fractions; index++) start[layout.amplitudes + index] = 0.2 + 0.6 * uniform();
  let scale = layout.fixedScale;
  if (layout.fitsScale) {
    scale = weightedShare(
      data.map(({ observed, uncertainty }, index) => [observed, forms.constants[index] as number, uncertainty]),
    );
    start[layout.size - 1] = scale;
  }
  const { values } = calculated(forms, layout, start);
  // I − s N = t² (I_calc − s N): the best t² for this direction.
  const share = weightedShare(
    data.map(({ observed, uncertainty }, index) => {
      const nuclear = scale * (forms.constants[index] as number);
      return [observed - nuclear, (values[index] as number) - nuclear, uncertainty];
    }),
  );
  const factor = Math.sqrt(Math.max(share, 1e-6));
  for (let index = 0; index < layout.amplitudes; index++) start[index] = factor * (start[index] as number);
  return start;
}

/** The factor c that makes Σ ((o − c v)/s)² least; at least a little above 0. */
function weightedShare(rows: readonly (readonly [number, number, number])[]): number {
  let top = 0;
  let bottom = 0;
  for (const [observed, value, uncertainty] of rows) {
    top += (observed * value) / uncertainty ** 2;
    bottom += (value / uncertainty) ** 2;
  }
  return bottom > 0 ? Math.max(top / bottom, 1e-6) : 1;
}

function sameUpToSign(a: BoundedFit, b: BoundedFit, { amplitudes }: FitLayout): boolean {
  const size = Math.hypot(...a.parameters.subarray(0, amplitudes)) || 1;
  return [1, -1].some((sign) => {
    let away = 0;
    for (let index = 0; index < amplitudes; index++)
      away = Math.max(away, Math.abs((a.parameters[index] as number) - sign * (b.parameters[index] as number)));
    return away <= 1e-3 * size;
  });
}
