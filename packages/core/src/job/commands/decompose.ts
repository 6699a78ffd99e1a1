import { decomposeField, type GivenMoments, momentField } from "../../configurations/index.js";
import { fail, nowhere, placed } from "../../errors/index.js";
import { type MagneticStructure, parseCif, readMagneticCif } from "../../files/index.js";
import { type DecomposeRecord, decomposeRecord } from "../../reports/index.js";
import { type BasisChange, type Cell, identityChange, parseBasisChange } from "../../spacegroups/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { optionOf, readingGiven } from "../inputs/given.js";
import { groupOf } from "../inputs/group-input.js";
import { parentSitesOf } from "../inputs/parent-sites.js";
import { readNamed } from "../inputs/read-file.js";
import { orbitsOf, writtenSites } from "../inputs/site-input.js";
import { argumentNames } from "../request.js";
import { remember, together, type Work } from "../work.js";

/** `kvane decompose`: the moments of a magnetic CIF as irreps of the parent, their group, and the configuration they are. */
export async function decomposeCommand(work: Work): Promise<DecomposeRecord> {
  if (work.study === null && work.structure === null)
    fail("missing-argument", "no parent structure was given", {
      where: { argument: argumentNames.parent },
      expected: "--parent with a study or the CIF of the nuclear structure",
      found: "nothing",
      remedy: "give --parent: its group, cell and sites are what the moments are held against",
    });
  const { structure, group, given, sites } = await together({
    structure: () => structureOf(work),
    group: () => groupOf(work),
    given: () => writtenCell(work),
    sites: () => writtenSites(work),
  });
  const cell = cellFor(group, given);
  const orbits = orbitsOf(work, group, sites, cell);
  const moments = momentsOf(work, structure, cell);
  const field = placed({ ...nowhere, file: structure.file }, () => momentField(group, cell, orbits, moments));
  const found = await decomposeField(group, cell, field, work.host);
  const { magnetic } = parentSitesOf(work, group, cell, sites, orbits);
  return decomposeRecord(group, cell, structure, moments, field, found, magnetic);
}

async function structureOf({ request, host }: Work): Promise<MagneticStructure> {
  const named = optionOf(request, "moments");
  if (named === null || named.text === "")
    fail("missing-argument", "no magnetic CIF was given", {
      where: { argument: argumentNames.moments },
      expected: "kvane decompose FILE.cif --parent STUDY",
      found: "nothing",
      remedy: "name the file with the moments",
    });
  const document = await parseCif(await readNamed(host, named.text, named.where), named.text);
  const structure = await readMagneticCif(document, optionOf(request, "block")?.text ?? null);
  if (structure.modulation !== null)
    fail("not-built", "modulated structures are not decomposed in this version", {
      where: { file: named.text },
      expected: "a commensurate structure with its magnetic cell",
      found: "superspace operators",
      remedy: "kvane modes --read splits Fourier components of one site over the irreps",
    });
  return structure;
}

function momentsOf(work: Work, structure: MagneticStructure, cell: Cell): GivenMoments {
  return {
    childFromParent: changeOf(work, structure, cell),
    cell: structure.cell,
    operators: structure.operators,
    centrings: structure.centrings,
    atoms: structure.atoms,
  };
}

/** Relative. A cell that agrees with the parent's to this has the parent's axes. */
const sameLength = 0.01;

/** That of the option, else of the file; a file with the parent's own cell needs none. */
function changeOf(work: Work, structure: MagneticStructure, cell: Cell): BasisChange {
  const option = optionOf(work.request, "child");
  if (option !== null) return readingGiven(option, () => parseBasisChange(option.text));
  if (structure.childFromParent !== null) return structure.childFromParent;
  const alike = (["a", "b", "c", "alpha", "beta", "gamma"] as const).every(
    (name) => Math.abs(structure.cell[name] - cell[name]) <= sameLength * cell[name],
  );
  if (!alike)
    fail("cif-missing", "the file does not say how its cell lies in the parent's", {
      where: { file: structure.file, argument: argumentNames.child },
      expected: "_parent_space_group.child_transform_Pp_abc, or --child",
      found: "neither, and another cell than the parent's",
      remedy: 'give the axes of the file in those of the parent: --child "2a,b,c;0,0,0"',
    });
  remember(
    work,
    [
      {
        what: "axes and origin of the file",
        value: "those of the parent",
        because: "the file does not say it, and its cell is the parent's",
      },
    ],
    [],
  );
  return identityChange;
}
