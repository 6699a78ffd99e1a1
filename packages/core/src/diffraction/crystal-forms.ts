import { integerDeterminant, reflectionIndexTolerance } from "../numbers/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { cartesianQ, type Triple } from "./geometry.js";
import { rotationNumbers, rowTimesNumbers } from "./satellite-members.js";
import { addChirality, addSquares, basisFactors, type PreparedSpace } from "./structure-factors.js";

/** The vector H + k of a wave that a reflection means, with k or with −k. */
export interface MatchedWave {
  readonly wave: number;
  /** H + k exactly; −(H + k) where the reflection is H − k. */
  readonly q: Triple;
}

/** The wave of a space that a reflection Q (a*, b*, c*) belongs to, or null when it is no satellite of it. */
export function matchWave({ lattice }: SpaceGroup, prepared: PreparedSpace, q: Triple): MatchedWave | null {
  const vectors = lattice.vectors.map((vector) => vector.map((entry) => entry / lattice.denominator));
  let best: MatchedWave | null = null;
  let nearest = reflectionIndexTolerance;
  prepared.waveVectors.forEach((k, wave) => {
    for (const side of [1, -1]) {
      const h = [side * q[0] - k[0], side * q[1] - k[1], side * q[2] - k[2]];
      const eta = vectors.map((vector) => vector.reduce((sum, entry, axis) => sum + entry * (h[axis] as number), 0));
      const whole = eta.map(Math.round);
      const away = Math.max(...eta.map((entry, axis) => Math.abs(entry - (whole[axis] as number))));
      if (away >= nearest) continue;
      nearest = away;
      best = { wave, q: moved(lattice.vectors, lattice.denominator, whole, k) };
    }
  });
  return best;
}

/** `η B⁻¹ + k`, B upper triangular as rows. */
function moved(
  vectors: readonly (readonly [number, number, number])[],
  denominator: number,
  eta: readonly number[],
  k: Triple,
): Triple {
  const [p, q, r] = vectors as [Triple, Triple, Triple];
  // H·T_i = η_i: solve from the last basis vector, which has one component.
  const l = ((eta[2] as number) * denominator) / r[2];
  const second = ((eta[1] as number) * denominator - q[2] * l) / q[1];
  const h = ((eta[0] as number) * denominator - p[1] * second - p[2] * l) / p[0];
  return [h + k[0], second + k[1], l + k[2]];
}

/**
 * `|F⊥(Q)|² = aᵀ A a` of one domain of a crystal: that which the operator {R|t} makes of the arrangement, so that it
 * scatters at Q as the first does at Q R. Zero where Q is no satellite of that domain.
 *
 * @param polarization P·Q̂ of the beam, −1 to 1: that many times the chiral term, det(R) times that of the first domain at
 *   Q R, is added
 */
export function domainForm(
  group: SpaceGroup,
  prepared: PreparedSpace,
  q: Triple,
  operator: number,
  polarization = 0,
): Float64Array {
  const { size } = prepared;
  const matrix = new Float64Array(size * size);
  const symmetry = group.operators[operator];
  if (!symmetry) throw new Error(`the group has no operator ${operator}`);
  const rotation = rotationNumbers(symmetry);
  const found = matchWave(group, prepared, rowTimesNumbers(q, rotation));
  if (found === null) return matrix;
  const factors = basisFactors(prepared, found.wave, found.q);
  addSquares(matrix, factors, size, 1);
  if (polarization !== 0) {
    const hand = integerDeterminant(group.primitive.rotations[operator] as readonly number[]);
    addChirality(matrix, factors, size, cartesianQ(prepared.geometry, found.q), hand * polarization);
  }
  return matrix;
}
