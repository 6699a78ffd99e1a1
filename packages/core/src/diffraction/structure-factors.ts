import { numericWaveVector } from "../kvectors/index.js";
import { formFactorAt, type MagneticFormFactor } from "./form-factors.js";
import {
  cartesianMoment,
  cartesianQ,
  dotTriple,
  type ScatteringGeometry,
  scaleTriple,
  type Triple,
} from "./geometry.js";
import { type MomentArrangement, type MomentSpace, spaceOfArrangement } from "./moment-space.js";

/**
 * γ r₀/2 in 10⁻¹² cm per μB: γ = 1.91304276 nuclear magnetons of the neutron, r₀ = 2.8179403 fm (CODATA 2018);
 * International Tables C, section 4.4.5, has 0.2695.
 */
export const magneticLengthPerMagneton = (1.91304276 * 0.28179403205) / 2;

/** A space of arrangements ready for sums over many Q: Cartesian, flat. */
export interface PreparedSpace {
  readonly space: MomentSpace;
  readonly geometry: ScatteringGeometry;
  readonly size: number;
  /** k of each wave as numbers. */
  readonly waveVectors: readonly Triple[];
  /** Per wave: basis × atoms × (re x y z, im x y z), times γ r₀/2. */
  readonly components: readonly Float64Array[];
  readonly positions: Float64Array;
  /** The different form factors, and which one each atom has. */
  readonly factors: readonly MagneticFormFactor[];
  readonly factorOf: readonly number[];
}

/** Cartesian components of a space in one geometry. */
export function prepareSpace(geometry: ScatteringGeometry, space: MomentSpace): PreparedSpace {
  const { atoms, basis, waves } = space;
  const factors = [...new Set(atoms.map(({ formFactor }) => formFactor))];
  return {
    space,
    geometry,
    size: basis.length,
    waveVectors: waves.map(({ k }) => {
      const numeric = numericWaveVector(k);
      if (numeric === null) throw new Error("a wave vector of an arrangement has open letters");
      return numeric;
    }),
    components: waves.map((_, wave) => {
      const flat = new Float64Array(basis.length * atoms.length * 6);
      basis.forEach((vector, index) => {
        atoms.forEach(({ occupancy = 1 }, atom) => {
          const component = vector.components[wave]?.[atom];
          if (!component) return;
          const start = 6 * (index * atoms.length + atom);
          flat.set(scaleTriple(occupancy, cartesianMoment(geometry, component.real)), start);
          flat.set(scaleTriple(occupancy, cartesianMoment(geometry, component.imaginary)), start + 3);
        });
      });
      return flat.map((value) => value * magneticLengthPerMagneton);
    }),
    positions: Float64Array.from(atoms.flatMap(({ position }) => position)),
    factors,
    factorOf: atoms.map(({ formFactor }) => factors.indexOf(formFactor)),
  };
}

/**
 * F⊥ of every basis vector at Q = H + k of one wave, in 10⁻¹² cm per μB of amplitude: basis × (re x y z, im x y z) on
 * Cartesian axes. `F(Q) = Σ_j p f_j(Q) S_j e^{2πi (H+k)·r_j}` over one atom per class of L (docs/conventions.md, Moments
 * and phases); F⊥ = F − Q̂ (Q̂·F), and all of F at Q = 0.
 *
 * @param q H + k in a*, b*, c*
 */
export function basisFactors(prepared: PreparedSpace, wave: number, q: Triple): Float64Array {
  const { positions, factors, factorOf, size, geometry } = prepared;
  const components = prepared.components[wave] as Float64Array;
  const atoms = factorOf.length;
  const cartesian = cartesianQ(geometry, q);
  const length = Math.hypot(...cartesian);
  const atQ = factors.map((factor) => formFactorAt(factor, length));
  const sums = new Float64Array(6 * size);
  for (let atom = 0; atom < atoms; atom++) {
    const turns =
      q[0] * (positions[3 * atom] as number) +
      q[1] * (positions[3 * atom + 1] as number) +
      q[2] * (positions[3 * atom + 2] as number);
    const angle = 2 * Math.PI * (turns - Math.round(turns));
    const factor = atQ[factorOf[atom] as number] as number;
    const [cosine, sine] = [factor * Math.cos(angle), factor * Math.sin(angle)];
    for (let index = 0; index < size; index++) {
      const from = 6 * (index * atoms + atom);
      const to = 6 * index;
      for (let axis = 0; axis < 3; axis++) {
        const re = components[from + axis] as number;
        const im = components[from + axis + 3] as number;
        sums[to + axis] = (sums[to + axis] as number) + cosine * re - sine * im;
        sums[to + axis + 3] = (sums[to + axis + 3] as number) + cosine * im + sine * re;
      }
    }
  }
  if (length > 0) for (let start = 0; start < 6 * size; start += 3) takeAlong(sums, start, cartesian, length);
  return sums;
}

