import { defaultSearchOptions, type SearchOptions } from "../../search/index.js";
import { remember, type Work } from "../work.js";
import { numberOption } from "./number-input.js";

/** The wishes for the search: those of the options, else of the study, else the safe defaults, which are remembered. */
export function searchOptionsOf(work: Work): SearchOptions {
  const { request, study } = work;
  const wishes = study?.search ?? null;
  const unmatched = numberOption(request, "unmatched", { from: 0, whole: true }) ?? wishes?.unmatched ?? null;
  const maxDimension = numberOption(request, "maxDimension", { from: 0, to: 3, whole: true }) as 0 | 1 | 2 | 3 | null;
  if (unmatched === null && request.command !== "index")
    remember(
      work,
      [
        {
          what: "peaks left unmatched",
          value: `at most ${defaultSearchOptions.unmatched}`,
          because: "--unmatched was not given",
        },
      ],
      [],
    );
  return {
    tolerance: wishes?.tolerance ?? defaultSearchOptions.tolerance,
    unmatched: unmatched ?? defaultSearchOptions.unmatched,
    maxDimension: maxDimension ?? wishes?.maxDimension ?? defaultSearchOptions.maxDimension,
    qMax: numberOption(request, "qMax", { above: 0 }) ?? wishes?.qMax ?? null,
    zeroShift: numberOption(request, "zeroShift", { from: 0 }) ?? wishes?.zeroShift ?? 0,
    cellScale: numberOption(request, "cellScale", { from: 0 }) ?? wishes?.cellScale ?? 0,
  };
}
