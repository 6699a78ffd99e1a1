import { KvaneError, type Place, type Problem, type ProblemCode, problem } from "../../errors/index.js";
import type { BlockReader } from "./block-reader.js";
import { type CifDocument, type CifText, placeAt } from "./document.js";

/** The place of an offset in the file. */
export function placeIn(document: CifDocument, offset: number): Partial<Place> {
  return { file: document.file, ...placeAt(document.lineStarts, offset) };
}

/** The place of the heading of a block. */
export function blockPlace({ document, block }: BlockReader): Partial<Place> {
  return placeIn(document, block.start);
}

export function valuePlace({ document }: BlockReader, { line, column }: CifText): Partial<Place> {
  return { file: document.file, line, column };
}

/** Runs `action` on the text of a value; columns in its problems are moved to where the text stands in the file. */
export function readingValue<T>(reader: BlockReader, value: CifText, action: () => T): T {
  const place = valuePlace(reader, value);
  // Behind its quotation mark the text stands as it is; a text field begins in the next column or line.
  const inside = value.form === "text field" ? null : value.form === "quoted" ? 1 : 0;
  try {
    return action();
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(
      error.problems.map((one) => {
        const within = inside === null || one.where.column === null ? 0 : inside + one.where.column - 1;
        return { ...one, where: { ...one.where, ...place, column: value.column + within, argument: null } };
      }),
    );
  }
}

/** Problems of independent parts: those of `action` go to `problems`, and null comes back. */
export function attempt<T>(problems: Problem[], action: () => T): T | null {
  try {
    return action();
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    problems.push(...error.problems);
    return null;
  }
}

/** Several labels as text, the first few by name. */
export function someOf(labels: readonly string[], shown = 5): string {
  const more = labels.length - shown;
  return more > 0 ? `${labels.slice(0, shown).join(", ")} and ${more} more` : labels.join(", ");
}

export function doubtful(message: string, where: Partial<Place>, remedy: string): Problem {
  return problem("cif-doubtful" satisfies ProblemCode, message, { where, remedy });
}
