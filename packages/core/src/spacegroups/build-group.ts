import {
  adjugate,
  gcdOf,
  type IntegerMatrix,
  integerDeterminant,
  lcm,
  multiplyIntegerMatrices,
  type RationalVector,
  reduceModulo,
  safe,
} from "../numbers/index.js";
import { identityChangeText } from "./basis-changes.js";
import { closeOperators } from "./closure.js";
import { integerLattice, latticeFrom, latticeVectors } from "./lattices.js";
import { compareKeys, operatorKey } from "./operator-order.js";
import { isTranslation, translationOf, usualTranslationDenominator } from "./operators.js";
import { pointGroupSymbol } from "./point-groups.js";
import { type PrimitiveElement, timesIntegers } from "./primitive-elements.js";
import type { GroupName, Lattice, SpaceGroup, SymmetryOperator } from "./types.js";

export const unnamed: GroupName = {
  number: null,
  hall: null,
  hermannMauguin: null,
  choice: "",
  basisChange: identityChangeText,
};

/**
 * The group that `operators` generate. All integer translations belong to it, besides them the pure translations among
 * the operators and `extraTranslations`; a product of the operators that is any other translation is an error.
 *
 * @param name what is known of its name; the rest is null
 * @throws `not-a-group`, naming the operator at fault
 */
export function groupFromOperators(
  operators: readonly SymmetryOperator[],
  name: Partial<GroupName> = {},
  extraTranslations: readonly RationalVector[] = [],
): SpaceGroup {
  return groupOnLattice(
    latticeFrom([
      ...latticeVectors(integerLattice),
      ...extraTranslations,
      ...operators.filter(isTranslation).map(translationOf),
    ]),
    operators,
    name,
  );
}

/** The group that `operators` and the translations of `lattice` generate. Throws as `groupFromOperators`. */
export function groupOnLattice(
  lattice: Lattice,
  operators: readonly SymmetryOperator[],
  name: Partial<GroupName> = {},
  columns?: readonly number[],
): SpaceGroup {
  const { elements, denominator } = closeOperators(lattice, operators, columns);
  return assembleGroup(lattice, elements, denominator, { ...unnamed, ...name });
}

/**
 * The record of a group from one representative per coset of L in the primitive basis: translations reduced modulo L,
 * operators in their fixed order, denominators canonical.
 */
export function assembleGroup(
  lattice: Lattice,
  elements: readonly PrimitiveElement[],
  denominator: number,
  name: GroupName = unnamed,
): SpaceGroup {
  const sorted = arrangeElements(lattice, elements, denominator);
  const divisor = gcdOf([denominator, ...sorted.flatMap((one) => one.translation)]);
  return {
    name,
    lattice,
    operators: sorted.map((one) => one.operator),
    primitive: {
      rotations: sorted.map((one) => one.rotation),
      translations: sorted.map((one) => one.translation.map((entry) => entry / divisor) as [number, number, number]),
      denominator: denominator / divisor,
    },
    pointGroup: pointGroupSymbol(sorted.map((one) => one.rotation)),
  };
}

/** An operator in both bases; the primitive translation has the denominator that the caller gave. */
export interface ArrangedElement extends PrimitiveElement {
  readonly operator: SymmetryOperator;
}

/**
 * Operators of the primitive basis, each with its record in the axes of the setting, translations reduced modulo L, in
 * the fixed order of operators. They need not be a group, but no two may have one rotation.
 */
export function arrangeElements(
  lattice: Lattice,
  elements: readonly PrimitiveElement[],
  denominator: number,
): readonly ArrangedElement[] {
  const toSetting = settingConverter(lattice, denominator);
  return elements
    .map((element) => {
      const { operator, translation } = toSetting(element);
      const key = operatorKey(element.rotation, operator.rotation, operator.rotationDenominator);
      return { key, arranged: { rotation: element.rotation, translation, operator } };
    })
    .sort((a, b) => compareKeys(a.key, b.key))
    .map((one) => one.arranged);
}

/**
 * From the primitive basis to the axes of the setting, on integers: with V the numerators of the lattice vectors as
 * columns, `R = V R_p adj(V) / det V`, `t = V τ`, reduced modulo L; the primitive translation follows the reduction.
 */
function settingConverter(lattice: Lattice, denominator: number) {
  const basis = columnsOf(lattice);
  const adjoint = adjugate(basis);
  const volume = integerDeterminant(basis);
  const scale = lattice.denominator * denominator;
  const hermite = lattice.vectors.map((row) => row.map((entry) => safe(entry * denominator)));
  return (element: PrimitiveElement) => {
    const rotated = multiplyIntegerMatrices(multiplyIntegerMatrices(basis, element.rotation), adjoint).map(safe);
    const common = gcdOf([volume, ...rotated]);
    const reduced = reduceModulo(timesIntegers(basis, element.translation), hermite);
    const lowest = gcdOf([scale, ...reduced]);
    const finest = lcm(scale / lowest, usualTranslationDenominator);
    const operator: SymmetryOperator = {
      rotation: rotated.map((entry) => entry / common + 0),
      rotationDenominator: volume / common,
      translation: reduced.map((entry) => safe((entry / lowest) * (finest / (scale / lowest))) + 0) as [
        number,
        number,
        number,
      ],
      translationDenominator: finest,
    };
    return { operator, translation: timesIntegers(adjoint, reduced).map((entry) => entry / volume + 0) };
  };
}

/** Numerators of the lattice vectors as columns; upper triangular by rows, so the determinant is positive. */
function columnsOf({ vectors }: Lattice): IntegerMatrix {
  return [0, 1, 2].flatMap((row) => vectors.map((vector) => vector[row as 0 | 1 | 2]));
}
