import { choleskyFactor, hermitianEigen } from "../algorithms/index.js";
import type { Configuration } from "../configurations/index.js";
import {
  hermiteNormalForm,
  integerDeterminant,
  invert,
  reduceModulo,
  roundNumber,
  toNumber,
} from "../numbers/index.js";
import { applyOperator, directMetric, latticeMatrix, rotationOf, toPrimitiveColumn } from "../spacegroups/index.js";
import { reversedBond } from "./atoms.js";
import type { Bond, BondTable, ExchangeModel } from "./types.js";

/** Energy of an arrangement whose amplitudes are free, per atom, for |M|² = 1 on the average of all atoms. */
export interface ArrangementEnergy {
  readonly lowest: number;
  readonly highest: number;
  /** Free real amplitudes. */
  readonly amplitudes: number;
}

/**
 * The energy of a commensurate arrangement, summed bond by bond over its magnetic cell: a quadratic form in the free
 * amplitudes of its moments, least and largest where it equals its extreme eigenvalues against the mean square moment.
 * Site potentials of the model are counted: they are nothing for moments of one size.
 * Null where no atom carries a moment.
 */
export function arrangementEnergy(model: ExchangeModel, configuration: Configuration): ArrangementEnergy | null {
  const { table } = model;
  const placed = placedMoments(table, configuration);
  const amplitudes = placed[0]?.moments.length ?? 0;
  if (amplitudes === 0) return null;
  const metric = childMetric(table, configuration);
  const keyOf = cellKeys(table, configuration);
  const at = new Map(placed.map((one) => [keyOf(one.atom, one.translation), one]));
  const product = (a: readonly number[], b: readonly number[]) =>
    a.reduce(
      (sum, left, row) =>
        sum + left * b.reduce((part, right, column) => part + (metric[3 * row + column] as number) * right, 0),
      0,
    );
  const energy = new Float64Array(amplitudes * amplitudes);
  const square = new Float64Array(amplitudes * amplitudes);
  const outgoing = bondsByAtom(model);
  for (const one of placed) {
    addProducts(square, one.moments, one.moments, 1 / placed.length, product);
    const potential = model.potentials[one.atom] as number;
    if (potential !== 0) addProducts(energy, one.moments, one.moments, potential / (2 * placed.length), product);
    for (const { bond, strength } of outgoing[one.atom] ?? []) {
      const other = at.get(
        keyOf(
          bond.to,
          one.translation.map((entry, axis) => entry + (bond.translation[axis] as number)),
        ),
      );
      if (!other) throw new Error("a bond leads to no atom of the magnetic cell");
      addProducts(energy, one.moments, other.moments, strength / (2 * placed.length), product);
    }
  }
  return extremes(energy, square, amplitudes);
}

interface PlacedMoment {
  /** Atom of the table, and the cell that it is in. */
  readonly atom: number;
  readonly translation: readonly number[];
  /** For each amplitude the moment in the axes of the magnetic cell. */
  readonly moments: readonly (readonly number[])[];
}

function placedMoments(table: BondTable, { cell, sites }: Configuration): PlacedMoment[] {
  const { matrix } = cell.cellFromParent;
  const seen = new Set<string>();
  const amplitudes = Math.max(0, ...sites.flatMap((site) => site.amplitudes.map(({ amplitude }) => amplitude + 1)));
  return sites.flatMap((site) =>
    cell.operators.flatMap((first) =>
      cell.centrings.flatMap((second): PlacedMoment[] => {
        const position = applyOperator(second.operator, applyOperator(first.operator, site.positionLattice));
        const inside = position.map((entry) => {
          const value = toNumber(entry);
          return value - Math.floor(value + 1e-9);
        });
        const key = inside.map((entry) => Math.round(entry * 1e6)).join();
        if (seen.has(key)) return [];
        seen.add(key);
        const parent = matrix.map((row) =>
          row.reduce((sum, entry, axis) => sum + toNumber(entry) * (inside[axis] as number), 0),
        );
        const rotation = rotationOf(first.operator).map((row) => row.map(toNumber));
        const flat = first.operator.rotation;
        const sign = Math.sign(integerDeterminant(flat)) * first.timeReversal * second.timeReversal;
        return [
          {
            ...placeOf(table, parent),
            moments: Array.from({ length: amplitudes }, (_, index) => {
              const moment = site.amplitudes.find(({ amplitude }) => amplitude === index)?.momentLattice ?? [0, 0, 0];
              return rotation.map(
                (row) => sign * row.reduce((sum, entry, axis) => sum + entry * (moment[axis] as number), 0),
              );
            }),
          },
        ];
      }),
    ),
  );
}

