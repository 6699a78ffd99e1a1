import type { LinearForm } from "../numbers/index.js";

/**
 * A wave vector: three exact linear forms in u, v, w (a row in the reciprocal basis of the setting's axes) and, where
 * the k was measured or given values, numbers for the letters. `components` alone decide symmetry.
 */
export interface WaveVector {
  readonly components: readonly [LinearForm, LinearForm, LinearForm];
  /** Values of u, v, w in that order as far as they occur; empty for an exact k; null while letters are left open. */
  readonly values: readonly number[] | null;
  /** Standard uncertainties of the values, null where not known; same length as `values`. */
  readonly uncertainties: readonly (number | null)[] | null;
}

/** Whether −k is equivalent to k (2k ∈ L*), another arm of its star, or of a different star. */
export type MinusK = "equivalent" | "in star" | "not in star";

/** The little group of k: the operators of the space group (by index) whose rotation leaves k fixed modulo L*. */
export interface LittleGroup {
  readonly operators: readonly number[];
  /** For each of them `H = k R − k ∈ L*`, three integers in the dual of the primitive basis of the group. */
  readonly shifts: readonly (readonly [number, number, number])[];
  /** Hermann–Mauguin symbol of the little co-group. */
  readonly symbol: string;
}

/** The star of k under the point group: arm i is `k R⁻¹` for the operator `representatives[i]`; arm 0 is k. */
export interface Star {
  readonly arms: readonly WaveVector[];
  readonly representatives: readonly number[];
  readonly minusK: MinusK;
  /** Indices of the operators with `k R ≡ −k`; empty when −k is not in the star. */
  readonly reversing: readonly number[];
}

/** The affine set of all k' with the same little group and the same shifts H as k: point, line, plane or everything. */
export interface Manifold {
  /** Parametric form, e.g. (u, u, 1/2). */
  readonly form: WaveVector;
  readonly dimension: 0 | 1 | 2 | 3;
}

/** A special point of the point group extended by −1: an isolated k. */
export interface SpecialPoint {
  readonly k: WaveVector;
  readonly arms: number;
  /** Arms counted under the point group extended by −1 and taken in ±k pairs. */
  readonly armPairs: number;
  readonly minusK: MinusK;
  readonly littleCoGroup: { readonly symbol: string; readonly order: number };
}

/** A kind of k of a group: all k on one orbit of points, lines, planes, or the general position. */
export interface KindOfK {
  /** Parametric form of one representative; letters are open. */
  readonly k: WaveVector;
  /** Dimension under the point group, and under the point group extended by −1. */
  readonly dimension: 0 | 1 | 2 | 3;
  readonly dimensionPM: 0 | 1 | 2 | 3;
  readonly littleCoGroup: { readonly symbol: string; readonly order: number };
  readonly arms: number;
  /** The value for a generic k of the kind. */
  readonly minusK: MinusK;
  /** The k with 2k ∈ L* that are of this kind and of no smaller one: one of each star, on the form `k`, plainest first. */
  readonly halfLattice: readonly WaveVector[];
}

/** A kind of k that comes near to a given k. */
export interface NearbyKind {
  readonly kind: KindOfK;
  /** Its place in the atlas made with the same options. */
  readonly index: number;
  /** The nearest k of the kind: exact for a point, else a form (of the arm that is near) with values for its letters. */
  readonly nearest: WaveVector;
  /** Length of the difference with 2π, Å⁻¹. */
  readonly distance: number;
}
