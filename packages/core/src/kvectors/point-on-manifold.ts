import {
  add,
  isInteger,
  multiply,
  overCommonDenominator,
  type Rational,
  type RationalVector,
  rational,
  rationalField,
  reducedEchelon,
  subtractVectors,
  zero,
} from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import { adaptedCoordinates, saturated } from "./flats.js";
import type { Manifold, WaveVector } from "./types.js";
import { exactComponents } from "./wave-vector.js";

/**
 * The exact values of u, v, w at which a manifold passes through an exact k modulo L*, or null when it does not. Where
 * the manifold passes without a shift along itself, those values are given.
 */
export function pointOnManifold(group: SpaceGroup, through: Manifold, k: WaveVector): readonly Rational[] | null {
  const row = exactComponents(k);
  if (row === null) return null;
  const { components } = through.form;
  const base: RationalVector = [components[0].constant, components[1].constant, components[2].constant];
  const directions = Array.from(
    { length: through.dimension },
    (_, letter): RationalVector => [
      components[0].coefficients[letter as 0 | 1 | 2],
      components[1].coefficients[letter as 0 | 1 | 2],
      components[2].coefficients[letter as 0 | 1 | 2],
    ],
  );
  const primitive = directions.map((direction) => toPrimitiveRow(group.lattice, direction));
  const lattice = saturated(primitive.map((entries) => overCommonDenominator(entries).numerators));
  const coordinates = adaptedCoordinates(lattice);
  const difference = throughColumns(toPrimitiveRow(group.lattice, subtractVectors(row, base)), coordinates);
  if (!difference.slice(through.dimension).every(isInteger)) return null;
  const along = primitive.map((direction) => throughColumns(direction, coordinates).slice(0, through.dimension));
  return solveSquare(along, difference.slice(0, through.dimension));
}

/** Row times integer matrix, exact. */
function throughColumns(row: RationalVector, matrix: readonly number[]): Rational[] {
  return [0, 1, 2].map((column) =>
    row.reduce<Rational>(
      (sum, entry, index) => add(sum, multiply(entry, rational(matrix[3 * index + column] as number))),
      zero,
    ),
  );
}

/** x with `Σ x_i rows[i] = target`; the rows are independent, so the echelon form of the equations is the solution. */
function solveSquare(rows: readonly (readonly Rational[])[], target: readonly Rational[]): Rational[] {
  const equations = target.map((value, equation) => [...rows.map((row) => row[equation] as Rational), value]);
  return reducedEchelon(equations, rationalField).rows.map((row) => row[rows.length] as Rational);
}
