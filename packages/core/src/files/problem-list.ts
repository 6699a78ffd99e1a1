import { KvaneError, type Problem, problem } from "../errors/index.js";

/** How many problems of one file are listed; a file of the wrong kind has one on every line. */
const listedProblems = 20;

/** The problems of one file as they are found. */
export interface ProblemList {
  readonly file: string;
  readonly listed: Problem[];
  /** How many were found beyond those listed. */
  more: number;
}

export function problemList(file: string): ProblemList {
  return { file, listed: [], more: 0 };
}

type ProblemArguments = Parameters<typeof problem>;

/** Longest message, and longest piece of a file that a problem shows. */
const longestMessage = 200;
const longestFound = 60;

/** Adds a problem; the file is filled in, and what was found is cut where a file has endless words. */
export function note(list: ProblemList, code: ProblemArguments[0], message: string, details: ProblemArguments[2] = {}) {
  if (list.listed.length >= listedProblems) {
    list.more += 1;
    return;
  }
  const found = details.found === undefined ? {} : { found: cut(details.found, longestFound) };
  const where = { ...details.where, file: list.file };
  list.listed.push(problem(code, cut(message, longestMessage), { ...details, ...found, where }));
}

function cut(text: string, length: number): string {
  return text.length > length ? `${text.slice(0, length - 1)}…` : text;
}

/** Throws all problems at once in the order of the file, if there are any; the last says how many are not listed. */
export function throwProblems(list: ProblemList): void {
  const sorted = [...list.listed].sort(byPlace);
  const [first] = sorted;
  if (!first) return;
  if (list.more === 0) throw new KvaneError(sorted);
  const last = problem(first.code, `${list.more} more problems of this file are not listed`, {
    where: { ...first.where, path: null },
    remedy: "mend those that are listed and read the file again",
  });
  throw new KvaneError([...sorted, last]);
}

function byPlace({ where: a }: Problem, { where: b }: Problem): number {
  return (a.line ?? 0) - (b.line ?? 0) || (a.column ?? 0) - (b.column ?? 0);
}
