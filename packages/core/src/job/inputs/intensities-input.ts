import { fail, KvaneError, type Place } from "../../errors/index.js";
import { type IntensityList, parseIntensityList, readPeakKind, type StudyIntensities } from "../../files/index.js";
import { overlapInverseAngstrom } from "../../numbers/index.js";
import type { PeakKind } from "../../search/index.js";
import { remember, together, type Work } from "../work.js";
import { optionOf, studyText } from "./given.js";
import { numberOption } from "./number-input.js";
import { besideStudy, readNamed } from "./read-file.js";

/** A list of intensities and how it is to be understood. */
export interface GivenIntensities {
  readonly list: IntensityList;
  readonly file: string;
  /** Whether the Lorentz factor is in the numbers. */
  readonly lorentz: boolean;
  readonly scale: number | null;
  /** Å⁻¹. */
  readonly resolution: number;
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
  const { kind, wavelength, scale, resolution, asked, text } = await together({
    kind: () => kindOption(options),
    wavelength: () => numberOption(options.request, "wavelength", { above: 0 }),
    scale: () => numberOption(options.request, "scale", { above: 0 }),
    resolution: () => numberOption(options.request, "resolution", { above: 0 }),
    asked: () => lorentzOption(options),
    text: () => readNamed(work.host, named.path, named.where),
  });
  const known = wavelength ?? fromStudy?.wavelengthAngstrom ?? work.study?.peaks?.wavelengthAngstrom ?? null;
  const list = parsed(work, text, named.path, kind ?? fromStudy?.kind ?? null, known);
  rememberUncertainties(work, list);
  return {
    list,
    file: named.path,
    lorentz: lorentzOf(work, asked ?? fromStudy?.lorentz ?? null, list, named.where),
    scale: scale ?? fromStudy?.scale ?? null,
    resolution: resolutionOf(work, resolution ?? fromStudy?.resolution ?? null, list),
  };
}

interface NamedList {
  readonly path: string;
  readonly where: Partial<Place>;
  readonly fromStudy: StudyIntensities | null;
}

function namedList({ request, study }: Work): NamedList | null {
  const option = request.command === "weigh" ? optionOf(request, "intensities") : null;
  if (option !== null) return { path: option.text, where: option.where, fromStudy: null };
  const fromStudy = study?.intensities ?? null;
  if (study === null || fromStudy === null) return null;
  const { where } = studyText(study, "intensities.file", fromStudy.file);
  return { path: besideStudy(study.file, fromStudy.file), where, fromStudy };
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
    const usual = study?.peaks?.kind ?? null;
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

function lorentzOption({ request }: Pick<Work, "request">): boolean | null {
  const given = optionOf(request, "lorentz");
  if (given === null) return null;
  if (given.text === "yes" || given.text === "no") return given.text === "yes";
  return fail("invalid-argument", `\`${given.text}\` does not say whether the Lorentz factor is in the intensities`, {
    where: given.where,
    expected: "yes or no",
    found: given.text,
    remedy: "--lorentz yes for intensities as measured, --lorentz no for |F|²",
  });
}

/** Powder intensities with a wavelength are taken as measured, all others as |F|². */
function lorentzOf(
  work: Work,
  asked: boolean | null,
  { kind, wavelengthAngstrom }: IntensityList,
  where: Partial<Place>,
): boolean {
  if (asked !== null) {
    if (asked && wavelengthAngstrom === null)
      fail("missing-wavelength", "the Lorentz factor needs the wavelength", {
        where,
        expected: "the wavelength in Å",
        found: "none",
        remedy: "give it (--wavelength, or `wavelength:` under intensities), or say that the numbers are |F|²",
      });
    return asked;
  }
  const lorentz = kind !== "hkl" && wavelengthAngstrom !== null;
  const because = lorentz
    ? "they are powder intensities with a wavelength; `lorentz: false` or --lorentz no says otherwise"
    : `${kind === "hkl" ? "reflections by h k l" : "no wavelength"}; \`lorentz: true\` or --lorentz yes says otherwise`;
  const value = lorentz ? "in the intensities" : "not in the numbers: they are |F|²";
  remember(work, [{ what: "Lorentz factor", value, because }], []);
  return lorentz;
}

function resolutionOf(work: Work, asked: number | null, { kind }: IntensityList): number {
  if (asked !== null) return asked;
  if (kind !== "hkl")
    remember(
      work,
      [
        {
          what: "resolution",
          value: `${overlapInverseAngstrom} Å⁻¹`,
          because: "neither `resolution` under intensities nor --resolution says within what lines are one peak",
        },
      ],
      [],
    );
  return overlapInverseAngstrom;
}

function rememberUncertainties(work: Work, { uncertaintySource }: IntensityList): void {
  if (!uncertaintySource.includes("by default")) return;
  const value = uncertaintySource.replace(", as the file gives none", "");
  remember(work, [{ what: "uncertainty of intensities", value, because: "the list does not say it" }], []);
}
