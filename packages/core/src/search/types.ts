import type { Problem } from "../errors/index.js";
import type { Manifold, WaveVector } from "../kvectors/index.js";
import type { Rational } from "../numbers/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../spacegroups/index.js";

/** What the positions of a peak list are. */
export type PeakKind = "d" | "q" | "two-theta" | "hkl";

/** One observed peak. */
export interface Peak {
  /** Place in the list, from 0; results refer to a peak by it. */
  readonly index: number;
  /** Å⁻¹; null in a list of fractional h k l. */
  readonly q: number | null;
  /** Standard uncertainty of `q` in Å⁻¹, above 0; null in a list of fractional h k l. */
  readonly uncertainty: number | null;
  /** Three fractional indices in a*, b*, c* of the setting; null in a powder list. */
  readonly hkl: readonly number[] | null;
  /** Standard uncertainty of each of the three indices, above 0; null in a powder list. */
  readonly hklUncertainty: number | null;
  readonly intensity: number | null;
  readonly intensityUncertainty: number | null;
  /** The position as the list gives it, in the unit of its kind; null in a list of fractional h k l. */
  readonly position: number | null;
  /** Line of the source file, from 1. */
  readonly line: number;
}

/** Peaks as they were read, and how. */
export interface PeakList {
  readonly kind: PeakKind;
  readonly wavelengthAngstrom: number | null;
  readonly peaks: readonly Peak[];
  /** Where the standard uncertainties come from, in words for the reader. */
  readonly uncertaintySource: string;
}

/** What may be asked of `indexPeaks` and `locate`; `defaultSearchOptions` has the defaults. */
export interface SearchOptions {
  /**
   * Half-width of a match in Å⁻¹ (r.l.u. for each index of a list of fractional h k l); null for 3 standard
   * uncertainties of each peak. It decides which peaks are listed as matched, not the evidence.
   */
  readonly tolerance: number | null;
  /** How many peaks a candidate may leave unmatched. */
  readonly unmatched: number;
  /** Largest dimension of the kinds of k to search; see `Certificate.maxDimension` for what was searched. */
  readonly maxDimension: 0 | 1 | 2 | 3;
  /** Peaks above this Q in Å⁻¹ are set aside; null for no limit. */
  readonly qMax: number | null;
  /** Largest zero shift in degrees 2θ, up or down, to refine with k; needs a wavelength. */
  readonly zeroShift: number;
  /** Largest relative change of all cell lengths, up or down, to refine with k. */
  readonly cellScale: number;
  /** Ranges of positions, in the unit of the list, whose peaks are set aside. Default none; not for h k l. */
  readonly exclude?: readonly (readonly [number, number])[];
  /** Other phases in the sample: peaks on their allowed nuclear lines are set aside. Default none; not for h k l. */
  readonly impurities?: readonly ImpurityPhase[];
  /** Atoms of the structure: tells which nuclear lines their positions forbid. Default none. */
  readonly sites?: readonly SiteOrbit[];
  /** Boxes after which the search over lines, planes and general k is stopped; default `defaultMostBoxes`. */
  readonly mostBoxes?: number;
  /** Return also the candidates that match fewer peaks than asked. Default false. */
  readonly belowMinimum?: boolean;
  /** Take strong peaks as less likely to be strays (`strayShares`). Default false: positions alone speak. */
  readonly weighByIntensity?: boolean;
  /** Nuclear lines measured in the same way: the parent of a λ/2 image gets its intensity from there. Default none. */
  readonly nuclear?: PeakList;
  /** Look for harmonics, sums and a second vector where no k explains enough. Default true. */
  readonly severalVectors?: boolean;
}

/** Another phase in the sample: peaks on its lines are set aside. */
export interface ImpurityPhase {
  readonly name: string;
  readonly group: SpaceGroup;
  readonly cell: Cell;
}

/** Why a nuclear line should be seen or not. */
export type NuclearState = "allowed" | "forbidden by a glide plane or screw axis" | "forbidden by the sites";

