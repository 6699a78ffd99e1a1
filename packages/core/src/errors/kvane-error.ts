import type { ProblemCode } from "./codes.js";
import type { Place, Problem, ProblemDetails } from "./problem.js";
import { problem } from "./problem.js";

/**
 * The one error that kvane throws for wrong input or a job that cannot be done. It carries every problem found, the
 * first of which gives `code` and `message`. Anything else that is thrown is a fault of kvane itself.
 */
export class KvaneError extends Error {
  readonly problems: readonly Problem[];

  constructor(problems: readonly Problem[]) {
    super(problems[0]?.message ?? "unknown problem");
    this.name = "KvaneError";
    this.problems = problems;
  }

  /** The code of the first problem. */
  get code(): ProblemCode {
    return this.problems[0]?.code ?? "internal-fault";
  }
}

/** Throws a `KvaneError` with a single problem. */
export function fail(code: ProblemCode, message: string, details: ProblemDetails = {}): never {
  throw new KvaneError([problem(code, message, details)]);
}

/**
 * Runs `action`; a `KvaneError` from it is thrown on with `where` filled in where the problem has none. Rooms that
 * parse text know the column, their callers know the file or the argument.
 */
export function placed<T>(where: Partial<Place>, action: () => T): T {
  try {
    return action();
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(
      error.problems.map((one) => ({
        ...one,
        where: {
          file: one.where.file ?? where.file ?? null,
          line: one.where.line ?? where.line ?? null,
          column: one.where.column ?? where.column ?? null,
          path: one.where.path ?? where.path ?? null,
          argument: one.where.argument ?? where.argument ?? null,
        },
      })),
    );
  }
}
