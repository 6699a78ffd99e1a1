import {
  arrangementWith,
  cartesianMoment,
  type FourierComponent,
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

/**
 * Moments of every atom of the primitive cell with standard uncertainties, for amplitudes that come first in the fit.
 *
 * @param unseen directions of the amplitudes that the data do not see: sizes that change along one have no uncertainty
 */
export function fittedMoments(
  group: SpaceGroup,
  geometry: ScatteringGeometry,
  space: MomentSpace,
  amplitudes: ArrayLike<number>,
  covariance: FitCovariance,
  unseen: readonly Float64Array[],
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
    const { first, largest, halfAxes, components } = own[atom] as MomentSizes;
    const constant = isConstant(own[atom] as MomentSizes);
    const gradient = new Float64Array(Math.sqrt(covariance.matrix.length));
    moved.forEach(([up, down], index) => {
      gradient[index] = ((up?.[atom]?.largest as number) - (down?.[atom]?.largest as number)) / (2 * step);
    });
    const open = unseen.some((direction) => isAlong(gradient, direction));
    const linear = propagated(covariance, gradient);
    // One as large as the moment says that the derivatives do not tell it. The digits of differences of step 1e-5 end
    // behind some ten, and what is beyond differs from one engine to another.
    const uncertainty = open || linear > largest ? null : roundNumber(linear, scale, uncertaintyDigits);
    const limit = formFactor.largestMoment;
    return {
      label: site,
      position,
      momentCrystal: first.map((entry) => roundNumber(entry, scale)) as unknown as Triple,
      size: constant ? roundNumber(largest, scale) : null,
      sizeUncertainty: constant ? uncertainty : null,
      largest: roundNumber(largest, scale),
      largestUncertainty: uncertainty,
      components: components.map(({ real, imaginary }) => ({
        real: rounded(real, scale),
        imaginary: rounded(imaginary, scale),
      })),
      halfAxes: phases.runs ? [roundNumber(halfAxes[0], scale), roundNumber(halfAxes[1], scale)] : null,
      limit,
      aboveLimit: !relative && limit !== null && largest > limit + limitUncertainties * (uncertainty ?? 0),
    };
  });
}

/** Significant digits of an uncertainty. */
const uncertaintyDigits = 6;

/** The largest moment of every atom in any cell. */
export function largestMoments(
  group: SpaceGroup,
  geometry: ScatteringGeometry,
  space: MomentSpace,
  amplitudes: readonly number[],
): number[] {
  return sizesOf(geometry, arrangementWith(space, amplitudes), phasesOf(group, space)).map(({ largest }) => largest);
}

function rounded(vector: Triple, scale: number): Triple {
  return vector.map((entry) => roundNumber(entry, scale)) as unknown as Triple;
}

/** Share of a gradient along an unseen direction that counts: below it is rounding. */
const gradientShare = 1e-3;

function isAlong(gradient: Float64Array, direction: Float64Array): boolean {
  const along = gradient.reduce((sum, entry, index) => sum + entry * (direction[index] as number), 0);
  return Math.abs(along) > gradientShare * Math.hypot(...gradient) * Math.hypot(...direction);
}

function isConstant({ largest, smallest }: MomentSizes): boolean {
  return largest - smallest <= sameSize * largest;
}

/** The phases k·T of every wave in turns, cell by cell; null for one wave that takes every phase. */
interface Phases {
  readonly cells: readonly (readonly number[])[] | null;
  /** Whether there is one wave with 2k ∉ L*, along which the moment runs through an ellipse. */
  readonly runs: boolean;
}

function phasesOf(group: SpaceGroup, { waves }: MomentSpace): Phases {
  const [first] = waves;
  if (!first) return { cells: [[]], runs: false };
  if (waves.length === 1) {
    const period = periodOf(group, first.k);
    const cells = period === null ? null : Array.from({ length: period }, (_, step) => [step / period]);
    return { cells, runs: !first.halfLattice };
  }
  const steps = waves.map(({ k }) => primitiveNumbers(group, k));
  const cells: number[][] = [];
  for (let a = 0; a < cellsAlong; a++)
    for (let b = 0; b < cellsAlong; b++)
      for (let c = 0; c < cellsAlong; c++)
        cells.push(steps.map((step) => a * (step[0] as number) + b * (step[1] as number) + c * (step[2] as number)));
  return { cells, runs: false };
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
  readonly components: readonly FourierComponent[];
  readonly largest: number;
  readonly smallest: number;
  /** Of the ellipse of the first wave. */
  readonly halfAxes: readonly [number, number];
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
    const whole = ellipse(cartesian[0]);
    const { largest, smallest } = phases.cells === null ? whole : overCells(cartesian, phases.cells);
    const components = waves.map((wave) => wave.components[atom] ?? { real: [0, 0, 0], imaginary: [0, 0, 0] });
    const halfAxes = [whole.largest, whole.smallest] as const;
    return { first, components: components as readonly FourierComponent[], largest, smallest, halfAxes };
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
