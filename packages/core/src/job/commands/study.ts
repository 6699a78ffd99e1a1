import { fail } from "../../errors/index.js";
import { draftStudyOf } from "../../files/index.js";
import { cellRecord, groupRecord, type StudyRecord } from "../../reports/index.js";
import { cellIfGiven } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { rememberMove } from "../inputs/site-input.js";
import { structureFor, throwPart } from "../inputs/structure-notes.js";
import { together, type Work } from "../work.js";

/** `kvane study FILE.cif`: a commented study to start from, with what is known and what is to be filled in. */
export async function studyCommand(work: Work): Promise<StudyRecord> {
  const structure = structureFor(work, "sites", false);
  if (structure === null)
    fail("missing-argument", "no CIF was given", {
      where: { argument: "STUDY" },
      expected: "kvane study FILE.cif",
      found: "nothing",
      remedy: "name the CIF of the nuclear structure",
    });
  const { group, given } = await together({
    group: () => groupOf(work),
    given: () => cellIfGiven(work),
    sites: () => throwPart(structure.problems.sites),
  });
  const cell = given?.cell ?? null;
  const notes = [
    ...work.warnings.map(({ message, remedy }) => (remedy === null ? message : `${message}: ${remedy}`)),
    ...work.assumed.map(({ what, value, because }) => `${what}: ${value} (${because})`),
  ];
  const { text, sites } = await draftStudyOf(structure, group, cell, notes);
  for (const { orbit, active } of sites) if (orbit && active) rememberMove(work, orbit, cell);
  return {
    study: text,
    block: structure.block,
    group: groupRecord(group),
    cell: cell && cellRecord(cell),
    sites: sites.map(({ site, active, because }) => ({
      label: site.label,
      ion: site.ion?.text ?? null,
      active,
      because,
    })),
  };
}
