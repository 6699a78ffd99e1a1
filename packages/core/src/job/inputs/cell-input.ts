import { fail, KvaneError } from "../../errors/index.js";
import { type Cell, checkCell, checkCellAgainstGroup, parseCell, type SpaceGroup } from "../../spacegroups/index.js";
import type { Work } from "../work.js";
import { type Given, optionOf, orOption, readingGiven, studyText } from "./given.js";

/** A cell as it was written, with where. */
export interface GivenCell {
  readonly given: Given;
  readonly cell: Cell;
}

/** The cell of the option or of the study, possible by itself; null when there is none. */
export function cellIfGiven({ request, study }: Work): GivenCell | null {
  const option = optionOf(request, "cell");
  if (option !== null) return { given: option, cell: readingGiven(option, () => readCell(option.text)) };
  if (study === null || study.cell === null) return null;
  const { cell } = study;
  const given = studyText(study, "cell", "");
  readingGiven(given, () => checkCell(cell));
  return { given, cell };
}

/** `parseCell`, which takes commas for separators; decimal commas are told from them. */
function readCell(text: string): Cell {
  try {
    return parseCell(text);
  } catch (error) {
    if (!(error instanceof KvaneError) || !/\d,\d/.test(text) || text.includes(".")) throw error;
    const remedy = `write decimal points: "${text.replace(/(\d),(?=\d)/g, "$1.").replaceAll(",", "")}"`;
    throw new KvaneError(error.problems.map((one) => (one.code === "invalid-cell" ? { ...one, remedy } : one)));
  }
}

/** The same for a command that cannot do without. */
export function writtenCell(work: Work): GivenCell {
  const given = cellIfGiven(work);
  if (given !== null) return given;
  if (work.study !== null)
    fail("missing-key", "the study has no cell", {
      where: { file: work.study.file, path: "cell" },
      expected: "a line such as `cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}`",
      found: "none",
      remedy: `add the cell to the study${orOption(work.request, "--cell")}`,
    });
  return fail("missing-argument", "no unit cell was given", {
    where: { argument: "--cell" },
    expected: '--cell "a b c alpha beta gamma" in Å and degrees',
    found: "nothing",
    remedy: "give --cell",
  });
}

/** The cell, held against the metric that the group needs. */
export function cellFor(group: SpaceGroup, { given, cell }: GivenCell): Cell {
  readingGiven(given, () => checkCellAgainstGroup(cell, group));
  return cell;
}
