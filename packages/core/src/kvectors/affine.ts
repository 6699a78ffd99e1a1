import {
  constantForm,
  gcdOf,
  type LinearForm,
  multiply,
  negate,
  nullSpace,
  one,
  overCommonDenominator,
  type Rational,
  type RationalMatrix,
  type RationalVector,
  rational,
  rationalField,
  reducedEchelon,
  subtract,
  vectorOf,
  zero,
} from "../numbers/index.js";

/** An affine set of wave vectors: a base point and 0 to 3 integer directions with their pivot components. */
export interface AffineSet {
  readonly base: RationalVector;
  readonly directions: readonly RationalVector[];
  /** Component that each direction is read off from: there the base is 0 and the other directions vanish. */
  readonly pivots: readonly number[];
}

/** One linear condition `coefficients · k = value` on the three components of k. */
export interface Condition {
  readonly coefficients: readonly Rational[];
  readonly value: Rational;
}

/** The conditions `k R − k = shift`, one per component. */
export function fixingConditions(rotation: RationalMatrix, shift: RationalVector, sign: 1 | -1 = 1): Condition[] {
  return [0, 1, 2].map((column) => ({
    coefficients: [0, 1, 2].map((row) => {
      const entry = (rotation[row] as RationalVector)[column] as Rational;
      return subtract(sign === 1 ? entry : negate(entry), row === column ? one : zero);
    }),
    value: shift[column] as Rational,
  }));
}

/**
 * The solutions of the conditions in the trade's parametric form: directions in reduced echelon form cleared to
 * coprime integers, base 0 at their pivots, so that (u, u, 1/2) reads as in tables. Null when there is none.
 */
export function solveConditions(conditions: readonly Condition[]): AffineSet | null {
  const { rows, pivots } = reducedEchelon(
    conditions.map((condition) => [...condition.coefficients, condition.value]),
    rationalField,
  );
  if (pivots.includes(3)) return null;
  const particular: Rational[] = [zero, zero, zero];
  pivots.forEach((pivot, index) => {
    particular[pivot] = (rows[index] as Rational[])[3] as Rational;
  });
  const raw = nullSpace(
    rows.map((row) => row.slice(0, 3)),
    3,
    rationalField,
    zero,
    one,
  );
  const echelon = reducedEchelon(raw, rationalField);
  const base = echelon.rows.reduce<Rational[]>((point, direction, index) => {
    const amount = point[echelon.pivots[index] as number] as Rational;
    return point.map((entry, axis) => subtract(entry, multiply(amount, direction[axis] as Rational)));
  }, particular);
  return {
    base: base as unknown as RationalVector,
    directions: echelon.rows.map(clearDenominators),
    pivots: echelon.pivots,
  };
}

function clearDenominators(direction: readonly Rational[]): RationalVector {
  const { numerators } = overCommonDenominator(direction);
  const divisor = gcdOf(numerators) || 1;
  const [first, second, third] = numerators.map((entry) => rational(entry / divisor)) as [Rational, Rational, Rational];
  return vectorOf(first, second, third);
}

/** `base + u·direction₁ + v·direction₂ + w·direction₃` as three linear forms. */
export function affineForms(set: AffineSet): [LinearForm, LinearForm, LinearForm] {
  const form = (axis: 0 | 1 | 2): LinearForm => ({
    constant: set.base[axis],
    coefficients: vectorOf(
      set.directions[0]?.[axis] ?? zero,
      set.directions[1]?.[axis] ?? zero,
      set.directions[2]?.[axis] ?? zero,
    ),
  });
  return [form(0), form(1), form(2)];
}

/**
 * The parameters of a point of the set, from its pivot components (exact forms in, exact forms out): the inverse of
 * `affineForms`.
 */
export function affineParameters(set: AffineSet, components: readonly LinearForm[]): LinearForm[] {
  return set.pivots.map((pivot, index) => {
    const scale = (set.directions[index] as RationalVector)[pivot as 0 | 1 | 2];
    const component = components[pivot] ?? constantForm(zero);
    const inverse: Rational = rational(scale[1], scale[0]);
    return {
      constant: multiply(component.constant, inverse),
      coefficients: vectorOf(
        multiply(component.coefficients[0], inverse),
        multiply(component.coefficients[1], inverse),
        multiply(component.coefficients[2], inverse),
      ),
    };
  });
}
