import { type SmallIrreps, smallIrreps } from "../irreps/index.js";
import { numericWaveVector, parameterValues, type WaveVector } from "../kvectors/index.js";
import { integerDeterminant, phasedToComplex, roundNumber } from "../numbers/index.js";
import { atomActions } from "./atoms.js";
import { branchesAt, degeneracy, type ExchangeBranches } from "./lattice-matrix.js";
import { kappaOf } from "./placing.js";
import type { ExchangeModel } from "./types.js";

/** An irrep with how often it occurs. */
export interface IrrepCount {
  readonly label: string;
  readonly dimension: number;
  readonly multiplicity: number;
}

/** One eigenvalue of J(k). */
export interface ExchangeLevel {
  /** Energy per spin of an arrangement that has this eigenvector alone. */
  readonly energy: number;
  readonly degeneracy: number;
  /** Irreps of the little group in its eigenvectors: how the sites are weighed, without the direction of the spins. */
  readonly irreps: readonly IrrepCount[];
  /** Irreps of moments with it: the above times those of an axial vector. Isotropic exchange does not tell them apart. */
  readonly magneticIrreps: readonly IrrepCount[];
  /** Share of each atom in the eigenvectors, 1 in all for each vector. */
  readonly weights: readonly number[];
  /** Phase of each atom in turns against the first that has weight; null where there are several vectors. */
  readonly phases: readonly (number | null)[] | null;
}

/** The eigenvalues of J(k), lowest first, with their irreps. */
export interface ExchangeLevels {
  readonly k: WaveVector;
  readonly irreps: SmallIrreps;
  readonly levels: readonly ExchangeLevel[];
}

type Complex = readonly [number, number];

/**
 * Sorts the eigenvectors of J(k) by the irreps of the little group. Spins that only exchange couples do not feel the
 * lattice with their direction, so the site permutation representation `Γ(g)_{j'j} = e^{+2πi k·a}` decides (the
 * magnetic representation without det(R) R; docs/conventions.md, Moments and phases).
 *
 * @param k with numbers for its letters
 */
export function exchangeLevels(model: ExchangeModel, k: WaveVector, tolerance: number): ExchangeLevels {
  const { group } = model.table;
  const numbers = numericWaveVector(k);
  if (numbers === null) throw new Error("a letter of k is open");
  const branches = branchesAt(model, kappaOf(group, numbers));
  const irreps = smallIrreps(group, k);
  const sorter = irrepSorter(model, k, irreps);
  const levels: ExchangeLevel[] = [];
  for (let from = 0; from < branches.size; ) {
    const count = degeneracy(branches, tolerance, from);
    const traces = sorter.traces(branches, from, count);
    levels.push({
      energy: roundNumber((branches.values[from] as number) / 2),
      degeneracy: count,
      irreps: sorter.counts(traces),
      magneticIrreps: sorter.counts(traces.map(([re, im], g) => times([re, im], sorter.axial[g] as number))),
      weights: weightsOf(branches, from, count),
      phases: count === 1 ? phasesOf(branches, from) : null,
    });
    from += count;
  }
  return { k, irreps, levels };
}

function times([re, im]: Complex, factor: number): Complex {
  return [re * factor, im * factor];
}

function irrepSorter(model: ExchangeModel, k: WaveVector, irreps: SmallIrreps) {
  const { group, atoms } = model.table;
  const kappa = kappaOf(group, numericWaveVector(k) ?? []);
  const all = atomActions(group, atoms);
  const actions = irreps.littleGroup.operators.map((index) => all[index] as (typeof all)[number]);
  const values = parameterValues(k);
  const characters = irreps.irreps.map((irrep) =>
    irrep.characters.map((one) => phasedToComplex(one, values) ?? ([Number.NaN, Number.NaN] as const)),
  );
  return {
    /** Of an axial vector, `det(R) tr(R)`. */
    axial: actions.map(
      ({ rotation }) =>
        integerDeterminant(rotation) * ((rotation[0] as number) + (rotation[4] as number) + (rotation[8] as number)),
    ),
    /** Trace of each operator within the eigenvectors. */
    traces: ({ size, real, imaginary }: ExchangeBranches, from: number, count: number): Complex[] =>
      actions.map(({ image, shift }) => {
        let [sumRe, sumIm] = [0, 0];
        for (let atom = 0; atom < size; atom++) {
          const to = image[atom] as number;
          const turns = (shift[atom] as readonly number[]).reduce(
            (sum, a, axis) => sum + a * (kappa[axis] as number),
            0,
          );
          const [cosine, sine] = [Math.cos(2 * Math.PI * turns), Math.sin(2 * Math.PI * turns)];
          for (let n = from; n < from + count; n++) {
            const [ar, ai] = [real[to * size + n] as number, imaginary[to * size + n] as number];
            const [br, bi] = [real[atom * size + n] as number, imaginary[atom * size + n] as number];
            const [pr, pi] = [ar * br + ai * bi, ar * bi - ai * br];
            sumRe += pr * cosine - pi * sine;
            sumIm += pr * sine + pi * cosine;
          }
        }
        return [sumRe, sumIm];
      }),
    counts: (traces: readonly Complex[]): IrrepCount[] =>
      irreps.irreps.flatMap(({ label, dimension }, index) => {
        const own = characters[index] as readonly Complex[];
        const sum = traces.reduce((total, [re, im], g) => {
          const [cr, ci] = own[g] as Complex;
          return total + cr * re + ci * im;
        }, 0);
        const multiplicity = Math.round(sum / traces.length);
        return multiplicity === 0 ? [] : [{ label, dimension, multiplicity }];
      }),
  };
}

function weightsOf({ size, real, imaginary }: ExchangeBranches, from: number, count: number): number[] {
  return Array.from({ length: size }, (_, atom) => {
    let sum = 0;
    for (let n = from; n < from + count; n++)
      sum += (real[atom * size + n] as number) ** 2 + (imaginary[atom * size + n] as number) ** 2;
    return roundNumber(sum);
  });
}

function phasesOf({ size, real, imaginary }: ExchangeBranches, n: number): (number | null)[] {
  const turns = Array.from({ length: size }, (_, atom) => {
    const [re, im] = [real[atom * size + n] as number, imaginary[atom * size + n] as number];
    return Math.hypot(re, im) < 1e-7 ? null : Math.atan2(im, re) / (2 * Math.PI);
  });
  const first = turns.find((one) => one !== null) ?? 0;
  return turns.map((one) => {
    if (one === null) return null;
    const step = one - first;
    // Half a turn is written +1/2, and what is nearly none is none.
    const reduced = step - Math.ceil(step - 0.5 - 1e-9);
    return Math.abs(reduced) < 1e-9 ? 0 : roundNumber(Number(reduced.toFixed(9)));
  });
}
