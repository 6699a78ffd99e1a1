import type { GroupRecord, KRecord, LittleGroupRecord } from "./common.js";

/** Result of `kvane star`. Names ending in PM belong to the point group extended by −1. */
export interface StarRecord {
  readonly group: GroupRecord;
  readonly k: KRecord;
  /** The plainest of all k + H, H a reciprocal lattice vector. */
  readonly reduced: KRecord;
  readonly manifold: KRecord;
  readonly dimension: number;
  readonly manifoldPM: KRecord;
  readonly dimensionPM: number;
  readonly minusK: "equivalent" | "in star" | "not in star";
  readonly arms: readonly KRecord[];
  readonly littleGroup: LittleGroupRecord;
}
