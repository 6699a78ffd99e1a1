import type { ComplexRecord, GroupRecord, KRecord, LittleGroupRecord } from "./common.js";

/** Exact texts of the characters and of the matrix entries, in the order of the little group's operators. */
export interface ExactIrrepRecord {
  readonly characters: readonly string[];
  readonly matrices: readonly (readonly (readonly string[])[])[];
}

/** One small irrep: D at the printed operators. Numbers are null while a letter of k has no value. */
export interface IrrepRecord {
  readonly label: string;
  readonly dimension: number;
  readonly reality: "real" | "pseudoreal" | "complex";
  readonly conjugateOf: string | null;
  readonly physicalDimension: number;
  readonly characters: readonly ComplexRecord[] | null;
  readonly matrices: readonly (readonly (readonly ComplexRecord[])[])[] | null;
  readonly exact: ExactIrrepRecord;
}

/** The operator g₀ with `k R₀⁻¹ ≡ −k` and for each irrep the matrix N of `D(g₀⁻¹ g g₀)* = N⁻¹ D'(g) N`. */
export interface MinusKRelationRecord {
  readonly operator: string;
  readonly links: readonly {
    readonly label: string;
    /** The irrep D': itself unless the irrep is complex. */
    readonly partner: string;
    readonly matrix: readonly (readonly ComplexRecord[])[];
    readonly exact: readonly (readonly string[])[];
  }[];
}

/** The irreps of the whole space group, induced over the star. Rows and columns run over (arm, partner), arm first. */
export interface FullIrrepsRecord {
  readonly arms: readonly KRecord[];
  /** The operator that takes k to each arm. */
  readonly representatives: readonly string[];
  /** One operator per coset of L, in the order of the matrices. */
  readonly operators: readonly string[];
  readonly irreps: readonly {
    readonly label: string;
    readonly dimension: number;
    readonly matrices: readonly (readonly (readonly ComplexRecord[])[])[] | null;
    readonly exact: { readonly matrices: readonly (readonly (readonly string[])[])[] };
  }[];
}

/** Result of `kvane irreps`. */
export interface IrrepsRecord {
  readonly group: GroupRecord;
  readonly k: KRecord;
  /** The plainest of all k + H, H a reciprocal lattice vector. */
  readonly reduced: KRecord;
  readonly minusK: "equivalent" | "in star" | "not in star";
  readonly arms: number;
  readonly littleGroup: LittleGroupRecord;
  readonly irreps: readonly IrrepRecord[];
  /** Null where −k is in no arm of the star. */
  readonly minusKRelation: MinusKRelationRecord | null;
  /** Null unless asked for. */
  readonly full: FullIrrepsRecord | null;
}
