import { fail } from "../errors/index.js";
import type { Cell } from "../spacegroups/index.js";
import type { MomentComponents } from "./fourier-conventions.js";

type Triple = readonly [number, number, number];

/**
 * Real or imaginary parts of a moment in other axes: `lattice` (multiples of a, b, c), `crystal` (along the unit
 * vectors a/|a|, b/|b|, c/|c|, the `crystalaxis` of the IUCr magnetic dictionary), `cartesian` (x ∥ a, z ∥ c*). The
 * length unit of lattice components is the moment's unit per Å.
 */
export function convertComponents(cell: Cell, vector: Triple, from: MomentComponents, to: MomentComponents): Triple {
  if (from === to) return vector;
  const lattice =
    from === "lattice" ? vector : from === "crystal" ? perLength(cell, vector) : fromCartesian(cell, vector);
  if (to === "lattice") return lattice;
  if (to === "crystal") return [lattice[0] * cell.a, lattice[1] * cell.b, lattice[2] * cell.c];
  const [a, b, c] = cartesianAxes(cell);
  const at = (axis: 0 | 1 | 2): number => lattice[0] * a[axis] + lattice[1] * b[axis] + lattice[2] * c[axis];
  return [at(0), at(1), at(2)];
}

/** Throws `missing-argument` for components that come or are wanted in crystal or Cartesian axes without a cell. */
export function checkCellGiven(components: MomentComponents, cell: Cell | null): void {
  if (components === "lattice" || cell !== null) return;
  fail("missing-argument", `${components} components need a unit cell`, {
    expected: "a cell beside the convention",
    found: "none",
    remedy: "give the cell, or take lattice components",
  });
}

function perLength(cell: Cell, vector: Triple): Triple {
  return [vector[0] / cell.a, vector[1] / cell.b, vector[2] / cell.c];
}

/** The axes a, b, c in Å on Cartesian axes with x ∥ a and z ∥ c*. */
export function cartesianAxes(cell: Cell): readonly [Triple, Triple, Triple] {
  const radians = Math.PI / 180;
  const [cosAlpha, cosBeta, cosGamma] = [cell.alpha, cell.beta, cell.gamma].map((angle) =>
    Math.cos(angle * radians),
  ) as [number, number, number];
  const sinGamma = Math.sin(cell.gamma * radians);
  const cy = (cosAlpha - cosBeta * cosGamma) / sinGamma;
  return [
    [cell.a, 0, 0],
    [cell.b * cosGamma, cell.b * sinGamma, 0],
    [cell.c * cosBeta, cell.c * cy, cell.c * Math.sqrt(Math.max(0, 1 - cosBeta * cosBeta - cy * cy))],
  ];
}

/** The matrix of axes is triangular: solve from z up. */
function fromCartesian(cell: Cell, [x, y, z]: Triple): Triple {
  const [a, b, c] = cartesianAxes(cell);
  const third = z / c[2];
  const second = (y - third * c[1]) / b[1];
  return [(x - second * b[0] - third * c[0]) / a[0], second, third];
}
