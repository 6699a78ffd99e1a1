import { fail } from "../errors/index.js";
import {
  addVectors,
  determinant,
  divide,
  dot,
  gcdOf,
  hermiteNormalForm,
  invert,
  isInteger,
  lcm,
  mapVector,
  matrixFrom,
  multiply,
  overCommonDenominator,
  type Rational,
  type RationalMatrix,
  type RationalVector,
  rational,
  reduceModulo,
  rowTimes,
  safe,
  subtract,
  toNumber,
  transpose,
  vectorFrom,
} from "../numbers/index.js";
import type { Lattice } from "./types.js";

/** All integer vectors. */
export const integerLattice: Lattice = {
  vectors: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  denominator: 1,
};

/** The lattice spanned by `generators` (they must span space) as its canonical record. */
export function latticeFrom(generators: readonly RationalVector[]): Lattice {
  const { numerators, denominator } = overCommonDenominator(generators.flat());
  const rows = generators.map((_, index) => numerators.slice(3 * index, 3 * index + 3));
  const hermite = hermiteNormalForm(rows, 3);
  const common = gcdOf([denominator, ...hermite.flat()]);
  return {
    vectors: hermite.map((row) => row.map((entry) => entry / common) as [number, number, number]),
    denominator: denominator / common,
  };
}

/** The basis vectors of L as exact vectors. */
export function latticeVectors(lattice: Lattice): readonly RationalVector[] {
  return lattice.vectors.map((vector) => vectorFrom(vector, lattice.denominator));
}

/** The matrix B whose columns are the basis vectors of L: `x = B ξ`. */
export function latticeMatrix(lattice: Lattice): RationalMatrix {
  return transpose(matrixFrom(lattice.vectors.flat(), lattice.denominator));
}

type LatticeVector = Lattice["vectors"][number];

/** Coordinates ξ in the primitive basis of L, `ξ = B⁻¹ x`. */
export function toPrimitiveColumn(lattice: Lattice, x: RationalVector): RationalVector {
  // The basis vectors are upper triangular, so that B is lower triangular and is solved from the first axis on.
  const [p, q, r] = lattice.vectors as [LatticeVector, LatticeVector, LatticeVector];
  const scaled = mapVector(x, (entry) => multiply(entry, rational(lattice.denominator)));
  const first = multiply(scaled[0], rational(1, p[0]));
  const second = multiply(subtract(scaled[1], multiply(first, rational(p[1]))), rational(1, q[1]));
  const rest = subtract(subtract(scaled[2], multiply(first, rational(p[2]))), multiply(second, rational(q[2])));
  return [first, second, multiply(rest, rational(1, r[2]))];
}

/** Coordinates in the axes of the setting, `x = B ξ`. */
export function fromPrimitiveColumn(lattice: Lattice, xi: RationalVector): RationalVector {
  const [p, q, r] = lattice.vectors as [LatticeVector, LatticeVector, LatticeVector];
  const part = rational(1, lattice.denominator);
  const at = (axis: 0 | 1 | 2): Rational =>
    multiply(part, dot(xi, [rational(p[axis]), rational(q[axis]), rational(r[axis])]));
  return [at(0), at(1), at(2)];
}

/** A reciprocal row in the dual of the primitive basis, `κ = k B`; κ is integer exactly when k ∈ L*. */
export function toPrimitiveRow(lattice: Lattice, k: RationalVector): RationalVector {
  return rowTimes(k, latticeMatrix(lattice));
}

/** A reciprocal row in the axes of the setting, `k = κ B⁻¹`. */
export function fromPrimitiveRow(lattice: Lattice, kappa: RationalVector): RationalVector {
  return rowTimes(kappa, invert(latticeMatrix(lattice)));
}

/** Whether a vector (fractions of the axes of the setting) is a translation of the lattice; exact. */
export function isLatticeVector(lattice: Lattice, x: RationalVector): boolean {
  return toPrimitiveColumn(lattice, x).every(isInteger);
}

/**
 * The representative of `x` modulo L whose coordinates are the lexicographically smallest that are not negative.
 * Where L holds all integer vectors it lies in [0, 1).
 */
export function reduceByLattice(lattice: Lattice, x: RationalVector): RationalVector {
  const { numerators, denominator } = overCommonDenominator(x);
  const common = lcm(denominator, lattice.denominator);
  const rows = lattice.vectors.map((row) => row.map((entry) => safe((entry * common) / lattice.denominator)));
  return vectorFrom(
    reduceModulo(
      numerators.map((entry) => safe((entry * common) / denominator)),
      rows,
    ),
    common,
  );
}

/** True when every integer vector is a lattice vector, as in all conventional settings. */
export function holdsIntegers(lattice: Lattice): boolean {
  return integerLattice.vectors.every((vector) => isLatticeVector(lattice, vectorFrom(vector)));
}

/** Lattice points per cell of the setting: 1/det B, a fraction where the cell is smaller than a primitive one. */
export function latticePointsPerCell(lattice: Lattice): Rational {
  return divide(rational(1), determinant(latticeMatrix(lattice)));
}

/** Lattice points of one cell that are listed: far more than any supercell of a crystal has, and listed in 0.1 s. */
const mostLatticePoints = 10_000;

/**
 * Representatives of L modulo L ∩ Z³, zero first, then by coordinates: in a conventional setting the centring vectors
 * in [0, 1). Elsewhere each is the lexicographically smallest non-negative one of its class.
 *
 * @throws `invalid-argument` for more than `mostLatticePoints`
 */
export function latticeVectorsOfCell(lattice: Lattice): readonly RationalVector[] {
  const common = integerSublattice(lattice);
  const count = toNumber(divide(determinant(latticeMatrix(common)), determinant(latticeMatrix(lattice))));
  if (count > mostLatticePoints)
    fail("invalid-argument", `the cell of this setting holds ${count} lattice points`, {
      expected: `at most ${mostLatticePoints}`,
      remedy: "check the translations and the change of basis for digits too many",
    });
  const steps = latticeVectors(lattice);
  const found = new Map<string, RationalVector>();
  const queue: RationalVector[] = [vectorFrom([0, 0, 0])];
  for (let next = queue.pop(); next !== undefined; next = queue.pop()) {
    const key = next.join(";");
    if (found.has(key)) continue;
    found.set(key, next);
    for (const step of steps) queue.push(reduceByLattice(common, addVectors(next, step)));
  }
  return [...found.values()].sort(
    (a, b) => toNumber(a[0]) - toNumber(b[0]) || toNumber(a[1]) - toNumber(b[1]) || toNumber(a[2]) - toNumber(b[2]),
  );
}

/** L ∩ Z³, by duality: it is the dual of L* + Z³. */
export function integerSublattice(lattice: Lattice): Lattice {
  if (holdsIntegers(lattice)) return integerLattice;
  const sum = latticeFrom([...latticeVectors(dualLattice(lattice)), ...latticeVectors(integerLattice)]);
  return dualLattice(sum);
}

/** The rows H with `H·T` integer for every T in L, as a lattice in the reciprocal axes. */
export function dualLattice(lattice: Lattice): Lattice {
  return latticeFrom(invert(latticeMatrix(lattice)));
}
