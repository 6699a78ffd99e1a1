import type { SearchRecord } from "../../reports/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { peaksOf } from "../inputs/peaks-input.js";
import { searchOptionsOf } from "../inputs/search-input.js";
import { searchedFor } from "../study/search-of.js";
import { together, type Work } from "../work.js";

/** `kvane locate`: the search for k. */
export async function locateCommand(work: Work): Promise<SearchRecord> {
  const { group, given, peaks, options } = await together({
    group: () => groupOf(work),
    given: () => writtenCell(work),
    peaks: () => peaksOf(work),
    options: () => searchOptionsOf(work),
  });
  const cell = cellFor(group, given);
  return (await searchedFor(work, { group, cell, peaks, options })).record;
}
