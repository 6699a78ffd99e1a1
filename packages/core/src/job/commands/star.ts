import type { StarRecord } from "../../reports/index.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenK } from "../inputs/k-input.js";
import { starOf } from "../study/star-of.js";
import { together, type Work } from "../work.js";

/** `kvane star`: arms, little group, manifold. */
export async function starCommand(work: Work): Promise<StarRecord> {
  const { group, written } = await together({ group: () => groupOf(work), written: () => writtenK(work) });
  return starOf(group, placedK(work, group, written));
}
