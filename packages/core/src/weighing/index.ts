/**
 * Which arrangements fit the measured intensities? The real amplitudes of each candidate enter intensities as quadratic forms;
 * they are fitted by bounded least squares from seeded starts, in μB where a nuclear scale is known, with the fractions of
 * domains of a crystal as further parameters. Candidates are ranked by the Bayesian information criterion; those that the data do not
 * tell apart are named with the measurement that would. Moments along the unit vectors of the axes (docs/conventions.md, Components
 * and units). Sources: G. Schwarz, Ann. Statist. 6 (1978) 461; R. E. Kass & A. E. Raftery, J. Am. Stat. Assoc. 90 (1995)
 * 773; J. Nocedal & S. J. Wright, Numerical Optimization (2006).
 */
export {
  type DomainFraction,
  defaultWeighOptions,
  type FittedAmplitude,
  type FittedMinimum,
  type FittedMoment,
  type IntensityData,
  type IntensityDatum,
  type LeftOutDatum,
  type StruckCandidate,
  type WeighCandidate,
  type WeighedCandidate,
  type Weighing,
  type WeighOptions,
  type WeighSeparation,
} from "./types.js";
export { weigh } from "./weigh.js";