/** A peak that need not be a satellite. It is never removed for that. */
export interface PeakFlag {
  readonly peak: number;
  /** It lies on a nuclear line of the cell, or on the image of one through neutrons of half the wavelength. */
  readonly with: "nuclear" | "half wavelength";
  /** The nuclear line in a*, b*, c*. */
  readonly h: readonly [number, number, number];
  readonly state: NuclearState;
  /** Position of the line less that of the peak, Å⁻¹. */
  readonly separation: number;
  /** Intensity of the nuclear line itself where a list of them was given and has it; null otherwise. */
  readonly parentIntensity: number | null;
}

/** One way of writing a peak as H ± k. */
export interface IndexedLine {
  /** H in a*, b*, c*; integers wherever all integer vectors belong to the lattice L. */
  readonly h: readonly [number, number, number];
  /** Peak = H + k, H − k, or (0, for 2k ∈ L*) H + k where + and − are the same set. */
  readonly sign: 1 | -1 | 0;
  /** Arm of the star that k stands for; always 0 for a powder, where all arms give the same lines. */
  readonly arm: number;
  /** Observed minus calculated: of Q in Å⁻¹; of a list of h k l the length of the difference in Å⁻¹. */
  readonly residual: number;
}

export interface Assignment extends IndexedLine {
  readonly peak: number;
  /** Calculated position: Q in Å⁻¹. */
  readonly q: number;
  /** Observed minus calculated index by index; null for a powder. */
  readonly residualHkl: readonly [number, number, number] | null;
  /** Other lines within the tolerance, nearest first. */
  readonly alternatives: readonly IndexedLine[];
}

/** What was subtracted from the summed log-odds for having searched; natural logarithms, none below 0. */
export interface EvidenceCharges {
  /** ln(number of searched dimensions that have a kind). */
  readonly dimensions: number;
  /** ln(number of kinds of this dimension); 0 where k was given and is no special point. */
  readonly kinds: number;
  /** −ln V for the tuned parameters; 0 for a point. */
  readonly tuning: number;
}

/** How evidence reads: above 3 `found`, above 0 `weak`, else `not informative` (docs/search.md). */
export type EvidenceReading = "found" | "weak" | "not informative";

/** Log-odds of the peaks being lines of this k against being chance: above 3 found, 0 to 3 weak, below 0 no news. */
export interface Evidence {
  readonly value: number;
  readonly reading: EvidenceReading;
  readonly charges: EvidenceCharges;
}

/** How the matched peaks scatter about their lines. Å⁻¹; r.l.u. for a list of fractional h k l. */
export interface ResidualStatistics {
  readonly rootMeanSquare: number;
  readonly largest: number;
  /** Σ (residual / s.u.)² over the matched peaks. */
  readonly chiSquared: number;
  /** Matched observations minus refined parameters. */
  readonly degreesOfFreedom: number;
  /** χ² per degree of freedom; null when none is left. */
  readonly reducedChiSquared: number | null;
}

/** The free parameters of k after least squares against the matched peaks. */
export interface Refinement {
  /** The k that the refinement started from. */
  readonly from: WaveVector;
  /** False when some parameter is not fixed by the matched peaks: then nothing was moved. */
  readonly determined: boolean;
  readonly converged: boolean;
  /** Rounds of assigning and refining until the assignment stayed the same. */
  readonly rounds: number;
  /** Uncertainties of the values times √(χ² per degree of freedom), for an understated list; null when not above 1. */
  readonly rescaledUncertainties: readonly number[] | null;
}

/** A quantity refined with k between limits. */
export interface Correction {
  readonly name: "zeroShift" | "cellScale";
  /** Degrees 2θ that the positions are too high by; or the relative change of the cell lengths. */
  readonly value: number;
  /** Null where the value stands at its limit. */
  readonly uncertainty: number | null;
  readonly limit: number;
}

