import {
  formatForm,
  fractionalPart,
  isInteger,
  type LinearForm,
  multiply,
  nullSpace,
  one,
  type Rational,
  type RationalMatrix,
  type RationalVector,
  rational,
  rationalField,
  reducedEchelon,
  subtract,
  type VariableNames,
  zero,
  zeroVector,
} from "../numbers/index.js";

/**
 * The vectors that all `matrices` leave fixed, through `point`, as three linear forms: each free parameter has the
 * letter of a coordinate that is that parameter alone, e.g. `x, 2x, 1/4`. Letters go to the first coordinates that give
 * integer coefficients.
 *
 * @param point a point of the set; the zero vector for a linear set
 * @param reduce whether constants are taken modulo 1
 */
export function fixedForms(
  matrices: readonly RationalMatrix[],
  point: RationalVector,
  names: VariableNames,
  reduce: boolean,
): readonly [string, string, string] {
  const { rows, pivots } = parameterBasis(fixedDirections(matrices));
  const forms = ([0, 1, 2] as const).map((coordinate): LinearForm => {
    let coefficients: RationalVector = zeroVector;
    let constant = point[coordinate];
    rows.forEach((row, index) => {
      const pivot = pivots[index] as 0 | 1 | 2;
      const factor = row[coordinate] as Rational;
      coefficients = replaceEntry(coefficients, pivot, factor);
      constant = subtract(constant, multiply(factor, point[pivot]));
    });
    return { coefficients, constant: reduce ? fractionalPart(constant) : constant };
  });
  return forms.map((form) => formatForm(form, names)) as unknown as readonly [string, string, string];
}

/** A basis of the vectors with `M v = v` for all matrices. */
export function fixedDirections(matrices: readonly RationalMatrix[]): Rational[][] {
  const rows = matrices.flatMap((matrix) =>
    matrix.map((row, index) => row.map((entry, column) => subtract(entry, rational(index === column ? 1 : 0)))),
  );
  return nullSpace(rows, 3, rationalField, zero, one);
}

/** The basis in echelon form on the first columns that make all its entries integers, else on the first at all. */
function parameterBasis(basis: readonly (readonly Rational[])[]): { rows: Rational[][]; pivots: number[] } {
  const plain = reducedEchelon(basis, rationalField);
  for (const order of columnOrders) {
    const permuted = reducedEchelon(
      basis.map((row) => order.map((column) => row[column] as Rational)),
      rationalField,
    );
    if (!permuted.rows.flat().every(isInteger)) continue;
    return {
      rows: permuted.rows.map((row) => [0, 1, 2].map((column) => row[order.indexOf(column)] as Rational)),
      pivots: permuted.pivots.map((pivot) => order[pivot] as number),
    };
  }
  return plain;
}

const columnOrders = [
  [0, 1, 2],
  [0, 2, 1],
  [1, 0, 2],
  [1, 2, 0],
  [2, 0, 1],
  [2, 1, 0],
];

function replaceEntry(vector: RationalVector, index: 0 | 1 | 2, value: Rational): RationalVector {
  return [index === 0 ? value : vector[0], index === 1 ? value : vector[1], index === 2 ? value : vector[2]];
}
