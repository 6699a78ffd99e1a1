import type { CellRecord, GroupRecord, KRecord } from "./common.js";

/** One row of the peak list as it was read. */
export interface PeakRecord {
  readonly index: number;
  /** The position as given, in the list's own kind; null for a single-crystal reflection. */
  readonly position: number | null;
  readonly hkl: readonly number[] | null;
  /** Å⁻¹; null in a list of h k l. */
  readonly q: number | null;
  /** Standard uncertainty: Å⁻¹, or reciprocal lattice units for each index of h k l. */
  readonly uncertainty: number;
  readonly intensity: number | null;
}

/** The peak list of a search. */
export interface PeaksRecord {
  /** Null when it did not come from a file. */
  readonly file: string | null;
  readonly kind: "d" | "q" | "two-theta" | "hkl";
  readonly wavelengthAngstrom: number | null;
  readonly uncertaintySource: string;
  readonly list: readonly PeakRecord[];
}

/** A satellite by its H, sign and arm, and observed less computed in Å⁻¹ (a length for h k l). */
export interface LineRecord {
  readonly h: readonly number[];
  readonly sign: 1 | -1 | 0;
  readonly arm: number;
  readonly residual: number;
}

/** What a peak was taken for. */
export interface AssignmentRecord extends LineRecord {
  readonly peak: number;
  /** Computed position, Å⁻¹. */
  readonly q: number;
  /** Observed less computed, index by index; null for a powder. */
  readonly residualHkl: readonly number[] | null;
  /** Other lines within the tolerance, nearest first. */
  readonly alternatives: readonly LineRecord[];
}

/** A fraction within 2 standard uncertainties of a free parameter; `deviation` in standard uncertainties. */
export interface NearFractionRecord {
  readonly letter: string;
  readonly fraction: string;
  readonly deviation: number;
}

/** How the matched peaks scatter about their lines: Å⁻¹, or reciprocal lattice units for h k l. */
export interface ResidualsRecord {
  readonly rootMeanSquare: number;
  readonly largest: number;
  readonly chiSquared: number;
  readonly degreesOfFreedom: number;
  readonly reducedChiSquared: number | null;
}

/** What least squares did with the free parameters of k. */
export interface RefinementRecord {
  readonly from: KRecord;
  /** False when the matched peaks do not fix some parameter: then nothing was moved. */
  readonly determined: boolean;
  readonly converged: boolean;
  /** Uncertainties enlarged by √(χ² per degree of freedom), for an understated list; null when that is not above 1. */
  readonly rescaledSu: readonly number[] | null;
}

/** Natural log-odds against chance, how to read them, and what was charged for having searched. */
export interface EvidenceRecord {
  readonly value: number;
  readonly reading: "found" | "weak" | "not informative";
  readonly charges: { readonly dimensions: number; readonly kinds: number; readonly tuning: number };
}

/** A quantity refined with k: degrees 2θ, or a relative change of the cell lengths. */
export interface CorrectionRecord {
  readonly name: "zeroShift" | "cellScale";
  readonly value: number;
  /** Null where the value stands at its limit. */
  readonly su: number | null;
  readonly limit: number;
}

/** A candidate of a higher kind that is the same find within the resolution. */
export interface MergedRecord {
  readonly k: KRecord;
  readonly dimension: number;
  readonly evidence: number;
  readonly matched: number;
}

/** What would tell another k from this one: the line at `q`, with a relative resolution better than `resolution`. */
export interface SeparationRecord {
  /** Index of the other candidate; null for a simple k nearby that is none. */
  readonly candidate: number | null;
  readonly k: KRecord;
  readonly q: number;
  /** Å⁻¹ to the nearest line of the other. */
  readonly distance: number;
  /** ΔQ/Q; null when no resolution would do. */
  readonly resolution: number | null;
  /** Whether the peaks tell them apart already. */
  readonly toldApart: boolean;
}

/** One k that explains peaks: how many, how well, and what speaks for it. */
export interface CandidateRecord {
  readonly k: KRecord;
  /** The plainest of all k + H, H a reciprocal lattice vector. */
  readonly reduced: KRecord;
  readonly manifold: KRecord;
  readonly dimension: number;
  readonly arms: number;
  /** k = 0: peaks on nuclear lines fit it whether they are magnetic or not. */
  readonly onNuclearLines: boolean;
  readonly evidence: EvidenceRecord;
  readonly matched: number;
  readonly total: number;
  /** Figures of merit of de Wolff (1968) and of Smith & Snyder (1979); null where they do not apply. */
  readonly deWolff: number | null;
  readonly smithSnyder: number | null;
  readonly nearFractions: readonly NearFractionRecord[];
  /** Indices of candidates that these positions cannot tell from this one. */
  readonly tiedWith: readonly number[];
  readonly assignments: readonly AssignmentRecord[];
  /** Peaks, by index, that no satellite of this k explains. */
  readonly unmatched: readonly number[];
  readonly residuals: ResidualsRecord;
  readonly refinement: RefinementRecord | null;
  /** Zero shift and cell scale where they were refined with k. */
  readonly corrections: readonly CorrectionRecord[];
  /** Index of its region; null for a point and for a k that was given. */
  readonly region: number | null;
  readonly merged: readonly MergedRecord[];
  readonly separations: readonly SeparationRecord[];
}

