import type { PositionLimits } from "../reflections/index.js";
import { type NuclearLine, nuclearLines } from "../reflections/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { cartesianQ, type ScatteringGeometry, scatteringGeometry, type Triple } from "./geometry.js";
import { rotationNumbers, rowTimesNumbers } from "./satellite-members.js";
import { scatteringLength } from "./scattering-lengths.js";

/** A nucleus: one per class of the lattice L, so that all atoms of an orbit are listed. */
export interface NuclearAtom {
  /** Element or isotope, or its length in fm. */
  readonly nucleus: string | number;
  readonly position: Triple;
  readonly occupancy?: number;
  /** Isotropic displacement B in Å². */
  readonly displacement?: number;
}

/**
 * `N(H) = Σ_j o_j b_j e^{−B_j s²} e^{2πi H·r_j}` over one atom per class of L, in 10⁻¹² cm as `[re, im]`. Throws
 * `invalid-argument` for a nucleus that is not in the table.
 */
export function nuclearStructureFactor(
  geometry: ScatteringGeometry,
  atoms: readonly NuclearAtom[],
  h: Triple,
): readonly [number, number] {
  const square = (Math.hypot(...cartesianQ(geometry, h)) / (4 * Math.PI)) ** 2;
  let real = 0;
  let imaginary = 0;
  for (const { nucleus, position, occupancy = 1, displacement = 0 } of atoms) {
    const length = typeof nucleus === "number" ? { real: nucleus, imaginary: 0 } : scatteringLength(nucleus);
    // 1 fm is 0.1 × 10⁻¹² cm.
    const factor = 0.1 * occupancy * Math.exp(-displacement * square);
    const angle = 2 * Math.PI * (h[0] * position[0] + h[1] * position[1] + h[2] * position[2]);
    const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
    real += factor * (length.real * cosine - length.imaginary * sine);
    imaginary += factor * (length.real * sine + length.imaginary * cosine);
  }
  return [real, imaginary];
}

/** A nuclear powder line with Σ|N|² over its vectors in 10⁻²⁴ cm². */
export interface NuclearSquare {
  readonly line: NuclearLine;
  readonly square: number;
}

/** Σ|N|² of the nuclear powder lines; per primitive cell, as the magnetic ones, so that their ratio is that of intensities. */
export function nuclearSquares(
  group: SpaceGroup,
  cell: Cell,
  atoms: readonly NuclearAtom[],
  limits: PositionLimits,
): readonly NuclearSquare[] {
  const geometry = scatteringGeometry(group, cell);
  const rotations = group.operators.map(rotationNumbers);
  return nuclearLines(group, cell, limits).map((line) => {
    const vectors = new Map<string, Triple>();
    for (const rotation of rotations)
      for (const side of [1, -1]) {
        const image = rowTimesNumbers([side * line.h[0], side * line.h[1], side * line.h[2]], rotation);
        vectors.set(image.map((entry) => Math.round(1e4 * entry)).join(), image);
      }
    let square = 0;
    for (const h of vectors.values()) {
      const [real, imaginary] = nuclearStructureFactor(geometry, atoms, h);
      square += real * real + imaginary * imaginary;
    }
    return { line, square };
  });
}
