import type { CellRecord, GroupRecord, KRecord } from "./common.js";
import type { ConfigurationsRecord } from "./configurations.js";
import type { ExchangeRecord } from "./exchange.js";
import type { IrrepsRecord } from "./irreps.js";
import type { ModesRecord } from "./modes.js";
import type { OnsetRecord } from "./onset.js";
import type { OverlapRecord, SatellitesRecord } from "./satellites.js";
import type { PeaksRecord, SearchRecord } from "./search.js";
import type { StarRecord } from "./star.js";
import type { WeighRecord } from "./weigh.js";

/** All that follows from one k. */
export interface BranchRecord {
  readonly k: KRecord;
  /** Index of its candidate in `search`; null when there was no search. */
  readonly candidate: number | null;
  readonly star: StarRecord;
  readonly irreps: IrrepsRecord;
  readonly modes: ModesRecord;
  /** Null without sites, or where a letter of k has no number. */
  readonly configurations: ConfigurationsRecord | null;
  readonly satellites: SatellitesRecord | null;
  /** Null where the study has no intensities, or they could not be weighed, which is warned about. */
  readonly weigh: WeighRecord | null;
}

/** Result of `kvane run`. */
export interface RunRecord {
  readonly title: string | null;
  readonly group: GroupRecord;
  readonly cell: CellRecord | null;
  readonly peaks: PeaksRecord | null;
  /** Peaks that lie on a nuclear line or on the image of one through half the wavelength: flagged, not removed. */
  readonly coincidences: readonly { readonly peak: number; readonly overlaps: readonly OverlapRecord[] }[];
  readonly search: SearchRecord | null;
  readonly branches: readonly BranchRecord[];
  /** Null where the study has no exchange constants. */
  readonly exchange: ExchangeRecord | null;
  /** Null where the study names no temperature scan. */
  readonly onset: OnsetRecord | null;
  /** Tied candidates that were not followed because the number of branches is bounded. */
  readonly notFollowed: readonly number[];
  readonly next: readonly string[];
  /** Names of the files of the result folder; empty when none was asked for. */
  readonly files: readonly string[];
}
