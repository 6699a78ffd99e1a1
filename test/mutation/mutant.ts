/** One small change of one source file, that a test ought to notice. */
export interface Mutant {
  /** From the root of the repository. */
  readonly file: string;
  /** Places in the text of the file; the text between them is replaced. */
  readonly start: number;
  readonly end: number;
  readonly replacement: string;
  /** What kind of change, as the table of docs/mutation.md names it. */
  readonly operator: Operator;
  /** From 1, of `start`. */
  readonly line: number;
  readonly column: number;
  /** `before → after`, shortened to one line. */
  readonly change: string;
  /** Where in the text the reach point stands that the change belongs to (reach-points.ts). */
  readonly point: number;
}

export type Operator =
  | "arithmetic"
  | "comparison"
  | "boundary"
  | "logic"
  | "condition"
  | "negation"
  | "method"
  | "removed call"
  | "removed statement"
  | "integer"
  | "text"
  | "spread"
  | "fallback";

/** The text of a file with the change made. */
export function mutated(text: string, { start, end, replacement }: Mutant): string {
  return text.slice(0, start) + replacement + text.slice(end);
}

/** What names a mutant as long as the lines above it may move: file, line of code, place in it, change. */
export function mutantName(text: string, { file, start, column, change }: Mutant): string {
  const from = start - (column - 1);
  const to = text.indexOf("\n", start);
  const line = text.slice(from, to < 0 ? text.length : to);
  return `${file} | ${line.trim()} | ${column - (line.length - line.trimStart().length)} | ${change}`;
}
