import { fail, placed } from "../../errors/index.js";
import { parsePeakList } from "../../files/index.js";
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
  const { request, study } = work;
  const kind = kindOption(work) ?? named.fromStudy?.kind ?? null;
  const wavelength = wavelengthOf(work);
  const tolerance = numberOption(request, "tolerance", { above: 0 }) ?? named.fromStudy?.tolerance ?? null;
  const text = await readNamed(work.host, named.path, named.where);
  const list = placed(study === null || named.fromStudy === null ? {} : { file: study.file }, () =>
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

function namedList({ request, study }: Work) {
  const option = optionOf(request, "peaks");
  if (option !== null) return { path: option.text, where: option.where, fromStudy: null };
  if (study === null || study.peaks === null) return null;
  const { where } = studyText(study, "peaks.file", study.peaks.file);
  return { path: besideStudy(study.file, study.peaks.file), where, fromStudy: study.peaks };
}

const kinds: readonly PeakKind[] = ["d", "q", "two-theta", "hkl"];

function kindOption({ request }: Work): PeakKind | null {
  const given = optionOf(request, "as");
  if (given === null) return null;
  const kind = kinds.find((one) => one === given.text.toLowerCase());
  if (kind !== undefined) return kind;
  return fail("invalid-argument", `\`${given.text}\` is no kind of positions`, {
    where: given.where,
    expected: kinds.join(", "),
    found: given.text,
    remedy: "say what the numbers are: --as two-theta",
  });
}
