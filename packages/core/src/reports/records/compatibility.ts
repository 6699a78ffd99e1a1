import type { ComplexRecord, GroupRecord, KRecord, LittleGroupRecord } from "./common.js";

/** An irrep as compatibility tables name it: its characters at the operators of the little group beside it. */
export interface NamedIrrepRecord {
  readonly label: string;
  readonly dimension: number;
  /** Null while a letter of k is open. */
  readonly characters: readonly ComplexRecord[] | null;
  readonly exact: { readonly characters: readonly string[] };
}

/** How often irreps of one k stand in, or contain, an irrep of another. */
export interface PartRecord {
  readonly label: string;
  readonly multiplicity: number;
}

/** Result of `kvane compatibility`. */
export interface CompatibilityRecord {
  readonly group: GroupRecord;
  /** The k that irreps are restricted from: the one given, and the arm of its star that lies on `to`. */
  readonly from: {
    readonly k: KRecord;
    readonly arm: KRecord;
    /** The operator that takes `k` to `arm`. */
    readonly operator: string;
    readonly littleGroup: LittleGroupRecord;
    readonly irreps: readonly NamedIrrepRecord[];
  };
  /** The line or plane. */
  readonly to: {
    readonly k: KRecord;
    readonly dimension: number;
    /** The letters at `from.arm`, exact. */
    readonly values: { readonly [letter: string]: string };
    readonly littleGroup: LittleGroupRecord;
    readonly irreps: readonly NamedIrrepRecord[];
  };
  /** For each irrep of `from.arm` its parts on the line or plane; the dimensions must be equal. */
  readonly splitting: readonly {
    readonly label: string;
    readonly dimension: number;
    readonly dimensionOfParts: number;
    readonly parts: readonly PartRecord[];
  }[];
  /** The other direction: for each irrep of the line or plane where it ends. */
  readonly joining: readonly { readonly label: string; readonly ends: readonly PartRecord[] }[];
}
