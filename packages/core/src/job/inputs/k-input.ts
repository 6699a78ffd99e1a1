import { fail, KvaneError, nowhere } from "../../errors/index.js";
import {
  formatWaveVector,
  numericWaveVector,
  parseWaveVector,
  placeWaveVector,
  type WaveVector,
  type WrittenWaveVector,
} from "../../kvectors/index.js";
import type { SpaceGroup } from "../../spacegroups/index.js";
import { argumentNames } from "../request.js";
import { remember, type Work } from "../work.js";
import { type Given, optionOf, readingGiven, studyText } from "./given.js";

/** A wave vector as it was written, with where. */
export interface GivenK {
  readonly given: Given;
  readonly written: WrittenWaveVector;
}

/** The wave vectors of the option or of the study; empty when there is none. */
export function writtenKs({ request, study }: Work): GivenK[] {
  const option = optionOf(request, "k");
  const texts = option
    ? [option]
    : study === null
      ? []
      : (study.k ?? []).map((text, index) => studyText(study, `k[${index}]`, text));
  return texts.map((given) => ({ given, written: readingGiven(given, () => readK(given.text)) }));
}

/** `parseWaveVector`, which takes commas for separators; decimal commas are likely where there are too many. */
function readK(text: string): WrittenWaveVector {
  try {
    return parseWaveVector(text);
  } catch (error) {
    if (!(error instanceof KvaneError) || text.split(",").length < 4 || !/\d,\d/.test(text)) throw error;
    const remedy = "write decimal points within numbers and commas between them, such as 0,0.472,0";
    throw new KvaneError(error.problems.map((one) => ({ ...one, remedy })));
  }
}

/** The one wave vector of a command that needs one; of several in a study the first, and that is said. */
export function writtenK(work: Work): GivenK {
  const written = writtenKIfGiven(work);
  if (written === null)
    fail("missing-argument", "no wave vector was given", {
      where: work.study === null ? { argument: "--k" } : { file: work.study.file, path: "k", argument: "--k" },
      expected: "three components such as --k 0,1/2,0",
      found: "nothing",
      remedy:
        work.study?.peaks == null
          ? "give --k"
          : "`kvane locate` with this study finds k from its peaks; then give --k, or write `k:` in the study",
    });
  return written;
}

/** The same, null when there is none. */
export function writtenKIfGiven(work: Work): GivenK | null {
  const [first, ...others] = writtenKs(work);
  if (first === undefined) return null;
  if (others.length > 0)
    remember(
      work,
      [
        {
          what: "wave vector",
          value: first.given.text,
          because: `it is the first of ${others.length + 1} in the study`,
        },
      ],
      [],
    );
  return first;
}

/** The wave vector of an option of its own name, such as --from. */
export function writtenOption({ request }: Work, field: "from" | "to", expected: string): GivenK {
  const given = optionOf(request, field);
  if (given === null)
    fail("missing-argument", `${argumentNames[field]} was not given`, {
      where: { argument: argumentNames[field] },
      expected,
      found: "nothing",
      remedy: `give ${argumentNames[field]}`,
    });
  return { given, written: readingGiven(given, () => readK(given.text)) };
}

/** What the written wave vector stands for in this group; where it moved is remembered. */
export function placedK(work: Work, group: SpaceGroup, { given, written }: GivenK): WaveVector {
  const { k, assumed, warnings } = readingGiven(given, () => placeWaveVector(group, written));
  remember(
    work,
    assumed,
    warnings.map((one) => ({ ...one, where: { ...nowhere, ...given.where } })),
  );
  return k;
}

/** The same for a command that needs numbers: throws `k-needs-values` while a letter is open. */
export function numericK(work: Work, group: SpaceGroup, written: GivenK): WaveVector {
  const k = placedK(work, group, written);
  if (numericWaveVector(k) !== null) return k;
  return fail("k-needs-values", `positions need a number for every letter of ${formatWaveVector(k)}`, {
    where: written.given.where,
    expected: "fractions or decimals, such as 0,0.472,0",
    found: written.given.text,
    remedy: "give numbers in place of the letters",
  });
}
