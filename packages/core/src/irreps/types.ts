import type { LittleGroup, MinusK, WaveVector } from "../kvectors/index.js";
import type { CyclotomicMatrix, Phase, PhasedNumber } from "../numbers/index.js";

/** Herring's three cases, for the irrep of the full space group induced over the star. */
export type Reality = "real" | "pseudoreal" | "complex";

/**
 * One small irrep of a little group: `D(g_i) = e^{2πi·phases[i]} · matrices[i]`, with the phases of `SmallIrreps`.
 * The matrices belong to the coset representative `g_i = {R|t}` exactly as printed.
 */
export interface SmallIrrep {
  readonly label: string;
  readonly dimension: number;
  readonly reality: Reality;
  /** The label of the irrep that its conjugate is, where complex and −k is in the star; else null. */
  readonly conjugateOf: string | null;
  /** Real dimension of the physically irreducible representation: arms × dimension, doubled unless real. */
  readonly physicalDimension: number;
  readonly matrices: readonly CyclotomicMatrix[];
  readonly characters: readonly PhasedNumber[];
}

/** All small irreps of one k. */
export interface SmallIrreps {
  readonly k: WaveVector;
  readonly littleGroup: LittleGroup;
  readonly minusK: MinusK;
  readonly arms: number;
  /** `phases[i]` of operator i of the little group, shared by all irreps. */
  readonly phases: readonly Phase[];
  readonly irreps: readonly SmallIrrep[];
}
