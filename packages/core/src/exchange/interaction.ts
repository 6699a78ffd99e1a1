import { type HermitianMatrix, hermitianEigen, hermitianMatrix } from "../algorithms/index.js";
import type { ExchangeModel } from "./types.js";
import { bondVectors, type ZoneFrame, zoneFrame } from "./zone-frame.js";

/**
 * J(k) of unit spins as a function of x, the Cartesian k of the frame:
 * `J_ij = Σ |S_i||S_j| J exp(−2πi x·d)` over the bonds from i to j and, conjugated, over those from j to i.
 */
export interface Interaction {
  readonly frame: ZoneFrame;
  readonly size: number;
  readonly count: number;
  readonly from: Int32Array;
  readonly to: Int32Array;
  readonly strength: Float64Array;
  /** Bond by bond, `rank` numbers each, Å. */
  readonly vectors: Float64Array;
  /** ν of each atom. */
  readonly potentials: Float64Array;
  /** Largest Σ|J| at one atom: the scale of all energies; bounds every eigenvalue. */
  readonly scale: number;
}

/** @param given the frame of a larger set of bonds, where several models share one; default: that of the bonds with J ≠ 0 */
export function interactionOf(model: ExchangeModel, given?: ZoneFrame): Interaction {
  const bonds = model.couplings.flatMap(({ bonds, j }) => (j === 0 ? [] : bonds.bonds.map((bond) => ({ bond, j }))));
  const frame =
    given ??
    zoneFrame(
      model.table,
      bonds.map(({ bond }) => bond),
    );
  const vectorOf = bondVectors(model.table, frame);
  const size = model.table.atoms.length;
  const strength = Float64Array.from(
    bonds,
    ({ bond, j }) => j * (model.lengths[bond.from] as number) * (model.lengths[bond.to] as number),
  );
  const sums = new Float64Array(size);
  bonds.forEach(({ bond }, index) => {
    sums[bond.from] = (sums[bond.from] as number) + Math.abs(strength[index] as number);
    sums[bond.to] = (sums[bond.to] as number) + Math.abs(strength[index] as number);
  });
  return {
    frame,
    size,
    count: bonds.length,
    from: Int32Array.from(bonds, ({ bond }) => bond.from),
    to: Int32Array.from(bonds, ({ bond }) => bond.to),
    strength,
    vectors: Float64Array.from(bonds.flatMap(({ bond }) => [...vectorOf(bond)])),
    potentials: Float64Array.from(model.potentials),
    scale: Math.max(...sums, Number.MIN_VALUE),
  };
}

const turn = 2 * Math.PI;

/** Fills `value` with J(x) and, where given, `slopes[a]` with ∂J/∂x_a. */
export function fillInteraction(
  interaction: Interaction,
  x: ArrayLike<number>,
  value: HermitianMatrix,
  slopes: readonly HermitianMatrix[] = [],
): void {
  const { size, count, from, to, strength, vectors, frame } = interaction;
  const { rank } = frame;
  value.real.fill(0);
  value.imaginary.fill(0);
  for (let atom = 0; atom < size; atom++) value.real[atom * size + atom] = interaction.potentials[atom] as number;
  for (const slope of slopes) {
    slope.real.fill(0);
    slope.imaginary.fill(0);
  }
  for (let bond = 0; bond < count; bond++) {
    let phase = 0;
    for (let a = 0; a < rank; a++) phase += (vectors[bond * rank + a] as number) * (x[a] as number);
    const j = strength[bond] as number;
    const [cosine, sine] = [j * Math.cos(turn * phase), j * Math.sin(turn * phase)];
    const [i, k] = [from[bond] as number, to[bond] as number];
    add(value, size, i, k, cosine, -sine);
    for (let a = 0; a < slopes.length; a++) {
      const d = turn * (vectors[bond * rank + a] as number);
      add(slopes[a] as HermitianMatrix, size, i, k, -d * sine, -d * cosine);
    }
  }
}

/** Adds a number at (i, k) and its conjugate at (k, i). */
function add(matrix: HermitianMatrix, size: number, i: number, k: number, real: number, imaginary: number): void {
  const { real: re, imaginary: im } = matrix;
  re[i * size + k] = (re[i * size + k] as number) + real;
  re[k * size + i] = (re[k * size + i] as number) + real;
  im[i * size + k] = (im[i * size + k] as number) + imaginary;
  im[k * size + i] = (im[k * size + i] as number) - imaginary;
}

/** The lowest eigenvalue of J(x) and its slope (that of one of its branches where several meet). */
export interface LowestBranch {
  readonly value: number;
  readonly slope: Float64Array;
}

/** A function that gives the lowest eigenvalue; the matrices that it works in are made once. */
export function lowestBranch(interaction: Interaction): (x: ArrayLike<number>) => LowestBranch {
  const { size, frame } = interaction;
  const matrix = hermitianMatrix(size);
  const slopes = Array.from({ length: frame.rank }, () => hermitianMatrix(size));
  return (x) => {
    fillInteraction(interaction, x, matrix, slopes);
    if (size === 1)
      return { value: matrix.real[0] as number, slope: Float64Array.from(slopes, ({ real }) => real[0] as number) };
    const { values, real, imaginary } = hermitianEigen(matrix);
    // Hellmann and Feynman: the slope of an eigenvalue is that of the matrix between its eigenvector.
    return {
      value: values[0] as number,
      slope: Float64Array.from(slopes, (slope) => expectation(slope, real, imaginary, 0)),
    };
  };
}

/** `v† M v` for column `column` of the vectors. */
export function expectation(
  { size, real: re, imaginary: im }: HermitianMatrix,
  real: Float64Array,
  imaginary: Float64Array,
  column: number,
): number {
  let sum = 0;
  for (let i = 0; i < size; i++)
    for (let k = 0; k < size; k++) {
      const [ar, ai] = [real[i * size + column] as number, imaginary[i * size + column] as number];
      const [br, bi] = [real[k * size + column] as number, imaginary[k * size + column] as number];
      // Re(conj(a) · M_ik · b)
      const [pr, pi] = [ar * br + ai * bi, ar * bi - ai * br];
      sum += (re[i * size + k] as number) * pr - (im[i * size + k] as number) * pi;
    }
  return sum;
}

/** Half-widths of a box → the largest norm of what the first-order expansion of J about its centre leaves out. */
export function remainderOf(interaction: Interaction, half: ArrayLike<number>): number {
  const { size, count, from, to, strength, vectors, frame } = interaction;
  const sums = new Float64Array(size);
  for (let bond = 0; bond < count; bond++) {
    let phase = 0;
    for (let a = 0; a < frame.rank; a++)
      phase += Math.abs(vectors[bond * frame.rank + a] as number) * (half[a] as number);
    // |exp(iφ) − 1 − iφ| ≤ φ²/2, and ≤ 2 + φ.
    const angle = turn * phase;
    const left = Math.abs(strength[bond] as number) * Math.min((angle * angle) / 2, 2 + angle);
    const [i, k] = [from[bond] as number, to[bond] as number];
    sums[i] = (sums[i] as number) + left;
    sums[k] = (sums[k] as number) + left;
  }
  // The largest row sum bounds the spectral norm of a Hermitian matrix.
  return Math.max(...sums);
}
