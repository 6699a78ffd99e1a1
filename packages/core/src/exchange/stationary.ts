import type { WorkHost } from "../algorithms/index.js";
import { numericWaveVector, usedParameters, type WaveVector } from "../kvectors/index.js";
import { evaluateFormNumber, parameterNames, roundNumber, sameEnergyShare } from "../numbers/index.js";
import { groundOf } from "./ground.js";
import { interactionOf } from "./interaction.js";
import { branchesAt, type ExchangeBranches, latticeMatrix } from "./lattice-matrix.js";
import { withConstants } from "./model.js";
import { kappaOf } from "./placing.js";
import type { BondClass, ExchangeModel } from "./types.js";

/** What a wave vector asks of the constants: for each open letter of k a linear relation Σ slope_n J_n = 0. */
export interface StationaryRelation {
  /** u, v or w. */
  readonly letter: string;
  /** For each class ∂λ/∂letter for J = 1, the eigenvector being that of the lowest branch at k. */
  readonly slopes: readonly number[];
  /** Likewise ∂²λ/∂letter². */
  readonly curvatures: readonly number[];
  /** The slopes as sums of cosines after division by a common sine, where all classes have that form; else null. */
  readonly cosines: readonly (readonly CosineTerm[])[] | null;
}

/** `factor · cos(2π · multiple · letter)`. */
export interface CosineTerm {
  readonly factor: number;
  readonly multiple: number;
}

/** The constant that one class would need for k to be stationary, all others as they are. */
export interface NeededConstant {
  readonly name: string;
  /** Null where no value does. */
  readonly j: number | null;
  /** Whether k then is a minimum along its letters. */
  readonly minimum: boolean;
  /** Whether it is the lowest of the whole zone, by the certified search; null where that was not asked. */
  readonly lowest: boolean | null;
}

export interface StationaryAnswer {
  readonly k: WaveVector;
  readonly classes: readonly BondClass[];
  /** Empty where symmetry alone makes k stationary. */
  readonly relations: readonly StationaryRelation[];
  /**
   * Whether the eigenvector is fixed by symmetry: then the relations hold for all constants, else only near those of
   * the model.
   */
  readonly fixedBySymmetry: boolean;
  /** Slope along each letter for the constants of the model, and whether k is a minimum along the letters. */
  readonly slopes: readonly number[];
  readonly needed: readonly NeededConstant[];
}

/** Step in a letter for second differences: rounding leaves 1e-8 of the scale. */
const step = 1e-4;

/**
 * Which constants put the minimum at a measured k? On a line or plane of symmetry the slope of the lowest eigenvalue
 * along each letter must vanish. Where symmetry fixes the eigenvector the slope is linear in the constants, so each letter
 * gives one linear relation, such as J1 + 4 cos(2πu) J2 = 0 for a chain; a second derivative above zero tells minimum
 * from maximum. For every class the constant that would do with all others as they are is worked out and, if asked,
 * held against the whole zone.
 *
 * @param k with numbers for its letters
 */
export async function stationaryConstants(
  model: ExchangeModel,
  k: WaveVector,
  options: { readonly fixedBySymmetry: boolean; readonly searchZone: boolean },
  host: WorkHost = {},
): Promise<StationaryAnswer> {
  const numbers = numericWaveVector(k);
  if (numbers === null) throw new Error("a letter of k is open");
  const letters = usedParameters(k);
  const values = k.values ?? [];
  const lines = letters.map((_, index) => lineOf(model, k, index));
  const { scale } = interactionOf(model);
  const relations = lines.map((line, index) =>
    relationOf(model, line, scale, letters[index] as number, values[index] as number),
  );
  const slopes = lines.map((line) => slopeAt(model, line, scale));
  const needed = letters.length !== 1 ? [] : await neededConstants(model, lines[0] as Line, options, host);
  return {
    k,
    classes: model.couplings.map(({ bonds }) => bonds),
    relations,
    fixedBySymmetry: options.fixedBySymmetry,
    slopes: slopes.map((one) => roundNumber(one, scale)),
    needed,
  };
}

/** κ along one letter of k, through its value. */
interface Line {
  readonly at: (shift: number) => number[];
  readonly direction: readonly number[];
}

function lineOf(model: ExchangeModel, k: WaveVector, index: number): Line {
  const { group } = model.table;
  const at = (shift: number): number[] => {
    const given = [0, 0, 0];
    usedParameters(k).forEach((parameter, position) => {
      given[parameter] = (k.values?.[position] as number) + (position === index ? shift : 0);
    });
    return kappaOf(
      group,
      k.components.map((form) => evaluateFormNumber(form, given)),
    );
  };
  const [from, to] = [at(0), at(1)];
  return { at, direction: to.map((entry, axis) => entry - (from[axis] as number)) };
}