/** A part of a kind of k that branch and bound could not exclude. */
export interface Region {
  /** The kind, with open letters. */
  readonly kind: WaveVector;
  /** Bounds of each letter. */
  readonly from: readonly number[];
  readonly to: readonly number[];
  /** Boxes that it is made of. */
  readonly leaves: number;
  /** Whether a k that matches enough peaks was found in it; if not, it could be neither settled nor excluded. */
  readonly decided: boolean;
}

/** A candidate of a higher kind that lies beside the one it is listed under: the same find within the resolution. */
export interface MergedCandidate {
  readonly k: WaveVector;
  readonly dimension: 0 | 1 | 2 | 3;
  readonly evidence: Evidence;
  readonly matched: number;
}

/** Where another k could be told from this one. */
export interface Separation {
  /** The other k: a candidate of the same result by index, or null for a special k that is none. */
  readonly candidate: number | null;
  readonly k: WaveVector;
  /** Satellite of this k (Å⁻¹) furthest from every line of the other, in units of its Q. */
  readonly q: number;
  /** Distance in Å⁻¹ to the nearest line of the other. */
  readonly distance: number;
  /** Relative resolution ΔQ/Q needed there; null when all lines agree whatever the resolution. */
  readonly resolution: number | null;
  /** Whether these peaks tell the two apart already: ln of their likelihoods differs by more than 3. */
  readonly toldApart: boolean;
}

/** A simple fraction within 2 standard uncertainties of a free parameter. */
export interface NearFraction {
  readonly parameter: "u" | "v" | "w";
  readonly fraction: Rational;
  /** (value − fraction) / s.u. */
  readonly deviation: number;
}

/** A k with what it explains. */
export interface Candidate {
  /** Refined, with uncertainties, where it has values and the peaks fix them. */
  readonly k: WaveVector;
  /** The kind of k under the point group extended by −1. */
  readonly manifold: Manifold;
  /** Arms of the star under the point group. */
  readonly arms: number;
  /** k = 0: the lines are the nuclear ones, so that peaks which the list should not hold fit it as well. */
  readonly onNuclearLines: boolean;
  readonly evidence: Evidence;
  readonly matched: number;
  readonly total: number;
  /** M_N of de Wolff over the N matched peaks; null for h k l or when the residuals are below any measurement. */
  readonly deWolff: number | null;
  /** F_N of Smith and Snyder in 1/°; null also without a wavelength. */
  readonly smithSnyder: number | null;
  readonly nearFractions: readonly NearFraction[];
  /** Indices of the candidates of the same result that predict the same positions within the tolerance. */
  readonly tiedWith: readonly number[];
  readonly assignments: readonly Assignment[];
  /** Peaks (by index) that no line of this k explains. */
  readonly unmatched: readonly number[];
  readonly residuals: ResidualStatistics;
  readonly refinement: Refinement | null;
  /** Zero shift and cell scale at this k, as far as they were set free. */
  readonly corrections: readonly Correction[];
  /** The region of the search that it stands for, by index; null for points and for a k that was given. */
  readonly region: number | null;
  /** Candidates of higher kinds beside it that are the same find within the resolution. */
  readonly merged: readonly MergedCandidate[];
  /** For every tied candidate, and for simpler k nearby, what would tell them apart. */
  readonly separations: readonly Separation[];
  readonly warnings: readonly Problem[];
}

/**
 * k = 0 or a k that only reverses centring translations: its lines are nuclear positions, allowed or forbidden ones, so
 * it is weighed and shown whatever it explains.
 */
export interface ReferenceVector {
  readonly k: WaveVector;
  readonly evidence: Evidence;
  readonly matched: number;
  readonly total: number;
}

