import type { SmallIrreps } from "../irreps/index.js";
import type { WaveVector } from "../kvectors/index.js";
import type { MagneticGroup } from "../magneticgroups/index.js";
import type { RationalVector } from "../numbers/index.js";
import type { BasisChange, SpaceGroup } from "../spacegroups/index.js";
import type { ArmChoice } from "./arm-selection.js";
import type { CellOperator } from "./child-cell.js";
import type { Consequences } from "./consequences.js";
import type { ConstantMoment } from "./equal-sizes.js";
import type { ModulatedConfiguration } from "./modulated-types.js";

/** Which configurations are asked for: arms of the star, irreps together, irreps on sites, and the limits of the work. */
export interface ConfigurationOptions {
  /** Arms that may take part: the pair ±k (default), all, or those named by their number in the star. */
  readonly arms?: ArmChoice;
  /** Irreps by label whose order parameters are taken at once, set by set; default: every one by itself. */
  readonly together?: readonly (readonly string[])[];
  /** Irreps by label that each site (by label) may carry; a site not named carries all that are taken. */
  readonly onSites?: Readonly<Record<string, readonly string[]>>;
  /** The most elements of the parent modulo the magnetic lattice, and the most directions with all their images. */
  readonly limit?: number;
}

/** What of the options was used, and the sites by label. */
export interface ConfigurationSet {
  readonly group: SpaceGroup;
  readonly k: WaveVector;
  readonly arms: ArmChoice;
  readonly irreps: SmallIrreps;
  readonly kind: "commensurate" | "incommensurate";
  readonly configurations: readonly Configuration[];
  readonly modulated: readonly ModulatedConfiguration[];
  /** What was left out because of the limit; empty when the list is complete. */
  readonly bounded: readonly string[];
  readonly limit: number;
}

/** One arrangement: a direction of the order parameter with its magnetic group. */
export interface Configuration {
  /** `Γ2.1`: the irreps, then the number of the direction. */
  readonly id: string;
  /** The irreps of k whose order parameters it has; a complex irrep together with its conjugate. */
  readonly irreps: readonly string[];
  /** Real components of the order parameter; arms are separated by `;`, several order parameters by `|`. */
  readonly direction: string;
  /** Numbers in the star of the first arms of the ±k pairs that take part. */
  readonly arms: readonly number[];
  /** Of the magnetic group in the grey parent group, translations included. */
  readonly index: number;
  readonly domains: { readonly total: number; readonly k: number; readonly orientation: number };
  /** Real parameters of the moments: under the irreps listed, and under the magnetic group. */
  readonly freeParameters: { readonly irreps: number; readonly group: number };
  /** Phases between copies that symmetry leaves free; 0 for commensurate order. */
  readonly freePhases: number;
  /** Other irreps that the magnetic group allows on these sites, with their k where it is another one. */
  readonly secondaryIrreps: readonly SecondaryIrrep[];
  /** Ids of the minimal supergroups in the list, up to conjugation in the parent. */
  readonly subgroupOf: readonly string[];
  /** Set for several order parameters at once: beyond a transition that one irrep drives. */
  readonly severalIrreps: boolean;
  /** In the axes of the parent. */
  readonly magneticGroup: MagneticGroup;
  readonly cell: ConfigurationCell;
  readonly sites: readonly ConfigurationSite[];
  /** Set where `sites` is left empty because there are too many: `1296 atoms with 432 amplitudes`. */
  readonly notWritten: string | null;
  /** Whether the amplitudes can give moments of one size on each parent site that orders; null without a cell. */
  readonly constantMoment: ConstantMoment | null;
  /** What the magnetic point group allows; null without a cell. */
  readonly consequences: Consequences | null;
}

/** An irrep of another k that may come with the order: how many free parameters the magnetic group allows it. */
export interface SecondaryIrrep {
  readonly label: string;
  readonly k: WaveVector;
  /** Whether k is that of the list. */
  readonly sameK: boolean;
  /** Real parameters that it adds. */
  readonly parameters: number;
}

/** A cell of the magnetic group's own; operators × centrings applied to the sites give every moment. */
export interface ConfigurationCell {
  readonly cellFromParent: BasisChange;
  readonly operators: readonly CellOperator[];
  readonly centrings: readonly CellOperator[];
}

/** One atom of the asymmetric unit of the magnetic group, in the child cell unless the name says otherwise. */
export interface ConfigurationSite {
  /** Label of its own: that of the parent site, with a number where it splits. */
  readonly label: string;
  readonly parentSite: string;
  readonly positionLattice: RationalVector;
  /** Atoms of the child cell that the group makes of it. */
  readonly multiplicity: number;
  /** Moment under the listed irreps: u, v, … are free real amplitudes, common to all sites. */
  readonly momentLattice: string;
  /** Moment under the magnetic group, in mx, my, mz of this atom. */
  readonly symmformLattice: string;
  /** The same for components along unit vectors of the child axes; null without a cell where axes mix. */
  readonly symmformCrystal: string | null;
  /** Moment for one generic choice of the amplitudes. */
  readonly exampleLattice: readonly [number, number, number];
  /** The same in numbers: each amplitude that reaches the atom (from 0, in the order of the letters) and its share. */
  readonly amplitudes: readonly AmplitudeShare[];
}

/** What one free amplitude, at 1, puts on an atom: its number, from 0, and lattice components of the child cell. */
export interface AmplitudeShare {
  readonly amplitude: number;
  readonly momentLattice: readonly [number, number, number];
}
