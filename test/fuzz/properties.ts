import { KvaneError, type Problem, problemCodes } from "@kvane/core/errors";
import type { Outcome } from "./target.js";

/** Throws with `message` unless `holds`: a broken promise of kvane. */
export function demand(holds: boolean, message: () => string): asserts holds {
  if (!holds) throw new Error(message());
}

/** Every problem has a known code that is no fault of kvane's own, words, and a place that counts from 1. */
export function demandProblems(problems: readonly Problem[]): void {
  demand(problems.length > 0, () => "an error without problems");
  for (const one of problems) {
    const shown = () => JSON.stringify(one);
    demand(Object.hasOwn(problemCodes, one.code) && one.code !== "internal-fault", () => `code: ${shown()}`);
    demand(one.message.trim() !== "", () => `no message: ${shown()}`);
    for (const text of [one.message, one.expected, one.found, one.remedy])
      demand(!/\bundefined\b|\[object /.test(text ?? ""), () => `words: ${shown()}`);
    for (const count of [one.where.line, one.where.column])
      demand(count === null || (Number.isInteger(count) && count >= 1), () => `place: ${shown()}`);
  }
}

/** Every problem stands within the text. @param file name that it was read under; null for a single line */
export function demandWithin(problems: readonly Problem[], text: string, file: string | null): void {
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\r|\n/);
  for (const { where, ...rest } of problems) {
    const shown = () => JSON.stringify({ where, ...rest });
    if (file !== null) {
      demand(where.file === file, () => `file: ${shown()}`);
      demand(where.line !== null && where.line <= lines.length, () => `line: ${shown()}`);
    }
    const line = file === null ? text : (lines[(where.line ?? 1) - 1] ?? "");
    demand(where.column === null || where.column <= line.length + 1, () => `column: ${shown()}`);
  }
}

/** Runs a reader. What it refuses must be refused with problems as promised; anything else it throws goes on. */
export async function readOrRefused(
  read: () => unknown,
  problemsAre: (problems: readonly Problem[]) => void,
): Promise<Outcome> {
  try {
    await read();
    return "taken";
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    demandProblems(error.problems);
    problemsAre(error.problems);
    return "refused";
  }
}

/** Throws when a record holds a number that JSON has no word for, or `undefined`. */
export function demandPlain(value: unknown, path = ""): void {
  if (typeof value === "number") demand(Number.isFinite(value), () => `${path} is ${value}`);
  else if (Array.isArray(value)) for (const [index, one] of value.entries()) demandPlain(one, `${path}[${index}]`);
  else if (value !== null && typeof value === "object")
    for (const [key, one] of Object.entries(value)) demandPlain(one, `${path}.${key}`);
  else demand(value !== undefined && typeof value !== "function", () => `${path} is no data`);
}
