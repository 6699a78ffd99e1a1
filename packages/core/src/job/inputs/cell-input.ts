import { fail, KvaneError } from "../../errors/index.js";
import type { CifStructure } from "../../files/index.js";
import { type Cell, checkCell, checkCellAgainstGroup, parseCell, type SpaceGroup } from "../../spacegroups/index.js";
import { remember, type Work } from "../work.js";
import { type Given, optionOf, orOption, readingGiven, studyText } from "./given.js";
import { structureFor, throwPart } from "./structure-notes.js";

/** A cell as it was written, with where. */
export interface GivenCell {
  readonly given: Given;
  readonly cell: Cell;
}

/** The cell of the option, of the study or of the CIF, possible by itself; null when there is none. */
export function cellIfGiven(work: Work): GivenCell | null {
  const { request, study } = work;
  const option = optionOf(request, "cell");
  if (option !== null) {
    const cell = readingGiven(option, () => readCell(option.text));
    rememberOther(work, cell);
    return { given: option, cell };
  }
  const structure = structureFor(work, "cell", (study?.cell ?? null) !== null);
  if (structure !== null) return cellOfStructure(work, structure);
  if (study === null || study.cell === null) return null;
  const { cell } = study;
  const given = studyText(study, "cell", "");
  readingGiven(given, () => checkCell(cell));
  return { given, cell };
}

/**
 * The cell of a CIF. Where the group is its own too, the cell was held against it; with another group the cell counts as
 * written. A CIF without a cell is no fault of a command that can do without.
 */
function cellOfStructure(work: Work, structure: CifStructure): GivenCell | null {
  const { cell, fitted, problems } = structure;
  if (cell === null) {
    throwPart(problems.cell.some(({ code }) => code !== "cif-missing") ? problems.cell : []);
    return null;
  }
  const given = { text: "", where: cell.place, verbatim: false };
  if (typeof work.request.group === "string") return { given, cell: cell.cell };
  throwPart(problems.fit);
  structureFor(work, "fit", false);
  return { given, cell: fitted?.cell ?? cell.cell };
}

/** That a cell beside a CIF is another one than its own is said: the temperature may be another, or the setting. */
function rememberOther(work: Work, cell: Cell): void {
  const own = work.structure?.structure?.cell ?? null;
  if (own === null || cellNames.every((name) => Math.abs(cell[name] - own.cell[name]) <= own.lastDigits[name])) return;
  const because = `--cell wins over the CIF, which has ${cellNames.map((name) => own.written[name]).join(" ")}`;
  remember(work, [{ what: "unit cell", value: cellNames.map((name) => cell[name]).join(" "), because }], []);
}

const cellNames = ["a", "b", "c", "alpha", "beta", "gamma"] as const;

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
  throwPart(work.structure?.structure?.problems.cell ?? []);
  if (work.study !== null)
    fail("missing-key", "the study has no cell", {
      where: { file: work.study.file, path: "cell" },
      expected: "a line such as `cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}`",
      found: "none",
      remedy: `add the cell to the study${orOption(work.request, "cell")}`,
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
