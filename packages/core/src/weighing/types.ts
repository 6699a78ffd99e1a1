import type { DiffractionGeometry, FourierComponent, MomentSpace, NuclearAtom, Triple } from "../diffraction/index.js";

/** One measured intensity. */
export interface IntensityDatum {
  /** For messages: `(1 0 1/2)`, `peak 3`. */
  readonly label: string;
  /** Position of a powder peak, Å⁻¹; null for a reflection of a crystal. */
  readonly q: number | null;
  /** Q = H ± k of a crystal's reflection in a*, b*, c*; null for a powder. */
  readonly hkl: Triple | null;
  readonly observed: number;
  /** Standard uncertainty. */
  readonly uncertainty: number;
  /**
   * Component along Q of the polarization of the incident beam, −1 to 1, for a crystal; with Q = k_i − k_f. Left out or 0:
   * not polarized.
   */
  readonly polarization?: number;
  /** Left out: satellites alone. Nuclear lines measured with them, or peaks that hold both, fix the scale. */
  readonly holds?: "satellites" | "nuclear" | "both";
}

/** What was measured and how. */
export interface IntensityData {
  readonly sample: "powder" | "single crystal";
  readonly data: readonly IntensityDatum[];
  /** `none` for |F|² (Σ|F|² over the line for a powder). */
  readonly geometry: DiffractionGeometry;
  /** Observed intensity per Σ|F|² × Lorentz factor × displacement factor, |F|² in 10⁻²⁴ cm²; null where not known. */
  readonly scale: number | null;
  /** All atoms of the primitive cell, for the data that hold nuclear lines; they fix the scale where it is not given. */
  readonly nuclear: readonly NuclearAtom[];
  /** Overall B, Å². */
  readonly displacement: number;
  /** Å⁻¹: lines nearer to each other than this are one peak, and a peak lies this near to its lines. */
  readonly resolution: number;
}

export interface WeighOptions {
  /** Most starts of one fit; fewer where the best minimum has come up several times. */
  readonly starts: number;
  readonly seed: number;
  /** Domains of a crystal: equally frequent, or their fractions are fitted. */
  readonly domains: "equal" | "free";
  /** Amplitudes to start from besides the random ones, by id of the candidate: those of an earlier fit or of a known structure. */
  readonly from: Readonly<Record<string, readonly number[]>>;
  /** Å⁻¹: how far measurements that would tell arrangements apart are looked for. */
  readonly qMax: number;
}

export const defaultWeighOptions: WeighOptions = { starts: 24, seed: 1, domains: "equal", from: {}, qMax: 4 };

/** What is to be weighed: an id and the arrangements that it allows. */
export type WeighCandidate = MomentSpace;

/** A fitted parameter. */
export interface FittedAmplitude {
  readonly label: string;
  /** μB, or relative where no scale is known. */
  readonly value: number;
  /** Null where the data do not determine it, and for candidates far from the best where it would take many more fits. */
  readonly uncertainty: number | null;
  /** Whether the data see it at all. */
  readonly determined: boolean;
}

/** One of several minima that fit equally well. */
export interface FittedMinimum {
  readonly chiSquared: number;
  readonly amplitudes: readonly number[];
  /** The largest moment of each atom in any cell. */
  readonly largest: readonly number[];
  /** Whether one of them is above what its ion can have. */
  readonly aboveLimit: boolean;
  /** Standard uncertainties from the derivatives there. */
  readonly uncertainties: readonly number[];
}

/** The moment of one atom of the primitive cell. */
export interface FittedMoment {
  readonly label: string;
  readonly position: Triple;
  /** In the cell T = 0, μB along the unit vectors of the axes; relative where no scale is known. */
  readonly momentCrystal: Triple;
  /** Where it is the same in all cells, else null. */
  readonly size: number | null;
  /** Null where the size is, and where it depends on what the data leave open. */
  readonly sizeUncertainty: number | null;
  /** The largest in any cell. */
  readonly largest: number;
  /** Null where it depends on what the data leave open. */
  readonly largestUncertainty: number | null;
  /** Its Fourier components, one for each wave of the arrangement. */
  readonly components: readonly FourierComponent[];
  /** Half axes of the ellipse that the moment runs through from cell to cell, for one wave with 2k ∉ L*. */
  readonly halfAxes: readonly [number, number] | null;
  /** gS or g_J J; null where the ion does not say. */
  readonly limit: number | null;
  /** `largest` above the limit by more than 3 s.u. */
  readonly aboveLimit: boolean;
}

