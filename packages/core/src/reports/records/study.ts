import type { CellRecord, GroupRecord } from "./common.js";

/** Result of `kvane study`: a study file to start from. */
export interface StudyRecord {
  /** The text of the file. */
  readonly study: string;
  /** The data block of the CIF. */
  readonly block: string;
  readonly group: GroupRecord;
  readonly cell: CellRecord | null;
  readonly sites: readonly {
    readonly label: string;
    readonly ion: string | null;
    /** Whether it is a site of the study, or a comment in it. */
    readonly active: boolean;
    readonly because: string;
  }[];
}
