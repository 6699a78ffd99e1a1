import type { CellRecord, GroupRecord, KRecord } from "./common.js";

/** A magnetic atom of the primitive cell. */
export interface ExchangeAtomRecord {
  readonly label: string;
  readonly position: readonly string[];
  /** |S| in the energy. */
  readonly length: number;
  /** Added to the energy of the atom to tighten the bound; the sum over the atoms is 0. */
  readonly potential: number;
}

/** Bonds that the space group makes equal. */
export interface BondClassRecord {
  /** `2`, or `2b` where symmetry does not relate all bonds of the shell. */
  readonly name: string;
  readonly labels: readonly string[];
  /** Bonds of a primitive cell. */
  readonly bonds: number;
  /** Neighbours that one atom of a label has through them. */
  readonly neighbours: readonly { readonly label: string; readonly count: number }[];
  /** One of them, in the axes of the setting. */
  readonly vector: readonly number[];
  /** Its constant; null where none is given. */
  readonly j: number | null;
}

/** A shell of neighbours: distance, bonds, kinds that symmetry tells apart. */
export interface ShellRecord {
  readonly number: number;
  /** Å. */
  readonly distance: number;
  readonly classes: readonly BondClassRecord[];
}

/** What proves that no k lies lower. */
export interface ExchangeCertificateRecord {
  readonly boxes: number;
  /** Half-diagonal, Å⁻¹ (without 2π). */
  readonly smallestBox: number;
  readonly leaves: number;
  readonly exhaustive: boolean;
  /** No k has less energy per spin. */
  readonly lowerBound: number;
  readonly stopped: string | null;
}

/** The k of lowest energy. */
export interface GroundRecord {
  /** Per spin, in the unit of the constants. */
  readonly energy: number;
  /** 0 for isolated k, 1 for lines and rings, 2 for surfaces, 3 for all k. */
  readonly dimension: number;
  readonly vectors: readonly { readonly k: KRecord; readonly pairs: number }[];
  /** Lines and planes of symmetry that lie in the set as a whole. */
  readonly manifolds: readonly KRecord[];
  /** Number of directions of k that no bond notices. */
  readonly freeDirections: number;
  readonly certificate: ExchangeCertificateRecord;
  readonly constantMoments: {
    readonly answer: "reached" | "only a bound" | "not found";
    readonly k: readonly KRecord[];
    readonly spins: "collinear" | "coplanar" | "non-coplanar" | null;
    readonly short: readonly string[];
  };
}

/** How often an irrep occurs. */
export interface IrrepCountRecord {
  readonly label: string;
  readonly dimension: number;
  readonly multiplicity: number;
}

/** An eigenvalue of J(k) and the irreps of its eigenvectors. */
export interface ExchangeLevelRecord {
  readonly energy: number;
  readonly degeneracy: number;
  readonly irreps: readonly IrrepCountRecord[];
  readonly magneticIrreps: readonly IrrepCountRecord[];
  /** By atom. */
  readonly weights: readonly number[];
  /** By atom, in turns; null where several vectors share the energy. */
  readonly phases: readonly (number | null)[] | null;
}

/** The energies that one k allows. */
export interface ExchangeAtKRecord {
  readonly k: KRecord;
  readonly from: "minimum" | "given";
  /** Lowest energy here less that of the ground. */
  readonly above: number;
  readonly levels: readonly ExchangeLevelRecord[];
}

/** Energy of one arrangement. */
export interface ConfigurationEnergyRecord {
  readonly id: string;
  readonly k: KRecord;
  readonly irreps: readonly string[];
  readonly direction: string;
  /** Free amplitudes of its moments. */
  readonly amplitudes: number;
  /** Per spin, moments taken as unit vectors on average over the atoms; the range that the amplitudes span. */
  readonly lowest: number;
  readonly highest: number;
}

/** The relation between constants that a measured k asks for. */
export interface StationaryRecord {
  readonly k: KRecord;
  /** The constants as they were given; the lists below are in their order. */
  readonly constants: readonly { readonly name: string; readonly classes: readonly string[]; readonly j: number }[];
  readonly relations: readonly {
    readonly letter: string;
    readonly slopes: readonly number[];
    readonly curvatures: readonly number[];
    /** `J1 + 4 cos(2πu) J2 = 0`; null where there is no such form. */
    readonly text: string | null;
  }[];
  readonly fixedBySymmetry: boolean;
  readonly slopes: readonly number[];
  readonly needed: readonly {
    readonly name: string;
    readonly classes: readonly string[];
    readonly j: number | null;
    readonly along: "minimum" | "maximum" | "level";
    readonly lowest: boolean | null;
    readonly oneOfMany: boolean;
  }[];
  /** Site potentials with which the needed constants were worked out. */
  readonly potentials: "none" | "balanced anew" | "those of the model";
}

/** A phase diagram along one or two constants. */
export interface DiagramRecord {
  /** Directions of k that no bond notices, whatever the constants. */
  readonly freeDirections: number;
  readonly axes: readonly {
    readonly name: string;
    readonly classes: readonly string[];
    readonly from: number;
    readonly to: number;
    readonly count: number;
  }[];
  readonly phases: readonly { readonly forms: readonly string[]; readonly dimension: number }[];
  readonly points: readonly {
    readonly values: readonly number[];
    readonly energy: number;
    readonly phase: number;
    readonly k: readonly KRecord[];
  }[];
  readonly boundaries:
    | readonly { readonly value: number; readonly from: number; readonly to: number; readonly sudden: boolean }[]
    | null;
}

/** Result of `kvane exchange`. */
export interface ExchangeRecord {
  readonly group: GroupRecord;
  readonly cell: CellRecord;
  readonly energy: "sum over bonds of J S·S, every bond once; J > 0 is antiferromagnetic";
  readonly atoms: readonly ExchangeAtomRecord[];
  readonly shells: readonly ShellRecord[];
  /** Null while no constants are given. */
  readonly ground: GroundRecord | null;
  readonly atK: readonly ExchangeAtKRecord[];
  readonly configurations: readonly ConfigurationEnergyRecord[];
  readonly stationary: StationaryRecord | null;
  readonly diagram: DiagramRecord | null;
}
