import { decomposeField, type GivenMoments, momentField } from "../../configurations/index.js";
import { fail, nowhere, placed } from "../../errors/index.js";
import {
  type ListedMoment,
  looksLikeCif,
  type MagneticStructure,
  parseCif,
  parseMomentList,
  readMagneticCif,
} from "../../files/index.js";
import { parseMagneticTriplet } from "../../magneticgroups/index.js";
import { toNumber } from "../../numbers/index.js";
import { type DecomposeRecord, decomposeRecord } from "../../reports/index.js";
import {
  type BasisChange,
  type Cell,
  changeCell,
  identityChange,
  invertBasisChange,
  parseBasisChange,
} from "../../spacegroups/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { optionOf, readingGiven } from "../inputs/given.js";
import { groupOf } from "../inputs/group-input.js";
import { parentSitesOf } from "../inputs/parent-sites.js";
import { readNamed } from "../inputs/read-file.js";
import { orbitsOf, writtenSites } from "../inputs/site-input.js";
import { argumentNames } from "../request.js";
import { remember, together, type Work } from "../work.js";

/** `kvane decompose`: the moments of a magnetic CIF or a list as irreps of the parent, their group, and the configuration they are. */
export async function decomposeCommand(work: Work): Promise<DecomposeRecord> {
  if (work.study === null && work.structure === null)
    fail("missing-argument", "no parent structure was given", {
      where: { argument: argumentNames.parent },
      expected: "--parent with a study or the CIF of the nuclear structure",
      found: "nothing",
      remedy: "give --parent: its group, cell and sites are what the moments are held against",
    });
  const { file, group, given, sites } = await together({
    file: () => fileOf(work),
    group: () => groupOf(work),
    given: () => writtenCell(work),
    sites: () => writtenSites(work),
  });
  const cell = cellFor(group, given);
  const orbits = orbitsOf(work, group, sites, cell);
  const moments = momentsOf(work, file, cell);
  const field = placed({ ...nowhere, file: file.sort === "cif" ? file.structure.file : file.file }, () =>
    momentField(group, cell, orbits, moments),
  );
  const found = await decomposeField(group, cell, field, work.host);
  const { magnetic } = parentSitesOf(work, group, cell, sites, orbits);
  const source =
    file.sort === "cif"
      ? { file: file.structure.file, block: file.structure.block, bns: file.structure.named.bns }
      : { file: file.file, block: null, bns: null };
  return decomposeRecord(group, cell, source, moments, field, found, magnetic);
}

/** What the file gives: a magnetic CIF, or a list of moments. */
type GivenFile =
  | { readonly sort: "cif"; readonly structure: MagneticStructure }
  | { readonly sort: "list"; readonly file: string; readonly moments: readonly ListedMoment[] };

async function fileOf({ request, host }: Work): Promise<GivenFile> {
  const named = optionOf(request, "moments");
  if (named === null || named.text === "")
    fail("missing-argument", "no file with moments was given", {
      where: { argument: argumentNames.moments },
      expected: "kvane decompose FILE --parent STUDY, FILE a magnetic CIF or a list of moments",
      found: "nothing",
      remedy: "name the file with the moments",
    });
  const text = await readNamed(host, named.text, named.where);
  if (!/\.m?cif$/i.test(named.text) && !looksLikeCif(text))
    return { sort: "list", file: named.text, moments: parseMomentList(text, named.text) };
  const document = await parseCif(text, named.text);
  const structure = await readMagneticCif(document, optionOf(request, "block")?.text ?? null);
  if (structure.modulation !== null)
    fail("not-built", "modulated structures are not decomposed in this version", {
      where: { file: named.text },
      expected: "a commensurate structure with its magnetic cell",
      found: "superspace operators",
      remedy: "kvane modes --read splits Fourier components of one site over the irreps",
    });
  return { sort: "cif", structure };
}

const identityOperator = parseMagneticTriplet("x,y,z,+1");

function momentsOf(work: Work, given: GivenFile, cell: Cell): GivenMoments {
  if (given.sort === "list") return listedMoments(work, given.moments, cell);
  const { structure } = given;
  return {
    childFromParent: changeOf(work, structure, cell),
    cell: structure.cell,
    operators: structure.operators,
    centrings: structure.centrings,
    atoms: structure.atoms,
  };
}

/** A list is in the parent's axes and names every atom of the magnetic cell that has a moment. */
function listedMoments(work: Work, moments: readonly ListedMoment[], cell: Cell): GivenMoments {
  const option = optionOf(work.request, "child");
  const change = option === null ? identityChange : readingGiven(option, () => parseBasisChange(option.text));
  const child = changeCell(cell, change);
  const inverse = invertBasisChange(change).matrix.map((row) => row.map(toNumber));
  const shift = change.shift.map(toNumber);
  const turned = (vector: readonly number[]) =>
    inverse.map((row) => row.reduce((sum, entry, axis) => sum + entry * (vector[axis] as number), 0));
  const [from, to] = [cell, child].map(({ a, b, c }) => [a, b, c]) as [number[], number[]];
  return {
    childFromParent: change,
    cell: child,
    operators: [identityOperator],
    centrings: [identityOperator],
    atoms: moments.map(({ label, position, crystal }) => ({
      label,
      position: turned(position.map((entry, axis) => entry - (shift[axis] as number))) as unknown as Triple,
      crystal: turned(crystal.map((entry, axis) => entry / (from[axis] as number))).map(
        (entry, axis) => entry * (to[axis] as number),
      ) as unknown as Triple,
    })),
  };
}

type Triple = readonly [number, number, number];

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
