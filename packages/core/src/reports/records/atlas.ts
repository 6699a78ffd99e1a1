import type { CellRecord, GroupRecord, KRecord } from "./common.js";

/** One kind of k. Names ending in PM belong to the point group extended by −1. */
export interface KindRecord {
  readonly k: KRecord;
  readonly dimension: number;
  readonly dimensionPM: number;
  readonly littleCoGroup: { readonly symbol: string; readonly order: number };
  readonly arms: number;
  /** The value for a generic k of the kind. */
  readonly minusK: "equivalent" | "in star" | "not in star";
  /** The k on it with 2k ∈ L*. */
  readonly halfLattice: readonly KRecord[];
}

/** A kind of lower dimension near a given k. */
export interface NearbyKindRecord {
  /** Index in `kindsPM`. */
  readonly kindPM: number;
  /** Its nearest k. */
  readonly nearest: KRecord;
  /** Å⁻¹, with 2π. */
  readonly distance: number;
}

/** Where a k that the user gave belongs. */
export interface PlacedKRecord {
  readonly k: KRecord;
  /** Index in `kinds`, and in `kindsPM`. */
  readonly kind: number;
  readonly kindPM: number;
  /** Å⁻¹: how far `nearby` looks; null where it is null. */
  readonly within: number | null;
  /** Null without a cell and while a letter of k is open. */
  readonly nearby: readonly NearbyKindRecord[] | null;
}

/** Result of `kvane atlas`. */
export interface AtlasRecord {
  readonly group: GroupRecord;
  readonly cell: CellRecord | null;
  readonly kinds: readonly KindRecord[];
  readonly kindsPM: readonly KindRecord[];
  /** Null when no k was given. */
  readonly given: PlacedKRecord | null;
}
