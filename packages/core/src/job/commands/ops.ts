import { type OpsRecord, opsRecord } from "../../reports/index.js";
import { groupOf } from "../inputs/group-input.js";
import type { Work } from "../work.js";

/** `kvane ops`: the operators of the group. */
export function opsCommand(work: Work): OpsRecord {
  return opsRecord(groupOf(work));
}
