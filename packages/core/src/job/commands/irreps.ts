import { fullIrreps, minusKRelation, smallIrreps } from "../../irreps/index.js";
import { type IrrepsRecord, irrepsRecord } from "../../reports/index.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenK } from "../inputs/k-input.js";
import { together, type Work } from "../work.js";

/** `kvane irreps`: small irreps of the little group, exact, with reality and the relation to −k; full ones on demand. */
export async function irrepsCommand(work: Work): Promise<IrrepsRecord> {
  const { group, written } = await together({ group: () => groupOf(work), written: () => writtenK(work) });
  const irreps = smallIrreps(group, placedK(work, group, written));
  const full = work.request.full === true ? fullIrreps(group, irreps) : null;
  return irrepsRecord(group, irreps, minusKRelation(group, irreps), full);
}