/** The atom of the table at a place, and its cell, in the primitive basis. */
function placeOf({ group, atoms }: BondTable, position: readonly number[]): { atom: number; translation: number[] } {
  const inverse = invert(latticeMatrix(group.lattice)).map((row) => row.map(toNumber));
  const place = inverse.map((row) => row.reduce((sum, entry, axis) => sum + entry * (position[axis] as number), 0));
  for (const [atom, { position: own }] of atoms.entries()) {
    const step = toPrimitiveColumn(group.lattice, own).map((entry, axis) => (place[axis] as number) - toNumber(entry));
    if (step.every((entry) => Math.abs(entry - Math.round(entry)) < 1e-5))
      return { atom, translation: step.map((entry) => Math.round(entry) + 0) };
  }
  throw new Error("an atom of the magnetic cell is none of the table");
}

/** Texts that are the same for atoms that a translation of the magnetic cell joins. */
function cellKeys(
  { group }: BondTable,
  { cell }: Configuration,
): (atom: number, translation: readonly number[]) => string {
  const { matrix } = cell.cellFromParent;
  const columns = [0, 1, 2].map((axis) =>
    toPrimitiveColumn(group.lattice, [
      (matrix[0] as (typeof matrix)[0])[axis as 0 | 1 | 2],
      (matrix[1] as (typeof matrix)[1])[axis as 0 | 1 | 2],
      (matrix[2] as (typeof matrix)[2])[axis as 0 | 1 | 2],
    ]).map((entry) => Math.round(toNumber(entry))),
  );
  const hermite = hermiteNormalForm(columns, 3);
  return (atom, translation) => `${atom} ${reduceModulo(translation, hermite).join(" ")}`;
}

/** The metric of the magnetic cell, nine numbers. */
function childMetric({ cell }: BondTable, configuration: Configuration): number[] {
  const p = configuration.cell.cellFromParent.matrix.map((row) => row.map(toNumber));
  const metric = directMetric(cell);
  return Array.from({ length: 9 }, (_, at) => {
    const [row, column] = [Math.floor(at / 3), at % 3];
    let sum = 0;
    for (let a = 0; a < 3; a++)
      for (let b = 0; b < 3; b++)
        sum += (p[a]?.[row] as number) * (metric[3 * a + b] as number) * (p[b]?.[column] as number);
    return sum;
  });
}

function bondsByAtom(model: ExchangeModel): { readonly bond: Bond; readonly strength: number }[][] {
  const lists: { bond: Bond; strength: number }[][] = model.table.atoms.map(() => []);
  for (const { bonds, j } of model.couplings)
    for (const bond of bonds.bonds) {
      const strength = j * (model.lengths[bond.from] as number) * (model.lengths[bond.to] as number);
      lists[bond.from]?.push({ bond, strength });
      lists[bond.to]?.push({ bond: reversedBond(bond), strength });
    }
  return lists;
}

function addProducts(
  form: Float64Array,
  left: readonly (readonly number[])[],
  right: readonly (readonly number[])[],
  factor: number,
  product: (a: readonly number[], b: readonly number[]) => number,
): void {
  const size = left.length;
  for (let a = 0; a < size; a++)
    for (let b = 0; b < size; b++)
      form[a * size + b] =
        (form[a * size + b] as number) + factor * product(left[a] as readonly number[], right[b] as readonly number[]);
}

/** Extreme eigenvalues of `energy` against `square`; amplitudes that give no moment are left out. */
function extremes(energy: Float64Array, square: Float64Array, size: number): ArrangementEnergy | null {
  const factor = choleskyFactor(square, size, 1e-10);
  if (factor === null) return null;
  // A = L⁻¹ E L⁻ᵀ, column by column.
  const solve = (column: Float64Array): Float64Array => {
    const x = column.slice();
    for (let row = 0; row < size; row++) {
      for (let k = 0; k < row; k++) x[row] = (x[row] as number) - (factor[row * size + k] as number) * (x[k] as number);
      x[row] = (x[row] as number) / (factor[row * size + row] as number);
    }
    return x;
  };
  const transposed = (matrix: Float64Array) =>
    Float64Array.from({ length: size * size }, (_, at) => matrix[(at % size) * size + Math.floor(at / size)] as number);
  const columnsSolved = (matrix: Float64Array): Float64Array => {
    const result = new Float64Array(size * size);
    for (let column = 0; column < size; column++)
      solve(Float64Array.from({ length: size }, (_, row) => matrix[row * size + column] as number)).forEach(
        (entry, row) => {
          result[row * size + column] = entry;
        },
      );
    return result;
  };
  const real = columnsSolved(transposed(columnsSolved(energy)));
  const { values } = hermitianEigen({ size, real, imaginary: new Float64Array(size * size) });
  return {
    lowest: roundNumber(values[0] as number),
    highest: roundNumber(values[size - 1] as number),
    amplitudes: size,
  };
}
