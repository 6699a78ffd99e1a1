import { constantRoot, type SmallIrrep } from "../irreps/index.js";
import {
  addCyclotomicMatrices,
  adjointCyclotomicMatrix,
  type Cyclotomic,
  type CyclotomicMatrix,
  cyclotomicFromRational,
  cyclotomicNumbers,
  type LinearForm,
  multiplyCyclotomicMatrices,
  type Phase,
  type RationalMatrix,
  reducedEchelon,
  scaleCyclotomicMatrix,
  subtractForms,
} from "../numbers/index.js";

/** One operator of the little group as it acts on moments (or displacements) of one atom. */
export interface MomentOperator {
  /** det(R) R for axial vectors, R for polar ones, in lattice components. */
  readonly matrix: CyclotomicMatrix;
  /** k·a_{gj} of the atom, in turns. */
  readonly phase: LinearForm;
  /** Number of the operator in the little group. */
  readonly element: number;
}

/** `det(R) R` (axial) or `R` (polar) with exact entries. */
export function momentMatrix(rotation: RationalMatrix, properSign: number): CyclotomicMatrix {
  return rotation.map((row) =>
    row.map(([numerator, denominator]) => cyclotomicFromRational([properSign * numerator + 0, denominator])),
  );
}

/**
 * A basis of the 3 × d matrices A with `Γ(s) A = A D(s)` for every s that fixes the first atom of a suborbit. By
 * Frobenius reciprocity they are as many as the irrep has copies on the suborbit, since the magnetic representation
 * there is induced from the site (the projection operators of Bertaut, Acta Cryst. A24 (1968) 217, reduced to one
 * atom). All phases are short roots of unity here: the letters of k cancel.
 */
export function siteIntertwiners(
  irrep: SmallIrrep,
  phases: readonly Phase[],
  stabilizer: readonly MomentOperator[],
): CyclotomicMatrix[] {
  const { dimension } = irrep;
  const operators = stabilizer.map(({ matrix, phase, element }) => {
    const root = constantRoot(subtractForms(phase, phases[element] as Phase));
    return {
      left: scaleCyclotomicMatrix(root, matrix),
      right: adjointCyclotomicMatrix(irrep.matrices[element] as CyclotomicMatrix),
    };
  });
  const projected: Cyclotomic[][] = [];
  for (let partner = 0; partner < dimension; partner++)
    for (let axis = 0; axis < 3; axis++) {
      // Γ(s) E D(s)⁻¹ for the elementary matrix E that is 1 at (axis, partner): a column times a row.
      const mean = operators
        .map(({ left, right }) =>
          multiplyCyclotomicMatrices(
            left.map((row) => [row[axis] as Cyclotomic]),
            [right[partner] as readonly Cyclotomic[]],
          ),
        )
        .reduce(addCyclotomicMatrices);
      projected.push(mean.flat());
    }
  return reducedEchelon(projected, cyclotomicNumbers).rows.map((flat) =>
    [0, 1, 2].map((row) => flat.slice(row * dimension, (row + 1) * dimension)),
  );
}
