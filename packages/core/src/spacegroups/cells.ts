import { fail, KvaneError, type Place, type Problem, problem, whyNoNumber } from "../errors/index.js";
import type { Cell } from "./types.js";

const lengthNames = ["a", "b", "c"] as const;
const angleNames = ["alpha", "beta", "gamma"] as const;

/** The six names in the order in which cells are written. */
export const cellNames = [...lengthNames, ...angleNames] as const;

/**
 * Reads `a b c alpha beta gamma` (Å and degrees; blanks or commas between them). The cell is checked.
 *
 * @throws `invalid-cell` for another count of numbers or an impossible cell, `invalid-number` with the column of each
 *   word that is no number
 */
export function parseCell(text: string): Cell {
  const words = [...text.matchAll(/[^\s,]+/g)];
  const problems = words
    .filter(([word]) => !Number.isFinite(Number(word)))
    .map((word) =>
      problem("invalid-number", `\`${word[0]}\` ${whyNoNumber(word[0])}`, {
        where: { column: word.index + 1 },
        expected: "a length in Å or an angle in degrees",
        found: word[0],
      }),
    );
  if (words.length !== 6)
    problems.push(
      problem("invalid-cell", `a cell has six numbers, not ${words.length}`, {
        where: { column: words.length > 6 ? (words[6]?.index ?? 0) + 1 : text.length + 1 },
        expected: "a b c alpha beta gamma",
        found: text.trim() === "" ? "nothing" : text.trim(),
      }),
    );
  if (problems.length > 0) throw new KvaneError(problems);
  const [a, b, c, alpha, beta, gamma] = words.map(([word]) => Number(word)) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const cell = { a, b, c, alpha, beta, gamma };
  const wrong = cellProblems(cell, (index) => ({ column: (words[index]?.index ?? 0) + 1 }));
  if (wrong.length > 0) throw new KvaneError(wrong);
  return cell;
}

/** Throws `invalid-cell`, all problems at once, unless lengths are positive, angles in (0, 180) and the volume real. */
export function checkCell(cell: Cell): void {
  const problems = cellProblems(cell, (index) => ({ path: cellNames[index] ?? null }));
  if (problems.length > 0) throw new KvaneError(problems);
}

function cellProblems(cell: Cell, placeOf: (index: number) => Partial<Place>): Problem[] {
  const lengths = lengthNames.flatMap((name, index) =>
    cell[name] > 0 && Number.isFinite(cell[name])
      ? []
      : [wrong(placeOf(index), name, cell[name], "a length above 0 Å")],
  );
  const angles = angleNames.flatMap((name, index) =>
    cell[name] > 0 && cell[name] < 180
      ? []
      : [wrong(placeOf(index + 3), name, cell[name], "an angle between 0 and 180 degrees")],
  );
  const problems = [...lengths, ...angles];
  if (problems.length > 0 || shapeFactor(cell) > 0) return problems;
  return [
    problem("invalid-cell", "no cell has these three angles: its volume would not be real", {
      where: placeOf(3),
      expected: "each angle below the sum of the other two, and all three together below 360 degrees",
      found: angleNames.map((name) => `${name} = ${cell[name]}`).join(", "),
    }),
  ];
}

function wrong(where: Partial<Place>, name: string, value: number, expected: string): Problem {
  return problem("invalid-cell", `${name} = ${value} is impossible`, { where, expected, found: String(value) });
}

/** cos of an angle in degrees, exact at 60, 90 and 120. */
function cosine(degrees: number): number {
  if (degrees === 90) return 0;
  if (degrees === 60) return 0.5;
  if (degrees === 120) return -0.5;
  return Math.cos((degrees * Math.PI) / 180);
}

/** (V/abc)². */
function shapeFactor({ alpha, beta, gamma }: Cell): number {
  const [x, y, z] = [cosine(alpha), cosine(beta), cosine(gamma)];
  return 1 - x * x - y * y - z * z + 2 * x * y * z;
}

/** The metric tensor G of the direct axes, nine numbers row by row, Å². Lengths: `|x|² = xᵀ G x`. */
export function directMetric(cell: Cell): readonly number[] {
  const { a, b, c } = cell;
  const ab = a * b * cosine(cell.gamma);
  const ac = a * c * cosine(cell.beta);
  const bc = b * c * cosine(cell.alpha);
  return [a * a, ab, ac, ab, b * b, bc, ac, bc, c * c];
}

/** The metric tensor of the reciprocal axes a*, b*, c* without 2π, the inverse of G, Å⁻². */
export function reciprocalMetric(cell: Cell): readonly number[] {
  const { a, b, c } = cell;
  const [x, y, z] = [cosine(cell.alpha), cosine(cell.beta), cosine(cell.gamma)];
  const factor = shapeFactor(cell);
  if (!(factor > 0)) fail("invalid-cell", "the cell has no volume");
  const ab = (x * y - z) / (a * b * factor);
  const ac = (x * z - y) / (a * c * factor);
  const bc = (y * z - x) / (b * c * factor);
  return [
    (1 - x * x) / (a * a * factor),
    ab,
    ac,
    ab,
    (1 - y * y) / (b * b * factor),
    bc,
    ac,
    bc,
    (1 - z * z) / (c * c * factor),
  ];
}

/** The volume of the cell in Å³. */
export function cellVolume(cell: Cell): number {
  return cell.a * cell.b * cell.c * Math.sqrt(shapeFactor(cell));
}

/** The length of a vector in a metric (three components; nine metric numbers): Å for direct, Å⁻¹ for reciprocal ones. */
export function lengthInMetric(metric: readonly number[], v: readonly number[]): number {
  let sum = 0;
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++)
      sum += (v[row] as number) * (metric[3 * row + column] as number) * (v[column] as number);
  return Math.sqrt(Math.max(0, sum));
}
