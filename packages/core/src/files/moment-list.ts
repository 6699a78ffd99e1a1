import { KvaneError, type Problem, problem } from "../errors/index.js";
import { readNumber } from "./number-text.js";
import { readableText } from "./readable-text.js";

/** An atom of a list of moments: position in fractions of the parent's axes, moment in μB along their unit vectors. */
export interface ListedMoment {
  readonly label: string;
  readonly position: readonly [number, number, number];
  readonly crystal: readonly [number, number, number];
  /** Line of the file, from 1. */
  readonly line: number;
}

/**
 * Reads a list of moments: one atom a row, `label x y z mx my mz`, separated by blanks, tabs, commas or semicolons; a
 * header row and comments behind # or ! may stand there. Fractions such as 1/3 are read as they are.
 *
 * @throws `file-empty`, `invalid-component`, all problems at once with their lines
 */
export function parseMomentList(text: string, file: string): readonly ListedMoment[] {
  const problems: Problem[] = [];
  const moments: ListedMoment[] = [];
  const rows = readableText(text, file).split("\n");
  rows.forEach((row, index) => {
    const words = row
      .replace(/[#!].*$/, "")
      .trim()
      .split(/[\s,;]+/)
      .filter((word) => word !== "");
    if (words.length === 0) return;
    const numbers = words.slice(1).map(numberOf);
    const isHeader = moments.length === 0 && problems.length === 0 && numbers.every((number) => number === null);
    if (isHeader) return;
    if (words.length === 7 && numbers.every((number) => number !== null) && !hasDecimalComma(row)) {
      const [x, y, z, mx, my, mz] = numbers as [number, number, number, number, number, number];
      moments.push({ label: words[0] as string, position: [x, y, z], crystal: [mx, my, mz], line: index + 1 });
      return;
    }
    problems.push(
      problem("invalid-component", "a row of the list is not an atom with its moment", {
        where: { file, line: index + 1 },
        expected: "label x y z mx my mz: a name and six numbers",
        found: row.trim().slice(0, 60),
        remedy: "write decimal points, and a label without blanks",
      }),
    );
  });
  if (problems.length === 0 && moments.length === 0)
    problems.push(
      problem("file-empty", "the list has no moments", {
        where: { file, line: 1, column: 1 },
        expected: "rows of label x y z mx my mz",
        found: "no row with numbers",
        remedy: "write one atom a row, for example Fe1 0 0 1/2 0 0 4.1",
      }),
    );
  if (problems.length > 0) throw new KvaneError(problems.slice(0, mostProblems));
  return moments;
}

/** Problems of one file that are listed. */
const mostProblems = 20;

/** Whether a row parted by blanks or semicolons has a comma between two digits: `3,5` is then one number, not two. */
function hasDecimalComma(row: string): boolean {
  const words = row.trim().split(/[\s;]+/);
  return (
    words.length > 1 && words.some((word) => /^[+-]?\d+,\d+$/.test(word)) && words.some((word) => !word.includes(","))
  );
}

/** A decimal, or a fraction of two integers. */
function numberOf(word: string): number | null {
  const fraction = /^([+-]?\d+)\/(\d+)$/.exec(word);
  if (fraction) {
    const quotient = Number(fraction[1]) / Number(fraction[2]);
    return Number.isFinite(quotient) ? quotient : null;
  }
  const number = readNumber(word);
  return number === null ? null : number.value;
}
