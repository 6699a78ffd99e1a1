import type { SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import {
  apply,
  determinantOf,
  type FloatGroup,
  type FloatOperator,
  floatGroup,
  inner,
  inverse,
  plus,
  turnColumn,
  turnRow,
} from "./float-group.js";
import type { Random } from "./random.js";
import { type FloatModes, floatModes, landings } from "./validate-modes.js";

/**
 * Explicit moment fields in a supercell, in plain floats and from docs/conventions.md alone: atoms of all sites in a cell
 * whose axes are lattice vectors of the parent, and how an operator with or without time reversal moves a field,
 * `(gM)(r) = θ det(R) R M(g⁻¹ r)`. A field is a flat array, three lattice components of the parent per atom.
 */
export interface Supercell {
  readonly group: FloatGroup;
  /** Columns: axes of the supercell in parent coordinates; and the inverse. */
  readonly axes: readonly (readonly number[])[];
  readonly inverse: readonly (readonly number[])[];
  readonly atoms: readonly SuperAtom[];
  /** Vectors of the parent lattice modulo the supercell. */
  readonly translations: readonly (readonly number[])[];
  readonly sites: readonly FloatModes[];
  readonly find: (position: readonly number[]) => number;
}

export interface SuperAtom {
  readonly site: number;
  readonly atom: number;
  /** r_j + T, and T. */
  readonly position: readonly number[];
  readonly translation: readonly number[];
}

export type Field = Float64Array;

/** An operator of the grey group in parent axes. */
export interface GreyOperator {
  readonly operator: FloatOperator;
  readonly timeReversal: 1 | -1;
}

const grain = 1e5;
/** So that no fraction with a usual denominator, n/64 or n/6000, lies where rounding turns. */
const offGrain = 0.3183;

/** @param axes rows: the three axes of the supercell in parent coordinates */
export function supercell(
  group: SpaceGroup,
  sites: readonly SiteModes[],
  axes: readonly (readonly number[])[],
): Supercell {
  const read = floatGroup(group);
  const columns = [0, 1, 2].map((row) => axes.map((axis) => axis[row] as number));
  const inverse = inverseOf(columns);
  const key = (position: readonly number[]): string =>
    inverse
      .map((row) => {
        const value = Math.round((inner(row, position) % 1) * grain + offGrain);
        return ((value % grain) + grain) % grain;
      })
      .join();
  const translations: number[][] = [[0, 0, 0]];
  const seen = new Set([key([0, 0, 0])]);
  for (let next = 0; next < translations.length; next++)
    for (const step of read.basis) {
      const moved = plus(translations[next] as number[], step);
      if (seen.has(key(moved))) continue;
      seen.add(key(moved));
      translations.push(moved);
    }
  const floats = sites.map((site) => floatModes(group, site));
  const atoms = floats.flatMap(({ positions }, site) =>
    positions.flatMap((position, atom) =>
      translations.map(
        (translation): SuperAtom => ({ site, atom, position: plus(position, translation), translation }),
      ),
    ),
  );
  const places = new Map(atoms.map(({ position }, index) => [key(position), index]));
  if (places.size !== atoms.length) throw new Error("two atoms of the supercell coincide");
  return {
    group: read,
    axes: columns,
    inverse,
    atoms,
    translations,
    sites: floats,
    find: (position) => {
      const index = places.get(key(position));
      if (index === undefined) throw new Error(`there is no atom at ${position}`);
      return index;
    },
  };
}

function inverseOf(m: readonly (readonly number[])[]): number[][] {
  const [a, b, c] = m as [number[], number[], number[]];
  const cross = (p: number[], q: number[]): number[] => [
    (p[1] as number) * (q[2] as number) - (p[2] as number) * (q[1] as number),
    (p[2] as number) * (q[0] as number) - (p[0] as number) * (q[2] as number),
    (p[0] as number) * (q[1] as number) - (p[1] as number) * (q[0] as number),
  ];
  const columns = [cross(b, c), cross(c, a), cross(a, b)];
  const volume = inner(a, columns[0] as number[]);
  return [0, 1, 2].map((row) => columns.map((column) => (column[row] as number) / volume));
}

/** All operators of the grey parent modulo the supercell. */
export function greyOperators(cell: Supercell): GreyOperator[] {
  return cell.group.operators.flatMap(({ rotation, translation }) =>
    cell.translations.flatMap((step) =>
      ([1, -1] as const).map((timeReversal) => ({
        operator: { rotation, translation: plus(translation, step) },
        timeReversal,
      })),
    ),
  );
}

export function movedField(cell: Supercell, field: Field, { operator, timeReversal }: GreyOperator): Field {
  const result = new Float64Array(field.length);
  const sign = timeReversal * Math.round(determinantOf(operator.rotation));
  // From every atom back to where its moment comes from: an operator that turns the supercell may take two to one place.
  const back = inverse(operator);
  cell.atoms.forEach(({ position }, index) => {
    const source = cell.find(apply(back, position));
    turnColumn(operator.rotation, [...field.subarray(3 * source, 3 * source + 3)]).forEach((entry, axis) => {
      result[3 * index + axis] = sign * entry;
    });
  });
  return result;
}

/** Whether g leaves the field unchanged; stops at the first atom where it does not. */
export function isUnchanged(cell: Supercell, field: Field, { operator, timeReversal }: GreyOperator): boolean {
  // The rotated axes of the supercell must be periods of the field, or positions modulo the supercell mean nothing.
  const periods = [0, 1, 2].every((axis) => {
    const turned = turnColumn(
      operator.rotation,
      cell.axes.map((row) => row[axis] as number),
    );
    return cell.atoms.every(({ position }, index) => {
      const target = cell.find(plus(position, turned));
      return [0, 1, 2].every(
        (entry) => Math.abs((field[3 * index + entry] as number) - (field[3 * target + entry] as number)) < 1e-7,
      );
    });
  });
  if (!periods) return false;
  const sign = timeReversal * Math.round(determinantOf(operator.rotation));
  return cell.atoms.every(({ position }, index) => {
    const target = cell.find(apply(operator, position));
    const turned = turnColumn(operator.rotation, [...field.subarray(3 * index, 3 * index + 3)]);
    return turned.every((entry, axis) => Math.abs(sign * entry - (field[3 * target + axis] as number)) < 1e-7);
  });
}

/** S_j = mean over the cells of M_j(T) e^{+2πi k·T}, per site: 3N complex numbers. */
export function fourierComponents(
  cell: Supercell,
  field: Field,
  k: readonly number[],
): { real: Float64Array; imaginary: Float64Array }[] {
  const result = cell.sites.map(({ positions }) => ({
    real: new Float64Array(3 * positions.length),
    imaginary: new Float64Array(3 * positions.length),
  }));
  cell.atoms.forEach(({ site, atom, translation }, index) => {
    const turns = 2 * Math.PI * inner(k, translation);
    const [cosine, sine] = [Math.cos(turns) / cell.translations.length, Math.sin(turns) / cell.translations.length];
    const own = result[site] as { real: Float64Array; imaginary: Float64Array };
    for (let axis = 0; axis < 3; axis++) {
      const value = field[3 * index + axis] as number;
      own.real[3 * atom + axis] = (own.real[3 * atom + axis] as number) + value * cosine;
      own.imaginary[3 * atom + axis] = (own.imaginary[3 * atom + axis] as number) + value * sine;
    }
  });
  return result;
}

/** A real field of random amplitudes of the listed irreps of k, carried to the arms k R⁻¹ of the operators given. */
export function randomIrrepField(
  cell: Supercell,
  labels: readonly string[],
  k: readonly number[],
  carriers: readonly FloatOperator[],
  random: Random,
): Field {
  const total = new Float64Array(3 * cell.atoms.length);
  for (const operator of carriers) {
    const arm = turnRow(k, inverse(operator).rotation);
    const components = cell.sites.map((site) => {
      const sum = {
        real: new Float64Array(3 * site.positions.length),
        imaginary: new Float64Array(3 * site.positions.length),
      };
      site.modes.forEach((list, irrep) => {
        if (!labels.includes(site.irreps.labels[irrep] as string)) return;
        for (const { real, imaginary } of list) {
          const [a, b] = [2 * random.next() - 1, 2 * random.next() - 1];
          for (let index = 0; index < real.length; index++) {
            const [x, y] = [real[index] as number, imaginary[index] as number];
            sum.real[index] = (sum.real[index] as number) + a * x - b * y;
            sum.imaginary[index] = (sum.imaginary[index] as number) + a * y + b * x;
          }
        }
      });
      return carriedComponents(cell.group, site.positions, sum, operator, arm);
    });
    cell.atoms.forEach(({ site, atom, translation }, index) => {
      const turns = -2 * Math.PI * inner(arm, translation);
      const own = components[site] as FourierVector;
      for (let axis = 0; axis < 3; axis++)
        total[3 * index + axis] =
          (total[3 * index + axis] as number) +
          (own.real[3 * atom + axis] as number) * Math.cos(turns) -
          (own.imaginary[3 * atom + axis] as number) * Math.sin(turns);
    });
  }
  return total;
}

export interface FourierVector {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** `S'_{j'} = e^{2πi k'·a} det(R) R S_j` with `g r_j = r_j' + a`, k' the arm that g takes the wave vector to. */
export function carriedComponents(
  group: FloatGroup,
  positions: readonly (readonly number[])[],
  vector: FourierVector,
  operator: FloatOperator,
  arm: readonly number[],
): FourierVector {
  const sign = Math.round(determinantOf(operator.rotation));
  const result = { real: new Float64Array(3 * positions.length), imaginary: new Float64Array(3 * positions.length) };
  landings(group, operator, positions).forEach(({ target, shift }, atom) => {
    const turns = 2 * Math.PI * inner(arm, shift);
    const re = turnColumn(operator.rotation, [...vector.real.subarray(3 * atom, 3 * atom + 3)]);
    const im = turnColumn(operator.rotation, [...vector.imaginary.subarray(3 * atom, 3 * atom + 3)]);
    for (let axis = 0; axis < 3; axis++) {
      const [a, b] = [sign * (re[axis] as number), sign * (im[axis] as number)];
      result.real[3 * target + axis] = a * Math.cos(turns) - b * Math.sin(turns);
      result.imaginary[3 * target + axis] = a * Math.sin(turns) + b * Math.cos(turns);
    }
  });
  return result;
}

/**
 * Mean over a group, translations first: an operator may turn the axes of the supercell into other translations of the
 * group, and only a field with all of these is moved to one place.
 */
export function meanOver(cell: Supercell, field: Field, operators: readonly GreyOperator[]): Field {
  const isTranslation = ({ operator: { rotation } }: GreyOperator): boolean =>
    rotation.every((entry, index) => Math.abs(entry - (index % 4 === 0 ? 1 : 0)) < 1e-9);
  return plainMean(cell, plainMean(cell, field, operators.filter(isTranslation)), operators);
}

function plainMean(cell: Supercell, field: Field, operators: readonly GreyOperator[]): Field {
  const total = new Float64Array(field.length);
  for (const operator of operators)
    movedField(cell, field, operator).forEach((entry, index) => {
      total[index] = (total[index] as number) + entry / operators.length;
    });
  return total;
}

/** Rank of real vectors by Gram–Schmidt. */
export function rankOfFields(fields: readonly Field[]): number {
  const kept: Float64Array[] = [];
  for (const field of fields) {
    const rest = Float64Array.from(field);
    const start = Math.sqrt(rest.reduce((sum, entry) => sum + entry * entry, 0));
    for (let round = 0; round < 2; round++)
      for (const unit of kept) {
        let overlap = 0;
        for (let index = 0; index < rest.length; index++) overlap += (rest[index] as number) * (unit[index] as number);
        for (let index = 0; index < rest.length; index++)
          rest[index] = (rest[index] as number) - overlap * (unit[index] as number);
      }
    const size = Math.sqrt(rest.reduce((sum, entry) => sum + entry * entry, 0));
    if (size < 1e-7 * Math.max(start, 1e-3)) continue;
    kept.push(rest.map((entry) => entry / size));
  }
  return kept.length;
}

export function differenceOf(a: Field, b: Field): number {
  return a.reduce((worst, entry, index) => Math.max(worst, Math.abs(entry - (b[index] as number))), 0);
}
