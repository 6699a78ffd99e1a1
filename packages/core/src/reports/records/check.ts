import type { CellRecord, GroupRecord, KRecord } from "./common.js";

/** A site as the study has it and as it was understood. */
export interface CheckedSiteRecord {
  readonly label: string;
  readonly ion: string | null;
  readonly position: readonly string[];
  readonly multiplicity: number;
  readonly siteSymmetry: string;
  readonly freeCoordinates: readonly string[];
  /**
   * Moments that every operator of the site leaves as they are, a form in mx, my, mz: what the totally symmetric irrep
   * at k = 0 allows. Other irreps allow other moments.
   */
  readonly allowedMoment: readonly string[];
  readonly snapped: { readonly from: readonly string[]; readonly distanceAngstrom: number | null } | null;
}

/** Result of `kvane check`. */
export interface CheckRecord {
  readonly kind: "study" | "cif";
  /** Names of the data blocks of a CIF; null for a study. */
  readonly blocks: readonly string[] | null;
  readonly title: string | null;
  readonly cell: CellRecord | null;
  readonly group: GroupRecord | null;
  readonly sites: readonly CheckedSiteRecord[];
  readonly k: readonly KRecord[];
  readonly peaks: { readonly file: string; readonly kind: string; readonly count: number } | null;
  /** What the whole job still needs, in words; empty when it can run. */
  readonly missing: readonly string[];
}
