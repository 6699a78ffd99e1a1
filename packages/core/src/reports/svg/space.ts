/** A point or direction in a Cartesian frame: x ∥ a, z ∥ c* (docs/conventions.md). */
export type Vector = readonly [number, number, number];

/** Cell lengths in Å and angles in degrees. */
interface CellLike {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly alpha: number;
  readonly beta: number;
  readonly gamma: number;
}

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

export function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

/** a + factor · b. */
export function plus(a: Vector, b: Vector, factor = 1): Vector {
  return [a[0] + factor * b[0], a[1] + factor * b[1], a[2] + factor * b[2]];
}

export function times(a: Vector, factor: number): Vector {
  return [a[0] * factor, a[1] * factor, a[2] * factor];
}

export function size(a: Vector): number {
  return Math.sqrt(dot(a, a));
}

export function unit(a: Vector): Vector {
  return times(a, 1 / size(a));
}

/** Σ coefficients · basis. */
export function combine(basis: readonly [Vector, Vector, Vector], coefficients: readonly number[]): Vector {
  const [x = 0, y = 0, z = 0] = coefficients;
  return plus(plus(times(basis[0], x), basis[1], y), basis[2], z);
}

/** a, b, c of a cell in Å, x ∥ a, z ∥ c*. */
export function directAxes({ a, b, c, alpha, beta, gamma }: CellLike): readonly [Vector, Vector, Vector] {
  const cosine = (degrees: number) => (degrees === 90 ? 0 : Math.cos((degrees * Math.PI) / 180));
  const sine = Math.sqrt(1 - cosine(gamma) ** 2);
  const x = c * cosine(beta);
  const y = (c * (cosine(alpha) - cosine(beta) * cosine(gamma))) / sine;
  return [
    [a, 0, 0],
    [b * cosine(gamma), b * sine, 0],
    [x, y, Math.sqrt(Math.max(0, c * c - x * x - y * y))],
  ];
}

/** The dual of a basis with 2π: a* … in Å⁻¹. */
export function dualAxes([a, b, c]: readonly [Vector, Vector, Vector]): readonly [Vector, Vector, Vector] {
  const factor = (2 * Math.PI) / dot(a, cross(b, c));
  return [times(cross(b, c), factor), times(cross(c, a), factor), times(cross(a, b), factor)];
}

/** A way to look: what is to the right, what is up, and what is towards the eye; orthonormal and right-handed. */
export interface View {
  readonly right: Vector;
  readonly up: Vector;
  readonly towards: Vector;
}

/** The view from `towards` with `level` to the right as far as that goes. */
export function viewFrom(towards: Vector, level: Vector): View {
  const eye = unit(towards);
  const right = unit(plus(level, eye, -dot(level, eye)));
  return { right, up: cross(eye, right), towards: eye };
}

/**
 * The view in angles: turned by `turn` about the upright z, then tipped towards the eye by `tip`, in radians; at 0, 0
 * one looks along −x… from +y: x is to the left. z stays upright.
 */
export function turnedView(turn: number, tip: number): View {
  const right: Vector = [-Math.sin(turn), Math.cos(turn), 0];
  const flat: Vector = [Math.cos(turn), Math.sin(turn), 0];
  const towards = plus(times(flat, Math.cos(tip)), [0, 0, Math.sin(tip)]);
  return { right, up: cross(towards, right), towards };
}
