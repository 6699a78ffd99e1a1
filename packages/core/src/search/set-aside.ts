import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { peakModel } from "./peak-model.js";
import type { PeakList, SearchOptions, SetAside } from "./types.js";

/** The peaks of a list that `indexPeaks` and `locate` leave out, with the reason. Throws as they do. */
export function setAsidePeaks(
  group: SpaceGroup,
  cell: Cell,
  peaks: PeakList,
  options: SearchOptions,
): readonly SetAside[] {
  return peakModel(group, cell, peaks, options).setAside;
}
