import type { SmallIrreps } from "@kvane/core/irreps";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import { adjoint, type Complex, type ComplexMatrix, distance, product, trace, turned, unitMatrix } from "./complex.js";
import {
  compose,
  countArms,
  type FloatGroup,
  type FloatOperator,
  inner,
  inverse,
  operatorsTaking,
  type Reduced,
  reduce,
} from "./float-group.js";
import { type FloatIrreps, floatIrreps } from "./float-irreps.js";

/** Matrix entries are sums of few roots of unity: this is a thousand times their rounding. */
const tolerance = 1e-9;

/**
 * Everything that small irreps must obey, checked from floats and docs/conventions.md alone. An empty list is a pass.
 */
export function irrepProblems(group: SpaceGroup, irreps: SmallIrreps): string[] {
  const read = floatIrreps(group, irreps);
  return [
    ...littleGroupProblems(read, irreps),
    ...representationProblems(read),
    ...characterProblems(read),
    ...realityProblems(read, irreps),
  ];
}

function littleGroupProblems(read: FloatIrreps, irreps: SmallIrreps): string[] {
  const problems: string[] = [];
  const expected = operatorsTaking(read.group, read.k, 1);
  const given = [...irreps.littleGroup.operators].sort((a, b) => a - b);
  if (expected.join() !== given.join()) problems.push(`little group: operators ${given} instead of ${expected}`);
  const arms = countArms(read.group, read.k);
  if (arms !== irreps.arms) problems.push(`${irreps.arms} arms instead of ${arms}`);
  const reversing = operatorsTaking(read.group, read.k, -1);
  const minusK =
    reversing.length === 0
      ? "not in star"
      : reversing.some((index) => expected.includes(index))
        ? "equivalent"
        : "in star";
  if (minusK !== irreps.minusK) problems.push(`−k is said to be ${irreps.minusK}, it is ${minusK}`);
  if (irreps.phases.length !== given.length)
    problems.push(`${irreps.phases.length} phases for ${given.length} operators`);
  return problems;
}

/**
 * D(g) D(h) = D(gh) for all pairs, where gh is `{1|T}` times a representative and `D({1|T}) = e^{+2πi k·T}`; the unit
 * matrix for the identity; unitary matrices.
 */
export function representationProblems(read: FloatIrreps): string[] {
  const { operators, group } = read;
  const problems: string[] = [];
  const products = operators.map((first) =>
    operators.map((second) => reducedProduct(group, operatorAt(group, first), operatorAt(group, second))),
  );
  read.matrices.forEach((matrices, irrep) => {
    const name = read.labels[irrep];
    const size = read.dimensions[irrep] as number;
    const identity = operators.indexOf(reduce(group, identityOperator).index);
    if (!matrices.every((matrix) => matrix.rows === size)) problems.push(`${name}: a matrix is not ${size} × ${size}`);
    else if (distance(matrices[identity] as ComplexMatrix, unitMatrix(size)) > tolerance)
      problems.push(`${name}: D of the identity is not 1`);
    else {
      const worst = worstProduct(read, matrices, products);
      if (worst !== null) problems.push(`${name}: ${worst}`);
      const crooked = matrices.findIndex((m) => distance(product(m, adjoint(m)), unitMatrix(size)) > tolerance);
      if (crooked >= 0) problems.push(`${name}: D of operator ${operators[crooked]} is not unitary`);
    }
  });
  return problems;
}

function worstProduct(
  read: FloatIrreps,
  matrices: FloatIrreps["matrices"][number],
  products: readonly (readonly Reduced[])[],
): string | null {
  for (let first = 0; first < matrices.length; first++)
    for (let second = 0; second < matrices.length; second++) {
      const { index, shift } = (products[first] as readonly Reduced[])[second] as Reduced;
      const at = read.operators.indexOf(index);
      const expected = turned(matrices[at] as ComplexMatrix, inner(read.k, shift));
      const error = distance(product(matrices[first] as ComplexMatrix, matrices[second] as ComplexMatrix), expected);
      if (error > tolerance)
        return `D(g)D(h) ≠ D(gh) for operators ${read.operators[first]}, ${read.operators[second]} (by ${error.toPrecision(2)})`;
    }
  return null;
}

const identityOperator: FloatOperator = { rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1], translation: [0, 0, 0] };

function operatorAt(group: FloatGroup, index: number): FloatOperator {
  return group.operators[index] as FloatOperator;
}

function reducedProduct(group: FloatGroup, first: FloatOperator, second: FloatOperator): Reduced {
  return reduce(group, compose(first, second));
}

