import { KvaneError } from "../errors/index.js";
import { parseWaveVector } from "../kvectors/index.js";
import { checkCell, checkCellAgainstGroup, parseGroup, type SpaceGroup } from "../spacegroups/index.js";
import { note, type ProblemList } from "./problem-list.js";
import type { Study } from "./study-types.js";

/**
 * Notes what is well formed and yet means nothing: a group that is none, an impossible cell, one that contradicts the
 * group, a wave vector that cannot be read. So the author hears of it together with everything else.
 */
export function checkMeaning(study: Study, problems: ProblemList): void {
  const { group, cell, k } = study;
  const known = group === null ? null : tried<SpaceGroup>(study, "group", problems, () => parseGroup(group));
  if (cell) {
    tried(study, "cell", problems, () => {
      checkCell(cell);
      if (known) checkCellAgainstGroup(cell, known);
    });
  }
  for (const [index, phase] of study.impurities.entries()) {
    const its = tried<SpaceGroup>(study, `impurities[${index}].group`, problems, () => parseGroup(phase.group));
    tried(study, `impurities[${index}].cell`, problems, () => {
      checkCell(phase.cell);
      if (its) checkCellAgainstGroup(phase.cell, its);
    });
  }
  for (const [index, text] of k?.entries() ?? []) {
    tried(study, `k[${index}]`, problems, () => parseWaveVector(text));
  }
}

/**
 * The result of `action`, or null when it failed: then what it says goes to `problems` with the place of the value, and
 * a column within the value's text is added where the text stands so in the file.
 */
function tried<T>(study: Study, path: string, problems: ProblemList, action: () => T): T | null {
  try {
    return action();
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    const place = study.places[path];
    for (const { code, message, where, expected, found, remedy } of error.problems) {
      const inside = place?.verbatim ? (where.column ?? 1) - 1 : 0;
      note(problems, code, message, {
        where: { line: place?.line ?? 1, column: (place?.column ?? 1) + inside, path },
        ...(expected && { expected }),
        ...(found && { found }),
        ...(remedy && { remedy }),
      });
    }
    return null;
  }
}
