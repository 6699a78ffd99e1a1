import { modulo, safe } from "../numbers/index.js";

/**
 * `U A V = D` for an integer matrix A of three columns: U and V unimodular, D diagonal with entries not negative
 * (H. Cohen, A Course in Computational Algebraic Number Theory, 1993, section 2.4.4, without the divisibility).
 */
export interface DiagonalForm {
  readonly left: readonly (readonly number[])[];
  readonly right: readonly (readonly number[])[];
  readonly diagonal: readonly [number, number, number];
}

export function diagonalForm(matrix: readonly (readonly number[])[]): DiagonalForm {
  const work = matrix.map((row) => [...row]);
  const left = identity(work.length);
  const right = identity(3);
  const diagonal = [0, 0, 0];
  for (let step = 0; step < 3; step++) {
    while (clearOnce(work, left, right, step));
    const pivot = work[step]?.[step] ?? 0;
    if (pivot < 0) negateRow(work, left, step);
    diagonal[step] = Math.abs(pivot);
  }
  return { left, right, diagonal: diagonal as [number, number, number] };
}

/** Brings the smallest entry of the rest to the corner and clears its row and column once; false when all is done. */
function clearOnce(work: number[][], left: number[][], right: number[][], step: number): boolean {
  let best: [number, number] | null = null;
  for (let row = step; row < work.length; row++)
    for (let column = step; column < 3; column++) {
      const size = Math.abs(at(work, row, column));
      if (size > 0 && (best === null || size < Math.abs(at(work, best[0], best[1])))) best = [row, column];
    }
  if (best === null) return false;
  swapRows(work, step, best[0]);
  swapRows(left, step, best[0]);
  swapColumns(work, step, best[1]);
  swapColumns(right, step, best[1]);
  const pivot = at(work, step, step);
  let rest = false;
  for (let row = step + 1; row < work.length; row++) {
    const factor = Math.trunc(at(work, row, step) / pivot);
    addRow(work, row, step, -factor);
    addRow(left, row, step, -factor);
    rest ||= at(work, row, step) !== 0;
  }
  for (let column = step + 1; column < 3; column++) {
    const factor = Math.trunc(at(work, step, column) / pivot);
    addColumn(work, column, step, -factor);
    addColumn(right, column, step, -factor);
    rest ||= at(work, step, column) !== 0;
  }
  return rest;
}

/**
 * All solutions of `A x ≡ b` modulo the integers up to those that differ by integers, as numerators over
 * `denominator · scale`; free directions (zeros of D) are left at 0. Null when there is none.
 *
 * @param constants numerators of b over `denominator`
 */
export function solveCongruences(
  form: DiagonalForm,
  constants: readonly number[],
  denominator: number,
): { readonly solutions: readonly (readonly number[])[]; readonly denominator: number } | null {
  const turned = form.left.map((row) =>
    row.reduce((sum, entry, index) => safe(sum + entry * (constants[index] as number)), 0),
  );
  if (turned.some((entry, index) => (form.diagonal[index] ?? 0) === 0 && modulo(entry, denominator) !== 0)) return null;
  const scale = form.diagonal.reduce((product, entry) => product * Math.max(1, entry), 1);
  let partial: number[][] = [[]];
  form.diagonal.forEach((entry, index) => {
    const steps = Math.max(1, entry);
    const start = entry === 0 ? 0 : (turned[index] as number) * (scale / steps);
    partial = partial.flatMap((known) =>
      Array.from({ length: steps }, (_, step) => [...known, start + step * denominator * (scale / steps)]),
    );
  });
  const common = denominator * scale;
  const solutions = partial.map((y) =>
    form.right.map((row) =>
      modulo(
        row.reduce((sum, entry, index) => safe(sum + entry * (y[index] as number)), 0),
        common,
      ),
    ),
  );
  return { solutions, denominator: common };
}

/** Columns of V that belong to zeros of D: the directions along which a solution may be moved freely. */
export function freeDirections({ right, diagonal }: DiagonalForm): readonly (readonly number[])[] {
  return diagonal.flatMap((entry, column) => (entry === 0 ? [right.map((row) => row[column] as number)] : []));
}

function identity(size: number): number[][] {
  return Array.from({ length: size }, (_, row) => Array.from({ length: size }, (_unused, column) => +(row === column)));
}

function at(matrix: readonly (readonly number[])[], row: number, column: number): number {
  return matrix[row]?.[column] as number;
}

function swapRows(matrix: number[][], a: number, b: number): void {
  const kept = matrix[a] as number[];
  matrix[a] = matrix[b] as number[];
  matrix[b] = kept;
}

function swapColumns(matrix: number[][], a: number, b: number): void {
  for (const row of matrix) {
    const kept = row[a] as number;
    row[a] = row[b] as number;
    row[b] = kept;
  }
}

function addRow(matrix: number[][], target: number, source: number, factor: number): void {
  const from = matrix[source] as number[];
  matrix[target] = (matrix[target] as number[]).map((entry, column) => entry + factor * (from[column] as number));
}

function addColumn(matrix: number[][], target: number, source: number, factor: number): void {
  for (const row of matrix) row[target] = (row[target] as number) + factor * (row[source] as number);
}

function negateRow(work: number[][], left: number[][], row: number): void {
  for (const matrix of [work, left]) matrix[row] = (matrix[row] as number[]).map((entry) => 0 - entry);
}
