import { type Place, type Problem, problem } from "../../errors/index.js";
import { type Cell, directMetric } from "../../spacegroups/index.js";
import type { CifRow } from "../cif/block-reader.js";
import { numberOf } from "../cif/numbers.js";

type Triple = readonly [number, number, number];

/**
 * The moment of a row in μB along the unit vectors of the axes, from whichever description the row has. Cartesian axes of
 * the magnetic dictionary: x along a, z along c*; spherical: polar angle from +z, azimuth from +x about +z.
 */
export function momentIn(row: CifRow, cell: Cell, where: Partial<Place>, problems: Problem[]): Triple {
  const moment = describedMoment(row, cell, where, problems);
  if (moment.every(Number.isFinite)) return moment;
  problems.push(
    problem("cif-value", "the components of a moment are beyond the range of numbers", {
      where,
      expected: "moments in μB, angles in degrees",
      found: "a value too large to reckon with",
      remedy: "correct the components",
    }),
  );
  return [0, 0, 0];
}

function describedMoment(row: CifRow, cell: Cell, where: Partial<Place>, problems: Problem[]): Triple {
  const read = (prefix: string, names: readonly string[]): number[] | null => {
    const values = names.map((name) => numberOf(row.value(`_atom_site_moment_${prefix}_${name}`))?.value ?? null);
    return values.every((value) => value !== null) ? (values as number[]) : null;
  };
  const crystal = read("crystalaxis", ["x", "y", "z"]) ?? read("crystalaxis", ["mx", "my", "mz"]);
  if (crystal !== null) return crystal as unknown as Triple;
  const cartesian = read("Cartn", ["x", "y", "z"]);
  if (cartesian !== null) return alongAxes(cell, cartesian);
  const spherical = read("spherical", ["modulus", "polar", "azimuthal"]);
  if (spherical !== null) {
    const [size, polar, azimuth] = spherical as [number, number, number];
    const [theta, phi] = [(polar * Math.PI) / 180, (azimuth * Math.PI) / 180];
    return alongAxes(cell, [
      size * Math.sin(theta) * Math.cos(phi),
      size * Math.sin(theta) * Math.sin(phi),
      size * Math.cos(theta),
    ]);
  }
  problems.push(
    problem("cif-missing", "a moment has no components", {
      where,
      expected: "_atom_site_moment_crystalaxis_x, _y, _z, or the Cartesian or spherical ones, as numbers",
      found: "none of them complete",
      remedy: "give all three components",
    }),
  );
  return [0, 0, 0];
}

/** Cartesian components (x ∥ a, z ∥ c*) along the unit vectors of a, b, c: the triangular axes solved from z up. */
function alongAxes(cell: Cell, [x = 0, y = 0, z = 0]: readonly number[]): Triple {
  const [, ab, ac, , bb, bc, , , cc] = directMetric(cell) as unknown as readonly [
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
  const bx = ab / cell.a;
  const by = Math.sqrt(bb - bx * bx);
  const cx = ac / cell.a;
  const cy = (bc - bx * cx) / by;
  const cz = Math.sqrt(cc - cx * cx - cy * cy);
  const third = z / cz;
  const second = (y - cy * third) / by;
  const first = (x - bx * second - cx * third) / cell.a;
  return [first * cell.a, second * cell.b, third * cell.c];
}
