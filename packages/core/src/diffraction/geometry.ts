import { cartesianAxes } from "../modes/index.js";
import { averagedReciprocalMetric } from "../reflections/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";

/** Three numbers: indices along a*, b*, c*, or components along axes, as the text beside it says. */
export type Triple = readonly [number, number, number];

/** Direct and reciprocal axes on Cartesian axes with x ∥ a and z ∥ c*, of the cell averaged over the point group. */
export interface ScatteringGeometry {
  readonly cell: Cell;
  /** a/|a|, b/|b|, c/|c|: moments in μB along them become Cartesian. */
  readonly unitAxes: readonly [Triple, Triple, Triple];
  /** a*, b*, c* in Å⁻¹ with 2π. */
  readonly reciprocalAxes: readonly [Triple, Triple, Triple];
}

/**
 * The geometry of a cell. Cells are given to four digits, and vectors that symmetry makes equivalent must have one
 * length. Throws `invalid-cell` and `cell-contradicts-group`.
 */
export function scatteringGeometry(group: SpaceGroup, cell: Cell): ScatteringGeometry {
  const exact = averagedCell(group, cell);
  const axes = cartesianAxes(exact);
  const [a, b, c] = axes;
  const volume = dotTriple(a, crossTriple(b, c));
  const reciprocal = (first: Triple, second: Triple): Triple =>
    scaleTriple((2 * Math.PI) / volume, crossTriple(first, second));
  return {
    cell: exact,
    unitAxes: [scaleTriple(1 / exact.a, a), scaleTriple(1 / exact.b, b), scaleTriple(1 / exact.c, c)],
    reciprocalAxes: [reciprocal(b, c), reciprocal(c, a), reciprocal(a, b)],
  };
}

/** The cell of the reciprocal metric averaged over the point group. */
function averagedCell(group: SpaceGroup, cell: Cell): Cell {
  const [g11, g12, g13, , g22, g23, , , g33] = averagedReciprocalMetric(group, cell) as unknown as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const minors = {
    aa: g22 * g33 - g23 * g23,
    bb: g11 * g33 - g13 * g13,
    cc: g11 * g22 - g12 * g12,
    bc: g12 * g13 - g11 * g23,
    ac: g12 * g23 - g13 * g22,
    ab: g13 * g23 - g12 * g33,
  };
  const determinant = g11 * minors.aa + g12 * minors.ab + g13 * minors.ac;
  const length = (minor: number): number => Math.sqrt(minor / determinant);
  const angle = (mixed: number, one: number, other: number): number =>
    (180 / Math.PI) * Math.acos(mixed / Math.sqrt(one * other));
  return {
    a: length(minors.aa),
    b: length(minors.bb),
    c: length(minors.cc),
    alpha: angle(minors.bc, minors.bb, minors.cc),
    beta: angle(minors.ac, minors.aa, minors.cc),
    gamma: angle(minors.ab, minors.aa, minors.bb),
  };
}

/** Q in Å⁻¹ on Cartesian axes of a row in a*, b*, c*. */
export function cartesianQ({ reciprocalAxes }: ScatteringGeometry, [h, k, l]: Triple): Triple {
  const [a, b, c] = reciprocalAxes;
  return [h * a[0] + k * b[0] + l * c[0], h * a[1] + k * b[1] + l * c[1], h * a[2] + k * b[2] + l * c[2]];
}

/** Cartesian components of a vector given along the unit vectors of the axes. */
export function cartesianMoment({ unitAxes }: ScatteringGeometry, [x, y, z]: Triple): Triple {
  const [a, b, c] = unitAxes;
  return [x * a[0] + y * b[0] + z * c[0], x * a[1] + y * b[1] + z * c[1], x * a[2] + y * b[2] + z * c[2]];
}

export function dotTriple(a: Triple, b: Triple): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

function crossTriple(a: Triple, b: Triple): Triple {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

export function scaleTriple(factor: number, a: Triple): Triple {
  return [factor * a[0], factor * a[1], factor * a[2]];
}
