/**
 * Which arrangements of moments does each irrep allow on a site? The magnetic representation
 * `Γ(g)_{j'j} = e^{+2πi k·a} det(R) R`, its split under the little group, exact mode vectors (copies × partners) and the
 * general arrangement in symbols, in lattice components and with phases per lattice translation (docs/conventions.md,
 * Moments and phases; Modes, amplitudes, real moments). Source: Bertaut, Acta Cryst. A24 (1968) 217.
 */

export { formatPhased, type LinearForm, type Phase, type PhasedNumber, phasedToComplex } from "../numbers/index.js";
export { axisLengths } from "./axis-lengths.js";
export { cartesianAxes, convertComponents } from "./components.js";
export {
  type ConstraintOptions,
  type ConstraintTexts,
  constraintCrystal,
  constraintTexts,
  orderParameterTexts,
} from "./constraint-forms.js";
export {
  type FourierConvention,
  fromConvention,
  type MomentComponents,
  ownConvention,
  toConvention,
} from "./fourier-conventions.js";
export { type MomentSizes, momentSizes } from "./moment-sizes.js";
export { type IrrepShare, type ProjectedComponents, projectComponents } from "./read-components.js";
export { siteModes } from "./site-modes.js";
export { type ArmModes, starModes } from "./star-modes.js";
export type { IrrepModes, MinusKOnModes, Mode, ModeMoment, SiteModes } from "./types.js";
export {
  ownWriting,
  type WritingConvention,
  type WritingOptions,
  type WrittenArm,
  type WrittenIrrep,
  type WrittenMode,
  type WrittenSite,
  writtenSite,
} from "./written-site.js";
