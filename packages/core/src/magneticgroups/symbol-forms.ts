import { roundNumber, tensorFactorSnap } from "../numbers/index.js";

/**
 * The general member of a space of vectors as texts: entries that can be chosen freely carry their own names, the first
 * ones in the order of the names, all others follow from them (`-αxy`, `2Λ11`, `Mx-My`, `0`).
 *
 * @param vectors any vectors that span the space
 */
export function symbolForms(vectors: readonly (readonly number[])[], names: readonly string[]): readonly string[] {
  const { rows, pivots } = numericEchelon(vectors, names.length);
  return names.map((_, entry) => {
    const terms = rows.flatMap((row, index) => {
      const factor = row[entry] as number;
      return Math.abs(factor) < tensorFactorSnap ? [] : [term(factor, names[pivots[index] as number] as string)];
    });
    return terms.length === 0 ? "0" : terms.join("").replace(/^\+/, "");
  });
}

/** Reduced echelon form in floats; the largest entry of a column is the pivot, rounding noise is none. */
function numericEchelon(
  vectors: readonly (readonly number[])[],
  width: number,
): { rows: number[][]; pivots: number[] } {
  const work = vectors.map((vector) => {
    const scale = Math.max(...vector.map(Math.abs));
    return vector.map((entry) => entry / scale);
  });
  const pivots: number[] = [];
  for (let column = 0; column < width && pivots.length < work.length; column++) {
    const top = pivots.length;
    let best = top;
    for (let row = top; row < work.length; row++)
      if (Math.abs(work[row]?.[column] as number) > Math.abs(work[best]?.[column] as number)) best = row;
    const lead = work[best]?.[column] as number;
    if (Math.abs(lead) < tensorFactorSnap) continue;
    const pivotRow = (work[best] as number[]).map((entry) => entry / lead);
    work[best] = work[top] as number[];
    work[top] = pivotRow;
    work.forEach((row, index) => {
      const factor = row[column] as number;
      if (index !== top && factor !== 0)
        work[index] = row.map((entry, position) => entry - factor * (pivotRow[position] as number));
    });
    pivots.push(column);
  }
  return { rows: work.slice(0, pivots.length), pivots };
}

function term(factor: number, name: string): string {
  const sign = factor < 0 ? "-" : "+";
  const size = Math.abs(factor);
  for (let bottom = 1; bottom <= 6; bottom++)
    for (const root of [1, 2, 3, 6]) {
      const top = Math.round((size * bottom) / Math.sqrt(root));
      if (top === 0 || top > 12 || Math.abs((top * Math.sqrt(root)) / bottom - size) > tensorFactorSnap) continue;
      const rootText = root === 1 ? "" : `√${root}`;
      return `${sign}${top === 1 ? "" : top}${rootText}${name}${bottom === 1 ? "" : `/${bottom}`}`;
    }
  return `${sign}${roundNumber(size)}${name}`;
}
