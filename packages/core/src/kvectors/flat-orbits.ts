import { modulo } from "../numbers/index.js";
import { type ActingRotation, fixedDimension, fixedRows } from "./acting-rotations.js";
import {
  type DirectionLattice,
  type DirectionTable,
  directionTable,
  type Flat,
  flatName,
  flatThrough,
  pointDenominator,
  pointOfFlat,
} from "./flats.js";
import { rotateRow } from "./integer-form.js";

/** The flats of one kind. */
export interface FlatOrbit {
  /** All images modulo L*; the first is the one that `fixing` speaks of. */
  readonly flats: readonly Flat[];
  /** What leaves each point of the first flat fixed, of the point group extended by −1. */
  readonly fixing: readonly ActingRotation[];
}

/**
 * The orbits of flats whose points are fixed by nothing larger: the kinds of k under the acting matrices (those of the
 * point group, or all). The list of candidates is complete: the directions are those of a single matrix (a group that
 * fixes just a line contains a rotation about it, one that fixes just a plane is a mirror), and four or six times the
 * place across is whole (`pointDenominator`).
 *
 * @param extended the point group extended by −1
 * @param dimensions which kinds are wanted
 */
export function flatOrbits(
  extended: readonly ActingRotation[],
  withInversion: boolean,
  dimensions: readonly number[],
): readonly FlatOrbit[] {
  const acting = extended.filter(({ own }) => own || withInversion);
  const table = directionTable();
  const lattices = new Set([table([]), ...acting.map((rotation) => table(fixedRows([rotation])))]);
  const places = [0, 1, 2, 3].map(possiblePlaces);
  const orbits: FlatOrbit[] = [];
  for (const lattice of lattices) {
    if (!dimensions.includes(lattice.rows.length)) continue;
    const images = acting.map(({ matrix }) => imageOf(lattice, matrix, table));
    // One lattice of each orbit is enough; a set may lose members while it is walked.
    for (const image of images) if (image !== lattice) lattices.delete(image);
    for (const { flat, fixing } of flatsAlong(lattice, places[3 - lattice.rows.length] ?? [], acting, images))
      orbits.push({ flats: imagesOf(flat, acting, images), fixing: fixing(extended) });
  }
  return orbits;
}

function imageOf(lattice: DirectionLattice, matrix: readonly number[], table: DirectionTable): DirectionLattice {
  return lattice.rows.length % 3 === 0 ? lattice : table(lattice.rows.map((row) => rotateRow(row, matrix)));
}

interface FoundFlat {
  readonly flat: Flat;
  readonly fixing: (rotations: readonly ActingRotation[]) => readonly ActingRotation[];
}

/** One flat of each orbit among those along a lattice. */
function* flatsAlong(
  lattice: DirectionLattice,
  possible: readonly (readonly number[])[],
  acting: readonly ActingRotation[],
  images: readonly DirectionLattice[],
): Generator<FoundFlat> {
  const keeping = acting.filter((_, index) => images[index] === lattice);
  const along = acting.filter(({ matrix }) => fixesRows(lattice, matrix));
  const places = 3 - lattice.rows.length;
  const seen = new Uint8Array(pointDenominator ** places);
  for (const across of possible) {
    if (seen[numberOf(across, places)] === 1) continue;
    const flat = { lattice, across };
    const point = pointOfFlat(flat);
    for (const { matrix } of keeping)
      seen[numberOf(rotateRow(rotateRow(point, matrix), lattice.coordinates), places)] = 1;
    const fixing = (rotations: readonly ActingRotation[]): readonly ActingRotation[] =>
      rotations.filter(({ matrix }) => fixesPoint(point, matrix));
    if (fixedDimension(fixing(along)) !== lattice.rows.length) continue;
    yield { flat, fixing: (rotations) => fixing(rotations.filter(({ matrix }) => fixesRows(lattice, matrix))) };
  }
}

/** The places across with 4 s or 6 s a whole number. */
function possiblePlaces(places: number): readonly (readonly number[])[] {
  const multiples = (step: number): readonly (readonly number[])[] => {
    let rows: readonly (readonly number[])[] = [[]];
    for (let place = 0; place < places; place++)
      rows = rows.flatMap((row) =>
        Array.from({ length: pointDenominator / step }, (_, times) => [...row, step * times]),
      );
    return rows;
  };
  return [...multiples(2), ...multiples(3)];
}

/** A number for the last `places` coordinates modulo 1. */
function numberOf(coordinates: readonly number[], places: number): number {
  let code = 0;
  for (let index = coordinates.length - places; index < coordinates.length; index++)
    code = code * pointDenominator + modulo(coordinates[index] as number, pointDenominator);
  return code;
}

function fixesRows({ rows }: DirectionLattice, matrix: readonly number[]): boolean {
  return rows.every((row) => rotateRow(row, matrix).every((entry, axis) => entry === row[axis]));
}

/** Whether `κ M ≡ κ`, κ over `pointDenominator`. */
function fixesPoint(point: readonly number[], matrix: readonly number[]): boolean {
  for (let axis = 0; axis < 3; axis++) {
    const image =
      (point[0] as number) * (matrix[axis] as number) +
      (point[1] as number) * (matrix[3 + axis] as number) +
      (point[2] as number) * (matrix[6 + axis] as number);
    if ((image - (point[axis] as number)) % pointDenominator !== 0) return false;
  }
  return true;
}

function imagesOf(flat: Flat, acting: readonly ActingRotation[], images: readonly DirectionLattice[]): Flat[] {
  const point = pointOfFlat(flat);
  const found = new Map([[flatName(flat), flat]]);
  acting.forEach(({ matrix }, index) => {
    const image = flatThrough(images[index] as DirectionLattice, rotateRow(point, matrix));
    found.set(flatName(image), image);
  });
  return [...found.values()];
}