/** Mean of a matrix over the lowest level: all its vectors, where several are one by symmetry. */
function meanOf(model: ExchangeModel, only: ExchangeModel, kappa: readonly number[], scale: number): number {
  const branches = branchesAt(model, kappa);
  const matrix = latticeMatrix(only, kappa);
  return meanOver(branches, levelSize(branches, scale), (i, k) => [
    matrix.real[i * matrix.size + k] as number,
    matrix.imaginary[i * matrix.size + k] as number,
  ]);
}

function levelSize({ values }: ExchangeBranches, scale: number): number {
  const limit = (values[0] as number) + 1e3 * sameEnergyShare * scale;
  return values.filter((value) => value <= limit).length;
}

function meanOver(
  { size, real, imaginary }: ExchangeBranches,
  count: number,
  entry: (i: number, k: number) => readonly [number, number],
): number {
  let sum = 0;
  for (let n = 0; n < count; n++)
    for (let i = 0; i < size; i++)
      for (let k = 0; k < size; k++) {
        const [ar, ai] = [real[i * size + n] as number, imaginary[i * size + n] as number];
        const [br, bi] = [real[k * size + n] as number, imaginary[k * size + n] as number];
        const [mr, mi] = entry(i, k);
        sum += mr * (ar * br + ai * bi) - mi * (ar * bi - ai * br);
      }
  return sum / count;
}

/** One class alone with J = 1. */
function alone(model: ExchangeModel, index: number): ExchangeModel {
  const couplings = model.couplings.map(({ bonds }, at) => ({ bonds, j: at === index ? 1 : 0 }));
  return { ...model, couplings, potentials: model.potentials.map(() => 0) };
}

function relationOf(
  model: ExchangeModel,
  line: Line,
  scale: number,
  letter: number,
  value: number,
): StationaryRelation {
  const each = model.couplings.map((_, index) => alone(model, index));
  const branches = branchesAt(model, line.at(0));
  const count = levelSize(branches, scale);
  const means = (only: ExchangeModel, shift: number) => meanOf(model, only, line.at(shift), scale);
  return {
    letter: parameterNames[letter as 0 | 1 | 2],
    slopes: each.map((only) => roundNumber(slopeOf(only, branches, count, line))),
    curvatures: each.map((only) =>
      roundNumber(
        Number(((means(only, step) - 2 * means(only, 0) + means(only, -step)) / (step * step)).toPrecision(7)),
      ),
    ),
    cosines: cosineForm(model, line, value),
  };
}

/** `⟨∂J/∂u⟩` over the lowest level (Hellmann and Feynman). */
function slopeOf(only: ExchangeModel, branches: ExchangeBranches, count: number, { at, direction }: Line): number {
  const kappa = at(0);
  const { size } = branches;
  const real = new Float64Array(size * size);
  const imaginary = new Float64Array(size * size);
  for (const { bonds, j } of only.couplings) {
    if (j === 0) continue;
    for (const { from, to, translation } of bonds.bonds) {
      const turns = dot(translation, kappa);
      const factor =
        -2 * Math.PI * dot(translation, direction) * j * (only.lengths[from] as number) * (only.lengths[to] as number);
      const [re, im] = [factor * Math.sin(2 * Math.PI * turns), factor * Math.cos(2 * Math.PI * turns)];
      real[from * size + to] = (real[from * size + to] as number) + re;
      real[to * size + from] = (real[to * size + from] as number) + re;
      imaginary[from * size + to] = (imaginary[from * size + to] as number) + im;
      imaginary[to * size + from] = (imaginary[to * size + from] as number) - im;
    }
  }
  return meanOver(branches, count, (i, k) => [real[i * size + k] as number, imaginary[i * size + k] as number]);
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, axis) => sum + entry * (b[axis] as number), 0);
}

function slopeAt(model: ExchangeModel, line: Line, scale: number): number {
  const branches = branchesAt(model, line.at(0));
  return slopeOf(model, branches, levelSize(branches, scale), line);
}

function curvatureAt(model: ExchangeModel, line: Line): number {
  const lowest = (shift: number) => branchesAt(model, line.at(shift)).values[0] as number;
  return (lowest(step) - 2 * lowest(0) + lowest(-step)) / (step * step);
}

