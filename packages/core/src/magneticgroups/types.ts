import type { Lattice, SymmetryOperator } from "../spacegroups/index.js";

/** A symmetry operator and whether it comes with time reversal (−1) or not (+1): the last field of the triplet text. */
export interface MagneticOperator {
  readonly operator: SymmetryOperator;
  readonly timeReversal: 1 | -1;
}

/** I without time reversal, II grey, III with time reversal on half of the point group, IV with anti-translations. */
export type MagneticGroupType = 1 | 2 | 3 | 4;

/**
 * A magnetic space group in one set of axes. `operators` holds one representative per coset of `lattice`, translation
 * reduced modulo it, identity first, in an order that depends on the set of operators alone.
 */
export interface MagneticGroup {
  /** Translations without time reversal. */
  readonly lattice: Lattice;
  readonly operators: readonly MagneticOperator[];
  readonly type: MagneticGroupType;
  /** Symbol of the magnetic point group, e.g. `2'/m`, `-31'`. */
  readonly pointGroup: string;
}

/** What a magnetic group is called in the table of the 1651 types. Numbers are texts: `1.10` is not 1.1. */
export interface MagneticGroupName {
  readonly bns: { readonly number: string; readonly symbol: string };
  readonly og: { readonly number: string };
}
