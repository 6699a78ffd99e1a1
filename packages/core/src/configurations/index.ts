/**
 * Which arrangements of moments are there for a k, and which symmetry has each? Directions of the order parameter of
 * every physically irreducible representation as the fixed spaces of its finite image group with time reversal as −1,
 * each with its magnetic group in the parent's axes and in a cell of its own, index, domains, free parameters under the
 * irreps and under the group, and the moments on every atom.
 *
 * Conventions: docs/conventions.md, Moments and phases; Modes; Superspace. Forms are in lattice components.
 *
 * Sources: J. M. Perez-Mato, J. L. Ribeiro, V. Petricek and M. I. Aroyo, J. Phys.: Condens. Matter 24 (2012) 163201;
 * J.-C. Tolédano and V. Dmitriev, Reconstructive Phase Transitions (1996), chapter 2.
 */
export type { ArmChoice } from "./arm-selection.js";
export type { CellOperator } from "./child-cell.js";
export { configurationsOf, usualLimit } from "./configurations-of.js";
export type { Consequences, Property } from "./consequences.js";
export { type Decomposition, decomposeField, type IrrepPart } from "./decompose.js";
export type { ConstantMoment } from "./equal-sizes.js";
export { type GivenMoments, type MomentField, momentField } from "./given-field.js";
export type { ModulatedConfiguration, ModulatedSite } from "./modulated-types.js";
export { type MomentVerdict, momentVerdict } from "./plausibility.js";
export type { Recognised } from "./recognise.js";
export { splitPositions } from "./split-positions.js";
export type {
  AmplitudeShare,
  Configuration,
  ConfigurationCell,
  ConfigurationOptions,
  ConfigurationSet,
  ConfigurationSite,
  SecondaryIrrep,
} from "./types.js";
