import {
  arrangementWith,
  cartesianMoment,
  type MomentArrangement,
  type MomentSpace,
  type ScatteringGeometry,
  type Triple,
} from "../diffraction/index.js";
import { exactComponents, type WaveVector } from "../kvectors/index.js";
import { lcm, roundNumber } from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import { type FitCovariance, propagated } from "./fit-covariance.js";
import type { FittedMoment } from "./types.js";

/** Phases looked at along one wave whose period is longer than that, or not a whole number of cells. */
const mostPhases = 48;
/** Cells along each primitive axis that are looked at where several waves run. */
const cellsAlong = 6;
/** Relative. Sizes that differ by less are one. */
const sameSize = 1e-6;
const limitUncertainties = 3;

/** Moments of every atom of the primitive cell with standard uncertainties, for amplitudes that come first in the fit. */
export function fittedMoments(
  group: SpaceGroup,
  geometry: ScatteringGeometry,
  space: MomentSpace,
  amplitudes: ArrayLike<number>,
  covariance: FitCovariance,
  relative: boolean,
): FittedMoment[] {
  const phases = phasesOf(group, space);
  const at = (values: readonly number[]) => sizesOf(geometry, arrangementWith(space, values), phases);
  const centre = Array.from({ length: space.basis.length }, (_, index) => amplitudes[index] as number);
  const own = at(centre);
  const step = 1e-5 * (Math.max(...centre.map(Math.abs)) || 1);
  const moved = centre.map((_, index) =>
    [1, -1].map((side) => at(centre.map((value, other) => value + (other === index ? side * step : 0)))),
  );
  const scale = Math.max(...own.map(({ largest }) => largest)) || 1;
  return space.atoms.map(({ site, position, formFactor }, atom): FittedMoment => {
    const { first, largest, constant } = own[atom] as MomentSizes;
    const gradient = new Float64Array(Math.sqrt(covariance.matrix.length));
    moved.forEach(([up, down], index) => {
      gradient[index] = ((up?.[atom]?.largest as number) - (down?.[atom]?.largest as number)) / (2 * step);
    });
    const uncertainty = propagated(covariance, gradient);
    const limit = formFactor.largestMoment;
    return {
      label: site,
      position,
      momentCrystal: first.map((entry) => roundNumber(entry, scale)) as unknown as Triple,
      size: constant ? roundNumber(largest, scale) : null,
      sizeUncertainty: constant ? roundNumber(uncertainty, scale) : null,
      largest: roundNumber(largest, scale),
      limit,
      aboveLimit: !relative && limit !== null && largest > limit + limitUncertainties * uncertainty,
    };
  });
}

/** The phases k·T of every wave in turns, cell by cell; null for one wave that takes every phase. */
type Phases = readonly (readonly number[])[] | null;

function phasesOf(group: SpaceGroup, { waves }: MomentSpace): Phases {
  const [first] = waves;
  if (!first) return [[]];
  if (waves.length === 1) {
    const period = periodOf(group, first.k);
    return period === null ? null : Array.from({ length: period }, (_, step) => [step / period]);
  }
  const steps = waves.map(({ k }) => primitiveNumbers(group, k));
  const cells: number[][] = [];
  for (let a = 0; a < cellsAlong; a++)
    for (let b = 0; b < cellsAlong; b++)
      for (let c = 0; c < cellsAlong; c++)
        cells.push(steps.map((step) => a * (step[0] as number) + b * (step[1] as number) + c * (step[2] as number)));
  return cells;
}

/** Cells after which k·T is whole for all T, when they are few. */
function periodOf(group: SpaceGroup, k: WaveVector): number | null {
  const exact = exactComponents(k);
  if (exact === null) return null;
  const period = toPrimitiveRow(group.lattice, exact).reduce((common, [, bottom]) => lcm(common, bottom), 1);
  return period <= mostPhases ? period : null;
}

function primitiveNumbers({ lattice }: SpaceGroup, k: WaveVector): number[] {
  const values = k.components.map(({ constant, coefficients }) =>
    coefficients.reduce(
      (sum, [top, bottom], letter) => (top === 0 ? sum : sum + (top / bottom) * (lettersOf(k)[letter] ?? 0)),
      constant[0] / constant[1],
    ),
  );
  return lattice.vectors.map(
    (vector) => vector.reduce((sum, entry, axis) => sum + entry * (values[axis] as number), 0) / lattice.denominator,
  );
}

/** Values of u, v, w by position. */
function lettersOf(k: WaveVector): number[] {
  const used = [0, 1, 2].filter((letter) =>
    k.components.some((form) => form.coefficients[letter as 0 | 1 | 2][0] !== 0),
  );
  const letters: number[] = [];
  used.forEach((letter, place) => {
    letters[letter] = k.values?.[place] ?? 0;
  });
  return letters;
}

interface MomentSizes {
  readonly first: Triple;
  readonly largest: number;
  readonly constant: boolean;
}

function sizesOf(geometry: ScatteringGeometry, { atoms, waves }: MomentArrangement, phases: Phases): MomentSizes[] {
  return atoms.map((_, atom) => {
    const parts = waves.map(({ halfLattice, components }) => {
      const factor = halfLattice ? 1 : 2;
      const component = components[atom];
      const scaled = (part: Triple): Triple => [factor * part[0], factor * part[1], factor * part[2]];
      return { re: scaled(component?.real ?? [0, 0, 0]), im: scaled(component?.imaginary ?? [0, 0, 0]) };
    });
    const first = parts.reduce<Triple>((sum, { re }) => [sum[0] + re[0], sum[1] + re[1], sum[2] + re[2]], [0, 0, 0]);
    const cartesian = parts.map(({ re, im }) => ({
      re: cartesianMoment(geometry, re),
      im: cartesianMoment(geometry, im),
    }));
    const { largest, smallest } = phases === null ? ellipse(cartesian[0]) : overCells(cartesian, phases);
    return { first, largest, constant: largest - smallest <= sameSize * largest };
  });
}

interface CartesianPart {
  readonly re: Triple;
  readonly im: Triple;
}

/** Half axes of the ellipse that Re (a + ib) e^{−iφ} runs through. */
function ellipse(part: CartesianPart | undefined): { largest: number; smallest: number } {
  const { re, im } = part ?? { re: [0, 0, 0], im: [0, 0, 0] };
  const dot = (a: Triple, b: Triple): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
  const mean = (dot(re, re) + dot(im, im)) / 2;
  const spread = Math.hypot((dot(re, re) - dot(im, im)) / 2, dot(re, im));
  return { largest: Math.sqrt(mean + spread), smallest: Math.sqrt(Math.max(0, mean - spread)) };
}

function overCells(
  parts: readonly CartesianPart[],
  cells: readonly (readonly number[])[],
): { largest: number; smallest: number } {
  let largest = 0;
  let smallest = Number.POSITIVE_INFINITY;
  for (const turns of cells) {
    const moment = [0, 0, 0];
    parts.forEach(({ re, im }, wave) => {
      const angle = 2 * Math.PI * (turns[wave] ?? 0);
      for (let axis = 0; axis < 3; axis++)
        moment[axis] =
          (moment[axis] as number) + (re[axis] as number) * Math.cos(angle) + (im[axis] as number) * Math.sin(angle);
    });
    const size = Math.hypot(...moment);
    largest = Math.max(largest, size);
    smallest = Math.min(smallest, size);
  }
  return { largest, smallest };
}
