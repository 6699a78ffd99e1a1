import { KvaneError, nowhere, type Place, placed } from "../../errors/index.js";
import type { Study } from "../../files/index.js";
import { commandTable } from "../commands.js";
import { argumentNames, type Request, type RequestField } from "../request.js";

/** A text that came from an option or from a study, with where it stands. */
export interface Given {
  readonly text: string;
  readonly where: Partial<Place>;
  /** Whether columns inside the text can be added to that of `where`. */
  readonly verbatim: boolean;
}

/** `, or give --cell`, where the command takes that; other commands have it from the study alone. */
export function orOption({ command }: Request, field: RequestField): string {
  if (!commandTable[command]?.takes.includes(field)) return "";
  const name = argumentNames[field];
  return `, or give ${name.startsWith("--") ? name : `${name} on the command line`}`;
}

/** An option's text, trimmed, or null when it was not given. */
export function optionOf(request: Request, field: RequestField): Given | null {
  const value = request[field];
  return typeof value === "string"
    ? { text: value.trim(), where: { argument: argumentNames[field] }, verbatim: false }
    : null;
}

/** A text of a study with its place. */
export function studyText(study: Study, path: string, text: string): Given {
  const place = Object.hasOwn(study.places, path) ? study.places[path] : undefined;
  const where = { file: study.file, line: place?.line ?? 1, column: place?.column ?? 1, path };
  return { text, where, verbatim: place?.verbatim ?? false };
}

/**
 * Runs `action` on a given text. Columns in its problems count from the start of the text; in a file they are moved to
 * where the text stands.
 */
export function readingGiven<T>(given: Given, action: () => T): T {
  const where: Place = { ...nowhere, ...given.where };
  if (where.column === null) return placed(where, action);
  const start = where.column;
  try {
    return action();
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(
      error.problems.map((one) => ({
        ...one,
        where: { ...where, column: given.verbatim ? start + (one.where.column ?? 1) - 1 : start },
      })),
    );
  }
}
