import { fail, problem } from "../../errors/index.js";
import type { CifSymmetry } from "../../files/index.js";
import { parseGroupWithNotes, type SpaceGroup } from "../../spacegroups/index.js";
import type { Request } from "../request.js";
import { remember, type Work } from "../work.js";
import { type Given, optionOf, orOption, readingGiven, studyText } from "./given.js";
import { structureFor, throwPart } from "./structure-notes.js";

/** The space group of the option, of the study or of the CIF. */
export function groupOf(work: Work): SpaceGroup {
  const option = givenGroup(work.request);
  const structure = structureFor(work, "symmetry", (work.study?.group ?? null) !== null);
  if (structure !== null && option === null) {
    throwPart(structure.problems.symmetry);
    if (structure.symmetry !== null) return structure.symmetry.group;
  }
  const given = option ?? groupText(work);
  const { group, assumed } = readingGiven(given, () => parseGroupWithNotes(given.text));
  remember(work, assumed, []);
  if (structure?.symmetry) warnOfOther(work, group, structure.symmetry, given);
  return group;
}

function givenGroup(request: Request): Given | null {
  const option = optionOf(request, "group");
  return option !== null && option.text !== "" ? option : null;
}

/** A GROUP beside a CIF wins; that it is another one is said, since sites and cell were meant for the first. */
function warnOfOther(work: Work, group: SpaceGroup, { group: own, place }: CifSymmetry, given: Given): void {
  if (JSON.stringify([group.lattice, group.operators]) === JSON.stringify([own.lattice, own.operators])) return;
  const name = own.name.hermannMauguin ?? own.name.hall ?? `a group of class ${own.pointGroup}`;
  const other = problem("cif-contradiction", "the group given is not that of the CIF; the one given is used", {
    where: place,
    expected: name,
    found: given.text,
    remedy: "leave GROUP out, or check that cell and sites of the CIF belong to the group given",
  });
  remember(work, [], [other]);
}

function groupText({ request, study }: Work): Given {
  if (study !== null && study.group !== null) return studyText(study, "group", study.group);
  if (study !== null)
    fail("missing-key", "the study has no space group", {
      where: { file: study.file, path: "group" },
      expected: "a line such as `group: P n m a`",
      found: "none",
      remedy: `add the group to the study${orOption(request, "group")}`,
    });
  fail("missing-argument", "no space group was given", {
    where: { argument: "GROUP" },
    expected: 'a number, a symbol or operators: 62, "P n m a", "hall:-P 2ac 2n"',
    found: "nothing",
    remedy: "name the group behind the command, or a study file",
  });
}
