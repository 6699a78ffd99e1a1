import { fail } from "../../errors/index.js";
import { parsePeakList } from "../../files/index.js";
import type { ImpurityPhase, PeakList, SearchOptions } from "../../search/index.js";
import { checkCellAgainstGroup, parseCell, parseGroup } from "../../spacegroups/index.js";
import { argumentNames } from "../request.js";
import type { Work } from "../work.js";
import { optionOf, readingGiven, studyText } from "./given.js";
import { besideStudy, readNamed } from "./read-file.js";

type AsideOptions = Pick<SearchOptions, "exclude" | "impurities" | "nuclear" | "weighByIntensity">;

/** What is known not to be a satellite, from the options and the study together, and how strong the nuclear lines are. */
export async function asideOptionsOf(work: Work): Promise<AsideOptions> {
  const { request, study } = work;
  const nuclear = await nuclearOf(work);
  return {
    exclude: [...(request.exclude ?? []).map(readRange), ...(study?.exclude ?? [])],
    impurities: [...(request.impurities ?? []).map(readPhase), ...studyPhases(work)],
    weighByIntensity: request.weighIntensities ?? study?.search.weighIntensities ?? false,
    ...(nuclear === null ? {} : { nuclear }),
  };
}

/** `FROM TO`, with blanks, a comma or `..` between. */
function readRange(text: string): readonly [number, number] {
  const words = text.trim().split(/\s*(?:\.\.|[,;\s])\s*/);
  const [from, to] = words.map(Number);
  if (words.length === 2 && Number.isFinite(from) && Number.isFinite(to) && (from as number) < (to as number))
    return [from as number, to as number];
  return fail("invalid-argument", `\`${text}\` is no range`, {
    where: { argument: argumentNames.exclude },
    expected: "two positions in the unit of the peaks, the smaller first",
    found: text,
    remedy: 'for example --exclude "38.1 38.6"',
  });
}

/** `NAME; GROUP; CELL`. */
function readPhase(text: string): ImpurityPhase {
  const parts = text.split(";").map((part) => part.trim());
  const [name, group, cell] = parts;
  if (parts.length !== 3 || !name || !group || !cell)
    fail("invalid-argument", `\`${text}\` is no phase`, {
      where: { argument: argumentNames.impurities },
      expected: "NAME; GROUP; CELL",
      found: text,
      remedy: 'for example --impurity "MnO; F m -3 m; 4.445 4.445 4.445 90 90 90"',
    });
  const given = { text, where: { argument: argumentNames.impurities }, verbatim: false };
  return readingGiven(given, () => {
    const known = parseGroup(group as string);
    const its = parseCell(cell as string);
    checkCellAgainstGroup(its, known);
    return { name: name as string, group: known, cell: its };
  });
}

function studyPhases({ study }: Work): readonly ImpurityPhase[] {
  if (study === null) return [];
  return study.impurities.map(({ name, group, cell }, index) => ({
    name,
    cell,
    group: readingGiven(studyText(study, `impurities[${index}].group`, group), () => parseGroup(group)),
  }));
}

/** Read like the peaks themselves: the same kind of positions, and the same wavelength. */
async function nuclearOf(work: Work): Promise<PeakList | null> {
  const { request, study, host } = work;
  const option = optionOf(request, "nuclear");
  const written = study?.peaks?.nuclear ?? null;
  const named =
    option ??
    (study === null || written === null
      ? null
      : { ...studyText(study, "peaks.nuclear", written), text: besideStudy(study.file, written) });
  if (named === null) return null;
  const text = await readNamed(host, named.text, named.where);
  const wavelength = Number(request.wavelength ?? study?.peaks?.wavelengthAngstrom ?? Number.NaN);
  const kind = study?.peaks?.kind ?? null;
  const as = request.as ?? null;
  return parsePeakList(text, {
    file: named.text,
    ...(kind !== null ? { kind } : {}),
    ...(as === "d" || as === "q" || as === "two-theta" || as === "hkl" ? { kind: as } : {}),
    ...(wavelength > 0 ? { wavelengthAngstrom: wavelength } : {}),
  });
}