async function neededConstants(
  model: ExchangeModel,
  line: Line,
  options: { readonly fixedBySymmetry: boolean; readonly searchZone: boolean },
  host: WorkHost,
): Promise<NeededConstant[]> {
  const result: NeededConstant[] = [];
  for (const { bonds } of model.couplings) {
    const name = bonds.name;
    const j = neededValue(model, line, name);
    if (j === null) {
      result.push({ name, j, minimum: false, lowest: null });
      continue;
    }
    const changed = withConstants(model, { [name]: j });
    const { scale, count } = interactionOf(changed);
    if (count === 0) {
      // Without any constant every k is as good as another.
      result.push({ name, j: null, minimum: false, lowest: null });
      continue;
    }
    const minimum = curvatureAt(changed, line) > 1e-6 * scale;
    let lowest: boolean | null = null;
    if (options.searchZone) {
      const ground = await groundOf(changed, { mostLeaves: 300, leafShare: 1e-3 }, host);
      lowest = (branchesAt(changed, line.at(0)).values[0] as number) / 2 <= ground.energy + 1e-7 * scale;
    }
    result.push({ name, j: roundNumber(j), minimum, lowest });
  }
  return result;
}

/** The constant at which the slope vanishes; the slope is linear in it where symmetry fixes the eigenvector. */
function neededValue(model: ExchangeModel, line: Line, name: string): number | null {
  const slope = (j: number): number => {
    const changed = withConstants(model, { [name]: j });
    return slopeAt(changed, line, interactionOf(changed).scale);
  };
  const start = model.couplings.find(({ bonds }) => bonds.name === name)?.j ?? 0;
  const unit = interactionOf(model).scale;
  let [a, b] = [start, start + 0.1 * unit];
  let [fa, fb] = [slope(a), slope(b)];
  if (Math.abs(fa) < 1e-12 * unit) return a;
  for (let round = 0; round < 60; round++) {
    if (fb === fa) return null;
    const next = b - (fb * (b - a)) / (fb - fa);
    if (!Number.isFinite(next) || Math.abs(next) > 1e6 * unit) return null;
    [a, fa, b, fb] = [b, fb, next, slope(next)];
    if (Math.abs(b - a) <= 1e-13 * (Math.abs(b) + unit)) return Math.abs(fb) < 1e-7 * unit ? b : null;
  }
  return Math.abs(fb) < 1e-9 * unit ? b : null;
}

/**
 * For one atom in the primitive cell: `∂λ/∂u = −4π Σ m sin(2πmu)`, each sine over that of the smallest multiple as a sum
 * of cosines (Chebyshev polynomials of the second kind).
 */
function cosineForm(model: ExchangeModel, { at, direction }: Line, value: number): CosineTerm[][] | null {
  if (model.table.atoms.length !== 1) return null;
  const origin = at(-value);
  const sines = model.couplings.map(({ bonds }) => {
    const sums = new Map<number, number>();
    for (const { translation } of bonds.bonds) {
      const multiple = Math.round(Math.abs(dot(translation, direction)) * 1e6) / 1e6;
      if (multiple === 0) continue;
      const sign = Math.sign(dot(translation, direction));
      const turns = dot(translation, origin);
      // sin(2π(mu + c)): the odd part counts, the even one must cancel within the class.
      sums.set(multiple, (sums.get(multiple) ?? 0) + multiple * Math.cos(2 * Math.PI * turns));
      const key = -multiple;
      sums.set(key, (sums.get(key) ?? 0) + sign * Math.sin(2 * Math.PI * turns));
    }
    return sums;
  });
  if (sines.some((sums) => [...sums].some(([key, sum]) => key < 0 && Math.abs(sum) > 1e-9))) return null;
  const multiples = sines.flatMap((sums) =>
    [...sums].filter(([key, sum]) => key > 0 && Math.abs(sum) > 1e-9).map(([key]) => key),
  );
  if (multiples.length === 0) return null;
  const smallest = Math.min(...multiples);
  if (multiples.some((one) => Math.abs(one / smallest - Math.round(one / smallest)) > 1e-9)) return null;
  return sines.map((sums) => {
    const terms = new Map<number, number>();
    for (const [multiple, sum] of sums) {
      if (multiple < 0) continue;
      const order = Math.round(multiple / smallest);
      for (let s = order - 1; s >= 0; s -= 2) terms.set(s, (terms.get(s) ?? 0) + (s === 0 ? 1 : 2) * sum);
    }
    return [...terms]
      .filter(([, factor]) => Math.abs(factor) > 1e-9)
      .sort(([a], [b]) => a - b)
      .map(([s, factor]) => ({ factor: roundNumber(factor), multiple: roundNumber(s * smallest) }));
  });
}
