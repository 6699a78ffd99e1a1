import {
  addCyclotomic,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicOne,
  cyclotomicZero,
  isCyclotomicZero,
  multiplyCyclotomic,
} from "./cyclotomics.js";

/** A matrix of exact numbers, row by row. */
export type CyclotomicMatrix = readonly (readonly Cyclotomic[])[];

export function identityCyclotomicMatrix(size: number): CyclotomicMatrix {
  return Array.from({ length: size }, (_, row) =>
    Array.from({ length: size }, (_unused, column) => (row === column ? cyclotomicOne : cyclotomicZero)),
  );
}

export function multiplyCyclotomicMatrices(a: CyclotomicMatrix, b: CyclotomicMatrix): CyclotomicMatrix {
  const width = b[0]?.length ?? 0;
  return a.map((row) => {
    const sums = new Array<Cyclotomic>(width).fill(cyclotomicZero);
    for (const [index, entry] of row.entries()) {
      // Most entries are zero.
      if (isCyclotomicZero(entry)) continue;
      const other = b[index] as readonly Cyclotomic[];
      for (let column = 0; column < width; column++)
        sums[column] = addCyclotomic(
          sums[column] as Cyclotomic,
          multiplyCyclotomic(entry, other[column] as Cyclotomic),
        );
    }
    return sums;
  });
}

export function scaleCyclotomicMatrix(factor: Cyclotomic, matrix: CyclotomicMatrix): CyclotomicMatrix {
  return matrix.map((row) => row.map((entry) => (isCyclotomicZero(entry) ? entry : multiplyCyclotomic(factor, entry))));
}

export function addCyclotomicMatrices(a: CyclotomicMatrix, b: CyclotomicMatrix): CyclotomicMatrix {
  return a.map((row, index) =>
    row.map((entry, column) => addCyclotomic(entry, (b[index] as readonly Cyclotomic[])[column] as Cyclotomic)),
  );
}

/** Conjugate transpose; the inverse of a unitary matrix. */
export function adjointCyclotomicMatrix(matrix: CyclotomicMatrix): CyclotomicMatrix {
  return (matrix[0] ?? []).map((_, column) => matrix.map((row) => conjugateCyclotomic(row[column] as Cyclotomic)));
}

export function traceCyclotomicMatrix(matrix: CyclotomicMatrix): Cyclotomic {
  return matrix.reduce((sum, row, index) => addCyclotomic(sum, row[index] as Cyclotomic), cyclotomicZero);
}
