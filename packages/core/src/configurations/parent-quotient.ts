import {
  type IntegerMatrix,
  integerDeterminant,
  type RationalVector,
  reduceModulo,
  safe,
  vectorFrom,
} from "../numbers/index.js";
import { fromPrimitiveColumn, type SpaceGroup } from "../spacegroups/index.js";
import { type ArmSelection, cosetVectors, periodLattice } from "./arm-selection.js";

/**
 * The grey parent group modulo the translations that change nothing: the operators that permute the arms, each with
 * every translation of L modulo the period, with and without time reversal. Element e = (operator, translation, time
 * reversal) has the number `2·(operator·translations + translation) + (1 when reversed)`; its operator is
 * `{R | t + T}`.
 */
export interface ParentQuotient {
  readonly group: SpaceGroup;
  readonly selection: ArmSelection;
  /** Hermite normal form, primitive basis, of the translations with k·T integer for every arm. */
  readonly period: readonly (readonly number[])[];
  /** Representatives of L modulo the period, zero first, primitive basis. */
  readonly translations: readonly (readonly number[])[];
  readonly size: number;
}

export interface QuotientElement {
  /** Place among `selection.operators`. */
  readonly place: number;
  readonly translation: number;
  readonly timeReversal: 1 | -1;
}

export function parentQuotient(group: SpaceGroup, selection: ArmSelection): ParentQuotient {
  const period = periodLattice(selection.rows, selection.denominator);
  const translations = cosetVectors(period);
  return { group, selection, period, translations, size: 2 * selection.operators.length * translations.length };
}

export function elementAt(quotient: ParentQuotient, index: number): QuotientElement {
  const half = Math.floor(index / 2);
  const count = quotient.translations.length;
  return { place: Math.floor(half / count), translation: half % count, timeReversal: index % 2 === 0 ? 1 : -1 };
}

export function elementIndex(quotient: ParentQuotient, element: QuotientElement): number {
  return (
    2 * (element.place * quotient.translations.length + element.translation) + (element.timeReversal === 1 ? 0 : 1)
  );
}

/** Number of the representative that a translation (primitive basis) belongs to. */
export function translationNumber(quotient: ParentQuotient, translation: readonly number[]): number {
  const [x, y, z] = reduceModulo(translation, quotient.period) as [number, number, number];
  const [, b, c] = [0, 1, 2].map((axis) => quotient.period[axis]?.[axis] as number) as [number, number, number];
  return (x * b + y) * c + z;
}

/** The full translation part t + T in the primitive basis, over the group's `primitive.denominator`. */
function translationPart(quotient: ParentQuotient, element: QuotientElement): number[] {
  const { primitive } = quotient.group;
  const own = primitive.translations[operatorOf(quotient, element)] as readonly number[];
  const extra = quotient.translations[element.translation] as readonly number[];
  return own.map((entry, axis) => entry + (extra[axis] as number) * primitive.denominator);
}

/** Index of the element's operator in the group. */
export function operatorOf(quotient: ParentQuotient, element: QuotientElement): number {
  return quotient.selection.operators[element.place] as number;
}

/** The same translation part as an exact column in the axes of the setting. */
export function translationColumnOf(quotient: ParentQuotient, element: QuotientElement): RationalVector {
  const { primitive, lattice } = quotient.group;
  return fromPrimitiveColumn(lattice, vectorFrom(translationPart(quotient, element), primitive.denominator));
}

export function properSign(rotation: IntegerMatrix): 1 | -1 {
  return integerDeterminant(rotation) > 0 ? 1 : -1;
}

export function timesColumnIntegers(matrix: IntegerMatrix, column: readonly number[]): number[] {
  return [0, 3, 6].map((start) =>
    safe(
      (matrix[start] as number) * (column[0] as number) +
        (matrix[start + 1] as number) * (column[1] as number) +
        (matrix[start + 2] as number) * (column[2] as number),
    ),
  );
}

/**
 * Places among `selection.operators` of a few operators that generate, with the translations, all of them: each one is
 * taken that the products of those before it do not reach.
 */
export function generatingPlaces(quotient: ParentQuotient): number[] {
  const { rotations } = quotient.group.primitive;
  const own = quotient.selection.operators.map((operator) => rotations[operator] as IntegerMatrix);
  const placeOf = new Map(own.map((rotation, place) => [rotation.join(), place]));
  const reached = new Set<number>([placeOf.get("1,0,0,0,1,0,0,0,1") as number]);
  const generators: number[] = [];
  own.forEach((_, place) => {
    if (reached.has(place)) return;
    generators.push(place);
    const queue = [...reached];
    for (let next = queue.pop(); next !== undefined; next = queue.pop())
      for (const generator of generators) {
        const product = productKey(own[next] as IntegerMatrix, own[generator] as IntegerMatrix);
        const target = placeOf.get(product) as number;
        if (reached.has(target)) continue;
        reached.add(target);
        queue.push(target);
      }
  });
  return generators;
}

function productKey(a: IntegerMatrix, b: IntegerMatrix): string {
  const entries: number[] = [];
  for (let row = 0; row < 9; row += 3)
    for (let column = 0; column < 3; column++)
      entries.push(
        (a[row] as number) * (b[column] as number) +
          (a[row + 1] as number) * (b[3 + column] as number) +
          (a[row + 2] as number) * (b[6 + column] as number) +
          0,
      );
  return entries.join();
}
