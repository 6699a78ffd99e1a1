import { smallIrreps } from "../../irreps/index.js";
import { type IrrepsRecord, irrepsRecord } from "../../reports/index.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenK } from "../inputs/k-input.js";
import { together, type Work } from "../work.js";

/** `kvane irreps`: small irreps of the little group, exact, with reality. */
export async function irrepsCommand(work: Work): Promise<IrrepsRecord> {
  const { group, written } = await together({ group: () => groupOf(work), written: () => writtenK(work) });
  return irrepsRecord(group, smallIrreps(group, placedK(work, group, written)));
}
