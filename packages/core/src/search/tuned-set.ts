import { choleskyFactor, choleskyLogDeterminant } from "../algorithms/index.js";
import { numericWaveVector, usedParameters, type WaveVector } from "../kvectors/index.js";
import {
  cross,
  dot,
  gcdOf,
  hermiteNormalForm,
  identityMatrix,
  isInteger,
  isZero,
  matrixFrom,
  overCommonDenominator,
  type Rational,
  type RationalVector,
  rowTimes,
  subtractVectors,
  toNumber,
  vectorFrom,
} from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";

/** The measure of the set of k that the letters of a wave vector run over, for the charge of tuning them. */
export interface TunedSet {
  readonly dimension: number;
  /** Gram matrix of the directions ∂k/∂(u, v, w) in the metric, dimension × dimension. */
  readonly gram: Float64Array;
  /** Volume of one asymmetric part: of the set modulo L*, over the symmetry that maps the set onto itself. */
  readonly volume: number;
  /** Images of k under that symmetry, k itself included, that lie within `nearness` of it. */
  readonly coincidentImages: number;
}

/**
 * Measures the set of k with open letters that `k` (with values) belongs to. The symmetry is the point group extended
 * by −1 with L*: of its elements those that map the set onto itself, each once for its effect on the set.
 *
 * @param metric nine numbers in a*, b*, c*; the volume is in its unit to the power dimension/2
 * @param nearness in the unit of √metric
 */
export function tunedSet(group: SpaceGroup, k: WaveVector, metric: readonly number[], nearness: number): TunedSet {
  const letters = usedParameters(k);
  const directions = letters.map((letter) => partOf(k, (form) => form.coefficients[letter as 0 | 1 | 2]));
  const dimension = letters.length;
  const gram = new Float64Array(dimension * dimension);
  directions.forEach((a, i) => {
    directions.forEach((b, j) => {
      gram[i * dimension + j] = bilinear(metric, a.map(toNumber), b.map(toNumber));
    });
  });
  const factor = choleskyFactor(gram, dimension);
  if (factor === null) throw new Error("the letters of a wave vector do not move it independently");
  const area = Math.exp(choleskyLogDeterminant(factor, dimension) / 2);
  const primitive = directions.map((direction) => toPrimitiveRow(group.lattice, direction));
  const { onto, fixing, near } = symmetryOfSet(group, k, primitive, metric, nearness);
  return {
    dimension,
    gram,
    volume: (area * periodVolume(primitive) * fixing) / onto,
    coincidentImages: near / fixing,
  };
}

function partOf(k: WaveVector, part: (form: WaveVector["components"][0]) => Rational): RationalVector {
  return [part(k.components[0]), part(k.components[1]), part(k.components[2])];
}

/**
 * Volume, in units of the letters, of one period of the set: of the lattice of letters that lead to vectors of L*. That
 * is the dual of the lattice spanned by the rows that give each primitive component from the letters.
 */
function periodVolume(primitive: readonly RationalVector[]): number {
  const { numerators, denominator } = overCommonDenominator(primitive.flat());
  const rows = [0, 1, 2].map((component) => primitive.map((_, letter) => numerators[3 * letter + component] as number));
  const hermite = hermiteNormalForm(rows, primitive.length);
  return hermite.reduce((product, row, index) => (product * denominator) / (row[index] as number), 1);
}

/** Counts over ±R of the point group: those that map the set onto itself, fix all of it, or move k no further than `nearness`. */
function symmetryOfSet(
  group: SpaceGroup,
  k: WaveVector,
  primitive: readonly RationalVector[],
  metric: readonly number[],
  nearness: number,
): { onto: number; fixing: number; near: number } {
  const base = toPrimitiveRow(
    group.lattice,
    partOf(k, (form) => form.constant),
  );
  const normals = annihilators(primitive);
  const here = primitiveNumbers(group, numericWaveVector(k) as readonly number[]);
  const counts = { onto: 0, fixing: 0, near: 0 };
  for (const rotation of extendedByInversion(group.primitive.rotations)) {
    const matrix = matrixFrom(rotation);
    const images = primitive.map((direction) => rowTimes(direction, matrix));
    if (images.some((image) => normals.some((normal) => !isZero(dot(normal, image))))) continue;
    const step = subtractVectors(rowTimes(base, matrix), base);
    if (normals.some((normal) => !isInteger(dot(normal, step)))) continue;
    counts.onto += 1;
    const still = images.every((image, index) =>
      subtractVectors(image, primitive[index] as RationalVector).every(isZero),
    );
    if (still && step.every(isInteger)) counts.fixing += 1;
    const moved = [0, 1, 2].map((axis) =>
      here.reduce((sum, entry, row) => sum + entry * (rotation[3 * row + axis] as number), -(here[axis] as number)),
    );
    if (lengthModuloLattice(group, metric, moved) <= nearness) counts.near += 1;
  }
  return counts;
}

/** Integer vectors that span the lattice of all n with `n · direction = 0` for every direction. */
function annihilators(directions: readonly RationalVector[]): readonly RationalVector[] {
  const [first, second] = directions;
  if (first === undefined) return identityMatrix;
  if (directions.length === 3) return [];
  if (second !== undefined) return [primitiveVector(cross(first, second))];
  // For a primitive vector δ the three products δ × e span the whole lattice normal to it.
  const along = primitiveVector(first);
  return identityMatrix.map((unit) => cross(along, unit));
}

function primitiveVector(vector: RationalVector): RationalVector {
  const { numerators } = overCommonDenominator(vector);
  const divisor = gcdOf(numerators);
  return vectorFrom(numerators.map((entry) => entry / divisor));
}

function extendedByInversion(rotations: readonly (readonly number[])[]): readonly (readonly number[])[] {
  const all = rotations.flatMap((rotation) => [rotation, rotation.map((entry) => 0 - entry)]);
  return [...new Map(all.map((rotation) => [rotation.join(), rotation])).values()];
}

function primitiveNumbers({ lattice }: SpaceGroup, row: readonly number[]): number[] {
  return lattice.vectors.map(
    (vector) => vector.reduce((sum, entry, axis) => sum + entry * (row[axis] as number), 0) / lattice.denominator,
  );
}

/** Length of a row of the primitive dual after taking off the nearest vector of L*. */
function lengthModuloLattice({ lattice }: SpaceGroup, metric: readonly number[], row: readonly number[]): number {
  const rest = row.map((entry) => entry - Math.round(entry));
  // κ = k B with the lattice vectors as columns of B, triangular: solved from the last component up.
  const setting = [0, 0, 0];
  for (const axis of [2, 1, 0]) {
    const vector = lattice.vectors[axis] as readonly number[];
    const known = setting.reduce(
      (sum, entry, index) => (index > axis ? sum + entry * (vector[index] as number) : sum),
      0,
    );
    setting[axis] = ((rest[axis] as number) * lattice.denominator - known) / (vector[axis] as number);
  }
  return Math.sqrt(Math.max(0, bilinear(metric, setting, setting)));
}

function bilinear(metric: readonly number[], a: readonly number[], b: readonly number[]): number {
  let sum = 0;
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) sum += (a[i] as number) * (metric[3 * i + j] as number) * (b[j] as number);
  return sum;
}
