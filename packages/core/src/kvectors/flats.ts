import {
  hermiteNormalForm,
  invertUnimodular,
  modulo,
  transposeIntegers,
} from "../numbers/index.js";
import { rotateRow } from "./integer-form.js";

/**
 * A flat of the torus of wave vectors modulo L*: a point, line, plane or everything, in primitive coordinates. With
 * `(t, s) = κ C`, t runs along it and s, in [0, 1) over `denominator`, says which one it is. Equal flats are equal
 * records, whatever point of them was given.
 */
export interface Flat {
  /** Saturated integer lattice of directions, Hermite normal form. */
  readonly directions: readonly (readonly number[])[];
  readonly across: readonly number[];
  readonly denominator: number;
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

/** The flat through `point / denominator` along a saturated lattice of directions. */
export function flatThrough(directions: readonly (readonly number[])[], point: readonly number[], denominator: number): Flat {
  const across = rotateRow(point, adaptedCoordinates(directions)).slice(directions.length);
  return { directions, across: across.map((entry) => modulo(entry, denominator)), denominator };
}

/** One point of the flat, numerators over its denominator. */
export function pointOfFlat(flat: Flat): [number, number, number] {
  const padded = [...flat.directions.map(() => 0), ...flat.across];
  return rotateRow(padded, invertUnimodular(adaptedCoordinates(flat.directions)));
}

/** The image under `κ → sign·κR`. */
export function rotateFlat(flat: Flat, rotation: readonly number[], sign: 1 | -1): Flat {
  const directions = hermiteNormalForm(
    flat.directions.map((row) => rotateRow(row, rotation)),
    3,
  );
  const point = rotateRow(pointOfFlat(flat), rotation).map((entry) => sign * entry);
  return flatThrough(directions, point, flat.denominator);
}

/** A text that is the same for equal flats over one denominator. */
export function flatKey(flat: Flat): string {
  return `${flat.directions.map((row) => row.join(" ")).join(";")}|${flat.across.join(" ")}`;
}
