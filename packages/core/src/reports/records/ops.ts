import type { GroupRecord } from "./common.js";

/** Result of `kvane ops`: all operators modulo integer translations, centring written out. */
export interface OpsRecord {
  readonly group: GroupRecord;
  readonly order: number;
  readonly pointGroupOrder: number;
  readonly pointGroup: string;
  readonly operators: readonly string[];
}
