/**
 * Which operators does a space group have, in any setting? Groups come from table numbers, Hermann–Mauguin symbols,
 * Hall symbols or coordinate triplets, with any change of basis; the room also holds lattices, cells and the orbits of
 * sites.
 *
 * Conventions: `{R|t}` acts on columns of fractional coordinates, `x' = R x + t`; (P, p) changes the basis as in
 * International Tables A; everything is exact but the cell. Operators are one a coset of the translation lattice, in an
 * order that depends on the set alone: proper before improper, by order, axis and sense (`operator-order.ts`).
 *
 * Sources: International Tables for Crystallography A (settings, changes of basis, site symmetry) and B, appendix
 * A1.4.2 (Hall symbols and the 530 settings); S. R. Hall, Acta Cryst. A37 (1981) 517. Origin of the table:
 * spacegroup-data/SOURCES.md.
 */

export { averagedMetric, metricOfAxes } from "./averaged-metric.js";
export {
  composeBasisChanges,
  formatBasisChange,
  identityChange,
  invertBasisChange,
  parseBasisChange,
} from "./basis-changes.js";
export { arrangeElements, assembleGroup, groupFromOperators, groupOnLattice } from "./build-group.js";
export { changeCell } from "./cell-changes.js";
export {
  cellVolume,
  checkCell,
  directMetric,
  lengthInMetric,
  parseCell,
  reciprocalMetric,
} from "./cells.js";
export { changeBasis, changeOperator } from "./change-basis.js";
export { latticeVectorsInCell, operatorsModuloIntegers } from "./integer-cosets.js";
export {
  fromPrimitiveColumn,
  fromPrimitiveRow,
  isLatticeVector,
  latticeFrom as latticeFromVectors,
  latticeMatrix,
  latticeVectors,
  latticeVectorsOfCell,
  reduceByLattice,
  toPrimitiveColumn,
  toPrimitiveRow,
} from "./lattices.js";
export { checkCellAgainstGroup } from "./metric-symmetry.js";
export { groupFromSetting } from "./name-groups.js";
export {
  applyOperator,
  composeOperators,
  invertOperator,
  isTranslation,
  operatorFrom,
  rotationOf,
  translationOf,
} from "./operators.js";
export { type ParsedGroup, parseGroup, parseGroupWithNotes } from "./parse-group.js";
export { pointGroupSymbol, rotationType } from "./point-groups.js";
export { composeElements, type PrimitiveElement, timesIntegers, toPrimitiveElements } from "./primitive-elements.js";
export { tabulatedSettings } from "./settings.js";
export { siteOrbit } from "./site-orbits.js";
export { parseSite } from "./sites.js";
export { standardSetting, type WayToSetting, waysToSettings } from "./standard-setting.js";
export { formatTriplet, parseTriplet } from "./triplets.js";
export type {
  BasisChange,
  Cell,
  GroupAssumption,
  GroupName,
  Lattice,
  PrimitiveOperators,
  Site,
  SiteOrbit,
  SpaceGroup,
  SymmetryOperator,
  TabulatedSetting,
} from "./types.js";
