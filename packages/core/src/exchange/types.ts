import type { WaveVector } from "../kvectors/index.js";
import type { RationalVector } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";

type Integers = readonly [number, number, number];

/** A magnetic atom of the primitive cell. */
export interface ExchangeAtom {
  readonly label: string;
  /** Which of the given orbits, and which atom of it. */
  readonly orbit: number;
  readonly index: number;
  readonly position: RationalVector;
}

/** From atom `from` in the cell at 0 to atom `to` in the cell at T, integers in the primitive basis of L. */
export interface Bond {
  readonly from: number;
  readonly to: number;
  readonly translation: Integers;
}

/** Bonds that the space group makes equal: they have one J. */
export interface BondClass {
  /** `2`, or `2a`, `2b` where symmetry does not relate all bonds of the shell. */
  readonly name: string;
  readonly shell: number;
  /** Å. */
  readonly distance: number;
  /** Labels of the sites at its ends. */
  readonly labels: readonly [string, string];
  /** Each bond of the primitive cell once, in one direction. */
  readonly bonds: readonly Bond[];
  /** For each label the number of neighbours that one atom has through these bonds. */
  readonly neighbours: readonly { readonly label: string; readonly count: number }[];
  /** Its first bond as a vector in the axes of the setting. */
  readonly vector: readonly [number, number, number];
}

/** All bonds of one length. */
export interface NeighbourShell {
  readonly number: number;
  /** Å. */
  readonly distance: number;
  readonly classes: readonly BondClass[];
}

/** The magnetic atoms of a structure with their bonds up to a length. */
export interface BondTable {
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly atoms: readonly ExchangeAtom[];
  readonly shells: readonly NeighbourShell[];
  /** Å. Shells are complete up to here. */
  readonly reach: number;
}

/** A class of bonds with its constant. */
export interface Coupling {
  readonly bonds: BondClass;
  readonly j: number;
  /** What gave it, such as `2` for a whole shell: classes with one name have one constant. */
  readonly constant: string;
}

/** One constant of a model as it was given, with all classes of bonds that it stands for. */
export interface NamedConstant {
  /** `2` for a whole shell, `2b` for one of its classes, `2a=2c` for those between two sites. */
  readonly name: string;
  readonly classes: readonly string[];
  readonly j: number;
}

/** `E = Σ J S·S`, every bond once: J > 0 is antiferromagnetic. */
export interface ExchangeModel {
  readonly table: BondTable;
  readonly couplings: readonly Coupling[];
  /** |S| of every atom. */
  readonly lengths: readonly number[];
  /**
   * Σ ν_i |S_i|²/|S_i|² is added, with Σ ν_i = 0: for spins of full length that is nothing, but it tightens the bound where
   * the atoms are not all equivalent (Lyons and Kaplan).
   */
  readonly potentials: readonly number[];
}

/** What the branch and bound went through. */
export interface ExchangeCertificate {
  readonly boxes: number;
  /** Half-diagonal of the smallest box, Å⁻¹ (without 2π). */
  readonly smallestBox: number;
  /** Whether the whole zone was gone through. */
  readonly exhaustive: boolean;
  /** Boxes that may hold a minimum at the end. */
  readonly leaves: number;
  /** No k of the zone has a lower energy per spin than this: proven up to rounding. */
  readonly lowerBound: number;
  /** Directions of k that no bond notices. */
  readonly freeDirections: number;
  /** Why the work was ended early; null when it was not. */
  readonly stopped: string | null;
}

/** One star of wave vectors at which the lowest eigenvalue is least. */
export interface OrderingVector {
  readonly k: WaveVector;
  /** Arms under the point group extended by −1, counted in ±k pairs. */
  readonly pairs: number;
}

/** The k at which the lowest eigenvalue of J(k) is least. */
export interface MinimumSet {
  /** 0: isolated k; 1 a line or ring, 2 a surface, 3 all k. Free directions count. */
  readonly dimension: 0 | 1 | 2 | 3;
  /** One a star; for a continuous set some of its k, on symmetric lines where it meets them. */
  readonly vectors: readonly OrderingVector[];
  /** Points, lines and planes of symmetry that lie in it as a whole. */
  readonly manifolds: readonly WaveVector[];
  /** Directions of the reciprocal basis that no bond notices, integers in a*, b*, c* of the primitive basis. */
  readonly free: readonly (readonly number[])[];
}

/** The k of lowest energy of an exchange model, with the certificate of the search. */
export interface Ground {
  /** Energy per spin, (1/2N) times the lowest eigenvalue; what the method of Luttinger and Tisza bounds. */
  readonly energy: number;
  readonly set: MinimumSet;
  readonly certificate: ExchangeCertificate;
}
