import type { SmallIrrep, SmallIrreps } from "../irreps/index.js";
import type { Cyclotomic, Phase, PhasedNumber } from "../numbers/index.js";
import type { SiteOrbit } from "../spacegroups/index.js";

/** Fourier component of one atom in lattice components: `S = e^{2πi·phase} · vector`. */
export interface ModeMoment {
  readonly phase: Phase;
  readonly vector: readonly [Cyclotomic, Cyclotomic, Cyclotomic];
}

/** Basis vector `e_{c,p}` of copy c and partner p (both from 1): one Fourier component per atom of the orbit. */
export interface Mode {
  readonly copy: number;
  readonly partner: number;
  /** Index of the little-group suborbit on which it lives. */
  readonly suborbit: number;
  readonly moments: readonly ModeMoment[];
}

/** The part of a site's magnetic representation that belongs to one irrep. */
export interface IrrepModes {
  readonly irrep: SmallIrrep;
  readonly multiplicity: number;
  /** Copies in order, partners within a copy: multiplicity × dimension vectors. */
  readonly modes: readonly Mode[];
  /** The general allowed Fourier component on each atom, in symbols. */
  readonly constraint: readonly string[];
  /** Free real parameters of one arm's Fourier components. */
  readonly freeParameters: number;
  /**
   * Where −k is in another arm: the same when one order parameter drives all copies, which the relation between k and
   * −k then ties together. Elsewhere there is no such relation and it equals `freeParameters`.
   */
  readonly freeParametersWithMinusK: number;
  /** The relation itself; null where k ≡ −k or −k is not in the star. */
  readonly minusK: MinusKOnModes | null;
  /** Indices of orbit atoms whose component is zero for all amplitudes. */
  readonly vanishingAtoms: readonly number[];
}

/** Modes of one site at one k. */
export interface SiteModes {
  readonly orbit: SiteOrbit;
  /** Orbit indices grouped into orbits of the little group; the lowest index of each comes first. */
  readonly suborbits: readonly (readonly number[])[];
  readonly axial: boolean;
  readonly representations: SmallIrreps;
  readonly irreps: readonly IrrepModes[];
}

/**
 * How the operator g₀ that takes k to −k acts on the copies of an irrep, `Θ E_c = Σ_c' E'_c' N B_{c'c}` with
 * `(ΘS)_{j'} = e^{2πi k·a} det(R₀) R₀ S_j*`, `g₀ r_j = r_j' + a` and N of the irrep's relation. E' are the modes of
 * `partner`, the irrep itself unless it is complex.
 */
export interface MinusKOnModes {
  readonly operator: number;
  readonly partner: string;
  /** Suborbit that g₀ takes each suborbit to. */
  readonly suborbitImages: readonly number[];
  /** B, rows copies of the partner, columns copies of this irrep. */
  readonly matrix: readonly (readonly PhasedNumber[])[];
  /** For real irreps: the arrangement of one order parameter, up to a common phase, in symbols; else null. */
  readonly constraint: readonly string[] | null;
}
