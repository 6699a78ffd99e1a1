import {
  hermiteNormalForm,
  modulo,
  multiply,
  type Rational,
  type RationalVector,
  reduceModulo,
  safe,
  subtract,
} from "../numbers/index.js";

/**
 * An affine sublattice of L*: `origin + Σ n_i basis_i` in the dual of the primitive basis, basis in Hermite normal form:
 * the H of the satellites H + k that lie on a point, line or plane, or all of them.
 */
export interface ReflectionFlat {
  readonly origin: readonly number[];
  readonly basis: readonly (readonly number[])[];
}

/** `η · column = value`. */
export interface FlatCondition {
  readonly column: RationalVector;
  readonly value: Rational;
}

const wholeFlat: ReflectionFlat = {
  origin: [0, 0, 0],
  basis: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
};

function flatKey({ origin, basis }: ReflectionFlat): string {
  return `${basis.join(";")}|${origin.join()}`;
}

/** The vectors of a flat that meet a condition, or null when none does. */
function restrictFlat(flat: ReflectionFlat, { column, value }: FlatCondition): ReflectionFlat | null {
  const common = [...column, value].reduce((product, [, bottom]) => (product * bottom) / greatest(product, bottom), 1);
  const whole = column.map(([top, bottom]) => safe((top * common) / bottom));
  const target = safe((value[0] * common) / value[1]) - inner(flat.origin, whole);
  const rows = flat.basis.map((vector) => [inner(vector, whole), ...vector]);
  if (rows.every(([first]) => first === 0)) return target === 0 ? flat : null;
  // Euclid on the first column: one row keeps the common divisor, the others solve the homogeneous equation.
  const reduced = hermiteNormalForm(rows, 4);
  const [lead, ...rest] = reduced as [number[], ...number[][]];
  const divisor = lead[0] as number;
  if (modulo(target, divisor) !== 0) return null;
  const steps = target / divisor;
  const basis = hermiteNormalForm(
    rest.map((row) => row.slice(1)),
    3,
  );
  const origin = flat.origin.map((entry, axis) => safe(entry + steps * (lead[axis + 1] as number)));
  return { origin: reduceModulo(origin, basis), basis };
}

function inner(a: readonly number[], b: readonly number[]): number {
  return safe(a.reduce((sum, entry, index) => sum + entry * (b[index] as number), 0));
}

function greatest(a: number, b: number): number {
  return b === 0 ? a : greatest(b, a % b);
}

/** All flats that the sets of conditions cut out, alone and together, the whole first, larger ones before smaller. */
export function flatsOf(conditions: readonly (readonly FlatCondition[])[], most: number): ReflectionFlat[] | null {
  const found = new Map<string, ReflectionFlat>([[flatKey(wholeFlat), wholeFlat]]);
  const queue = [wholeFlat];
  for (let flat = queue.shift(); flat !== undefined; flat = queue.shift())
    for (const set of conditions) {
      const cut = set.reduce<ReflectionFlat | null>(
        (rest, one) => (rest === null ? null : restrictFlat(rest, one)),
        flat,
      );
      if (cut === null || found.has(flatKey(cut))) continue;
      if (found.size >= most) return null;
      found.set(flatKey(cut), cut);
      queue.push(cut);
    }
  return [...found.values()].sort((a, b) => b.basis.length - a.basis.length);
}

/** The n_i of a vector on the flat, or null when it does not lie on it. */
export function placeOnFlat(flat: ReflectionFlat, eta: readonly number[]): number[] | null {
  let rest = eta.map((entry, axis) => entry - (flat.origin[axis] as number));
  const places: number[] = [];
  for (const vector of flat.basis) {
    const pivot = vector.findIndex((entry) => entry !== 0);
    const times = (rest[pivot] as number) / (vector[pivot] as number);
    if (!Number.isInteger(times)) return null;
    places.push(times);
    rest = rest.map((entry, axis) => entry - times * (vector[axis] as number));
  }
  return rest.every((entry) => entry === 0) ? places : null;
}

/** Whether the line, plane or space that a flat spans holds all of another flat. */
export function spansFlat(flat: ReflectionFlat, other: ReflectionFlat): boolean {
  const difference = other.origin.map((entry, axis) => entry - (flat.origin[axis] as number));
  return [difference, ...other.basis].every((vector) => inSpan(flat.basis, vector));
}

/** Elimination without division along a Hermite normal form. */
function inSpan(basis: readonly (readonly number[])[], vector: readonly number[]): boolean {
  const rest = basis.reduce<readonly number[]>((left, row) => {
    const pivot = row.findIndex((entry) => entry !== 0);
    return left.map((entry, axis) =>
      safe(entry * (row[pivot] as number) - (left[pivot] as number) * (row[axis] as number)),
    );
  }, vector);
  return rest.every((entry) => entry === 0);
}

/** `origin + Σ n_i basis_i`. */
export function vectorOnFlat({ origin, basis }: ReflectionFlat, places: readonly number[]): number[] {
  return origin.map((entry, axis) =>
    basis.reduce((sum, vector, index) => sum + (places[index] as number) * (vector[axis] as number), entry),
  );
}

/** `value − vector · column` for conditions that are stated on η + constant. */
export function shiftedValue(value: Rational, constant: RationalVector, column: RationalVector): Rational {
  return constant.reduce<Rational>(
    (rest, entry, axis) => subtract(rest, multiply(entry, column[axis as 0 | 1 | 2])),
    value,
  );
}
