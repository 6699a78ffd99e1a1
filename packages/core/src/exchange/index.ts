/**
 * Which k does an exchange model prefer? Shells of neighbours of the magnetic atoms with the classes that symmetry
 * makes, the matrix J(k) of `E = Σ J S·S` (every bond once, J > 0 antiferromagnetic), its lowest eigenvalue over the
 * whole zone by certified branch and bound, whether spins of fixed length reach that energy, the irreps of the
 * eigenvectors, phase diagrams, and which constants put the minimum at a given k. Phases as in docs/conventions.md,
 * Moments and phases. Sources: J. M. Luttinger & L. Tisza, Phys. Rev. 70 (1946) 954; D. H. Lyons & T. A. Kaplan, Phys.
 * Rev. 120 (1960) 1580; T. A. Kaplan & N. Menyuk, Philos. Mag. 87 (2007) 3711.
 */
export { type ArrangementEnergy, arrangementEnergy } from "./arrangement-energy.js";
export { balancedModel } from "./balanced.js";
export { type ConstantMoments, constantMoments } from "./constant-moments.js";
export type { CosineTerm } from "./cosine-form.js";
export { groundOf } from "./ground.js";
export { type ExchangeLevel, type ExchangeLevels, exchangeLevels, type IrrepCount } from "./irreps-at.js";
export type { MinimiseOptions } from "./minimise.js";
export {
  bondsNamed,
  classesNamed,
  constantName,
  exchangeModel,
  farthestShell,
  type GivenCoupling,
  namedConstants,
  withConstants,
} from "./model.js";
export type { NeededConstant, NeededPotentials } from "./needed-constants.js";
export type { DiagramBoundary } from "./phase-boundaries.js";
export {
  type DiagramAxis,
  type DiagramPhase,
  type DiagramPoint,
  type PhaseDiagram,
  phaseDiagram,
} from "./phase-diagram.js";
export { bondTable, type ShellLimits } from "./shells.js";
export { type StationaryAnswer, type StationaryRelation, stationaryConstants } from "./stationary.js";
export type {
  Bond,
  BondClass,
  BondTable,
  Coupling,
  ExchangeAtom,
  ExchangeCertificate,
  ExchangeModel,
  Ground,
  MinimumSet,
  NamedConstant,
  NeighbourShell,
  OrderingVector,
} from "./types.js";
