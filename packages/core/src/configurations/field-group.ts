import { type MagneticGroup, type MagneticOperator, magneticGroup } from "../magneticgroups/index.js";
import {
  addVectors,
  hermiteNormalForm,
  integerDeterminant,
  type RationalVector,
  reduceModulo,
  vectorFrom,
} from "../numbers/index.js";
import {
  fromPrimitiveColumn,
  latticeFromVectors,
  operatorFrom,
  rotationOf,
  type SpaceGroup,
  type SymmetryOperator,
  translationOf,
} from "../spacegroups/index.js";
import { type MomentField, numberOf } from "./given-field.js";
import type { SiteFrame } from "./site-frames.js";

type Triple = readonly [number, number, number];

/** Share of the largest moment by which two moments may differ and still be equal: files round to a hundredth of a μB. */
const equalMomentShare = 0.02;

const identityKey = "1,0,0,0,1,0,0,0,1";

/**
 * The magnetic group of a field within the grey parent group: every operator of the parent with every translation of it
 * modulo the magnetic cell, with and without time reversal, that leaves all moments as they are. In the parent's axes.
 */
export function groupOfField(group: SpaceGroup, field: MomentField, frames: readonly SiteFrame[]): MagneticGroup {
  const largest = Math.max(...field.moments.flat(2).flatMap((moment) => moment.map(Math.abs)), 0);
  const tolerance = equalMomentShare * largest;
  const signs = (index: number, translation: readonly number[]): readonly (1 | -1)[] => {
    const rotation = group.primitive.rotations[index] as readonly number[];
    const matrix = axialMatrix(group.operators[index] as SymmetryOperator, rotation);
    return signsOf(field, frames, index, rotation, translation, matrix, tolerance);
  };
  const identity = group.primitive.rotations.findIndex((rotation) => rotation.join() === identityKey);
  const pure = field.cells.filter((translation) => signs(identity, translation).includes(1));
  // The field may repeat earlier than the given cell says.
  const rows = hermiteNormalForm([...field.lattice, ...pure], 3);
  const kept = group.operators.flatMap((_, index) =>
    keepsLattice(group.primitive.rotations[index] as readonly number[], rows)
      ? field.cells.flatMap((translation) =>
          signs(index, translation).map((timeReversal) => ({ index, translation, timeReversal })),
        )
      : [],
  );
  const seen = new Set<string>();
  const operators = kept.flatMap(({ index, translation, timeReversal }): MagneticOperator[] => {
    const key = `${index} ${timeReversal} ${reduceModulo(translation, rows).join()}`;
    if (seen.has(key)) return [];
    seen.add(key);
    const own = group.operators[index] as SymmetryOperator;
    const column = addVectors(translationOf(own), fromPrimitiveColumn(group.lattice, vectorFrom(translation)));
    return [{ operator: operatorFrom(rotationOf(own), column), timeReversal }];
  });
  const columns = rows.map((row): RationalVector => fromPrimitiveColumn(group.lattice, vectorFrom(row)));
  return magneticGroup(latticeFromVectors(columns), operators);
}

/** Only then is it well defined which cell an operator takes a cell to. */
function keepsLattice(rotation: readonly number[], rows: readonly (readonly number[])[]): boolean {
  return rows.every((row) => {
    const turned = [0, 1, 2].map((axis) =>
      row.reduce((sum, entry, column) => sum + (rotation[3 * axis + column] as number) * entry, 0),
    );
    return reduceModulo(turned, rows).every((entry) => entry === 0);
  });
}

/** `det(R) R` in the parent's lattice components, nine numbers. */
function axialMatrix({ rotation, rotationDenominator }: SymmetryOperator, primitive: readonly number[]): number[] {
  const sign = integerDeterminant(primitive);
  return rotation.map((entry) => (sign * entry) / rotationDenominator);
}

/** Which time reversals make `{R|t + T}` a symmetry of the field: none, one, or both where all moments are zero. */
function signsOf(
  field: MomentField,
  frames: readonly SiteFrame[],
  index: number,
  rotation: readonly number[],
  translation: readonly number[],
  matrix: readonly number[],
  tolerance: number,
): readonly (1 | -1)[] {
  let [plus, minus] = [true, true];
  for (const [site, atoms] of field.moments.entries()) {
    const frame = frames[site] as (typeof frames)[number];
    for (const [atom, list] of atoms.entries()) {
      const target = frame.images[index]?.[atom] as number;
      const shift = frame.shifts[index]?.[atom] as readonly number[];
      for (const [place, cell] of field.cells.entries()) {
        const moved = [0, 1, 2].map(
          (row) =>
            cell.reduce((sum, entry, column) => sum + (rotation[3 * row + column] as number) * entry, 0) +
            (shift[row] as number) +
            (translation[row] as number),
        );
        const there = (atoms[target] as readonly Triple[])[numberOf(field.lattice, moved)] as Triple;
        const moment = list[place] as Triple;
        for (let axis = 0; axis < 3; axis++) {
          const value = moment.reduce((sum, entry, column) => sum + (matrix[3 * axis + column] as number) * entry, 0);
          if (plus && Math.abs(value - (there[axis] as number)) > tolerance) plus = false;
          if (minus && Math.abs(value + (there[axis] as number)) > tolerance) minus = false;
        }
        if (!plus && !minus) return [];
      }
    }
  }
  return [...(plus ? ([1] as const) : []), ...(minus ? ([-1] as const) : [])];
}
