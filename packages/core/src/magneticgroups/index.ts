/**
 * Which magnetic group is it, and what does it allow? Space groups with time reversal: from generators in any basis,
 * in other axes, their type (I to IV), their number and symbol among the 1651 types, their point group.
 *
 * Conventions: operators are those of the room `spacegroups` with a time reversal of +1 or −1 beside them; the lattice
 * holds the translations without time reversal, so that a group of type IV has two operators for each rotation.
 *
 * Sources: International Tables for Crystallography A, chapter 3.6 (magnetic subperiodic and space groups); N. V. Belov,
 * N. N. Neronova and T. S. Smirnova, Sov. Phys. Crystallogr. 2 (1957) 311 (symbols and settings).
 */
export { magneticGroup } from "./build.js";
export { changeMagneticBasis } from "./change-basis.js";
export { type IdentifiedMagneticGroup, identifyMagneticGroup } from "./identify.js";
export { composeMagnetic, invertMagnetic, sameMagneticOperator } from "./operators.js";
export { type MagneticRotation, magneticPointGroupSymbol } from "./point-groups.js";
export { familyGroup, unprimedSubgroup } from "./related-groups.js";
export {
  composeSuperspace,
  invertSuperspace,
  type SuperspaceOperator,
  sameSuperspaceOperator,
} from "./superspace.js";
export { formatSuperspace, parseSuperspace } from "./superspace-text.js";
export { type MagneticTableRow, magneticGroupByNumber, magneticGroupTable } from "./table.js";
export { type TensorForms, tensorForms } from "./tensors.js";
export { formatMagneticTriplet, parseMagneticTriplet } from "./triplets.js";
export type { MagneticGroup, MagneticGroupName, MagneticGroupType, MagneticOperator } from "./types.js";
