import { type Assumption, fail } from "../../errors/index.js";
import { locate, openBlock } from "./block-reader.js";
import type { CifBlock, CifDocument } from "./document.js";
import { comparable } from "./names.js";
import { placeIn } from "./places.js";

/** The block that is meant, and what was assumed to come to it. */
export interface ChosenBlock {
  readonly block: CifBlock;
  readonly assumed: readonly Assumption[];
}

/**
 * The block that was asked for by its code; without a code the only one that has a cell or atoms. Throws `cif-block`
 * with the list where that does not settle it.
 */
export function chooseBlock(document: CifDocument, wanted: string | null): ChosenBlock {
  const { blocks } = document;
  if (blocks.length === 0)
    fail("cif-missing", "the CIF has no data block", {
      where: { file: document.file, line: 1, column: 1 },
      expected: "data_name and data names below it",
      found: "comments alone",
      remedy: "check that this is the CIF of the structure",
    });
  if (wanted !== null) return { block: namedBlock(document, wanted), assumed: [] };
  const [only] = blocks;
  if (blocks.length === 1 && only) return { block: only, assumed: [] };
  const candidates = structureBlocks(document);
  const [candidate] = candidates;
  if (candidates.length === 1 && candidate) {
    const because = `it is the only one of ${blocks.length} blocks with a cell or atoms`;
    return { block: candidate, assumed: [{ what: "data block", value: candidate.code, because }] };
  }
  return fail("cif-block", `the CIF has ${blocks.length} data blocks, and it is not said which one is meant`, {
    where: placeIn(document, (candidates[1] ?? blocks[1] ?? blocks[0])?.start ?? 0),
    expected: `one of ${listed(candidates.length > 0 ? candidates : blocks)}`,
    found: candidates.length > 0 ? `${candidates.length} blocks with a cell or atoms` : "none with a cell or atoms",
    remedy: `choose one: --block ${(candidates[0] ?? blocks[0])?.code}`,
  });
}

/** The blocks that have a cell or atoms. */
export function structureBlocks(document: CifDocument): CifBlock[] {
  return document.blocks.filter((block) => {
    const reader = openBlock(document, block);
    return ["_cell_length_a", "_atom_site_label", "_atom_site_fract_x"].some((name) => locate(reader, name) !== null);
  });
}

function namedBlock({ blocks }: CifDocument, wanted: string): CifBlock {
  const plain = comparable(wanted.trim());
  // CIF 2.0 has codes that begin with blanks of other scripts; nobody types them.
  const found = blocks.find(({ code }) => {
    const own = comparable(code.trim());
    return own === plain || `data_${own}` === plain;
  });
  if (found) return found;
  return fail("cif-block", `the CIF has no data block \`${wanted.trim()}\``, {
    where: { argument: "--block" },
    expected: `one of ${listed(blocks)}`,
    found: wanted.trim(),
    remedy: "name one of the blocks of the file",
  });
}

function listed(blocks: readonly CifBlock[]): string {
  const codes = blocks.map(({ code }) => code);
  return codes.length > 20 ? `${codes.slice(0, 20).join(", ")} and ${codes.length - 20} more` : codes.join(", ");
}
