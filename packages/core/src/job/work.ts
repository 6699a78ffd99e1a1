import { type Assumption, KvaneError, type Problem } from "../errors/index.js";
import type { Study } from "../files/index.js";
import type { GivenStructure } from "./inputs/structure-input.js";
import type { JobHost, Request } from "./request.js";

/** One request on its way: the commands add to `assumed` and `warnings` as they go. */
export interface Work {
  readonly request: Request;
  readonly host: JobHost;
  /** The study, read before the command starts; null when none was named. */
  readonly study: Study | null;
  /** The CIF, likewise. */
  readonly structure: GivenStructure | null;
  readonly assumed: Assumption[];
  readonly warnings: Problem[];
}

/** Adds assumptions and warnings, each once: several steps may meet the same one. */
export function remember(work: Work, assumed: readonly Assumption[], warnings: readonly Problem[]): void {
  const known = (list: readonly unknown[], one: unknown) =>
    list.some((other) => JSON.stringify(other) === JSON.stringify(one));
  for (const one of assumed) if (!known(work.assumed, one)) work.assumed.push(one);
  for (const one of warnings) if (!known(work.warnings, one)) work.warnings.push(one);
}

type Readers = { readonly [name: string]: () => unknown };
type Values<R extends Readers> = { readonly [name in keyof R]: Awaited<ReturnType<R[name]>> };

/** Reads inputs that do not depend on each other, and throws the problems of all of them at once. */
export async function together<R extends Readers>(readers: R): Promise<Values<R>> {
  const problems: Problem[] = [];
  const values: { [name: string]: unknown } = {};
  for (const [name, read] of Object.entries(readers)) {
    try {
      values[name] = await read();
    } catch (error) {
      if (!(error instanceof KvaneError)) throw error;
      problems.push(...error.problems);
    }
  }
  if (problems.length > 0) throw new KvaneError(problems);
  return values as Values<R>;
}
