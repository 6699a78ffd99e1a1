import { KvaneError, nowhere, type Problem, problem } from "../../errors/index.js";
import { checkSearchOptions, defaultSearchOptions, type PeakList, type SearchOptions } from "../../search/index.js";
import { argumentNames, type RequestField } from "../request.js";
import { remember, type Work } from "../work.js";
import { asideOptionsOf } from "./aside-input.js";
import { studyText } from "./given.js";
import { numberOption } from "./number-input.js";

/** The wishes for the search: those of the options, else of the study, else the safe defaults, which are remembered. */
export async function searchOptionsOf(work: Work): Promise<SearchOptions> {
  const { request, study } = work;
  const wishes = study?.search ?? null;
  const unmatched = numberOption(request, "unmatched", { from: 0, whole: true }) ?? wishes?.unmatched ?? null;
  const maxDimension = numberOption(request, "maxDimension", { from: 0, to: 3, whole: true }) as 0 | 1 | 2 | 3 | null;
  // With k given `weigh` does not search.
  const given = typeof request.k === "string" || (study?.k ?? []).length > 0;
  const searches = !["index", "check"].includes(request.command) && !(request.command === "weigh" && given);
  if (unmatched === null && searches)
    remember(
      work,
      [
        {
          what: "peaks left unmatched",
          value: `at most ${defaultSearchOptions.unmatched}`,
          because:
            study === null
              ? "--unmatched was not given"
              : "neither --unmatched nor `search: {unmatched: …}` of the study was given",
        },
      ],
      [],
    );
  const options: SearchOptions = {
    ...(await asideOptionsOf(work)),
    tolerance: wishes?.tolerance ?? defaultSearchOptions.tolerance,
    unmatched: unmatched ?? defaultSearchOptions.unmatched,
    maxDimension: maxDimension ?? wishes?.maxDimension ?? defaultSearchOptions.maxDimension,
    qMax: numberOption(request, "qMax", { above: 0 }) ?? wishes?.qMax ?? null,
    zeroShift: numberOption(request, "zeroShift", { from: 0 }) ?? wishes?.zeroShift ?? 0,
    cellScale: numberOption(request, "cellScale", { from: 0, below: 1 }) ?? wishes?.cellScale ?? 0,
  };
  try {
    checkSearchOptions(options);
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(error.problems.map((one) => atItsPlace(work, one)));
  }
  return options;
}

/** A problem of an option, where the user gave it. */
function atItsPlace(work: Work, found: Problem): Problem {
  const field = fields.find((name) => argumentNames[name] === found.where.argument);
  return field === undefined ? found : { ...found, where: { ...nowhere, ...placeOf(work, field) } };
}

/** Where a study has each of the options. */
const studyPaths: { readonly [field in RequestField]?: string } = {
  tolerance: "search.tolerance",
  unmatched: "search.unmatched",
  maxDimension: "search.max-dimension",
  qMax: "search.q-max",
  zeroShift: "search.zero-shift",
  cellScale: "search.cell-scale",
};
const fields = Object.keys(studyPaths) as RequestField[];

/** Throws the problems of options that do not fit the peaks, where the user gave them. */
export function checkSearchFits(work: Work, options: SearchOptions, peaks: PeakList): void {
  const problems: Problem[] = [];
  const count = peaks.peaks.length;
  if (options.unmatched >= count && options.unmatched > defaultSearchOptions.unmatched)
    problems.push(
      problem("invalid-argument", `with ${options.unmatched} of ${count} peaks unmatched any k would do`, {
        where: placeOf(work, "unmatched"),
        expected: `a number below ${count}, the number of peaks`,
        found: String(options.unmatched),
        remedy: "let fewer peaks stay unmatched; half of them is much already",
      }),
    );
  if (options.zeroShift > 0 && peaks.kind !== "hkl" && peaks.wavelengthAngstrom === null)
    problems.push(
      problem("missing-wavelength", "a zero shift of 2θ can only be refined where the wavelength is known", {
        where: placeOf(work, "zeroShift"),
        expected: "the wavelength, or a zero shift of 0",
        found: "no wavelength",
        remedy: "give the wavelength beside the peaks, or leave the zero shift out",
      }),
    );
  if (problems.length > 0) throw new KvaneError(problems);
}

/** The option on the command line, or else the line of the study. */
function placeOf({ request, study }: Work, field: RequestField) {
  const path = studyPaths[field];
  if (typeof request[field] === "string" || study === null || path === undefined || study.places[path] === undefined)
    return { argument: argumentNames[field] };
  return { ...nowhere, ...studyText(study, path, "").where };
}
