import { fail, KvaneError, nowhere, placed } from "../../errors/index.js";
import { parsePeakList, readPeakKind } from "../../files/index.js";
import type { PeakKind } from "../../search/index.js";
import type { ReadPeaks } from "../study/search-of.js";
import { remember, type Work } from "../work.js";
import { optionOf, studyText } from "./given.js";
import { numberOption } from "./number-input.js";
import { besideStudy, readNamed } from "./read-file.js";

/** The wavelength in Å of the option or of the study's peaks, or null. */
export function wavelengthOf({ request, study }: Work): number | null {
  return numberOption(request, "wavelength", { above: 0 }) ?? study?.peaks?.wavelengthAngstrom ?? null;
}

/** The peak list of the option or of the study; throws `missing-argument` when there is none. */
export async function peaksOf(work: Work): Promise<ReadPeaks> {
  const peaks = await peaksIfGiven(work);
  if (peaks !== null) return peaks;
  return fail("missing-argument", "no peak list was given", {
    where:
      work.study === null ? { argument: "--peaks" } : { file: work.study.file, path: "peaks", argument: "--peaks" },
    expected: "--peaks FILE, a list of satellite positions",
    found: "nothing",
    remedy: "give --peaks and what the positions are (--as); `kvane help peaks` shows the format",
  });
}

/** The same, null when there is none. Where uncertainties are kvane's own, that is remembered. */
export async function peaksIfGiven(work: Work): Promise<ReadPeaks | null> {
  const named = namedList(work);
  if (named === null) return null;
  const { request } = work;
  const kind = kindOption(work) ?? named.fromStudy?.kind ?? null;
  const wavelength = wavelengthOf(work);
  const tolerance = numberOption(request, "tolerance", { above: 0 }) ?? named.fromStudy?.tolerance ?? null;
  const text = await readNamed(work.host, named.path, named.where);
  const list = withStudyPlace(work, named.fromStudy !== null, () =>
    parsePeakList(text, {
      file: named.path,
      ...(kind === null ? {} : { kind }),
      ...(wavelength === null ? {} : { wavelengthAngstrom: wavelength }),
      ...(tolerance === null ? {} : { tolerance }),
      ...(named.fromStudy?.unit ? { unit: named.fromStudy.unit } : {}),
    }),
  );
  if (list.uncertaintySource.includes("by default"))
    remember(
      work,
      [
        {
          what: "uncertainty of the peaks",
          value: list.uncertaintySource.replace(", as the file gives none", ""),
          because: "neither the list nor --tolerance says it",
        },
      ],
      [],
    );
  return { list, file: named.path };
}

/** Runs `action`; that the wavelength is missing is the fault of the study where the study names the list. */
function withStudyPlace<T>({ study }: Work, fromStudy: boolean, action: () => T): T {
  if (study === null || !fromStudy) return action();
  try {
    return placed({ file: study.file }, action);
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    const { where } = studyText(study, "peaks", "");
    const remedy = "add `wavelength: …` in Å to the peaks of the study, or give --wavelength";
    throw new KvaneError(
      error.problems.map((one) =>
        one.code === "missing-wavelength" ? { ...one, where: { ...nowhere, ...where }, remedy } : one,
      ),
    );
  }
}

function namedList({ request, study }: Work) {
  const option = optionOf(request, "peaks");
  if (option !== null) return { path: option.text, where: option.where, fromStudy: null };
  if (study === null || study.peaks === null) return null;
  const { where } = studyText(study, "peaks.file", study.peaks.file);
  return { path: besideStudy(study.file, study.peaks.file), where, fromStudy: study.peaks };
}

function kindOption({ request }: Work): PeakKind | null {
  const given = optionOf(request, "as");
  if (given === null) return null;
  const kind = readPeakKind(given.text);
  if (kind !== null) return kind;
  return fail("invalid-argument", `\`${given.text}\` is no kind of positions`, {
    where: given.where,
    expected: "d, q, two-theta or hkl",
    found: given.text,
    remedy: "say what the numbers are: --as two-theta",
  });
}
