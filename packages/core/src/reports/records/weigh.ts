import type { CellRecord, GroupRecord, KRecord } from "./common.js";
import type { MeasuredRecord } from "./onset.js";

/** What was measured, and how it was read. */
export interface WeighDataRecord {
  readonly file: string;
  readonly sample: "powder" | "single crystal";
  readonly wavelengthAngstrom: number | null;
  /** Whether the Lorentz factor is in the numbers; else they are |F|². */
  readonly lorentz: boolean;
  /** Intensity per |F|² in 10⁻²⁴ cm² of the primitive cell; null where sizes are relative. */
  readonly scale: number | null;
  /** Å⁻¹. */
  readonly resolution: number;
  /** 2θ of the detectors in degrees; null where the wavelength is fixed or not known. */
  readonly scatteringAngleDeg: number | null;
  /** Overall B in Å². */
  readonly displacement: number;
  /** The list of nuclear lines that fix the scale. */
  readonly nuclearFile: string | null;
  /** Whether the intensities hold nuclear lines at the same places. */
  readonly includesNuclear: boolean;
  /** Fractions of the domains of a crystal. */
  readonly domains: "equal" | "free";
  readonly uncertaintySource: string;
  /** Those that lie on satellites; `calculated` of a candidate has one number for each. */
  readonly list: readonly {
    readonly label: string;
    readonly q: number | null;
    readonly twoThetaDeg: number | null;
    readonly hkl: readonly number[] | null;
    /** The lines of a powder that belong to it: `(1 0 0) + k`, nuclear ones `(1 1 0)`. */
    readonly lines: readonly string[];
    readonly observed: number;
    readonly su: number;
    readonly holds: "satellites" | "nuclear" | "both";
    /** Component along Q of the polarization of the beam. */
    readonly polarization: number | null;
  }[];
}

/** The ion of a magnetic site. */
export interface WeighIonRecord {
  readonly label: string;
  readonly ion: string;
  /** Which form factor was taken and why. */
  readonly formFactor: string;
  /** μB. */
  readonly limit: number | null;
}

/** The fitted moment of one atom of the primitive cell; μB, or relative where no scale is known. */
export interface WeighMomentRecord {
  readonly label: string;
  /** Of the atom in the primitive cell. */
  readonly position: readonly number[];
  /** In the cell at the origin, along unit vectors of the axes; μB, or relative where no scale is known. */
  readonly momentCrystal: readonly number[];
  /** Null where it changes from cell to cell. */
  readonly size: number | null;
  /** Null too where it depends on what the data leave open. */
  readonly sizeSu: number | null;
  /** The largest in any cell. */
  readonly largest: number;
  readonly largestSu: number | null;
  /** Fourier components S for each arm, along unit vectors of the axes, [re, im] each. */
  readonly fourierCrystal: readonly (readonly (readonly [number, number])[])[];
  /** Half axes of the ellipse that the moment of one incommensurate wave runs through. */
  readonly halfAxes: readonly [number, number] | null;
  /** gS or g_J J in μB. */
  readonly limit: number | null;
  readonly aboveLimit: boolean;
}

/** The fitted moment of a site of a configuration: of a commensurate one, or the waves of a modulated one. */
export interface FittedSiteRecord {
  readonly label: string;
  readonly momentCrystal: readonly number[] | null;
  readonly cosineCrystal: readonly number[] | null;
  readonly sineCrystal: readonly number[] | null;
}

/** One configuration with its best fit. */
export interface WeighedRecord {
  readonly id: string;
  /** Shared by those that the data do not tell apart. */
  readonly rank: number;
  readonly irreps: readonly string[];
  readonly direction: string;
  readonly chiSquared: number;
  readonly reducedChiSquared: number | null;
  readonly rFactor: number;
  /** Parameters that the data see. */
  readonly parameters: number;
  readonly criterion: number;
  readonly amplitudes: readonly (MeasuredRecord & { readonly label: string; readonly determined: boolean })[];
  /** Whether the common phase of the wave is free; one was chosen. */
  readonly freePhase: boolean;
  readonly moments: readonly WeighMomentRecord[];
  /** The same moments on the sites of the configuration, along the unit axes of its own cell, as its magnetic CIF has them. */
  readonly sites: readonly FittedSiteRecord[];
  /** What relative sizes are to be multiplied with for the largest moment to reach its limit. */
  readonly factorToLimit: number | null;
  readonly scale: number | null;
  readonly scaleSu: number | null;
  readonly domains: readonly { readonly operator: string; readonly fraction: number; readonly su: number | null }[];
  readonly calculated: readonly number[];
  /** Configurations that the data do not tell from this one. */
  readonly sameAs: readonly string[];
  /** Configurations whose best fits give the very same intensities. */
  readonly identicalTo: readonly string[];
  /** What would tell them apart. */
  readonly separations: readonly {
    readonly from: string;
    /** What `from` is of this one by symmetry. */
    readonly relation: "special case" | "more general" | null;
    readonly by: "powder line" | "single crystal" | "polarised neutrons" | "not by diffraction";
    readonly hkl: readonly number[] | null;
    readonly q: number | null;
    readonly text: string;
  }[];
  /** Arrangements that fit equally well, by their amplitudes. */
  readonly minima: readonly {
    readonly chiSquared: number;
    readonly amplitudes: readonly number[];
    /** Largest moments of the atoms in any cell. */
    readonly largest: readonly number[];
    readonly aboveLimit: boolean;
  }[];
  readonly starts: number;
  readonly hits: number;
}

/** Simulated patterns of satellites, for looking at: equal steps of 2θ from `fromDeg` on. */
export interface WeighPatternRecord {
  readonly wavelengthAngstrom: number;
  /** Full width at half maximum of the Gaussian lines, degrees 2θ. */
  readonly widthDeg: number;
  readonly fromDeg: number;
  readonly stepDeg: number;
  /** Of the first configurations; intensity per degree in the unit of the data. */
  readonly curves: readonly { readonly id: string; readonly intensities: readonly number[] }[];
}

/** Result of `kvane weigh`. */
export interface WeighRecord {
  readonly group: GroupRecord;
  readonly cell: CellRecord;
  readonly k: KRecord;
  readonly ions: readonly WeighIonRecord[];
  readonly data: WeighDataRecord;
  /** Best criterion first. */
  readonly ranking: readonly WeighedRecord[];
  /** Configurations that give nothing, whatever their amplitudes, where a peak is clearly observed. */
  readonly struckOut: readonly {
    readonly id: string;
    readonly irreps: readonly string[];
    readonly peaks: readonly string[];
    /** The first satellite of each. */
    readonly satellites: readonly string[];
  }[];
  readonly pattern: WeighPatternRecord | null;
  /** Intensities that no line belongs to. */
  readonly leftOut: readonly {
    readonly label: string;
    readonly reason: "no line near" | "another datum is nearer";
    readonly nearest: { readonly line: string; readonly q: number } | null;
  }[];
  /** Their share of all observed intensity. */
  readonly leftOutShare: number;
  /** Whether sizes are relative. */
  readonly relative: boolean;
  readonly criterion: string;
  readonly remarks: readonly string[];
  /** Configurations left out because of a limit. */
  readonly bounded: readonly string[];
}
