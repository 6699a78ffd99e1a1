import type { WaveVector } from "../kvectors/index.js";
import type { MagneticGroup, SuperspaceOperator } from "../magneticgroups/index.js";
import type { RationalVector } from "../numbers/index.js";
import type { Consequences } from "./consequences.js";

/**
 * One incommensurate arrangement with the single pair ±k: `M_j(x₄) = C_j cos 2πx₄ + S_j sin 2πx₄`, x₄ = k·x, in the axes
 * of the parent (docs/conventions.md, Superspace).
 */
export interface ModulatedConfiguration {
  readonly id: string;
  readonly irreps: readonly string[];
  /** Real and imaginary parts of the components at k; several order parameters are separated by `|`. */
  readonly direction: string;
  readonly arms: readonly number[];
  /** In the parent with phase shifts of the wave taken as no change. */
  readonly index: number;
  readonly domains: { readonly total: number; readonly k: number; readonly orientation: number };
  /** Real amplitudes with the origin of x₄ fixed by the operators. */
  readonly freeParameters: { readonly irreps: number; readonly group: number };
  /** Phases between amplitudes that symmetry leaves free; 0 where an operator that takes k to −k locks them. */
  readonly freePhases: number;
  /** True where one order parameter would have more symmetry: this needs a second one of the same symmetry. */
  readonly needsSecondOrderParameter: boolean;
  /** Other irreps of k that the operators allow on these sites. */
  readonly secondaryIrreps: readonly { readonly label: string; readonly k: WaveVector; readonly parameters: number }[];
  readonly subgroupOf: readonly string[];
  readonly severalIrreps: boolean;
  readonly superspace: {
    readonly k: WaveVector;
    readonly operators: readonly SuperspaceOperator[];
    /** Lattice translations of the parent's cell, and half a period of the wave with time reversal. */
    readonly centrings: readonly SuperspaceOperator[];
  };
  /**
   * The symmetry of mean properties: the operators in space with time reversal, which the wave always allows together
   * with half its period. Always type II, so no net moment and no linear magnetoelectric effect.
   */
  readonly magneticGroup: MagneticGroup;
  /** What that group allows; null without a cell. */
  readonly consequences: Consequences | null;
  readonly sites: readonly ModulatedSite[];
}

/** An atom of a modulated configuration with its wave, in lattice components of the parent (docs/conventions.md, Superspace). */
export interface ModulatedSite {
  readonly label: string;
  readonly parentSite: string;
  readonly position: RationalVector;
  /** Atoms per primitive cell that the operators make of it. */
  readonly multiplicity: number;
  /** Zero: a mean moment is a second harmonic or a second order, which half a period with time reversal excludes. */
  readonly meanMoment: string;
  /** Amplitudes under the listed irreps; letters are free real amplitudes. */
  readonly cosine: string;
  readonly sine: string;
  /** Amplitudes under the operators: `mxcos`, …, `mzsin` of this atom. */
  readonly symmformCosine: string;
  readonly symmformSine: string;
  /** Cosine and sine amplitudes for one generic choice of the letters. */
  readonly exampleCosine: readonly [number, number, number];
  readonly exampleSine: readonly [number, number, number];
  /** Each letter that reaches the atom (from 0) and its share, lattice components of the parent. */
  readonly amplitudes: readonly {
    readonly amplitude: number;
    readonly cosine: readonly [number, number, number];
    readonly sine: readonly [number, number, number];
  }[];
}
