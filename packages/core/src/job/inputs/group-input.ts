import { fail } from "../../errors/index.js";
import { parseGroupWithNotes, type SpaceGroup } from "../../spacegroups/index.js";
import { remember, type Work } from "../work.js";
import { type Given, optionOf, orOption, readingGiven, studyText } from "./given.js";

/** The space group of the option or of the study. */
export function groupOf(work: Work): SpaceGroup {
  const given = groupText(work);
  const { group, assumed } = readingGiven(given, () => parseGroupWithNotes(given.text));
  remember(work, assumed, []);
  return group;
}

function groupText({ request, study }: Work): Given {
  const option = optionOf(request, "group");
  if (option !== null && option.text !== "") return option;
  if (study !== null && study.group !== null) return studyText(study, "group", study.group);
  if (study !== null)
    fail("missing-key", "the study has no space group", {
      where: { file: study.file, path: "group" },
      expected: "a line such as `group: P n m a`",
      found: "none",
      remedy: `add the group to the study${orOption(request, "GROUP on the command line")}`,
    });
  fail("missing-argument", "no space group was given", {
    where: { argument: "GROUP" },
    expected: 'a number, a symbol or operators: 62, "P n m a", "hall:-P 2ac 2n"',
    found: "nothing",
    remedy: "name the group behind the command, or a study file",
  });
}
