import type { Place, Problem } from "../errors/index.js";
import type { Rational, RationalVector } from "../numbers/index.js";
import type { PeakKind } from "../search/index.js";
import type { Cell, Site } from "../spacegroups/index.js";

/** Place of a value in a study file. */
export interface StudyPlace extends Place {
  /** Whether the text of the value stands in one line just as it was read, so that a column inside it can be added. */
  readonly verbatim: boolean;
}

/** A magnetic form factor of one's own: `constant`, or coefficients A a B b C c D of ⟨j0⟩ and ⟨j2⟩. */
export type StudyFormFactor =
  | { readonly constant: number }
  | { readonly j0: StudyCoefficients; readonly j2?: StudyCoefficients; readonly j2Factor?: number };

export type StudyCoefficients = readonly [number, number, number, number, number, number, number];

/** A site that carries a moment. */
export interface StudySite extends Site {
  /** As written, e.g. `Fe3+`. */
  readonly ion: string | null;
  readonly position: RationalVector;
  /** Spin quantum number, a multiple of 1/2. */
  readonly spin: Rational | null;
  /** Spectroscopic g of a d ion, g_J of an f ion. */
  readonly g: number | null;
  /** In place of that of the ion. */
  readonly formFactor: StudyFormFactor | null;
  /** Share of the site that the ion has; null where it is not said. */
  readonly occupancy: number | null;
}

/** An atom that carries no moment: it goes into written files. */
export interface StudyAtom extends Site {
  readonly ion: string | null;
  readonly occupancy: number | null;
}

/** The list of satellite peaks and how it is to be read; what is null is not said in the study. */
export interface StudyPeaks {
  /** As written, relative to the study. */
  readonly file: string;
  readonly kind: PeakKind | null;
  readonly wavelengthAngstrom: number | null;
  /** Half-width of a match in the unit of the positions. */
  readonly tolerance: number | null;
  /** Unit of the positions, e.g. `nm`. */
  readonly unit: string | null;
  /** A list of nuclear lines measured in the same way, relative to the study. */
  readonly nuclear: string | null;
}

/** Integrated intensities and how they were measured; what is null is not said in the study. */
export interface StudyIntensities {
  /** As written, relative to the study. */
  readonly file: string;
  readonly kind: PeakKind | null;
  readonly wavelengthAngstrom: number | null;
  /** Whether the Lorentz factor is in the numbers: intensities as measured, or |F|². */
  readonly lorentz: boolean | null;
  /** Intensity per |F|² in 10⁻²⁴ cm² of the primitive cell. */
  readonly scale: number | null;
  /** Å⁻¹: lines nearer to each other are one peak. */
  readonly resolution: number | null;
  /** A list of nuclear lines in the same scale, relative to the study. */
  readonly nuclear: string | null;
  /** Whether the intensities hold the nuclear lines at the same places too. */
  readonly includesNuclear: boolean | null;
  /** Overall B in Å². */
  readonly displacement: number | null;
  /** 2θ in degrees of the detectors of a time-of-flight measurement. */
  readonly scatteringAngleDeg: number | null;
  /** Fractions of the domains of a crystal: equal, or fitted. */
  readonly domains: "equal" | "free" | null;
  /** Full width at half maximum in degrees 2θ of a simulated pattern. */
  readonly patternWidthDeg: number | null;
}

/** Wishes for the search; what is null is not said in the study. */
export interface StudySearch {
  readonly unmatched: number | null;
  readonly maxDimension: 0 | 1 | 2 | 3 | null;
  /** Half-width of a match in Å⁻¹. */
  readonly tolerance: number | null;
  /** Degrees 2θ. */
  readonly zeroShift: number | null;
  /** Relative. */
  readonly cellScale: number | null;
  /** Å⁻¹. */
  readonly qMax: number | null;
  /** Whether weak peaks are taken as likelier strays than strong ones. */
  readonly weighIntensities: boolean | null;
}

/** Another phase in the sample. */
export interface StudyImpurity {
  readonly name: string;
  /** GROUP as on the command line. */
  readonly group: string;
  readonly cell: Cell;
}

/** One exchange constant. */
export interface StudyCoupling {
  /** `2` for a whole shell, counted from 1, `2b` for one of its kinds of bonds. */
  readonly bond: string;
  /** Only bonds between sites of these labels; null for all. */
  readonly between: readonly [string, string] | null;
  /** Null where the constant only runs: outside a diagram it has the first value of its range. */
  readonly j: number | null;
  /** The range of a phase diagram; null where the constant stays. */
  readonly vary: StudyRange | null;
}

/** Values through which a constant runs. */
export interface StudyRange {
  readonly from: number;
  readonly to: number;
  /** How many values; null where it is not said. */
  readonly count: number | null;
}

/** A study file as a record: values where they are given, null for sections that are left out. */
export interface Study {
  readonly file: string;
  readonly title: string | null;
  /** File name of a CIF with cell, group and sites, relative to the study. */
  readonly structure: string | null;
  /** Which data block of that CIF. */
  readonly structureBlock: string | null;
  /** GROUP as on the command line. */
  readonly group: string | null;
  readonly cell: Cell | null;
  readonly sites: readonly StudySite[];
  readonly atoms: readonly StudyAtom[];
  /** Each wave vector as text for `parseWaveVector`; null when it is to be searched. */
  readonly k: readonly string[] | null;
  readonly peaks: StudyPeaks | null;
  readonly search: StudySearch;
  readonly intensities: StudyIntensities | null;
  /** Exchange constants of shells of neighbours or of single kinds of bonds. */
  readonly exchange: readonly StudyCoupling[] | null;
  /** A temperature scan, relative to the study. */
  readonly onset: { readonly file: string } | null;
  /** Ranges of positions, in the unit of the peaks, that are not to be used. */
  readonly exclude: readonly (readonly [number, number])[] | null;
  /** Other phases, whose lines are no satellites. */
  readonly impurities: readonly StudyImpurity[];
  /** Where each value stands, by its path: `cell.alpha`, `sites[0].at[2]`, `k[1]`. */
  readonly places: Readonly<Record<string, StudyPlace>>;
  /** Sections that this version reads but does not use. */
  readonly warnings: readonly Problem[];
}
