import { familyGroup, type MagneticGroup, unprimedSubgroup } from "../magneticgroups/index.js";
import {
  addVectors,
  determinant,
  divide,
  equal,
  identityMatrix,
  invert,
  isInteger,
  isZero,
  multiplyMatrices,
  negateVector,
  overCommonDenominator,
  type RationalMatrix,
  type RationalVector,
  rational,
  timesColumn,
  toNumber,
  zeroVector,
} from "../numbers/index.js";
import {
  type BasisChange,
  changeOperator,
  isTranslation,
  type Lattice,
  latticeFromVectors,
  latticeMatrix,
  latticeVectors,
  latticeVectorsOfCell,
  operatorFrom,
  reduceByLattice,
  rotationOf,
  type SymmetryOperator,
  standardSetting,
  toPrimitiveColumn,
  translationOf,
} from "../spacegroups/index.js";

/** A cell for a magnetic group, and the group in it. */
export interface ChildCell {
  /** (P, p) from the parent's axes; the origin stays the parent's. */
  readonly cellFromParent: BasisChange;
  readonly inverse: RationalMatrix;
  /** The lattice of translations without time reversal in the axes of the cell. */
  readonly lattice: Lattice;
  /** One per rotation and time reversal; with the centrings they make the group modulo integer translations. */
  readonly operators: readonly CellOperator[];
  readonly centrings: readonly CellOperator[];
}

/** An operator of a magnetic group in the axes of its own cell: fractions of these axes, time reversal +1 or −1. */
export interface CellOperator {
  readonly operator: SymmetryOperator;
  readonly timeReversal: 1 | -1;
}

/** Lattice points in a conventional cell are 1, 2, 3 (rhombohedral) or 4. */
const mostCentrings = 4;

/**
 * Multiples of the parent's axes where these make a cell with at most four lattice points; else the axes of the
 * tabulated setting of the group without regard to time reversal (type IV: of its operators without it), the choice
 * on which the symbols of Belov, Neronova and Smirnova rest. Always right-handed.
 */
export function childCell(group: MagneticGroup): ChildCell {
  const multiples = multiplesOfAxes(group.lattice);
  const matrix = multiples !== null && isAlongC(group, multiples) ? multiples : conventionalAxes(group);
  const change: BasisChange = { matrix, shift: zeroVector };
  const inverse = invert(matrix);
  const lattice = latticeFromVectors(latticeVectors(group.lattice).map((vector) => timesColumn(inverse, vector)));
  const moved = group.operators.map(({ operator, timeReversal }) => ({
    operator: changeOperator(operator, change, inverse),
    timeReversal,
  }));
  const anti = moved.find(({ operator, timeReversal }) => timeReversal === -1 && isTranslation(operator));
  const points = latticeVectorsOfCell(lattice);
  const centrings = [
    ...points.map((vector) => translationBy(vector, 1)),
    ...(anti === undefined
      ? []
      : points.map((vector) => translationBy(reduceToCell(addVectors(vector, translationOf(anti.operator))), -1))),
  ];
  return {
    cellFromParent: change,
    inverse,
    lattice,
    operators: moved
      // An anti-translation brings every rotation with both signs: those without time reversal are enough.
      .filter(({ timeReversal }) => anti === undefined || timeReversal === 1)
      .map(({ operator, timeReversal }) => ({
        operator: operatorFrom(rotationOf(operator), reduceByLattice(lattice, translationOf(operator))),
        timeReversal,
      })),
    centrings,
  };
}

function translationBy(vector: RationalVector, timeReversal: 1 | -1): CellOperator {
  return { operator: operatorFrom(identityMatrix, vector), timeReversal };
}

/** Coordinates in [0, 1). */
export function reduceToCell(vector: RationalVector): RationalVector {
  return addVectors(
    vector,
    negateVector([
      rational(Math.floor(vector[0][0] / vector[0][1])),
      rational(Math.floor(vector[1][0] / vector[1][1])),
      rational(Math.floor(vector[2][0] / vector[2][1])),
    ]),
  );
}

/** The smallest multiples (or parts) of the axes that are lattice vectors, null when their cell has many points. */
function multiplesOfAxes(lattice: Lattice): RationalMatrix | null {
  const sizes = identityMatrix.map((axis) => {
    const column = overCommonDenominator(toPrimitiveColumn(lattice, axis));
    // r·axis is a lattice vector exactly when r·numerators/denominator are integers: r = denominator/gcd.
    const common = column.numerators.reduce((value, entry) => greatest(value, Math.abs(entry)), 0);
    return rational(column.denominator, common);
  });
  const matrix = identityMatrix.map((axis, index) =>
    axis.map((entry) => (entry[0] === 0 ? entry : (sizes[index] as readonly [number, number]))),
  ) as unknown as RationalMatrix;
  const points = divide(determinant(matrix), determinant(latticeMatrix(lattice)));
  return isInteger(points) && toNumber(points) <= mostCentrings ? matrix : null;
}

function greatest(a: number, b: number): number {
  let [x, y] = [a, b];
  while (y !== 0) [x, y] = [y, x % y];
  return x;
}

/**
 * Whether the one threefold axis of a trigonal group runs along c of the cell: in a cubic parent it does not, and
 * hexagonal axes are clearer there.
 */
function isAlongC(group: MagneticGroup, matrix: RationalMatrix): boolean {
  const inverse = invert(matrix);
  const threefold = group.operators
    .map(({ operator }) => multiplyMatrices(multiplyMatrices(inverse, rotationOf(operator)), matrix))
    .filter(
      (rotation) => Math.abs(toNumber(rotation[0][0]) + toNumber(rotation[1][1]) + toNumber(rotation[2][2])) === 0,
    )
    .filter((rotation) => !equalMatrices(multiplyMatrices(rotation, rotation), identityMatrix));
  const alongC = threefold.filter((rotation) => isZero(rotation[0][2]) && isZero(rotation[1][2]));
  // Cubic groups have several such axes and keep theirs.
  return threefold.length === 0 || alongC.length > 0 || threefold.length > mostThirdsOfOneAxis;
}

/** Rotations of order 3 and 6 with trace 0 about one axis, each with and without time reversal. */
const mostThirdsOfOneAxis = 8;

function equalMatrices(a: RationalMatrix, b: RationalMatrix): boolean {
  return a.every((row, index) =>
    row.every((entry, column) => equal(entry, (b[index] as typeof row)[column] as typeof entry)),
  );
}

function conventionalAxes(group: MagneticGroup): RationalMatrix {
  return standardSetting(group.type === 4 ? unprimedSubgroup(group) : familyGroup(group)).change.matrix;
}
