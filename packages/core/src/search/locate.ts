import { breathe, type WorkHost } from "../algorithms/index.js";
import { type Problem, problem } from "../errors/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { type Weighed, weigh } from "./candidate.js";
import { peakModel } from "./peak-model.js";
import { largestSearchedDimension, searchKinds, solutionsOf } from "./search-kind.js";
import { tiesAmong } from "./ties.js";
import type { PeakList, SearchOptions, SearchResult } from "./types.js";

/**
 * Searches the k whose satellites are the peaks: every special point of the group, k = 0 among them, is weighed, and
 * those that match at least `total − options.unmatched` peaks come back by falling evidence (all of them with
 * `options.belowMinimum`). The list is complete within what the certificate states.
 *
 * Throws `too-few-peaks`, `invalid-peak`, `cell-contradicts-group`, `interrupted`.
 */
export async function locate(
  group: SpaceGroup,
  cell: Cell,
  peaks: PeakList,
  options: SearchOptions,
  host: WorkHost = {},
): Promise<SearchResult> {
  const { model, setAside } = peakModel(group, cell, peaks, options);
  const minimumMatched = Math.max(1, model.total - options.unmatched);
  const kinds = searchKinds(group);
  const dimensions = Math.log(new Set(kinds.map((kind) => kind.dimension)).size);
  const found: Weighed[] = [];
  let boxes = 0;
  for (const [index, kind] of kinds.entries()) {
    await breathe(host);
    host.progress?.(index, kinds.length, "kinds of k");
    const charges = { dimensions, kinds: Math.log(kind.kindsOfDimension) };
    const { solutions, boxes: visited } = solutionsOf(kind);
    boxes += visited;
    for (const k of solutions) found.push(weigh(group, model, k, charges));
  }
  host.progress?.(kinds.length, kinds.length, "kinds of k");
  const kept = found
    .filter(({ candidate }) => options.belowMinimum === true || candidate.matched >= minimumMatched)
    // The sort is stable: equal evidence leaves the order of the kinds, fewest arms first.
    .sort((a, b) => b.candidate.evidence.value - a.candidate.evidence.value);
  const ties = tiesAmong(model, kept);
  const candidates = kept.map(({ candidate }, index) => ({ ...candidate, tiedWith: ties[index] ?? [] }));
  return {
    candidates,
    certificate: {
      minimumMatched,
      boxes,
      smallestBox: 0,
      exhaustive: true,
      maxDimension: largestSearchedDimension,
      zeroShift: 0,
      cellScale: 0,
    },
    setAside,
    unmatched:
      candidates[0]?.unmatched ??
      usedIndices(
        peaks,
        setAside.map(({ peak }) => peak),
      ),
    dropped: found.length - kept.length,
    warnings: notBuilt(options),
  };
}

function usedIndices(peaks: PeakList, setAside: readonly number[]): number[] {
  return peaks.peaks.map((peak) => peak.index).filter((index) => !setAside.includes(index));
}

/** What was asked for and is not done is said, never passed over. */
function notBuilt(options: SearchOptions): readonly Problem[] {
  const warnings: Problem[] = [];
  if (options.maxDimension > largestSearchedDimension)
    warnings.push(
      problem("not-built", "lines, planes and general k are not searched yet: only the special points were", {
        where: { argument: "--max-dimension" },
        expected: "0",
        found: String(options.maxDimension),
        remedy: "try a k on a line or plane with `kvane index --k`, which refines its values",
      }),
    );
  for (const [value, argument] of [
    [options.zeroShift, "--zero-shift"],
    [options.cellScale, "--cell-scale"],
  ] as const)
    if (value !== 0)
      warnings.push(
        problem("not-built", `${argument} is not refined yet: the positions were taken as they are`, {
          where: { argument },
          expected: "0",
          found: String(value),
          remedy: "correct the positions, or give a wider tolerance",
        }),
      );
  return warnings;
}
