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

/** A data block with a structure. */
export interface CifBlockRecord {
  readonly block: string;
  readonly title: string | null;
  readonly group: GroupRecord | null;
  readonly cell: CellRecord | null;
  readonly sites: number;
}

/** What a CIF is beside its structure. */
export interface CifRecord {
  readonly version: "1.1" | "2.0";
  /** The data block that was read; null where only the grammar was, or where several blocks have structures. */
  readonly block: string | null;
  /** What the group was taken from. */
  readonly symmetryFrom: string | null;
  /** How many atoms the block lists; `sites` may show fewer. */
  readonly siteCount: number | null;
  /** The blocks with a cell or atoms; empty where only the grammar was read. */
  readonly structures: readonly CifBlockRecord[];
  /** Single items and loops of all blocks. */
  readonly items: number;
  readonly loops: number;
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
  /** Null for a study. */
  readonly cif: CifRecord | null;
}
