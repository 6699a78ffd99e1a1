import {
  addCyclotomic,
  addCyclotomicMatrices,
  adjointCyclotomicMatrix,
  type Cyclotomic,
  type CyclotomicMatrix,
  conjugateCyclotomic,
  cyclotomicFromRational,
  cyclotomicToRational,
  cyclotomicZero,
  invertCyclotomic,
  isCyclotomicZero,
  multiplyCyclotomic,
  rational,
  reduceOrder,
  scaleCyclotomicMatrix,
  squareRootOf,
} from "../numbers/index.js";

/**
 * The unitary X with `left · X = X · right` for all given pairs of matrices of two equivalent irreps of a finite group
 * (one pair per element), unique up to a phase by Schur's lemma: the mean of `left · E · right⁻¹` for the first
 * elementary matrix E that does not vanish, scaled so that one entry is positive.
 */
export function unitaryIntertwiner(
  pairs: readonly (readonly [CyclotomicMatrix, CyclotomicMatrix])[],
): CyclotomicMatrix {
  const [[identity]] = pairs as readonly [(typeof pairs)[number]];
  for (const a of identity.keys())
    for (const b of identity.keys()) {
      const mean = pairs.map(([left, right]) => outerProduct(left, right, a, b)).reduce(addCyclotomicMatrices);
      const entry = mean.flat().find((value) => !isCyclotomicZero(value));
      if (entry) return normalizedUnitary(scaleCyclotomicMatrix(invertCyclotomic(reduceOrder(entry)), mean));
    }
  throw new Error("two equivalent irreps have no intertwiner");
}

/** Δ E_{ab} Δ'† for an elementary matrix: column a of the first times the conjugated column b of the second. */
function outerProduct(left: CyclotomicMatrix, right: CyclotomicMatrix, a: number, b: number): CyclotomicMatrix {
  const adjoint = adjointCyclotomicMatrix(right);
  return left.map((row) =>
    (adjoint[b] as readonly Cyclotomic[]).map((entry) => multiplyCyclotomic(row[a] as Cyclotomic, entry)),
  );
}

/** Σ a_j b_j*. */
export function rowProduct(a: readonly Cyclotomic[], b: readonly Cyclotomic[]): Cyclotomic {
  return a.reduce(
    (sum, entry, column) => addCyclotomic(sum, multiplyCyclotomic(entry, conjugateCyclotomic(b[column] as Cyclotomic))),
    cyclotomicZero,
  );
}

/** Divides by √m where X X† = m·1; m is rational because one entry of X is 1 and the rest come from roots of unity. */
function normalizedUnitary(matrix: CyclotomicMatrix): CyclotomicMatrix {
  const [row] = matrix as readonly [readonly Cyclotomic[]];
  const norm = rowProduct(row, row);
  const value = cyclotomicToRational(reduceOrder(norm));
  if (value === null) throw new Error("an intertwiner has no unitary form in a cyclotomic field found by this method");
  const inverseRoot = multiplyCyclotomic(
    squareRootOf(value[0] * value[1]),
    cyclotomicFromRational(rational(1, value[0])),
  );
  return scaleCyclotomicMatrix(inverseRoot, matrix).map((row) => row.map(reduceOrder));
}
