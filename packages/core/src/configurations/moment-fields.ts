import { KvaneError } from "../errors/index.js";
import {
  addCyclotomic,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicToComplex,
  cyclotomicZero,
  isCyclotomicZero,
  lcm,
  multiplyCyclotomic,
  reduceOrder,
  rootOfUnity,
  subtractCyclotomic,
} from "../numbers/index.js";
import type { FixedVectors } from "./fixed-vectors.js";
import type { ParentQuotient } from "./parent-quotient.js";
import { type CopyOnArms, dotCyclotomic, waveRoot } from "./site-frames.js";
import { type SparseRow, sparseEchelon } from "./sparse-echelon.js";
import type { SplitOrbit } from "./split-orbits.js";

/**
 * The moments that order parameters put on the representatives of one site: rows are free real amplitudes, columns three
 * components of each representative, reduced echelon form.
 */
export interface MomentRows {
  readonly rows: readonly SparseRow[];
}

/**
 * All fields `M_j(T) = Re Σ f_(i,p) e^(i)_{c,p}(j) e^{−2πi k_i·T}` over the fixed vectors f, times 1 and i, and the copies
 * c: those of the irreps that the stabilizer leaves unchanged.
 *
 * @param axes rows of the matrix that takes parent components to those wanted
 */
export function momentRows(
  quotient: ParentQuotient,
  orbits: readonly SplitOrbit[],
  sources: readonly { readonly fixed: FixedVectors; readonly copies: readonly CopyOnArms[] }[],
  axes: readonly (readonly Cyclotomic[])[],
): MomentRows {
  const { rows, denominator } = quotient.selection;
  const waves = new Map<string, readonly Cyclotomic[]>();
  const places = new Map<number, { readonly column: number; readonly waves: readonly Cyclotomic[] }[]>();
  orbits.forEach(({ atom, cell }, number) => {
    const key = cell.join();
    const own =
      waves.get(key) ??
      rows.map((row) =>
        waveRoot(
          row,
          cell.map((entry) => 0 - entry),
          denominator,
        ),
      );
    waves.set(key, own);
    places.set(atom, [...(places.get(atom) ?? []), { column: 3 * number, waves: own }]);
  });
  const raw = sources.flatMap(({ fixed, copies }) =>
    fixed.complex.flatMap((vector) =>
      copies.flatMap((copy) => fieldRows(places, fixed.parameter.irrep.dimension, vector, copy, axes)),
    ),
  );
  return { rows: echelonWherePossible(raw) };
}

/** Share of a row's length that must be new for it to be independent of those before. */
const independentShare = 1e-6;

/**
 * The reduced echelon form; where its exact numbers grow beyond the safe integers (k of large denominators), a choice of
 * the rows as they are, exact too and only less plain. Which are independent is then told from floats.
 */
function echelonWherePossible(rows: readonly SparseRow[]): SparseRow[] {
  try {
    return sparseEchelon(rows);
  } catch (error) {
    if (!(error instanceof KvaneError) || error.code !== "number-overflow") throw error;
    return independentRows(rows);
  }
}

function independentRows(rows: readonly SparseRow[]): SparseRow[] {
  const basis: Map<number, number>[] = [];
  return rows.filter((row) => {
    const rest = new Map([...row].map(([column, value]): [number, number] => [column, cyclotomicToComplex(value)[0]]));
    const size = lengthOf(rest);
    for (const unit of basis) {
      let product = 0;
      for (const [column, value] of rest) product += value * (unit.get(column) ?? 0);
      for (const [column, value] of unit) rest.set(column, (rest.get(column) ?? 0) - product * value);
    }
    const left = lengthOf(rest);
    if (size === 0 || left < independentShare * size) return false;
    basis.push(new Map([...rest].map(([column, value]): [number, number] => [column, value / left])));
    return true;
  });
}

function lengthOf(row: ReadonlyMap<number, number>): number {
  let square = 0;
  for (const value of row.values()) square += value * value;
  return Math.sqrt(square);
}

type Places = ReadonlyMap<number, readonly { readonly column: number; readonly waves: readonly Cyclotomic[] }[]>;

function fieldRows(
  places: Places,
  dimension: number,
  vector: readonly Cyclotomic[],
  copy: CopyOnArms,
  axes: readonly (readonly Cyclotomic[])[],
): SparseRow[] {
  const field = new Map<number, Cyclotomic>();
  for (const [atom, cells] of places) {
    const onArms = copy.flatMap((partners, arm) => {
      const moment = onArm(partners, vector, arm * dimension, atom);
      return moment === null ? [] : [{ arm, moment: axes.map((row) => dotCyclotomic(row, moment)) }];
    });
    if (onArms.length === 0) continue;
    for (const { column, waves } of cells)
      for (let axis = 0; axis < 3; axis++) {
        const sum = onArms.reduce(
          (total, { arm, moment }) =>
            addCyclotomic(total, multiplyCyclotomic(waves[arm] as Cyclotomic, moment[axis] as Cyclotomic)),
          cyclotomicZero,
        );
        if (!isCyclotomicZero(sum)) field.set(column + axis, reduceOrder(sum));
      }
  }
  return realRows(field);
}

/**
 * Multiples of the real and of the imaginary part of a row: `z + z*`, and `(z − z*)(ζ − ζ*)` with the ζ of the field that
 * holds the row, which keeps the numbers in that field.
 */
function realRows(field: SparseRow): SparseRow[] {
  let order = 1;
  for (const { order: own } of field.values()) order = lcm(order, own);
  if (order <= 2) return field.size === 0 ? [] : [field];
  const root = rootOfUnity([1, order]);
  const factor = subtractCyclotomic(root, conjugateCyclotomic(root));
  const real = new Map<number, Cyclotomic>();
  const imaginary = new Map<number, Cyclotomic>();
  for (const [column, value] of field) {
    const conjugate = conjugateCyclotomic(value);
    const re = addCyclotomic(value, conjugate);
    const im = subtractCyclotomic(value, conjugate);
    if (!isCyclotomicZero(re)) real.set(column, reduceOrder(re));
    if (!isCyclotomicZero(im)) imaginary.set(column, reduceOrder(multiplyCyclotomic(factor, im)));
  }
  return [real, imaginary].filter((row) => row.size > 0);
}

/** Σ_p f_p e_p of one atom on one arm; null where nothing is there. */
function onArm(
  partners: CopyOnArms[number],
  vector: readonly Cyclotomic[],
  first: number,
  atom: number,
): readonly Cyclotomic[] | null {
  let sum: Cyclotomic[] | null = null;
  partners.forEach((moments, partner) => {
    const amplitude = vector[first + partner] as Cyclotomic;
    const own = moments[atom] as readonly Cyclotomic[];
    if (isCyclotomicZero(amplitude) || own.every(isCyclotomicZero)) return;
    const term = own.map((entry) => multiplyCyclotomic(amplitude, entry));
    sum = sum === null ? term : sum.map((entry, axis) => addCyclotomic(entry, term[axis] as Cyclotomic));
  });
  return sum;
}
