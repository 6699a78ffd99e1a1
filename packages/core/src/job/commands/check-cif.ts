import { fail, KvaneError, type Place, type Problem, problem } from "../../errors/index.js";
import { type CifDocument, type CifStructure, readCifStructure, structureBlocksOf } from "../../files/index.js";
import {
  type CheckRecord,
  type CifBlockRecord,
  type CifRecord,
  cellRecord,
  checkedSiteRecord,
  groupRecord,
} from "../../reports/index.js";
import { siteOrbit } from "../../spacegroups/index.js";
import { rememberMove } from "../inputs/site-input.js";
import type { GivenStructure } from "../inputs/structure-input.js";
import { remember, type Work } from "../work.js";

/** So many sites are shown with their orbits; a file may have a hundred thousand. */
const shownSites = 200;

/** `kvane check FILE.cif`: the grammar, and with it the structure of the block chosen; of several blocks a list. */
export async function checkCif(work: Work, { document, block }: GivenStructure): Promise<CheckRecord> {
  remember(work, [], document.warnings);
  if (work.request.syntax === true) return record(document, null, null, []);
  const named = block === null ? await structureBlocksOf(document) : [block];
  if (named.length > 1) return record(document, null, null, await listBlocks(work, document, named));
  const structure = await readCifStructure(document, block);
  throwAll(structure);
  for (const { assumed, warnings } of Object.values(structure.notes)) remember(work, assumed, warnings);
  return record(document, structure, work, []);
}

/** What is wrong with any part of a structure, all at once. */
function throwAll({ problems, file, block }: CifStructure): void {
  const { symmetry, cell, fit, sites } = problems;
  const all = [...cell, ...symmetry, ...fit, ...sites];
  if (all.length === 0) return;
  // A block that has nothing of a structure is not an incomplete one.
  if (all.length === 3 && all.every(({ code }) => code === "cif-missing"))
    fail("cif-missing", `the data block ${block} holds no structure`, {
      where: { file, line: all[0]?.where.line ?? 1, column: all[0]?.where.column ?? 1 },
      expected: "a cell, the symmetry and atoms",
      found: "none of them",
      remedy: "choose another block with --block, or check the grammar alone with --syntax",
    });
  throw new KvaneError(all);
}

/** One row for each block with a structure; what is wrong with one is a warning, as another may be meant. */
async function listBlocks(work: Work, document: CifDocument, codes: readonly string[]): Promise<CifBlockRecord[]> {
  const rows: CifBlockRecord[] = [];
  for (const code of codes) {
    const structure = await readCifStructure(document, code);
    const problems: Problem[] = Object.values(structure.problems).flat();
    remember(work, [], problems.slice(0, 3));
    rows.push(blockRecord(structure));
  }
  return rows;
}

function blockRecord(structure: CifStructure): CifBlockRecord {
  const { block, title, symmetry, cell, sites } = structure;
  return {
    block,
    title,
    group: symmetry && groupRecord(symmetry.group),
    cell: cell && cellRecord(cell.cell),
    sites: sites.length,
  };
}

function record(
  document: CifDocument,
  structure: CifStructure | null,
  work: Work | null,
  structures: readonly CifBlockRecord[],
): CheckRecord {
  const cif: CifRecord = {
    version: document.version,
    block: structure?.block ?? null,
    symmetryFrom: structure?.symmetry?.source ?? null,
    siteCount: structure?.sites.length ?? null,
    structures: structure ? [blockRecord(structure)] : structures,
    items: document.blocks.reduce((sum, { items }) => sum + items.length, 0),
    loops: document.blocks.reduce((sum, { loops }) => sum + loops.length, 0),
  };
  return {
    kind: "cif",
    blocks: document.blocks.map(({ code }) => code),
    title: structure?.title ?? null,
    cell: structure?.fitted ? cellRecord(structure.fitted.cell) : null,
    group: structure?.symmetry ? groupRecord(structure.symmetry.group) : null,
    sites: structure && work ? siteRecords(work, structure) : [],
    k: [],
    peaks: null,
    missing: [],
    cif,
  };
}

function siteRecords(work: Work, { sites, symmetry, fitted }: CifStructure) {
  if (symmetry === null) return [];
  const cell = fitted?.cell ?? null;
  const placed = sites.flatMap(({ position, ...site }) => (position ? [{ ...site, position }] : []));
  const taken = new Map<string, string>();
  const again: { readonly text: string; readonly place: Partial<Place> }[] = [];
  const records = placed.slice(0, shownSites).map(({ label, position, ion, shares, place }) => {
    const orbit = siteOrbit(symmetry.group, { label, position }, cell);
    rememberMove(work, orbit, cell);
    const owner = taken.get(orbit.position.join(" "));
    if (owner === undefined) for (const one of orbit.positions) taken.set(one.join(" "), label);
    else if (shares === null) again.push({ text: `${label} with ${owner}`, place });
    return checkedSiteRecord(orbit, ion?.text ?? null);
  });
  if (again[0])
    remember(
      work,
      [],
      [
        oneOrbit(
          again.map(({ text }) => text),
          again[0].place,
        ),
      ],
    );
  return records;
}

/** Atoms that the symmetry makes of each other are listed once in a CIF; some programs list all. */
function oneOrbit(pairs: readonly string[], where: Partial<Place>): Problem {
  const more = pairs.length > 5 ? ` and ${pairs.length - 5} more` : "";
  return problem("cif-doubtful", `sites stand on one orbit: ${pairs.slice(0, 5).join(", ")}${more}`, {
    where,
    expected: "each orbit once",
    remedy: "the first of them stands for the orbit; check the symmetry if they are meant as different sites",
  });
}
