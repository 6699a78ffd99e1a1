import { KvaneError, type Problem } from "../../errors/index.js";
import type { CifPart, CifStructure } from "../../files/index.js";
import { remember, type Work } from "../work.js";

/**
 * The structure that a command takes a part from, null where there is none or where the study's own part comes first;
 * what was assumed for the part and what is doubtful in it is remembered.
 */
export function structureFor(work: Work, part: CifPart, fromStudy: boolean): CifStructure | null {
  const { structure } = work;
  if (structure === null || structure.structure === null) return null;
  if (fromStudy && structure.from !== "option") return null;
  for (const one of ["file", part] as const) {
    const { assumed, warnings } = structure.structure.notes[one];
    remember(work, assumed, warnings);
  }
  return structure.structure;
}

/** Throws what is wrong with a part of a CIF that a command needs. */
export function throwPart(problems: readonly Problem[]): void {
  if (problems.length > 0) throw new KvaneError(problems);
}
