import type { WaveVector } from "../kvectors/index.js";
import type { MagneticFormFactor } from "./form-factors.js";
import type { Triple } from "./geometry.js";

/** A magnetic atom: one per class of the lattice L, at exactly this position, to which its phases refer. */
export interface ScatteringAtom {
  /** Label of the site. */
  readonly site: string;
  readonly position: Triple;
  readonly formFactor: MagneticFormFactor;
  /** Share of the site that carries the moment, 1 where it is left out. */
  readonly occupancy?: number;
}

/**
 * Fourier component S of one atom, real and imaginary part, in μB along the unit vectors a/|a|, b/|b|, c/|c|:
 * `M(T) = S e^{−2πi k·T} + c.c.`, and without the conjugate (S real) where 2k ∈ L*.
 */
export interface FourierComponent {
  readonly real: Triple;
  readonly imaginary: Triple;
}

/** One arm of a star that takes part in an arrangement; −k comes with k. */
export interface ArrangementWave {
  readonly k: WaveVector;
  /** 2k ∈ L*. */
  readonly halfLattice: boolean;
  /** Index of the operator {R|t} of the group with `k = k₀ R⁻¹`, k₀ the k of the list of satellites; 0 for k₀ itself. */
  readonly operator: number;
}

/** All moments of one arrangement. */
export interface MomentArrangement {
  readonly atoms: readonly ScatteringAtom[];
  readonly waves: readonly (ArrangementWave & {
    /** One per atom. */
    readonly components: readonly FourierComponent[];
  })[];
}

/** What one free real amplitude, at 1, puts on the atoms. */
export interface MomentBasisVector {
  readonly label: string;
  /** By wave, then by atom. */
  readonly components: readonly (readonly FourierComponent[])[];
  /** Of a configuration: what its own amplitude (docs/conventions.md) is when this one is 1. */
  readonly unit?: number;
}

/** The arrangements that an irrep or a configuration allows: a real linear space. Amplitudes are in μB. */
export interface MomentSpace {
  readonly id: string;
  readonly atoms: readonly ScatteringAtom[];
  readonly waves: readonly ArrangementWave[];
  readonly basis: readonly MomentBasisVector[];
}

const nothing: FourierComponent = { real: [0, 0, 0], imaginary: [0, 0, 0] };

/** The arrangement with these amplitudes, one per basis vector. */
export function arrangementWith(space: MomentSpace, amplitudes: readonly number[]): MomentArrangement {
  return {
    atoms: space.atoms,
    waves: space.waves.map((wave, waveIndex) => ({
      ...wave,
      components: space.atoms.map((_, atom) =>
        space.basis.reduce((sum, { components }, index) => {
          const own = components[waveIndex]?.[atom] ?? nothing;
          const factor = amplitudes[index] ?? 0;
          return { real: plus(sum.real, factor, own.real), imaginary: plus(sum.imaginary, factor, own.imaginary) };
        }, nothing),
      ),
    })),
  };
}

function plus(a: Triple, factor: number, b: Triple): Triple {
  return [a[0] + factor * b[0], a[1] + factor * b[1], a[2] + factor * b[2]];
}

/** An arrangement as a space with a single amplitude, 1 for the arrangement itself. */
export function spaceOfArrangement(id: string, { atoms, waves }: MomentArrangement): MomentSpace {
  return {
    id,
    atoms,
    waves: waves.map(({ k, halfLattice, operator }) => ({ k, halfLattice, operator })),
    basis: [{ label: "a", components: waves.map(({ components }) => components) }],
  };
}
