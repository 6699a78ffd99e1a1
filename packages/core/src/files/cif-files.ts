import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import type { CifDocument } from "./cif/document.js";
import type { StudyDraft } from "./cif/draft-study.js";
import type { MagneticSites } from "./cif/magnetic-sites.js";
import type { CifStructure } from "./cif/structure.js";
import type { MagneticStructure } from "./magnetic-cif/read.js";

/**
 * Reads the grammar of a CIF, 1.1 or 2.0, into blocks, items and loops; what the names mean is not looked at. The reader
 * is loaded by the first call.
 *
 * Throws all problems at once, each with line and column: `file-empty`, `file-unreadable`, `file-too-large`,
 * `cif-syntax`, `cif-characters`, `cif-incomplete`, `cif-duplicate`.
 *
 * @param file name of the file, for messages
 * @param options.strict what breaks the letter of the standard and has one meaning all the same is a problem too
 */
export async function parseCif(
  text: string,
  file: string,
  options: { readonly strict?: boolean } = {},
): Promise<CifDocument> {
  return (await import("./cif/parse.js")).parseCif(text, file, options);
}

/**
 * Cell, space group and sites of one block of a CIF. Parts that cannot be read are null and have their problems.
 *
 * @param block code of the block; null where the file has one structure
 * @throws `cif-block`, `cif-missing` for a file without blocks, `cif-duplicate`
 */
export async function readCifStructure(document: CifDocument, block: string | null = null): Promise<CifStructure> {
  return (await import("./cif/structure.js")).readStructure(document, block);
}

/** The codes of the blocks of a CIF that have a cell or atoms. */
export async function structureBlocksOf(document: CifDocument): Promise<readonly string[]> {
  return (await import("./cif/choose-block.js")).structureBlocks(document).map(({ code }) => code);
}

/**
 * The sites of a structure that may carry moments, by their elements; each orbit once.
 *
 * @throws `cif-missing` where there is none, `missing-argument` where there are too many
 */
export async function magneticSitesOf(
  structure: CifStructure,
  group: SpaceGroup | null,
  cell: Cell | null,
): Promise<MagneticSites> {
  return (await import("./cif/magnetic-sites.js")).magneticSites(structure, group, cell);
}

/** A commented study file to start from. @param notes sentences that are written into it as comments */
export async function draftStudyOf(
  structure: CifStructure,
  group: SpaceGroup,
  cell: Cell | null,
  notes: readonly string[],
): Promise<StudyDraft> {
  return (await import("./cif/draft-study.js")).draftStudy(structure, group, cell, notes);
}

/** True for a text that begins as a CIF does: with its mark of a version, or comments and then `data_`. */
export function looksLikeCif(text: string): boolean {
  let at = text.charCodeAt(0) === 0xfeff ? 1 : 0;
  if (/^#\\#CIF/i.test(text.slice(at, at + 5))) return true;
  while (at < text.length) {
    const letter = text[at] as string;
    if (/\s/.test(letter)) at += 1;
    else if (letter === "#") {
      const end = /[\r\n]/.exec(text.slice(at, at + 4096));
      at += end ? end.index : 4096;
    } else break;
  }
  return /^data_\S/i.test(text.slice(at, at + 6));
}

/**
 * The magnetic structure of one block of a magnetic CIF: cell, magnetic symmetry, atoms with moments.
 *
 * @throws `cif-missing`, `cif-value`, `cif-block`, `cif-contradiction`, `syntax`, `invalid-cell`, with places
 */
export async function readMagneticCif(document: CifDocument, block: string | null = null): Promise<MagneticStructure> {
  return (await import("./magnetic-cif/read.js")).readMagneticStructure(document, block);
}
