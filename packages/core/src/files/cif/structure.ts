import { type Assumption, KvaneError, type Problem, problem } from "../../errors/index.js";
import { type BlockReader, firstText, openBlock } from "./block-reader.js";
import { type CifCell, hasCell, readCell, refuseCell } from "./cell.js";
import { type FittedCell, fitCell } from "./cell-fit.js";
import { chooseBlock } from "./choose-block.js";
import type { CifDocument, CifVersion } from "./document.js";
import { attempt, placeIn } from "./places.js";
import { type CifSite, readSites } from "./sites.js";
import { type CifSymmetry, readSymmetry } from "./symmetry.js";

/**
 * What a CIF says of a structure: cell, space group, sites. A part that cannot be read is null or empty and has its
 * problems: a command that does not need it goes on without, one that needs it throws them.
 */
export interface CifStructure {
  readonly file: string;
  readonly version: CifVersion;
  readonly block: string;
  /** Codes of all blocks of the file. */
  readonly blocks: readonly string[];
  /** Name or formula of the compound. */
  readonly title: string | null;
  readonly symmetry: CifSymmetry | null;
  readonly cell: CifCell | null;
  /** The cell held against the group; null where either is missing or they contradict each other. */
  readonly fitted: FittedCell | null;
  readonly sites: readonly CifSite[];
  /** What is wrong with each part. */
  readonly problems: Readonly<Record<CifPart, readonly Problem[]>>;
  /** What was assumed and what is doubtful, by the part that it belongs to; `file` belongs to all. */
  readonly notes: Readonly<Record<CifPart | "file", CifNotes>>;
}

/** `fit` is the cell held against the group. */
export type CifPart = "symmetry" | "cell" | "fit" | "sites";

/** What reading a nuclear structure noticed: what was assumed and what to be warned of. */
export interface CifNotes {
  readonly assumed: readonly Assumption[];
  readonly warnings: readonly Problem[];
}

/**
 * The structure of one block.
 *
 * @param block its code, with or without `data_`, in any case; null where the file has one structure
 * @throws `cif-block` where the block cannot be told, `cif-duplicate` for a name beside its own other spelling
 */
export function readStructure(document: CifDocument, block: string | null): CifStructure {
  const chosen = chooseBlock(document, block);
  const reader = openBlock(document, chosen.block);
  refuseDoubled(reader);
  const problems: Record<CifPart, Problem[]> = { symmetry: [], cell: [], fit: [], sites: [] };
  const cell = attempt(problems.cell, () => (hasCell(reader) ? readCell(reader) : refuseCell(reader)));
  const symmetry = attempt(problems.symmetry, () => readSymmetry(reader, cell?.cell ?? null));
  const fitted = cell && symmetry && attempt(problems.fit, () => fitCell(cell, symmetry.group));
  const sites = attempt(problems.sites, () => readSites(reader));
  const title = firstText(reader, "_chemical_name_common", "_chemical_name_mineral", "_chemical_formula_sum");
  return {
    file: document.file,
    version: document.version,
    block: chosen.block.code,
    blocks: document.blocks.map(({ code }) => code),
    title: title === null ? null : title.text.trim().replace(/\s+/g, " ").slice(0, 200),
    symmetry,
    cell,
    fitted,
    sites: sites?.sites ?? [],
    problems,
    notes: {
      file: { assumed: chosen.assumed, warnings: document.warnings },
      symmetry: symmetry ? { assumed: symmetry.assumed, warnings: symmetry.warnings } : noNotes,
      cell: { assumed: cell?.assumed ?? [], warnings: [] },
      fit: fitted ? { assumed: fitted.assumed, warnings: fitted.warnings } : noNotes,
      sites: sites ? { assumed: sites.assumed, warnings: sites.warnings } : noNotes,
    },
  };
}

const noNotes: CifNotes = { assumed: [], warnings: [] };

/** A name beside its alias says one thing twice, perhaps differently. */
function refuseDoubled(reader: BlockReader): void {
  const problems = reader.doubled.map(({ first, second }) =>
    problem("cif-duplicate", `${second.name} stands beside its other spelling ${first.name}`, {
      where: placeIn(reader.document, second.start),
      expected: "one of the two spellings",
      found: "both",
      remedy: "leave one of them out",
    }),
  );
  if (problems.length > 0) throw new KvaneError(problems);
}
