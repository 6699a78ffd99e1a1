import { fail, KvaneError, type Place } from "../../errors/index.js";
import { type IntensityList, parseIntensityList, readPeakKind, type StudyIntensities } from "../../files/index.js";
import type { PeakKind } from "../../search/index.js";
import { remember, together, type Work } from "../work.js";
import { optionOf, studyText } from "./given.js";
import { type IntensitySettings, settledSettings, writtenSettings } from "./intensity-settings.js";
import { numberOption } from "./number-input.js";
import { besideStudy, readNamed } from "./read-file.js";

/** A list of intensities and how it is to be understood. */
export interface GivenIntensities extends IntensitySettings {
  readonly list: IntensityList;
  readonly file: string;
  /** Nuclear lines in the same scale. */
  readonly nuclear: { readonly list: IntensityList; readonly file: string } | null;
}

/** The intensities of `--intensities` or of the study; throws `missing-argument` or `missing-key` where there are none. */
export async function intensitiesOf(work: Work): Promise<GivenIntensities> {
  const given = await intensitiesIfGiven(work);
  if (given !== null) return given;
  return fail(work.study === null ? "missing-argument" : "missing-key", "no intensities were given", {
    where:
      work.study === null
        ? { argument: "--intensities" }
        : { file: work.study.file, path: "intensities", argument: "--intensities" },
    expected: "`intensities: {file: …}` in the study, or --intensities FILE",
    found: "nothing",
    remedy: "name a list of integrated intensities; `kvane help intensities` shows the format",
  });
}

/** The same, null where there are none. The options on them are those of `kvane weigh` alone. */
export async function intensitiesIfGiven(work: Work): Promise<GivenIntensities | null> {
  const named = namedList(work);
  if (named === null) return null;
  const { fromStudy } = named;
  const options = work.request.command === "weigh" ? work : { ...work, request: { command: work.request.command } };
  const { kind, wavelength, written, text, nuclearText } = await together({
    kind: () => kindOption(options),
    wavelength: () => numberOption(options.request, "wavelength", { above: 0 }),
    written: () => writtenSettings(options, fromStudy),
    text: () => readNamed(work.host, named.path, named.where),
    nuclearText: () => namedNuclear(options, named),
  });
  const angle = written.scatteringAngleDeg;
  // With detectors at one angle the wavelength of the peaks is that of another measurement.
  const usual = angle === null ? (work.study?.peaks?.wavelengthAngstrom ?? null) : null;
  const known = wavelength ?? fromStudy?.wavelengthAngstrom ?? usual;
  // The header of a list that was named beside the study says more of it than the study does.
  const asked = kind ?? (named.option ? null : (fromStudy?.kind ?? null));
  const list = parsed(work, text, named.path, asked, known);
  rememberUncertainties(work, list);
  const settings = settledSettings(work, written, list, named.where);
  const nuclear = nuclearText && {
    list: parsed(work, nuclearText.text, nuclearText.path, asked, known),
    file: nuclearText.path,
  };
  if (nuclear !== null && (nuclear.list.kind === "hkl") !== (list.kind === "hkl"))
    fail("conflicting-arguments", "the nuclear lines are of another kind of sample than the satellites", {
      where: { file: nuclear.file },
      expected: list.kind === "hkl" ? "reflections by h k l" : "powder lines by position",
      found: nuclear.list.kind,
      remedy: "measure both on the same sample: only then do they have one scale",
    });
  return { list, file: named.path, nuclear, ...settings };
}

/** The list of nuclear lines of `--nuclear` or beside the intensities of the study, as text. */
async function namedNuclear(
  { request, study, host }: Work,
  { fromStudy }: NamedList,
): Promise<{ readonly path: string; readonly text: string } | null> {
  const option = request.command === "weigh" ? optionOf(request, "nuclear") : null;
  if (option !== null) return { path: option.text, text: await readNamed(host, option.text, option.where) };
  const written = fromStudy?.nuclear ?? null;
  if (study === null || written === null) return null;
  const { where } = studyText(study, "intensities.nuclear", written);
  const path = besideStudy(study.file, written);
  return { path, text: await readNamed(host, path, where) };
}

interface NamedList {
  readonly path: string;
  readonly where: Partial<Place>;
  readonly fromStudy: StudyIntensities | null;
  /** Whether an option names it. */
  readonly option: boolean;
}

function namedList({ request, study }: Work): NamedList | null {
  const option = request.command === "weigh" ? optionOf(request, "intensities") : null;
  const fromStudy = study?.intensities ?? null;
  // Another list, measured in the same way: what else the study says of intensities stays.
  if (option !== null) return { path: option.text, where: option.where, fromStudy, option: true };
  if (study === null || fromStudy === null) return null;
  const { where } = studyText(study, "intensities.file", fromStudy.file);
  return { path: besideStudy(study.file, fromStudy.file), where, fromStudy, option: false };
}

/** Where neither the list nor the study says what the positions are, they are what those of the peaks are. */
function parsed(
  { study }: Work,
  text: string,
  file: string,
  kind: PeakKind | null,
  wavelength: number | null,
): IntensityList {
  const withKind = (one: PeakKind | null) =>
    parseIntensityList(text, {
      file,
      ...(one === null ? {} : { kind: one }),
      ...(wavelength === null ? {} : { wavelengthAngstrom: wavelength }),
    });
  try {
    return withKind(kind);
  } catch (error) {
    const usual = study?.intensities?.kind ?? study?.peaks?.kind ?? null;
    const unknown = error instanceof KvaneError && error.problems.some(({ code }) => code === "peak-kind-unknown");
    if (!unknown || kind !== null || usual === null) throw error;
    return withKind(usual);
  }
}

function kindOption({ request }: Pick<Work, "request">): PeakKind | null {
  const given = optionOf(request, "as");
  const kind = given && readPeakKind(given.text);
  if (given !== null && kind === null)
    fail("invalid-argument", `\`${given.text}\` is no kind of positions`, {
      where: given.where,
      expected: "d, q, two-theta or hkl",
      found: given.text,
      remedy: "say what the numbers are: --as two-theta",
    });
  return kind;
}

function rememberUncertainties(work: Work, { uncertaintySource }: IntensityList): void {
  if (!uncertaintySource.includes("by default")) return;
  const value = uncertaintySource.replace(", as the file gives none", "");
  remember(work, [{ what: "uncertainty of intensities", value, because: "the list does not say it" }], []);
}
