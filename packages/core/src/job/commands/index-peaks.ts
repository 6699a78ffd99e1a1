import type { SearchRecord } from "../../reports/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { numericK, writtenK } from "../inputs/k-input.js";
import { peaksOf } from "../inputs/peaks-input.js";
import { searchOptionsOf } from "../inputs/search-input.js";
import { indexedBy } from "../study/search-of.js";
import { together, type Work } from "../work.js";

/** `kvane index`: the peaks as satellites of a given k. */
export async function indexCommand(work: Work): Promise<SearchRecord> {
  const { group, written, given, peaks, options } = await together({
    group: () => groupOf(work),
    written: () => writtenK(work),
    given: () => writtenCell(work),
    peaks: () => peaksOf(work),
    options: () => searchOptionsOf(work),
  });
  const { k, cell } = await together({
    k: () => numericK(work, group, written),
    cell: () => cellFor(group, given),
  });
  return indexedBy(work, { group, cell, peaks, options }, [k]).record;
}
