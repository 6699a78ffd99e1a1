import {
  add,
  type LinearForm,
  lcm,
  modulo,
  multiply,
  type Rational,
  rational,
  safe,
  vectorOf,
  zero,
} from "../numbers/index.js";
import type { Lattice, SpaceGroup } from "../spacegroups/index.js";
import type { WaveVector } from "./types.js";

/**
 * A wave vector in the dual of the primitive basis, where rotations are integer matrices and L* is Z³: a base point
 * and the directions of u, v, w, numerators over one denominator. All tests modulo L* are done on this form.
 */
export interface IntegerForm {
  readonly denominator: number;
  readonly base: readonly [number, number, number];
  /** Directions of u, v, w; those that do not occur are zero rows. */
  readonly directions: readonly (readonly [number, number, number])[];
}

type Triple = [number, number, number];

/** `κ = k B`: the components of k along the dual of the primitive basis. */
export function toIntegerForm(lattice: Lattice, k: WaveVector): IntegerForm {
  const rows = [0, 1, 2, 3].map((part) =>
    lattice.vectors.map((vector) =>
      vector.reduce<Rational>(
        (sum, entry, axis) =>
          entry === 0
            ? sum
            : add(sum, multiply(partOf(k.components[axis] as LinearForm, part), rational(entry, lattice.denominator))),
        zero,
      ),
    ),
  );
  const denominator = rows.flat().reduce((common, entry) => lcm(common, entry[1]), 1);
  const numerators = rows.map((row) => row.map((entry) => safe(entry[0] * (denominator / entry[1]))) as Triple);
  return { denominator, base: numerators[0] as Triple, directions: numerators.slice(1) };
}

/** Part 0 is the constant, parts 1 to 3 the coefficients of u, v, w. */
function partOf(form: LinearForm, part: number): Rational {
  return part === 0 ? form.constant : (form.coefficients[part - 1] as Rational);
}

/** The wave vector with that primitive form; `values` and `uncertainties` are taken over from `like`. */
export function fromIntegerForm(group: SpaceGroup, form: IntegerForm, like: WaveVector): WaveVector {
  const rows = [form.base, ...form.directions].map((part) => fromPrimitiveIntegers(group, part, form.denominator));
  const [base, u, v, w] = rows as [Triplet, Triplet, Triplet, Triplet];
  const component = (axis: 0 | 1 | 2): LinearForm => ({
    constant: base[axis],
    coefficients: vectorOf(u[axis], v[axis], w[axis]),
  });
  return { ...like, components: [component(0), component(1), component(2)] };
}

type Triplet = readonly [Rational, Rational, Rational];

/** The row `numerators / denominator` of the primitive dual basis in the setting's reciprocal axes: `k = κ B⁻¹`. */
export function fromPrimitiveIntegers(group: SpaceGroup, numerators: readonly number[], denominator: number): Triplet {
  // The rows of the Hermite form are upper triangular: κ_i = Σ_axis k_axis v_i,axis is solved from the last axis up.
  const { vectors, denominator: scale } = group.lattice;
  const [p, q, r] = vectors as [Triple, Triple, Triple];
  const kappa = numerators.map((entry) => rational(safe(entry * scale), denominator));
  const third = divideBy(kappa[2] as Rational, r[2]);
  const second = divideBy(minus(kappa[1] as Rational, third, q[2]), q[1]);
  const first = divideBy(minus(minus(kappa[0] as Rational, second, p[1]), third, p[2]), p[0]);
  return [first, second, third];
}

function divideBy(value: Rational, divisor: number): Rational {
  return multiply(value, rational(1, divisor));
}

function minus(value: Rational, factor: Rational, times: number): Rational {
  return add(value, multiply(factor, rational(-times)));
}

/** Row times integer matrix. */
export function rotateRow(row: readonly number[], rotation: readonly number[]): Triple {
  const [a, b, c] = row as Triple;
  return [
    a * (rotation[0] as number) + b * (rotation[3] as number) + c * (rotation[6] as number) + 0,
    a * (rotation[1] as number) + b * (rotation[4] as number) + c * (rotation[7] as number) + 0,
    a * (rotation[2] as number) + b * (rotation[5] as number) + c * (rotation[8] as number) + 0,
  ];
}

/** The form of `k R`. */
export function rotateForm(form: IntegerForm, rotation: readonly number[]): IntegerForm {
  return {
    denominator: form.denominator,
    base: rotateRow(form.base, rotation),
    directions: form.directions.map((direction) => rotateRow(direction, rotation)),
  };
}

/**
 * `sign·a − b` when it is a vector of L*, for every value of the parameters; else null. Both forms must have one
 * denominator (they come from one k).
 */
export function reciprocalDifference(a: IntegerForm, b: IntegerForm, sign: 1 | -1 = 1): Triple | null {
  for (let index = 0; index < 3; index++)
    for (let axis = 0; axis < 3; axis++)
      if (sign * (a.directions[index]?.[axis] as number) !== b.directions[index]?.[axis]) return null;
  const difference: Triple = [0, 0, 0];
  for (let axis = 0; axis < 3; axis++) {
    const step = sign * (a.base[axis] as number) - (b.base[axis] as number);
    if (modulo(step, a.denominator) !== 0) return null;
    difference[axis] = step / a.denominator + 0;
  }
  return difference;
}

/** Both forms over their least common denominator. */
export function commonDenominator(a: IntegerForm, b: IntegerForm): [IntegerForm, IntegerForm] {
  const denominator = lcm(a.denominator, b.denominator);
  return [rescale(a, denominator), rescale(b, denominator)];
}

function rescale(form: IntegerForm, denominator: number): IntegerForm {
  const factor = denominator / form.denominator;
  const scaled = (row: readonly number[]): Triple => row.map((entry) => safe(entry * factor)) as Triple;
  return { denominator, base: scaled(form.base), directions: form.directions.map(scaled) };
}
