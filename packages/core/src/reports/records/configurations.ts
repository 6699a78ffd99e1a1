import type { CellRecord, GroupRecord, KRecord } from "./common.js";

/** What a property may be: its form in symbols, Cartesian, x ∥ a and z ∥ c* of the parent; zeros where forbidden. */
export interface PropertyRecord {
  readonly form: readonly string[];
  /** Whether the parent group allows some of it already. */
  readonly inParent: boolean;
  /** Whether the order allows more than the parent did. */
  readonly induced: boolean;
}

/** A magnetic space group in the child cell. */
export interface MagneticGroupRecord {
  readonly type: number;
  readonly bns: { readonly number: string; readonly symbol: string };
  readonly og: { readonly number: string };
  readonly pointGroup: string;
  /** (P, p): child axes = parent axes · P. */
  readonly cellFromParent: string;
  /** Null without a cell. */
  readonly cell: CellRecord | null;
  /** From the child axes to those of the BNS reference setting. */
  readonly toBns: string;
  readonly operators: readonly string[];
  readonly centrings: readonly string[];
}

/** One atom of the asymmetric unit of the magnetic group, in the child cell. */
export interface ConfigurationSiteRecord {
  readonly label: string;
  readonly parentSite: string;
  /** Atoms of the child cell. */
  readonly multiplicity: number;
  readonly positionLattice: readonly string[];
  readonly momentLattice: string;
  readonly symmformLattice: string;
  readonly symmformCrystal: string | null;
  readonly exampleLattice: readonly number[];
  /** The same in μB along unit vectors of the child axes, the largest moment that of the free ion; null without a cell. */
  readonly exampleCrystal: readonly number[] | null;
}

/** An atom without a moment, in the child cell. */
export interface OtherAtomRecord {
  readonly label: string;
  readonly parentSite: string;
  readonly multiplicity: number;
  readonly positionLattice: readonly string[];
}

/** A site of the parent structure. */
export interface ParentSiteRecord {
  readonly label: string;
  readonly ion: string | null;
  readonly occupancy: number;
  readonly magnetic: boolean;
  /** μB that the free ion can have (2S, or g_J J of rare earths); null where the ion is not known. */
  readonly largestMoment: number | null;
}

/** An irrep that may come with the order. */
export interface SecondaryIrrepRecord {
  readonly label: string;
  readonly k: KRecord;
  readonly parameters: number;
}

/** One commensurate configuration with its magnetic group, sites and consequences. */
export interface ConfigurationRecord {
  readonly id: string;
  readonly irreps: readonly string[];
  readonly direction: string;
  /** Arms of the ±k pairs, by number in the star. */
  readonly arms: readonly number[];
  readonly index: number;
  readonly domains: { readonly total: number; readonly k: number; readonly orientation: number };
  readonly freeParameters: { readonly irreps: number; readonly group: number };
  readonly freePhases: number;
  readonly secondaryIrreps: readonly SecondaryIrrepRecord[];
  readonly subgroupOf: readonly string[];
  readonly severalIrreps: boolean;
  readonly magneticGroup: MagneticGroupRecord;
  readonly sites: readonly ConfigurationSiteRecord[];
  readonly otherAtoms: readonly OtherAtomRecord[];
  /** Why `sites` is empty, where the atoms of the magnetic cell are too many to write; else null. */
  readonly notWritten: string | null;
  /** Whether moments of one size on each site are possible; null without a cell. */
  readonly constantMoment: "always" | "possible" | "impossible" | null;
  /** Null without a cell. */
  readonly netMoment: PropertyRecord | null;
  readonly polarization: PropertyRecord | null;
  readonly magnetoelectric: PropertyRecord | null;
  readonly piezomagnetic: PropertyRecord | null;
}

/** One atom of a modulated arrangement, in the axes of the parent. */
export interface ModulatedSiteRecord {
  readonly label: string;
  readonly parentSite: string;
  /** Atoms of the primitive cell. */
  readonly multiplicity: number;
  readonly positionLattice: readonly string[];
  readonly meanMoment: string;
  /** `M = C cos 2πx₄ + S sin 2πx₄`, x₄ = k·x, under the listed irreps: letters are free real amplitudes. */
  readonly cosineLattice: string;
  readonly sineLattice: string;
  /** The same under the operators. */
  readonly symmformCosine: string;
  readonly symmformSine: string;
  readonly exampleCosine: readonly number[];
  readonly exampleSine: readonly number[];
  /** μB along unit vectors of the axes, the largest |C| or |S| that of the free ion; null without a cell. */
  readonly exampleCosineCrystal: readonly number[] | null;
  readonly exampleSineCrystal: readonly number[] | null;
}

/** An incommensurate arrangement with the pair ±k. */
export interface ModulatedRecord {
  readonly id: string;
  readonly irreps: readonly string[];
  readonly direction: string;
  readonly arms: readonly number[];
  /** In the grey parent, phase shifts of the wave taken as no change. */
  readonly index: number;
  readonly domains: { readonly total: number; readonly k: number; readonly orientation: number };
  readonly freeParameters: { readonly irreps: number; readonly group: number };
  readonly freePhases: number;
  /** One order parameter would have more symmetry: this needs a second one. */
  readonly needsSecondOrderParameter: boolean;
  readonly secondaryIrreps: readonly SecondaryIrrepRecord[];
  readonly subgroupOf: readonly string[];
  readonly severalIrreps: boolean;
  readonly magneticGroup: {
    /** Of mean properties: the operators in space, with and without time reversal. */
    readonly pointGroup: string;
    readonly superspace: {
      readonly k: KRecord;
      readonly operators: readonly string[];
      readonly centrings: readonly string[];
    };
  };
  readonly sites: readonly ModulatedSiteRecord[];
  readonly netMoment: PropertyRecord | null;
  readonly polarization: PropertyRecord | null;
  readonly magnetoelectric: PropertyRecord | null;
  readonly piezomagnetic: PropertyRecord | null;
}

/** A configuration of a commensurate or of an incommensurate k. */
export type AnyConfiguration = ConfigurationRecord | ModulatedRecord;

/** Result of `kvane configurations`. */
export interface ConfigurationsRecord {
  readonly group: GroupRecord;
  readonly cell: CellRecord | null;
  readonly k: KRecord;
  readonly kind: "commensurate" | "incommensurate";
  /** Which arms may take part: the pair ±k, all, or their numbers. */
  readonly arms: "pair" | "all" | readonly number[];
  /** Arms of the star, which `arms` of a configuration counts. */
  readonly star: readonly KRecord[];
  /** Number of the parent group in any setting, and (P, p) to its standard setting. */
  readonly parentStandard: { readonly number: number; readonly change: string };
  readonly parentSites: readonly ParentSiteRecord[];
  /** Those of a commensurate k have a magnetic space group and a cell, others superspace operators. */
  readonly configurations: readonly AnyConfiguration[];
  /** What was left out because of a limit; empty when the list is complete. */
  readonly bounded: readonly string[];
}

/** The configurations of a commensurate k. */
export function commensurateOnes({ configurations }: ConfigurationsRecord): readonly ConfigurationRecord[] {
  return configurations.filter((one): one is ConfigurationRecord => !("superspace" in one.magneticGroup));
}

/** The configurations of an incommensurate k. */
export function modulatedOnes({ configurations }: ConfigurationsRecord): readonly ModulatedRecord[] {
  return configurations.filter((one): one is ModulatedRecord => "superspace" in one.magneticGroup);
}