/** What the search has gone through, so that a reader knows what its silence means. */
export interface Certificate {
  /** Every k of the searched kinds that matches at least this many peaks is among the candidates. */
  readonly minimumMatched: number;
  /** Regions of k that were tested; for points, how many points. */
  readonly boxes: number;
  /** Half-width in Å⁻¹ of the smallest region; 0 for points. */
  readonly smallestBox: number;
  /** Whether the search of the kinds up to `maxDimension` went to its end. */
  readonly exhaustive: boolean;
  /** Largest dimension of the kinds that were searched, which may be less than was asked for. */
  readonly maxDimension: 0 | 1 | 2 | 3;
  readonly zeroShift: number;
  readonly cellScale: number;
  /** Why the search ended before its end; null when it did not. */
  readonly stopped: string | null;
  /** What was done kind by kind. */
  readonly kinds: readonly KindCertificate[];
}

/** What the search did with one kind of k. */
export interface KindCertificate {
  readonly kind: WaveVector;
  readonly dimension: 0 | 1 | 2 | 3;
  readonly boxes: number;
  /** Boxes that hold or may hold a solution. */
  readonly leaves: number;
  readonly regions: number;
  /** Regions that could be neither settled nor excluded. */
  readonly undecided: number;
  /** Share of the kind's volume that was not looked at. */
  readonly unexplored: number;
  /** The peaks hardly restrict k here: solutions are so many that their list says nothing. */
  readonly saturated: boolean;
  /** Whether every distinct solution was weighed; if not, only the best by a quick score. */
  readonly allWeighed: boolean;
}

/** One of several vectors that explain the peaks together. */
export interface VectorMember {
  readonly name: "k1" | "k2" | "2 k1" | "3 k1" | "k1 + k2" | "k1 − k2";
  readonly k: WaveVector;
  /** Peaks (by index) on its lines; one may be on lines of several. */
  readonly peaks: readonly number[];
}

/** Several vectors that explain more than one alone. */
export interface VectorFind {
  readonly stage: "harmonics" | "second vector" | "sums";
  /** The independent ones, refined. */
  readonly vectors: readonly WaveVector[];
  readonly members: readonly VectorMember[];
  /** Of all members together, on the scale of a single vector's. */
  readonly evidence: Evidence;
  /** The evidence less that of the best single vector. */
  readonly gain: number;
  readonly matched: number;
  readonly total: number;
  readonly unmatched: readonly number[];
}

/** One stage of the search for more than one vector. */
export interface VectorStage {
  readonly stage: VectorFind["stage"];
  /** Combinations that were weighed. */
  readonly tried: number;
  /** Most of the certificates of the searches that it took: boxes in all, and whether each went to its end. */
  readonly boxes: number;
  readonly exhaustive: boolean;
  /** Peaks that a vector had to match in each of its searches; empty where none was needed. */
  readonly minimumMatched: readonly number[];
}

/** What was tried with more than one vector. */
export interface SeveralVectors {
  readonly stages: readonly VectorStage[];
  /** Those that gain on the best single vector, best evidence first. */
  readonly found: readonly VectorFind[];
  /** The best single vector of all that were weighed, however many peaks it leaves over. */
  readonly single: ReferenceVector;
}

/** A peak that was not used. */
export interface SetAside {
  readonly peak: number;
  readonly because: string;
}

/** All that a search for k gives: candidates, certificate, flags and what could not be told apart. */
export interface SearchResult {
  /** By falling evidence. */
  readonly candidates: readonly Candidate[];
  readonly certificate: Certificate;
  readonly setAside: readonly SetAside[];
  /** Peaks (by index) that the first candidate does not explain; all used peaks when there is no candidate. */
  readonly unmatched: readonly number[];
  /** Every part of the searched kinds where enough peaks may match. */
  readonly regions: readonly Region[];
  /** Peaks that need not be satellites; empty for h k l. */
  readonly flags: readonly PeakFlag[];
  /** k = 0 and the k that reverse centring translations, found or not. */
  readonly references: readonly ReferenceVector[];
  /** How many k were tried and left out because they match too few peaks. */
  readonly dropped: number;
  /** Harmonics, sums and a second vector; null where one k explains enough or they were not asked for. */
  readonly severalVectors: SeveralVectors | null;
  readonly warnings: readonly Problem[];
}
