import { echelonResidues, type ResidueMatrix, type Subspace } from "./subspaces.js";

/** A square matrix of residues by its non-zero entries, row after row. Induced matrices have few. */
export interface SparseResidues {
  readonly size: number;
  /** Where each row begins, and the end of the last. */
  readonly starts: Int32Array;
  readonly columns: Int32Array;
  readonly values: Float64Array;
}

export function sparseResidues(matrix: ResidueMatrix, size: number): SparseResidues {
  const starts = new Int32Array(size + 1);
  const columns: number[] = [];
  const values: number[] = [];
  for (let row = 0; row < size; row++) {
    for (let column = 0; column < size; column++) {
      const entry = matrix[row * size + column] as number;
      if (entry === 0) continue;
      columns.push(column);
      values.push(entry);
    }
    starts[row + 1] = columns.length;
  }
  return { size, starts, columns: Int32Array.from(columns), values: Float64Array.from(values) };
}

/** Room for the intermediate rows of `sparseFixedPart`, used again and again. */
export interface Scratch {
  readonly rows: Float64Array;
}

export function scratchFor(width: number): Scratch {
  return { rows: new Float64Array(width * width) };
}

/**
 * The vectors v of a subspace with `M v = sign·v`, null where there is only zero: most matrices leave nothing fixed, which
 * the rank of `M F − sign·F` alone shows.
 */
export function sparseFixedPart(
  space: Subspace,
  matrix: SparseResidues,
  sign: 1 | -1,
  prime: number,
  scratch: Scratch,
): Subspace | null {
  const { rows, width } = space;
  differences(space, matrix, sign, prime, scratch.rows);
  if (hasFullRank(scratch.rows, rows, width, prime)) return null;
  differences(space, matrix, sign, prime, scratch.rows);
  const wide = new Float64Array(rows * (width + rows));
  for (let row = 0; row < rows; row++) {
    wide.set(scratch.rows.subarray(row * width, (row + 1) * width), row * (width + rows));
    wide[row * (width + rows) + width + row] = 1;
  }
  const reduced = echelonResidues(wide, rows, width + rows, prime);
  const kept: Float64Array[] = [];
  for (let row = 0; row < reduced.rows; row++) {
    const start = row * (width + rows);
    if (reduced.basis.subarray(start, start + width).some((entry) => entry !== 0)) continue;
    kept.push(combination(space, reduced.basis.subarray(start + width, start + width + rows), prime));
  }
  const result = new Float64Array(kept.length * width);
  kept.forEach((row, index) => {
    result.set(row, index * width);
  });
  return echelonResidues(result, kept.length, width, prime);
}

function differences(
  { rows, width, basis }: Subspace,
  { starts, columns, values }: SparseResidues,
  sign: 1 | -1,
  prime: number,
  target: Float64Array,
): void {
  for (let vector = 0; vector < rows; vector++) {
    const first = vector * width;
    for (let row = 0; row < width; row++) {
      const own = basis[first + row] as number;
      let sum = sign === 1 && own !== 0 ? prime - own : own;
      for (let at = starts[row] as number; at < (starts[row + 1] as number); at++) {
        const entry = basis[first + (columns[at] as number)] as number;
        if (entry !== 0) sum = (sum + entry * (values[at] as number)) % prime;
      }
      target[first + row] = sum % prime;
    }
  }
}

/** Elimination without divisions, stopped at the first row that vanishes. Overwrites the rows. */
function hasFullRank(work: Float64Array, rows: number, width: number, prime: number): boolean {
  for (let row = 0; row < rows; row++) {
    let pivot = 0;
    while (pivot < width && work[row * width + pivot] === 0) pivot += 1;
    if (pivot === width) return false;
    const lead = work[row * width + pivot] as number;
    for (let other = row + 1; other < rows; other++) {
      const factor = work[other * width + pivot] as number;
      if (factor === 0) continue;
      const minus = prime - factor;
      for (let column = 0; column < width; column++) {
        const a = work[other * width + column] as number;
        const b = work[row * width + column] as number;
        if (a !== 0 || b !== 0) work[other * width + column] = (((a * lead) % prime) + minus * b) % prime;
      }
    }
  }
  return true;
}

function combination({ rows, width, basis }: Subspace, factors: Float64Array, prime: number): Float64Array {
  const sum = new Float64Array(width);
  for (let vector = 0; vector < rows; vector++) {
    const factor = factors[vector] as number;
    if (factor === 0) continue;
    for (let column = 0; column < width; column++)
      sum[column] = ((sum[column] as number) + factor * (basis[vector * width + column] as number)) % prime;
  }
  return sum;
}
