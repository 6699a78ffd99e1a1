import { gcdOf, hermiteNormalForm, invertUnimodular, modulo, transposeIntegers } from "../numbers/index.js";
import { rotateRow } from "./integer-form.js";

/**
 * Where a flat of a kind lies across its directions, 4 s or 6 s is whole, so 12 s is. A point's little co-group leaves
 * no vector fixed, so it holds one of the smallest such classes -1, 222, -4, 32, -6. For these `det(R − 1)` or the sum
 * over the group gives 2k, 4k, 4k, 6k, 6k ∈ L*. Across a line the same holds with a rotation 2, 3, 4, 6 (2, 3, 2, 1),
 * across a plane with a mirror (2).
 */
export const pointDenominator = 12;

/** A saturated lattice of directions in primitive coordinates: all integer rows of a subspace. */
export interface DirectionLattice {
  /** The same for equal lattices. */
  readonly name: string;
  readonly rows: readonly (readonly number[])[];
  /** Unimodular C: with `(t, s) = κ C`, t runs along the lattice and s says where κ lies across. */
  readonly coordinates: readonly number[];
  /** C⁻¹; its first rows span the lattice. */
  readonly inverse: readonly number[];
}

/**
 * A flat of the torus of wave vectors modulo L*: a point, line, plane or everything. `across` is its s in [0, 12),
 * numerators over `pointDenominator`.
 */
export interface Flat {
  readonly lattice: DirectionLattice;
  readonly across: readonly number[];
}

/** All integer n with `row · n = 0` for every row: a saturated lattice, in Hermite normal form. */
export function integerKernel(rows: readonly (readonly number[])[]): number[][] {
  const units = [0, 1, 2].map((axis) => [...rows.map((row) => row[axis] as number), ...unitRow(axis)]);
  return hermiteNormalForm(units, rows.length + 3)
    .filter((row) => row.slice(0, rows.length).every((entry) => entry === 0))
    .map((row) => row.slice(rows.length));
}

/** The saturated lattice of all integer rows in the span of some rows. */
export function saturated(rows: readonly (readonly number[])[]): number[][] {
  return integerKernel(integerKernel(rows));
}

function unitRow(axis: number): number[] {
  return [0, 1, 2].map((other) => (other === axis ? 1 : 0));
}

/**
 * A unimodular C for a saturated lattice of r rows with `lattice · C = [1 | 0]`, so that the first r entries of `κ C`
 * are coordinates along it and the rest say where κ lies across. From the Hermite form of `[latticeᵀ | 1]`.
 */
export function adaptedCoordinates(lattice: readonly (readonly number[])[]): number[] {
  const augmented = [0, 1, 2].map((axis) => [...lattice.map((row) => row[axis] as number), ...unitRow(axis)]);
  const transformed = hermiteNormalForm(augmented, lattice.length + 3).map((row) => row.slice(lattice.length));
  return transposeIntegers(transformed.flat());
}

/** Gives the direction lattice of any independent integer rows; equal lattices are made once and are one record. */
export type DirectionTable = (rows: readonly (readonly number[])[]) => DirectionLattice;

/** A table for the length of one call. */
export function directionTable(): DirectionTable {
  const known = new Map<string, DirectionLattice>();
  return (rows) => {
    const name = nameOfSpan(rows);
    const found = known.get(name);
    if (found) return found;
    const basis = saturated(rows);
    const coordinates = adaptedCoordinates(basis);
    const lattice = { name, rows: basis, coordinates, inverse: invertUnimodular(coordinates) };
    known.set(name, lattice);
    return lattice;
  };
}

/** A line by its coprime direction, a plane by its coprime normal, up to sign. */
function nameOfSpan(rows: readonly (readonly number[])[]): string {
  if (rows.length === 0) return "point";
  if (rows.length === 3) return "everything";
  const [first, second] = rows as [readonly number[], readonly number[] | undefined];
  return second ? `plane ${coprime(crossProduct(first, second))}` : `line ${coprime(first)}`;
}

function coprime(row: readonly number[]): string {
  const divisor = gcdOf(row) * ((row.find((entry) => entry !== 0) as number) < 0 ? -1 : 1);
  return row.map((entry) => entry / divisor + 0).join(" ");
}

/** The vector product of two integer triples: the normal of the plane that they span. */
export function crossProduct(a: readonly number[], b: readonly number[]): [number, number, number] {
  const [a1, a2, a3] = a as [number, number, number];
  const [b1, b2, b3] = b as [number, number, number];
  return [a2 * b3 - a3 * b2, a3 * b1 - a1 * b3, a1 * b2 - a2 * b1];
}

/** The flat along a lattice through `point / pointDenominator`. */
export function flatThrough(lattice: DirectionLattice, point: readonly number[]): Flat {
  const across = rotateRow(point, lattice.coordinates).slice(lattice.rows.length);
  return { lattice, across: across.map((entry) => modulo(entry, pointDenominator)) };
}

/** One point of the flat, numerators over `pointDenominator`. */
export function pointOfFlat({ lattice, across }: Flat): [number, number, number] {
  return rotateRow([...lattice.rows.map(() => 0), ...across], lattice.inverse);
}

/** The same for equal flats. */
export function flatName({ lattice, across }: Flat): string {
  return `${lattice.name} at ${across.join(" ")}`;
}
