import type { CellRecord, ComplexRecord, GroupRecord, KRecord, LittleGroupRecord } from "./common.js";
import type { ExactIrrepRecord } from "./irreps.js";

/**
 * How Fourier components are written. kvane's own: `M_j(T) = S_j exp(−2πi k·T) + c.c.`, that is exponent minus, phase
 * lattice, factor one, components lattice.
 */
export interface ConventionRecord {
  readonly exponent: "minus" | "plus";
  /** The phase runs with the lattice translation T, or with the position T + r_j of the atom. */
  readonly phase: "lattice" | "position";
  /** Whether the wave and its conjugate are added as they stand or with the factor 1/2. */
  readonly factor: "one" | "half";
  /** Axes of `moments`; `crystal` are the unit vectors along a, b, c, `cartesian` has x ∥ a and z ∥ c*. */
  readonly components: "lattice" | "crystal" | "cartesian";
}

/**
 * Basis vector of copy c and partner p: the Fourier component of every orbit atom. `moments` are in the components of
 * the convention (in crystal and Cartesian ones each copy is divided by the length of the axis of its leading entry),
 * `exact` always in lattice components.
 */
export interface ModeRecord {
  readonly copy: number;
  readonly partner: number;
  /** Index of the little-group suborbit on which it lives. */
  readonly suborbit: number;
  readonly moments: readonly (readonly ComplexRecord[])[] | null;
  readonly exact: readonly (readonly string[])[];
}

/**
 * How g₀ with `k R₀⁻¹ ≡ −k`, combined with complex conjugation, acts on the copies: `Θ E_c = Σ_c' E'_c' N B_{c'c}`, E' the
 * modes of `partner`.
 */
export interface MinusKModesRecord {
  readonly operator: string;
  readonly partner: string;
  /** The suborbit that g₀ takes each suborbit to. */
  readonly suborbitImages: readonly number[];
  /** B: rows are copies of the partner, columns copies of the irrep; kvane's own convention. Null with an open letter. */
  readonly matrix: readonly (readonly ComplexRecord[])[] | null;
  readonly exact: readonly (readonly string[])[];
  /**
   * The arrangement of one order parameter, up to a common phase: letters are real, complex where a star marks their
   * conjugate; ξ1, ξ2 are its components. Null unless the irrep is real.
   */
  readonly constraint: readonly string[] | null;
  readonly constraintCrystal: readonly string[] | null;
}

/** The basis vectors of one site on one arm of the star. */
export interface ArmModesRecord {
  readonly arm: KRecord;
  /** The operator that takes k to the arm. */
  readonly operator: string;
  readonly irreps: readonly { readonly label: string; readonly modes: readonly ModeRecord[] }[];
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
  /** The allowed Fourier component of every orbit atom, in symbols, in lattice components. */
  readonly constraint: readonly string[];
  /** The same in μB along the crystal axes; null where it is the same text, or without a cell. */
  readonly constraintCrystal: readonly string[] | null;
  readonly freeParameters: number;
  /** With the relation between k and −k of one order parameter. */
  readonly freeParametersWithMinusK: number;
  /** That relation on the copies; null where k ≡ −k, −k is not in the star, or the irrep does not occur. */
  readonly minusK: MinusKModesRecord | null;
  /** Indices of orbit atoms whose component is zero for all amplitudes. */
  readonly vanishingAtoms: readonly number[];
  /** Whether equal |S| on all atoms is possible; null without a cell and while a letter of k is open. */
  readonly equalAmplitude: boolean | null;
  /** Whether equal moments on all atoms in all cells are possible; null likewise. */
  readonly constantMoment: boolean | null;
  /** Whether all moments are along one line whatever the amplitudes; null likewise. */
  readonly collinear: boolean | null;
}

/** Fourier components that were read from a file, and how they split over the irreps. */
export interface ReadComponentsRecord {
  readonly file: string;
  /** In kvane's own convention and lattice components, one triple per orbit atom. */
  readonly components: readonly (readonly ComplexRecord[])[];
  readonly irreps: readonly {
    readonly label: string;
    /** Share of Σ |S|²; the shares add up to 1. */
    readonly share: number;
    /** Of the basis vectors in kvane's own convention and lattice components. */
    readonly amplitudes: readonly { readonly copy: number; readonly partner: number; readonly value: ComplexRecord }[];
  }[];
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
  /** Basis vectors on every arm, arm 0 being k; null unless asked for. */
  readonly starModes: readonly ArmModesRecord[] | null;
  /** Null unless a file was read. */
  readonly read: ReadComponentsRecord | null;
}

/** Result of `kvane modes`. */
export interface ModesRecord {
  readonly group: GroupRecord;
  readonly k: KRecord;
  readonly minusK: "equivalent" | "in star" | "not in star";
  readonly arms: number;
  readonly axial: boolean;
  /** Of all Fourier components in this result. */
  readonly convention: ConventionRecord;
  /** The cell behind `constraintCrystal`, moment sizes and crystal or Cartesian components. */
  readonly cell: CellRecord | null;
  readonly littleGroup: LittleGroupRecord;
  readonly sites: readonly SiteModesRecord[];
}
