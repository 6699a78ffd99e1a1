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

/** Result of `kvane irreps`. */
export interface IrrepsRecord {
  readonly group: GroupRecord;
  readonly k: KRecord;
  readonly minusK: "equivalent" | "in star" | "not in star";
  readonly arms: number;
  readonly littleGroup: LittleGroupRecord;
  readonly irreps: readonly IrrepRecord[];
}