/** Characters are the traces; they are orthonormal over the little co-group; Σ d² is its order. */
export function characterProblems(read: FloatIrreps): string[] {
  const problems: string[] = [];
  const order = read.operators.length;
  const squares = read.dimensions.reduce((sum, dimension) => sum + dimension ** 2, 0);
  if (squares !== order) problems.push(`Σ d² is ${squares} instead of ${order}`);
  read.matrices.forEach((matrices, irrep) => {
    matrices.forEach((matrix, index) => {
      const [re, im] = trace(matrix);
      const [givenRe, givenIm] = read.characters[irrep]?.[index] ?? [Number.NaN, Number.NaN];
      if (!(Math.hypot(re - givenRe, im - givenIm) < tolerance))
        problems.push(`${read.labels[irrep]}: character ${index} is not the trace`);
    });
  });
  for (let a = 0; a < read.characters.length; a++)
    for (let b = 0; b <= a; b++) {
      const [re, im] = overlap(read.characters[a] ?? [], read.characters[b] ?? []);
      if (!(Math.hypot(re - (a === b ? order : 0), im) < tolerance * order))
        problems.push(`${read.labels[a]}, ${read.labels[b]}: Σ χ χ* is ${re.toPrecision(4)}, ${im.toPrecision(4)}`);
    }
  return problems;
}

/** Σ χ_a χ_b*. */
export function overlap(a: readonly Complex[], b: readonly Complex[]): [number, number] {
  let re = 0;
  let im = 0;
  a.forEach(([x, y], index) => {
    const [u, v] = b[index] as Complex;
    re += x * u + y * v;
    im += y * u - x * v;
  });
  return [re, im];
}

/** χ of any operator of the little group: its representative's character times the phase of the translation. */
function characterAt(read: FloatIrreps, irrep: number, { index, shift }: Reduced): [number, number] {
  const characters = read.characters[irrep] as readonly Complex[];
  const [re, im] = characters[read.operators.indexOf(index)] as Complex;
  const angle = 2 * Math.PI * inner(read.k, shift);
  return [re * Math.cos(angle) - im * Math.sin(angle), re * Math.sin(angle) + im * Math.cos(angle)];
}

/** Herring's sum over the operators that take k to −k; physical dimension; the partner of a complex irrep. */
function realityProblems(read: FloatIrreps, irreps: SmallIrreps): string[] {
  const problems: string[] = [];
  const reversing = operatorsTaking(read.group, read.k, -1).map((index) => operatorAt(read.group, index));
  const squares = reversing.map((operator) => reducedProduct(read.group, operator, operator));
  irreps.irreps.forEach((irrep, at) => {
    const sum = squares.reduce<[number, number]>(
      ([re, im], square) => {
        const [x, y] = characterAt(read, at, square);
        return [re + x, im + y];
      },
      [0, 0],
    );
    const indicator = sum[0] / read.operators.length;
    if (Math.hypot(indicator - Math.round(indicator), sum[1]) > tolerance * 48)
      problems.push(`${irrep.label}: Herring's sum is no integer: ${indicator}, ${sum[1]}`);
    const expected = ["pseudoreal", "complex", "real"][Math.round(indicator) + 1];
    if (expected !== irrep.reality) problems.push(`${irrep.label}: is said to be ${irrep.reality}, it is ${expected}`);
    const physical = irreps.arms * irrep.dimension * (expected === "real" ? 1 : 2);
    if (physical !== irrep.physicalDimension)
      problems.push(`${irrep.label}: physical dimension ${irrep.physicalDimension} instead of ${physical}`);
    const partner = expected === "complex" ? conjugatePartner(read, at, reversing[0]) : null;
    if (partner !== irrep.conjugateOf)
      problems.push(`${irrep.label}: conjugate of ${irrep.conjugateOf} instead of ${partner}`);
  });
  return problems;
}

/** The irrep at k whose characters are χ(g₀⁻¹ g g₀)*, where g₀ takes k to −k. */
function conjugatePartner(read: FloatIrreps, irrep: number, reversing: FloatOperator | undefined): string | null {
  if (reversing === undefined) return null;
  const back = inverse(reversing);
  const mirrored = read.operators.map((index): Complex => {
    const moved = reduce(read.group, compose(compose(back, operatorAt(read.group, index)), reversing));
    const [re, im] = characterAt(read, irrep, moved);
    return [re, -im];
  });
  const found = read.characters.findIndex((characters) =>
    characters.every(([re, im], index) => {
      const [x, y] = mirrored[index] as Complex;
      return Math.hypot(re - x, im - y) < tolerance;
    }),
  );
  return found < 0 ? "(no irrep of the list)" : (read.labels[found] as string);
}
