/**
 * Every tolerance that decides something: name, value, unit, reason. Whatever can be decided exactly is not here.
 */

/** Å. Atoms closer than this cannot be two; a coordinate this near a special position is taken to be on it. */
export const siteSnapAngstrom = 0.02;

/** Fractional units. The same test where no cell is known: 0.0005 of a 10 Å axis is 0.005 Å, and 0.3333 still means 1/3. */
export const siteSnapFraction = 0.0005;

/** Reciprocal lattice units per component. A measured k this near a simpler kind is put onto it, and it is said. */
export const measuredKSnap = 1e-4;

/** Å⁻¹. Two positions this near are one computed line: far below any instrument, far above rounding. */
export const sameLineInverseAngstrom = 1e-7;

/** Relative. A cell may differ from the metric that the group needs by this much: printed lengths have four digits. */
export const cellMetricRelative = 2e-3;

/** Standard uncertainties. A peak within this of a line is listed as matched. */
export const matchStandardUncertainties = 3;

/** Share of Q. The uncertainty of a position where the file gives none: a usual ΔQ/Q of peak positions read by hand. */
export const defaultRelativeUncertainty = 0.002;

/** Reciprocal lattice units. The uncertainty of h, k, l of a single-crystal satellite where the file gives none. */
export const defaultIndexUncertainty = 0.005;

/** Reciprocal lattice units per component. A measured k that would be special if it were this near is warned about. */
export const measuredKWarning = 1e-3;

/** Å⁻¹. Half-width within which a nuclear line is said to overlap a satellite: half of a usual powder line width. */
export const overlapInverseAngstrom = 0.01;

/** Standard deviations of χ². A list whose χ² lies this far above its degrees of freedom is warned about. */
export const chiSquaredStandardDeviations = 3;

/** Standard uncertainties. A simple fraction this near a measured component of k is offered. */
export const nearFractionStandardUncertainties = 2;

/**
 * Fractional units. A decimal translation of an operator in a CIF this near a multiple of 1/24 is taken for it: half a
 * unit of the second decimal, as in 0.33 and 0.67, and a little for rounding. The multiples lie 0.042 apart.
 */
export const operatorTranslationSnap = 5.5e-3;

/** No unit. A factor between two entries of a tensor this near a fraction or a root of one is printed as that. */
export const tensorFactorSnap = 1e-9;

/** Å. Bonds whose lengths differ by less are one shell: printed cells and coordinates leave no more than that. */
export const sameBondAngstrom = 1e-3;

/** Share of Σ|J| at a site. Two eigenvalues this near are one: rounding leaves some 1e-15. */
export const sameEnergyShare = 1e-11;

/** Reciprocal lattice units per component. A computed minimum this near a simpler k is put there, if the energy agrees. */
export const computedKSnap = 2e-6;

/** Å. An atom of a magnetic structure this near a site of the parent is that atom: distortions are smaller, bonds larger. */
export const sameAtomAngstrom = 0.5;

/** No unit. A structure factor of a configuration below this share of the sizes it adds up is 0: they come to 12 digits. */
export const vanishingShare = 1e-9;

/** Share of the intensity, and of the strongest one, that make its uncertainty where the file gives none: usual counting. */
export const defaultIntensityShare = 0.1;
export const weakIntensityShare = 0.01;

/**
 * Difference of the Bayesian criterion below which two candidates are not told apart: below 6 the evidence is not strong
 * (R. E. Kass & A. E. Raftery, J. Am. Stat. Assoc. 90 (1995) 773).
 */
export const tiedCriterion = 6;

/** Standard uncertainties. An intensity above this must have a line: of hundreds of absent lines none is so high by chance. */
export const clearlySeenUncertainties = 5;

/** Share of the strongest intensity by which two arrangements must differ for a good measurement to tell them apart. */
export const clearDifferenceShare = 0.02;

/** Reciprocal lattice units per component. A measured reflection this near to H ± k is taken for it. */
export const reflectionIndexTolerance = 0.03;

/**
 * Any unit. Sizes, besides 0, that a measured number, its uncertainty or a scale can have: no instrument gives others, and
 * squares of their ratios stay far within what a double holds.
 */
export const smallestMeasured = 1e-30;
export const largestMeasured = 1e30;
