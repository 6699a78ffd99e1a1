import type { ComplexRecord, GroupRecord, KRecord, LittleGroupRecord } from "./common.js";
import type { ExactIrrepRecord } from "./irreps.js";

/** Basis vector of copy c and partner p: the Fourier component of every orbit atom in lattice components. */
export interface ModeRecord {
  readonly copy: number;
  readonly partner: number;
  /** Index of the little-group suborbit on which it lives. */
  readonly suborbit: number;
  readonly moments: readonly (readonly ComplexRecord[])[] | null;
  readonly exact: readonly (readonly string[])[];
}

/** The part of a site's representation that belongs to one irrep. */
export interface IrrepModesRecord {
  readonly label: string;
  readonly dimension: number;
  readonly reality: "real" | "pseudoreal" | "complex";
  readonly multiplicity: number;
  readonly characters: readonly ComplexRecord[] | null;
  readonly matrices: readonly (readonly (readonly ComplexRecord[])[])[] | null;
  readonly exact: ExactIrrepRecord;
  readonly modes: readonly ModeRecord[];
  /** The allowed Fourier component of every orbit atom, in symbols. */
  readonly constraint: readonly string[];
  readonly freeParameters: number;
  /** With the relation between k and −k of one order parameter; null while it is not derived. */
  readonly freeParametersWithMinusK: number | null;
  /** Indices of orbit atoms whose component is zero for all amplitudes. */
  readonly vanishingAtoms: readonly number[];
  /** Whether equal |S| on all atoms is possible; null where it was not computed. */
  readonly equalAmplitude: boolean | null;
  /** Whether equal moments in all cells are possible; null where it was not computed. */
  readonly constantMoment: boolean | null;
}

/** One site: `orbit` holds one atom per atom of the primitive cell, the positions that the phases refer to. */
export interface SiteModesRecord {
  readonly label: string;
  readonly position: readonly string[];
  readonly multiplicity: number;
  readonly siteSymmetry: string;
  readonly orbit: readonly (readonly string[])[];
  readonly suborbits: readonly (readonly number[])[];
  readonly irreps: readonly IrrepModesRecord[];
}

/** Result of `kvane modes`. */
export interface ModesRecord {
  readonly group: GroupRecord;
  readonly k: KRecord;
  readonly minusK: "equivalent" | "in star" | "not in star";
  readonly arms: number;
  readonly axial: boolean;
  readonly littleGroup: LittleGroupRecord;
  readonly sites: readonly SiteModesRecord[];
}
