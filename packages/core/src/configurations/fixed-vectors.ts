import {
  addCyclotomic,
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicFromRational,
  cyclotomicNumbers,
  cyclotomicOne,
  cyclotomicZero,
  isCyclotomicZero,
  modulo,
  multiplyCyclotomic,
  nullSpace,
  reducedEchelon,
  reduceOrder,
  rootOfUnity,
  subtractCyclotomic,
} from "../numbers/index.js";
import { type OrderParameter, timesVector } from "./order-parameter.js";
import { elementAt, type ParentQuotient } from "./parent-quotient.js";
import type { ResidueAction } from "./residue-action.js";
import { fixedPart, multiplyResidues, wholeSpace } from "./subspaces.js";

/** What an isotropy subgroup leaves fixed of one order parameter, exact. */
export interface FixedVectors {
  readonly parameter: OrderParameter;
  /** A basis over the complex numbers in the coordinates (arm, partner) of Ind D. */
  readonly complex: readonly (readonly Cyclotomic[])[];
  /** The same over the reals, in the real coordinates of the order parameter, reduced echelon form. */
  readonly real: readonly (readonly Cyclotomic[])[];
  readonly pivots: readonly number[];
}

/** Exact fixed vectors of the elements (numbers of the quotient) in one order parameter. */
export function fixedVectors(
  quotient: ParentQuotient,
  action: ResidueAction,
  elements: readonly number[],
): FixedVectors {
  const { parameter } = action;
  const equations = deciding(quotient, action, elements).flatMap((element) =>
    differenceRows(quotient, parameter, element),
  );
  const complex =
    equations.length === 0
      ? unitRows(parameter.complexSize)
      : nullSpace(equations, parameter.complexSize, cyclotomicNumbers, cyclotomicZero, cyclotomicOne);
  const { rows, pivots } = reducedEchelon(
    parameter.real
      ? complex.map((vector) => timesVector(parameter.inverseBasis ?? [], vector))
      : complex.flatMap(doubled),
    cyclotomicNumbers,
  );
  return { parameter, complex, real: rows.map((row) => row.map(reduceOrder)), pivots };
}

/** A few of the elements that have the fixed space of all. */
function deciding(quotient: ParentQuotient, action: ResidueAction, elements: readonly number[]): number[] {
  const { prime } = action.field;
  const { size } = action.parameter;
  let space = wholeSpace(size);
  const chosen: number[] = [];
  for (const index of elements) {
    const { place, translation, timeReversal } = elementAt(quotient, index);
    const matrix = multiplyResidues(
      action.translations[translation] as Float64Array,
      action.operators[place] as Float64Array,
      size,
      prime,
    );
    const part = fixedPart(space, matrix, timeReversal, prime);
    if (part.rows === space.rows) continue;
    space = part;
    chosen.push(index);
    if (space.rows === 0) break;
  }
  return chosen;
}

/** Rows of `θ D({1|T}) D(g) − 1`. */
function differenceRows(quotient: ParentQuotient, parameter: OrderParameter, index: number): Cyclotomic[][] {
  const { place, translation, timeReversal } = elementAt(quotient, index);
  const { rows, denominator } = quotient.selection;
  const vector = quotient.translations[translation] as readonly number[];
  return (parameter.matrices[place] ?? []).map((row, at) => {
    const arm = rows[Math.floor(at / parameter.irrep.dimension)] as readonly number[];
    const turns = arm.reduce((sum, entry, axis) => sum + entry * (vector[axis] as number), 0);
    const factor = multiplyCyclotomic(
      cyclotomicFromRational([timeReversal, 1]),
      rootOfUnity(fraction(modulo(turns, denominator), denominator)),
    );
    return row.map((entry, column) => {
      const value = multiplyCyclotomic(factor, entry);
      return column === at ? reduceOrder(subtractCyclotomic(value, cyclotomicOne)) : value;
    });
  });
}

function fraction(numerator: number, denominator: number): readonly [number, number] {
  let [a, b] = [numerator, denominator];
  while (b !== 0) [a, b] = [b, a % b];
  return [numerator / a, denominator / a];
}

function unitRows(size: number): Cyclotomic[][] {
  return Array.from({ length: size }, (_, row) =>
    Array.from({ length: size }, (_, column) => (row === column ? cyclotomicOne : cyclotomicZero)),
  );
}

/** A complex vector and i times it as real ones: (Re, Im) coordinate by coordinate. */
function doubled(vector: readonly Cyclotomic[]): Cyclotomic[][] {
  const parts = vector.map((entry) => ({ real: realPart(entry), imaginary: imaginaryPart(entry) }));
  return [
    parts.flatMap(({ real, imaginary }) => [real, imaginary]),
    parts.flatMap(({ real, imaginary }) => [subtractCyclotomic(cyclotomicZero, imaginary), real]),
  ];
}

const half = cyclotomicFromRational([1, 2]);

export function realPart(value: Cyclotomic): Cyclotomic {
  if (isCyclotomicZero(value) || value.order <= 2) return value;
  return reduceOrder(multiplyCyclotomic(half, addCyclotomic(value, conjugateCyclotomic(value))));
}

export function imaginaryPart(value: Cyclotomic): Cyclotomic {
  if (isCyclotomicZero(value) || value.order <= 2) return cyclotomicZero;
  const twice = subtractCyclotomic(value, conjugateCyclotomic(value));
  return reduceOrder(multiplyCyclotomic(multiplyCyclotomic(half, rootOfUnity([-1, 4])), twice));
}
