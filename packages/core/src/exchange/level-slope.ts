import { usedParameters, type WaveVector } from "../kvectors/index.js";
import { evaluateFormNumber, sameEnergyShare } from "../numbers/index.js";
import { branchesAt, type ExchangeBranches, latticeMatrix } from "./lattice-matrix.js";
import { kappaOf } from "./placing.js";
import type { ExchangeModel } from "./types.js";

/** κ along one letter of k, through its value. */
export interface Line {
  readonly at: (shift: number) => number[];
  readonly direction: readonly number[];
}

/** @param index which of the open letters of k runs */
export function lineOf(model: ExchangeModel, k: WaveVector, index: number): Line {
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

/** Step in a letter for second differences: rounding leaves 1e-8 of the scale. */
const step = 1e-4;

/** ∂λ/∂letter of the lowest level. */
export function slopeAt(model: ExchangeModel, line: Line, scale: number): number {
  return slopeOf(model, branchesAt(model, line.at(0)), line, scale);
}

/**
 * `⟨∂J/∂letter⟩` of one part of a model over the lowest level of the whole (Hellmann and Feynman): the mean over all its
 * vectors, where several are one by symmetry.
 */
export function slopeOf(part: ExchangeModel, branches: ExchangeBranches, line: Line, scale: number): number {
  const { at, direction } = line;
  const kappa = at(0);
  const { size } = branches;
  const real = new Float64Array(size * size);
  const imaginary = new Float64Array(size * size);
  for (const { bonds, j } of part.couplings) {
    if (j === 0) continue;
    for (const { from, to, translation } of bonds.bonds) {
      const turns = dot(translation, kappa);
      const factor =
        -2 * Math.PI * dot(translation, direction) * j * (part.lengths[from] as number) * (part.lengths[to] as number);
      const [re, im] = [factor * Math.sin(2 * Math.PI * turns), factor * Math.cos(2 * Math.PI * turns)];
      real[from * size + to] = (real[from * size + to] as number) + re;
      real[to * size + from] = (real[to * size + from] as number) + re;
      imaginary[from * size + to] = (imaginary[from * size + to] as number) + im;
      imaginary[to * size + from] = (imaginary[to * size + from] as number) - im;
    }
  }
  return meanOver(branches, levelSize(branches, scale), (i, k) => [
    real[i * size + k] as number,
    imaginary[i * size + k] as number,
  ]);
}

/** ∂²λ/∂letter² of the lowest level. */
export function curvatureAt(model: ExchangeModel, line: Line): number {
  return secondDifference((shift) => branchesAt(model, line.at(shift)).values[0] as number);
}

/** ∂²/∂letter² of the mean of one part over the lowest level of the whole, whose vectors go along. */
export function curvatureOf(model: ExchangeModel, part: ExchangeModel, line: Line, scale: number): number {
  return secondDifference((shift) => {
    const kappa = line.at(shift);
    const branches = branchesAt(model, kappa);
    const matrix = latticeMatrix(part, kappa);
    return meanOver(branches, levelSize(branches, scale), (i, k) => [
      matrix.real[i * matrix.size + k] as number,
      matrix.imaginary[i * matrix.size + k] as number,
    ]);
  });
}

function secondDifference(value: (shift: number) => number): number {
  return (value(step) - 2 * value(0) + value(-step)) / (step * step);
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

export function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, axis) => sum + entry * (b[axis] as number), 0);
}