/** A domain's share of the crystal. */
export interface DomainFraction {
  /** Index of an operator of the group that makes this domain of the first. */
  readonly operator: number;
  /** Operators that make the same domain as far as the data tell. */
  readonly alike: readonly number[];
  readonly fraction: number;
  readonly uncertainty: number | null;
}

/** What measurement would tell two arrangements apart that the data do not. */
export interface WeighSeparation {
  readonly from: string;
  readonly by: "powder line" | "single crystal" | "polarised neutrons" | "not by diffraction";
  /** Q of the vector or line where they differ most, in a*, b*, c*. */
  readonly hkl: Triple | null;
  /** Å⁻¹. */
  readonly q: number | null;
  /** Calculated |F⊥|² (or chiral terms) of both in the unit of the strongest of either. */
  readonly values: readonly [number, number] | null;
  readonly text: string;
}

/** One candidate after its fit. */
export interface WeighedCandidate {
  readonly id: string;
  /** From 1; candidates whose criterions lie less than 6 above that of the first of them share its rank. */
  readonly rank: number;
  readonly chiSquared: number;
  /** χ² / (data − parameters); null without degrees of freedom. */
  readonly reducedChiSquared: number | null;
  /** Σ|obs − calc| / Σ|obs| over all data but nuclear lines alone. */
  readonly rFactor: number;
  /** Parameters that the data see: rank of the derivatives, scale and domain fractions included. */
  readonly parameters: number;
  /** Bayesian information criterion `χ² + parameters · ln(data)` (G. Schwarz, Ann. Statist. 6 (1978) 461). */
  readonly criterion: number;
  readonly amplitudes: readonly FittedAmplitude[];
  /**
   * Whether the common phase of the wave is free: no diffraction sees it, it was chosen so that the first amplitude that is
   * no small one is largest, and uncertainties are those at that phase.
   */
  readonly freePhase: boolean;
  readonly moments: readonly FittedMoment[];
  /** Factor that makes the largest moment reach its limit, where sizes are relative; null where it cannot be said. */
  readonly factorToLimit: number | null;
  /** Fitted scale, or the given one; null where sizes are relative. */
  readonly scale: number | null;
  /** Of a fitted scale. */
  readonly scaleUncertainty: number | null;
  readonly domains: readonly DomainFraction[];
  /** Observed and calculated, one per datum. */
  readonly calculated: readonly number[];
  /** Others that the data cannot tell from this one: criterions less than 6 apart (`tiedCriterion`). */
  readonly sameAs: readonly string[];
  /** Others whose best fits give the very same intensities, for a powder on every line as far as looked for. */
  readonly identicalTo: readonly string[];
  readonly separations: readonly WeighSeparation[];
  /** Covariance of the amplitudes, row by row; along directions that the data do not see it is 0. */
  readonly covariance: readonly (readonly number[])[];
  /**
   * Every minimum that was found within 4 of the lowest χ² and does not differ from another in signs alone, the best first,
   * at most eight: arrangements that fit equally well, some of them the same up to a choice of origin or domain. The best
   * alone where the data leave amplitudes undetermined.
   */
  readonly minima: readonly FittedMinimum[];
  /** Starts that ended in the best minimum, of how many. */
  readonly hits: number;
  readonly starts: number;
}

/** A candidate that cannot give an observed peak. */
export interface StruckCandidate {
  readonly id: string;
  /** Labels of the data that it makes zero whatever its amplitudes are. */
  readonly peaks: readonly string[];
  /** The first satellite of each of them: `(0 0 0)+k`. */
  readonly satellites: readonly string[];
}

/** A datum that no line belongs to. */
export interface LeftOutDatum {
  readonly label: string;
  /** `no line near`, or `another datum is nearer` to the line that it lies on. */
  readonly reason: "no line near" | "another datum is nearer";
  /** The nearest line of its kind with Q in Å⁻¹; null for a crystal. */
  readonly nearest: { readonly line: string; readonly q: number } | null;
}

export interface Weighing {
  readonly ranking: readonly WeighedCandidate[];
  readonly struckOut: readonly StruckCandidate[];
  /** For each datum that was used the lines of a powder that belong to it: `(1 0 0) + k`, nuclear ones `(1 1 0)`. */
  readonly lines: readonly (readonly string[])[];
  /** Data that were left out. */
  readonly leftOut: readonly LeftOutDatum[];
  /** Their share of all observed intensity (absolute values). */
  readonly leftOutShare: number;
  /** Whether sizes are relative. */
  readonly relative: boolean;
  readonly criterion: string;
  /** What a reader must know: that a ranking is no refinement, and more. */
  readonly remarks: readonly string[];
}
