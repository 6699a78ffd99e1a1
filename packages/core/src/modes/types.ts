import type { SmallIrrep, SmallIrreps } from "../irreps/index.js";
import type { Cyclotomic, Phase } from "../numbers/index.js";
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
  /** The same with the relation between k and −k of one order parameter; null while it is not derived. */
  readonly freeParametersWithMinusK: number | null;
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
