import type { ProblemCode } from "./codes.js";

/** Where a problem stands. Fields that do not apply are null. Lines and columns count from 1. */
export interface Place {
  readonly file: string | null;
  readonly line: number | null;
  readonly column: number | null;
  /** Path inside a structured file, e.g. `sites[1].at`. */
  readonly path: string | null;
  /** Command-line option or argument, e.g. `--k`. */
  readonly argument: string | null;
}

/** One thing that is wrong, with what was expected and what to do. The shape is part of the JSON contract. */
export interface Problem {
  readonly code: ProblemCode;
  readonly message: string;
  readonly where: Place;
  readonly expected: string | null;
  readonly found: string | null;
  readonly remedy: string | null;
}

/** The place of a problem that has none: every part null. */
export const nowhere: Place = { file: null, line: null, column: null, path: null, argument: null };

/** What may be said about a problem beside its code and message. */
export interface ProblemDetails {
  readonly where?: Partial<Place>;
  readonly expected?: string;
  readonly found?: string;
  readonly remedy?: string;
}

/** A problem with the fields that matter; the others become null. */
export function problem(code: ProblemCode, message: string, details: ProblemDetails = {}): Problem {
  return {
    code,
    message,
    where: { ...nowhere, ...details.where },
    expected: details.expected ?? null,
    found: details.found ?? null,
    remedy: details.remedy ?? null,
  };
}

/** Something that was not given and taken as the safe default, or read other than written; listed once to the user. */
export interface Assumption {
  readonly what: string;
  readonly value: string;
  readonly because: string;
}
