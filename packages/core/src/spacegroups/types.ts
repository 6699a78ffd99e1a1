import type { IntegerMatrix, RationalVector } from "../numbers/index.js";

/**
 * A symmetry operator `{R|t}`: `x' = R x + t` on columns of fractional coordinates. `R` is row by row over
 * `rotationDenominator` (1 in conventional settings), `t` over `translationDenominator` (24 divides it in tabulated
 * settings; other bases need others). Composition: `{R₁|t₁}{R₂|t₂} = {R₁R₂ | R₁t₂ + t₁}`, right factor first.
 */
export interface SymmetryOperator {
  readonly rotation: IntegerMatrix;
  readonly rotationDenominator: number;
  readonly translation: readonly [number, number, number];
  readonly translationDenominator: number;
}

/** How a group is called. Null where the group was given by operators that no table row was matched to. */
export interface GroupName {
  readonly number: number | null;
  readonly hall: string | null;
  readonly hermannMauguin: string | null;
  /** Setting or origin code of the tabulated setting, `""` when it has none. */
  readonly choice: string;
  /** International Tables' (P, p) from the tabulated (or generating) setting to this one, `a,b,c;0,0,0` when none. */
  readonly basisChange: string;
}

/**
 * The translation lattice L in the axes of the setting: three basis vectors (rows of numerators, Hermite normal form,
 * so the same lattice always has the same rows) over `denominator`.
 */
export interface Lattice {
  readonly vectors: readonly (readonly [number, number, number])[];
  readonly denominator: number;
}

/**
 * The operators again, in the basis of `Lattice.vectors`: rotations are unimodular integer matrices and L is Z³, so
 * whatever is decided modulo L or L* is decided on integers. `x = B ξ`, `k_primitive = k B`, columns of B = vectors.
 * Translations are numerators over `denominator`. Same order as `SpaceGroup.operators`.
 */
export interface PrimitiveOperators {
  readonly rotations: readonly IntegerMatrix[];
  readonly translations: readonly (readonly [number, number, number])[];
  readonly denominator: number;
}

/**
 * A space group in one setting. `operators` holds one representative per coset of L, translation reduced modulo L, in
 * an order that depends on the set of operators alone (identity first); their number is the order of the point group.
 */
export interface SpaceGroup {
  readonly name: GroupName;
  readonly lattice: Lattice;
  readonly operators: readonly SymmetryOperator[];
  readonly primitive: PrimitiveOperators;
  /** Hermann–Mauguin symbol of the crystal class, e.g. `mmm`, `-3m`. */
  readonly pointGroup: string;
}

/** Cell lengths in Å and angles in degrees. */
export interface Cell {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly alpha: number;
  readonly beta: number;
  readonly gamma: number;
}

/** A change of basis (P, p) after International Tables A: new axes `(a',b',c') = (a,b,c) P`, `x' = P⁻¹ (x − p)`. */
export interface BasisChange {
  /** Rows of P. */
  readonly matrix: readonly [RationalVector, RationalVector, RationalVector];
  readonly shift: RationalVector;
}

/** An atom of the asymmetric unit as the user gave it; coordinates are exact (decimals as written). */
export interface Site {
  readonly label: string;
  readonly position: RationalVector;
}

/** The orbit of a site modulo L. */
export interface SiteOrbit {
  readonly label: string;
  /** The site after snapping, in [0, 1); equal to `positions[0]`. */
  readonly position: RationalVector;
  /** Atoms per cell of the setting: `positions.length` times the lattice points per cell. */
  readonly multiplicity: number;
  /** One atom per class of L, in [0, 1). */
  readonly positions: readonly RationalVector[];
  /** For each position j the index of the first operator g with `g r₀ = r_j + a`, and that lattice vector a. */
  readonly carriers: readonly { readonly operator: number; readonly shift: RationalVector }[];
  /** Indices of the operators that fix `position` modulo L. */
  readonly siteSymmetry: readonly number[];
  /** Hermann–Mauguin symbol of the site-symmetry class. */
  readonly siteSymmetryClass: string;
  /** The coordinates' free parameters, e.g. `["x", "2x", "1/4"]`; letters x, y, z. */
  readonly freeCoordinates: readonly [string, string, string];
  /** Set when the given coordinates were moved onto a special position. */
  readonly snapped: { readonly from: RationalVector; readonly distanceAngstrom: number | null } | null;
  /**
   * Moment directions that site symmetry allows for k = 0, as a form in mx, my, mz of lattice components, e.g.
   * `["mx", "2mx", "0"]`.
   */
  readonly allowedMoment: readonly [string, string, string];
}

/** One of the 530 tabulated settings. Symbols as in International Tables, `_` before the subscript of a screw axis. */
export interface TabulatedSetting {
  readonly number: number;
  readonly hall: string;
  /** Short Hermann–Mauguin symbol, e.g. `P2_1/c`. */
  readonly short: string;
  /** Full Hermann–Mauguin symbol with blanks, e.g. `P 1 2_1/c 1`. */
  readonly full: string;
  /** Setting, cell or origin code, e.g. `b1`, `cab`, `2`, `H`; `""` when the table has none. */
  readonly choice: string;
  /** The setting that the number alone stands for: unique axis b and cell choice 1, origin 2, hexagonal axes. */
  readonly standard: boolean;
}

/** Something that the text of a group left open and how it was taken; callers list it under "assumed". */
export interface GroupAssumption {
  readonly what: string;
  readonly value: string;
  readonly because: string;
}