/** v − Q (Q·v)/Q² in place. */
function takeAlong(values: Float64Array, start: number, q: Triple, length: number): void {
  const along =
    ((values[start] as number) * q[0] + (values[start + 1] as number) * q[1] + (values[start + 2] as number) * q[2]) /
    (length * length);
  for (let axis = 0; axis < 3; axis++)
    values[start + axis] = (values[start + axis] as number) - along * (q[axis] as number);
}

/**
 * Adds `weight · Re(G_a*·G_b)` for all pairs of basis vectors to a size × size matrix: |F⊥|² = aᵀ A a for amplitudes a.
 */
export function addSquares(matrix: Float64Array, factors: Float64Array, size: number, weight: number): void {
  for (let a = 0; a < size; a++)
    for (let b = a; b < size; b++) {
      let sum = 0;
      for (let part = 0; part < 6; part++) sum += (factors[6 * a + part] as number) * (factors[6 * b + part] as number);
      matrix[a * size + b] = (matrix[a * size + b] as number) + weight * sum;
      if (a !== b) matrix[b * size + a] = (matrix[b * size + a] as number) + weight * sum;
    }
}

/**
 * Adds `weight · C` for the chiral term as a quadratic form: `i (F⊥* × F⊥)·Q̂ = aᵀ C a`.
 *
 * @param q Cartesian, any length but 0
 */
export function addChirality(
  matrix: Float64Array,
  factors: Float64Array,
  size: number,
  q: Triple,
  weight: number,
): void {
  const part = (index: number, start: number): Triple => [
    factors[6 * index + start] as number,
    factors[6 * index + start + 1] as number,
    factors[6 * index + start + 2] as number,
  ];
  const scale = weight / (2 * (Math.hypot(...q) || 1));
  for (let a = 0; a < size; a++)
    for (let b = 0; b < size; b++)
      matrix[a * size + b] =
        (matrix[a * size + b] as number) +
        scale * (chiralityAlong(part(a, 0), part(b, 3), q) + chiralityAlong(part(b, 0), part(a, 3), q));
}

/** Structure factor of one arrangement at one Q. */
export interface MagneticStructureFactor {
  /** F⊥ on Cartesian axes (x ∥ a, z ∥ c*), 10⁻¹² cm. */
  readonly perpendicular: { readonly real: Triple; readonly imaginary: Triple };
  /** |F⊥|² in 10⁻²⁴ cm². */
  readonly square: number;
  /**
   * `i (F⊥* × F⊥)·Q̂` in 10⁻²⁴ cm²: a beam of polarization P scatters with |F⊥|² + P·Q̂ times this (M. Blume, Phys. Rev.
   * 130 (1963) 1670), for Q = k_i − k_f, which goes with e^{+iQ·r}.
   */
  readonly chirality: number;
}

/**
 * F(Q) and F⊥(Q) of one arrangement in 10⁻¹² cm per primitive cell, `F(Q) = Σ p f S exp(2πi Q·r)` (docs/conventions.md,
 * Moments and phases), with |F⊥|² and the chiral term (M. Blume, Phys. Rev. 130 (1963) 1670).
 *
 * @param q H + k of wave `wave`, in a*, b*, c*
 */
export function magneticStructureFactor(
  geometry: ScatteringGeometry,
  arrangement: MomentArrangement,
  q: Triple,
  wave = 0,
): MagneticStructureFactor {
  const factors = basisFactors(prepareSpace(geometry, spaceOfArrangement("", arrangement)), wave, q);
  return structureFactorFrom(factors, cartesianQ(geometry, q));
}

function structureFactorFrom(factors: Float64Array, q: Triple): MagneticStructureFactor {
  const real: Triple = [factors[0] as number, factors[1] as number, factors[2] as number];
  const imaginary: Triple = [factors[3] as number, factors[4] as number, factors[5] as number];
  const length = Math.hypot(...q);
  return {
    perpendicular: { real, imaginary },
    square: dotTriple(real, real) + dotTriple(imaginary, imaginary),
    chirality: length > 0 ? chiralityAlong(real, imaginary, q) / length : 0,
  };
}

/** (a − ib) × (a + ib) = 2i a × b, and i of that −2 a × b; along Q. */
export function chiralityAlong(real: Triple, imaginary: Triple, q: Triple): number {
  return (
    -2 *
    (q[0] * (real[1] * imaginary[2] - real[2] * imaginary[1]) +
      q[1] * (real[2] * imaginary[0] - real[0] * imaginary[2]) +
      q[2] * (real[0] * imaginary[1] - real[1] * imaginary[0]))
  );
}
