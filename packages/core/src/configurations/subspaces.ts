import { inverseModulo } from "./modular-field.js";

/**
 * A subspace of vectors of residues: `rows` basis vectors of length `width` one after the other, in reduced echelon
 * form, so that equal subspaces are equal arrays.
 */
export interface Subspace {
  readonly rows: number;
  readonly width: number;
  readonly basis: Float64Array;
}

/** A square matrix of residues, row by row. */
export type ResidueMatrix = Float64Array;

export function wholeSpace(width: number): Subspace {
  return { rows: width, width, basis: identityResidues(width) };
}

export function identityResidues(size: number): ResidueMatrix {
  const matrix = new Float64Array(size * size);
  for (let index = 0; index < size; index++) matrix[index * size + index] = 1;
  return matrix;
}

/** Text that is the same for equal subspaces only. */
export function subspaceKey(space: Subspace): string {
  return space.basis.join();
}

export function multiplyResidues(a: ResidueMatrix, b: ResidueMatrix, size: number, prime: number): ResidueMatrix {
  const result = new Float64Array(size * size);
  for (let row = 0; row < size; row++)
    for (let inner = 0; inner < size; inner++) {
      const factor = a[row * size + inner] as number;
      if (factor === 0) continue;
      for (let column = 0; column < size; column++) {
        const entry = b[inner * size + column] as number;
        if (entry !== 0)
          result[row * size + column] = ((result[row * size + column] as number) + factor * entry) % prime;
      }
    }
  return result;
}

/** The inverse, or null when the matrix is singular modulo the prime. */
export function invertResidues(matrix: ResidueMatrix, size: number, prime: number): ResidueMatrix | null {
  const wide = new Float64Array(2 * size * size);
  for (let row = 0; row < size; row++) {
    for (let column = 0; column < size; column++) wide[row * 2 * size + column] = matrix[row * size + column] as number;
    wide[row * 2 * size + size + row] = 1;
  }
  const reduced = echelonResidues(wide, size, 2 * size, prime);
  if (reduced.rows < size) return null;
  const result = new Float64Array(size * size);
  for (let row = 0; row < size; row++) {
    if (reduced.basis[row * 2 * size + row] !== 1) return null;
    for (let column = 0; column < size; column++)
      result[row * size + column] = reduced.basis[row * 2 * size + size + column] as number;
  }
  return result;
}

/** The span of `count` rows; the array given is overwritten. */
export function echelonResidues(work: Float64Array, count: number, width: number, prime: number): Subspace {
  let top = 0;
  for (let column = 0; column < width && top < count; column++) {
    let found = top;
    while (found < count && work[found * width + column] === 0) found += 1;
    if (found === count) continue;
    if (found !== top)
      for (let index = column; index < width; index++) {
        const held = work[top * width + index] as number;
        work[top * width + index] = work[found * width + index] as number;
        work[found * width + index] = held;
      }
    const lead = work[top * width + column] as number;
    if (lead !== 1) {
      const inverse = inverseModulo(lead, prime);
      for (let index = column; index < width; index++)
        work[top * width + index] = ((work[top * width + index] as number) * inverse) % prime;
    }
    for (let row = 0; row < count; row++) {
      const factor = work[row * width + column] as number;
      if (row === top || factor === 0) continue;
      for (let index = column; index < width; index++) {
        const entry = work[top * width + index] as number;
        if (entry !== 0)
          work[row * width + index] = ((work[row * width + index] as number) + (prime - factor) * entry) % prime;
      }
    }
    top += 1;
  }
  return { rows: top, width, basis: work.slice(0, top * width) };
}

/** `M v` for every basis vector v, one after the other. */
export function imagesOf(space: Subspace, matrix: ResidueMatrix, prime: number): Float64Array {
  const { rows, width, basis } = space;
  const result = new Float64Array(rows * width);
  for (let vector = 0; vector < rows; vector++)
    for (let row = 0; row < width; row++) {
      let sum = 0;
      for (let column = 0; column < width; column++) {
        const entry = basis[vector * width + column] as number;
        if (entry !== 0) sum = (sum + entry * (matrix[row * width + column] as number)) % prime;
      }
      result[vector * width + row] = sum;
    }
  return result;
}

/** The subspace `M F`. */
export function mapSubspace(space: Subspace, matrix: ResidueMatrix, prime: number): Subspace {
  return echelonResidues(imagesOf(space, matrix, prime), space.rows, space.width, prime);
}

/** Whether `M v = sign·v` for every v of the subspace. */
export function fixesSubspace(space: Subspace, matrix: ResidueMatrix, sign: 1 | -1, prime: number): boolean {
  const { rows, width, basis } = space;
  for (let vector = 0; vector < rows; vector++)
    for (let row = 0; row < width; row++) {
      let sum = 0;
      for (let column = 0; column < width; column++) {
        const entry = basis[vector * width + column] as number;
        if (entry !== 0) sum = (sum + entry * (matrix[row * width + column] as number)) % prime;
      }
      const own = basis[vector * width + row] as number;
      if (sum !== (sign === 1 || own === 0 ? own : prime - own)) return false;
    }
  return true;
}

/** The vectors v of the subspace with `M v = sign·v`. */
export function fixedPart(space: Subspace, matrix: ResidueMatrix, sign: 1 | -1, prime: number): Subspace {
  const { rows, width, basis } = space;
  // Rows (M v − sign·v | unit vector): elimination of the left part leaves the combinations that vanish there.
  const wide = new Float64Array(rows * (width + rows));
  const moved = imagesOf(space, matrix, prime);
  for (let vector = 0; vector < rows; vector++) {
    for (let column = 0; column < width; column++) {
      const own = basis[vector * width + column] as number;
      const change = (moved[vector * width + column] as number) + (sign === 1 ? prime - own : own);
      wide[vector * (width + rows) + column] = change % prime;
    }
    wide[vector * (width + rows) + width + vector] = 1;
  }
  const reduced = echelonResidues(wide, rows, width + rows, prime);
  const combinations: number[] = [];
  for (let row = 0; row < reduced.rows; row++) {
    let zero = true;
    for (let column = 0; column < width && zero; column++) zero = reduced.basis[row * (width + rows) + column] === 0;
    if (zero) combinations.push(row);
  }
  const result = new Float64Array(combinations.length * width);
  combinations.forEach((row, index) => {
    for (let vector = 0; vector < rows; vector++) {
      const factor = reduced.basis[row * (width + rows) + width + vector] as number;
      if (factor === 0) continue;
      for (let column = 0; column < width; column++)
        result[index * width + column] =
          ((result[index * width + column] as number) + factor * (basis[vector * width + column] as number)) % prime;
    }
  });
  return echelonResidues(result, combinations.length, width, prime);
}

/** Whether every vector of `inner` lies in `outer`: each is the sum of outer rows with its entries at their pivots. */
export function isInside(inner: Subspace, outer: Subspace, prime: number): boolean {
  if (inner.rows > outer.rows) return false;
  const { width, basis } = outer;
  const pivots: number[] = [];
  for (let row = 0; row < outer.rows; row++) {
    let pivot = 0;
    while (basis[row * width + pivot] === 0) pivot += 1;
    pivots.push(pivot);
  }
  for (let vector = 0; vector < inner.rows; vector++)
    for (let column = 0; column < width; column++) {
      let sum = 0;
      for (let row = 0; row < outer.rows; row++) {
        const factor = inner.basis[vector * width + (pivots[row] as number)] as number;
        if (factor !== 0) sum = (sum + factor * (basis[row * width + column] as number)) % prime;
      }
      if (sum !== inner.basis[vector * width + column]) return false;
    }
  return true;
}
