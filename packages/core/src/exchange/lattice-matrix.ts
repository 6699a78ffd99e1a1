import { type HermitianMatrix, hermitianEigen, hermitianMatrix } from "../algorithms/index.js";
import type { ExchangeModel } from "./types.js";

/** Eigenvalues of J(k) of unit spins in rising order with their vectors; column n belongs to `values[n]`. */
export interface ExchangeBranches {
  readonly size: number;
  readonly values: Float64Array;
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/**
 * J(k) in the convention of Fourier components, whose phase runs with the lattice translation alone:
 * `J_ij(k) = Σ |S_i||S_j| J exp(−2πi κ·T)`. `E = Σ_ij S_i* · J_ij S_j` for one cell and moments
 * `S_j exp(−2πi k·T) + c.c.`, half of it where 2k ∈ L*.
 */
export function latticeMatrix(model: ExchangeModel, kappa: readonly number[]): HermitianMatrix {
  const size = model.table.atoms.length;
  const matrix = hermitianMatrix(size);
  const { real, imaginary } = matrix;
  model.potentials.forEach((potential, atom) => {
    real[atom * size + atom] = potential;
  });
  for (const { bonds, j } of model.couplings) {
    if (j === 0) continue;
    for (const { from, to, translation } of bonds.bonds) {
      const turns = translation.reduce((sum, entry, axis) => sum + entry * (kappa[axis] as number), 0);
      const strength = j * (model.lengths[from] as number) * (model.lengths[to] as number);
      const [cosine, sine] = [strength * cosineOfTurns(turns), strength * cosineOfTurns(turns - 0.25)];
      real[from * size + to] = (real[from * size + to] as number) + cosine;
      real[to * size + from] = (real[to * size + from] as number) + cosine;
      imaginary[from * size + to] = (imaginary[from * size + to] as number) - sine;
      imaginary[to * size + from] = (imaginary[to * size + from] as number) + sine;
    }
  }
  return matrix;
}

export function branchesAt(model: ExchangeModel, kappa: readonly number[]): ExchangeBranches {
  const matrix = latticeMatrix(model, kappa);
  return { size: matrix.size, ...hermitianEigen(matrix) };
}

/** How many of the lowest eigenvalues are one within the tolerance. */
export function degeneracy({ values }: ExchangeBranches, tolerance: number, from = 0): number {
  const lowest = values[from] as number;
  let count = 1;
  while (from + count < values.length && (values[from + count] as number) - lowest <= tolerance) count += 1;
  return count;
}

/** cos 2πt, exactly 0 and ±1 at quarters, so that J(k) is exactly real where 2k ∈ L*. */
export function cosineOfTurns(turns: number): number {
  const quarter = 4 * (turns - Math.floor(turns));
  if (Number.isInteger(quarter)) return [1, 0, -1, 0][quarter % 4] as number;
  return Math.cos(2 * Math.PI * turns);
}
