import type { Cell } from "../../spacegroups/index.js";

/** Everything that a magnetic CIF of one arrangement says; symmetry as texts of the standard, numbers as they are. */
export interface MagneticCif {
  /** Code of the data block. */
  readonly block: string;
  /** Lines of remarks at the head of the file. */
  readonly remarks: readonly string[];
  readonly cell: Cell;
  readonly parent: {
    readonly symbol: string | null;
    readonly number: number | null;
    /** (P, p) from the parent as used to its standard setting; null where that is not known. */
    readonly toStandard: string | null;
    /** (P, p) from the parent as used to the axes of this file. */
    readonly toChild: string;
  };
  /** Wave vectors in the reciprocal lattice of the parent. */
  readonly waveVectors: readonly { readonly id: string; readonly components: readonly number[] }[];
  readonly symmetry: CommensurateSymmetry | ModulatedSymmetry;
  readonly atoms: readonly MagneticCifAtom[];
}

/** The magnetic space group of a commensurate structure as its file has it. */
export interface CommensurateSymmetry {
  readonly kind: "commensurate";
  readonly bns: { readonly number: string; readonly symbol: string };
  readonly og: { readonly number: string };
  readonly pointGroup: string;
  /** From the axes of this file to the BNS setting. */
  readonly toBns: string;
  /** `x,y,z,+1`. */
  readonly operators: readonly string[];
  readonly centrings: readonly string[];
}

/** The magnetic superspace group of a modulated structure as its file has it. */
export interface ModulatedSymmetry {
  readonly kind: "modulated";
  readonly pointGroup: string | null;
  /** The modulation vector in the reciprocal lattice of the cell of this file. */
  readonly waveVector: readonly number[];
  /** `x1,x2,x3,x4,+1`. */
  readonly operators: readonly string[];
  readonly centrings: readonly string[];
}

/** An atom of a magnetic CIF: fractional coordinates of the file's axes; a moment or null. */
export interface MagneticCifAtom {
  readonly label: string;
  /** Element symbol, with the charge where it is known: `Fe3+`. */
  readonly type: string;
  readonly position: readonly number[];
  readonly occupancy: number | null;
  /** Null for an atom without a moment. */
  readonly moment: MagneticCifMoment | null;
}

/** The moment of an atom in μB along the unit vectors of the axes, and the waves of a modulated one. */
export interface MagneticCifMoment {
  /** μB along the unit vectors of the cell's axes: the moment, or the mean moment of a modulated one. */
  readonly crystal: readonly number[];
  /** `mx,my,mz` form; null where it is not known. */
  readonly symmform: string | null;
  /** Cosine and sine amplitudes along the three axes of a modulated moment. */
  readonly waves: readonly MomentWave[];
}

/** `C cos(2π n·X) + S sin(2π n·X)` with the position of the atom inside the phase. */
export interface MomentWave {
  /** Order of the harmonic. */
  readonly order: number;
  readonly cosine: readonly number[];
  readonly sine: readonly number[];
  readonly cosineForms: readonly string[] | null;
  readonly sineForms: readonly string[] | null;
}
