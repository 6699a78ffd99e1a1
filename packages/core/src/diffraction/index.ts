/**
 * How strong is every satellite? Magnetic form factors in the dipole approximation, structure factors F(H ± k) and F⊥,
 * powder and single-crystal intensities, nuclear structure factors, Lorentz factors, and the satellites that symmetry
 * makes vanish. Structure factors are in 10⁻¹² cm per primitive cell, moments in μB along the unit vectors of the axes,
 * phases run with the lattice translation (docs/conventions.md, Moments and phases). Sources: International Tables C,
 * sections 4.4.4, 4.4.5 and 6.2; W. Marshall & S. W. Lovesey, Theory of Thermal Neutron Scattering (1971).
 */

export { configurationSpaces } from "./configuration-space.js";
export { domainForm, type MatchedWave, matchWave } from "./crystal-forms.js";
export { type ExtinctionRule, extinctionRules, type IrrepExtinctions } from "./extinction-rules.js";
export { type ExtinctionTest, extinctionTest } from "./extinctions.js";
export { type FormFactorRequest, formFactorAt, type MagneticFormFactor, magneticFormFactor } from "./form-factors.js";
export { cartesianMoment, cartesianQ, type ScatteringGeometry, scatteringGeometry, type Triple } from "./geometry.js";
export { type IonState, ionState } from "./ion-states.js";
export {
  formFactorIons,
  type IntegralCoefficients,
  radialIntegral,
  type TabulatedIon,
  tabulatedIon,
} from "./ion-table.js";
export { type DiffractionGeometry, displacementFactor, lorentzFactor } from "./lorentz.js";
export { modeSpace, type ScatteringSite } from "./mode-space.js";
export {
  type ArrangementWave,
  arrangementWith,
  type FourierComponent,
  type MomentArrangement,
  type MomentBasisVector,
  type MomentSpace,
  type ScatteringAtom,
  spaceOfArrangement,
} from "./moment-space.js";
export { type NuclearAtom, type NuclearSquare, nuclearSquares, nuclearStructureFactor } from "./nuclear.js";
export {
  clusterLines,
  integratedIntensity,
  type LineCluster,
  type PatternLine,
  type PatternOptions,
  type SimulatedPattern,
  simulatedPattern,
} from "./pattern.js";
export { type LineForm, type LineSquare, lineForm, lineForms, lineSquares, quadraticForm } from "./powder-lines.js";
export { type LineMembers, lineMembers, rotationNumbers, rowTimesNumbers } from "./satellite-members.js";
export { type ScatteringLength, scatteringLength } from "./scattering-lengths.js";
export { type SpaceExtinctions, spaceExtinctions } from "./space-extinctions.js";
export {
  addChirality,
  addSquares,
  basisFactors,
  chiralityAlong,
  type MagneticStructureFactor,
  magneticLengthPerMagneton,
  magneticStructureFactor,
  type PreparedSpace,
  prepareSpace,
} from "./structure-factors.js";
