import type { WaveVector } from "../kvectors/index.js";
import { type PositionLimits, type SatelliteLine, satelliteLines } from "../reflections/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { scatteringGeometry } from "./geometry.js";
import type { MomentArrangement, MomentSpace } from "./moment-space.js";
import { spaceOfArrangement } from "./moment-space.js";
import { type LineMembers, lineMembers } from "./satellite-members.js";
import { addSquares, basisFactors, type PreparedSpace, prepareSpace } from "./structure-factors.js";

/** A powder line of a space of arrangements. */
export interface LineForm {
  readonly line: SatelliteLine;
  /** `Σ |F⊥|² = aᵀ A a` over all vectors of the line, 10⁻²⁴ cm² per μB²; size × size, row by row. */
  readonly matrix: Float64Array;
}

/**
 * Σ|F⊥|² of the powder lines as quadratic forms of the amplitudes: over all vectors ±(H + k) of the line and all waves of
 * the arrangement. For one wave this is the sum over all arms of the domains divided by the number of arm pairs
 * (docs/methods.md, Satellites).
 */
export function lineForms(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  space: MomentSpace,
  limits: PositionLimits,
): readonly LineForm[] {
  const prepared = prepareSpace(scatteringGeometry(group, cell), space);
  const members = lineMembers(group, k);
  return satelliteLines(group, cell, k, limits).map((line) => ({ line, matrix: lineForm(prepared, members, line) }));
}

/** The quadratic form of one line. */
export function lineForm(prepared: PreparedSpace, members: LineMembers, line: SatelliteLine): Float64Array {
  const { size, space } = prepared;
  const matrix = new Float64Array(size * size);
  const onFirst = members.of(line.h, line.sign);
  const weight = members.halfLattice ? 1 : 2;
  space.waves.forEach((wave, index) => {
    for (const q of members.onArm(onFirst, wave)) addSquares(matrix, basisFactors(prepared, index, q), size, weight);
  });
  return matrix;
}

/** A line with the intensity of one arrangement. */
export interface LineSquare {
  readonly line: SatelliteLine;
  /** Σ|F⊥|² over its vectors, 10⁻²⁴ cm². */
  readonly square: number;
}

/** Σ|F⊥|² of every powder line of one arrangement. */
export function lineSquares(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  arrangement: MomentArrangement,
  limits: PositionLimits,
): readonly LineSquare[] {
  return lineForms(group, cell, k, spaceOfArrangement("", arrangement), limits).map(({ line, matrix }) => ({
    line,
    square: matrix[0] as number,
  }));
}

/** `aᵀ A a`. */
export function quadraticForm(matrix: Float64Array, amplitudes: ArrayLike<number>): number {
  const size = amplitudes.length;
  let sum = 0;
  for (let a = 0; a < size; a++) {
    let row = 0;
    for (let b = 0; b < size; b++) row += (matrix[a * size + b] as number) * (amplitudes[b] as number);
    sum += row * (amplitudes[a] as number);
  }
  return sum;
}