/** A part of a line, plane or the general kind where enough peaks may match; bounds for each letter. */
export interface RegionRecord {
  readonly kind: KRecord;
  readonly from: readonly number[];
  readonly to: readonly number[];
  readonly leaves: number;
  /** False where it could be neither settled nor excluded. */
  readonly decided: boolean;
}

/** What was done with one kind of k. */
export interface KindCertificateRecord {
  readonly kind: KRecord;
  readonly dimension: number;
  readonly boxes: number;
  readonly leaves: number;
  readonly regions: number;
  readonly undecided: number;
  /** Share of the kind's volume. */
  readonly unexplored: number;
  readonly saturated: boolean;
  /** False when only the best solutions by a quick score were weighed. */
  readonly allWeighed: boolean;
}

/** A nuclear line, or its λ/2 image, that a peak lies on; a flag removes nothing. */
export interface FlagRecord {
  readonly peak: number;
  readonly with: "nuclear" | "half wavelength";
  readonly h: readonly number[];
  readonly state: string;
  /** Å⁻¹, line less peak. */
  readonly separation: number;
  /** Intensity of the nuclear line itself where it was given. */
  readonly parentIntensity: number | null;
}

/** k = 0 or a k that only reverses centring translations. */
export interface ReferenceRecord {
  readonly k: KRecord;
  readonly evidence: number;
  readonly matched: number;
  readonly total: number;
}

/** What was searched and how far the answer is complete. */
export interface CertificateRecord {
  readonly minimumMatched: number;
  readonly boxes: number;
  readonly smallestBox: number;
  readonly exhaustive: boolean;
  readonly maxDimension: number;
  readonly zeroShift: number;
  readonly cellScale: number;
  /** Why the search ended early; null when it did not. */
  readonly stopped: string | null;
  readonly kinds: readonly KindCertificateRecord[];
}

/** Several vectors that explain more peaks together than one alone. */
export interface VectorFindRecord {
  readonly stage: "harmonics" | "second vector" | "sums";
  /** The independent ones. */
  readonly vectors: readonly KRecord[];
  readonly members: readonly { readonly name: string; readonly k: KRecord; readonly peaks: readonly number[] }[];
  readonly evidence: EvidenceRecord;
  /** Evidence less that of the best single vector. */
  readonly gain: number;
  readonly matched: number;
  readonly total: number;
  readonly unmatched: readonly number[];
}

/** What was tried with more than one vector, stage by stage. */
export interface SeveralVectorsRecord {
  readonly stages: readonly {
    readonly stage: "harmonics" | "second vector" | "sums";
    readonly tried: number;
    readonly boxes: number;
    readonly exhaustive: boolean;
    readonly minimumMatched: readonly number[];
  }[];
  readonly found: readonly VectorFindRecord[];
  /** The best single vector that was weighed, however many peaks it leaves over. */
  readonly single: ReferenceRecord;
}

/** Result of `kvane index` and `kvane locate`. */
export interface SearchRecord {
  readonly group: GroupRecord;
  readonly cell: CellRecord;
  readonly peaks: PeaksRecord;
  readonly candidates: readonly CandidateRecord[];
  /** Null for `index`, which searches nothing. */
  readonly certificate: CertificateRecord | null;
  readonly setAside: readonly { readonly peak: number; readonly because: string }[];
  /** Peaks that the first candidate does not explain. */
  readonly unmatched: readonly number[];
  readonly regions: readonly RegionRecord[];
  /** Peaks that need not be satellites: on nuclear lines or their λ/2 images. */
  readonly flags: readonly FlagRecord[];
  /** Weighed and shown whatever they explain; empty for `index`. */
  readonly references: readonly ReferenceRecord[];
  /** Harmonics, sums and a second vector; null where one k explains enough, and for `index`. */
  readonly severalVectors: SeveralVectorsRecord | null;
  /** How many k were tried and left out because they match too few peaks. */
  readonly dropped: number;
}
