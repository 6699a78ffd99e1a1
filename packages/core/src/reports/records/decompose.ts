import type { CellRecord, ComplexRecord, GroupRecord, KRecord } from "./common.js";

/** The part of the moments that one irrep of one star has. */
export interface IrrepPartRecord {
  readonly k: KRecord;
  readonly label: string;
  /** Share of Σ |S|² over all atoms and wave vectors. */
  readonly share: number;
  /** Amplitudes of the basis vectors that `modes` prints for this k, μB/Å in lattice components. */
  readonly arms: readonly {
    readonly k: KRecord;
    readonly sites: readonly { readonly label: string; readonly amplitudes: readonly ComplexRecord[] }[];
  }[];
}

/** Result of `kvane decompose`. */
export interface DecomposeRecord {
  readonly file: string;
  /** Null for a list of moments. */
  readonly block: string | null;
  readonly group: GroupRecord;
  readonly cell: CellRecord;
  /** (P, p) from the parent to the axes of the file. */
  readonly childFromParent: string;
  /** Å. How far the atom furthest off its parent site stands from it. */
  readonly furthest: number;
  /** Site by site the largest moment in μB against what the free ion can have; null where the ion is not known. */
  readonly moments: readonly {
    readonly site: string;
    readonly ion: string | null;
    readonly largest: number;
    readonly limit: number | null;
    readonly verdict: "beyond the ion" | "usual" | "low" | null;
  }[];
  readonly parts: readonly IrrepPartRecord[];
  readonly magneticGroup: {
    readonly type: number;
    readonly bns: { readonly number: string; readonly symbol: string };
    readonly og: { readonly number: string };
    readonly pointGroup: string;
    /** From the parent's axes to those of the BNS setting. */
    readonly toBns: string;
  };
  /** What the file calls its group, and what its operators are; null where it names none. */
  readonly declared: { readonly bns: string | null; readonly operators: string };
  /** `arms` of the star of k, from 1, as in `configurations --arms`. */
  readonly primary: { readonly k: KRecord; readonly irreps: readonly string[]; readonly arms: readonly number[] };
  /** The configuration that it is, and the parent operator from the listed one to it; null where it is none of them. */
  readonly recognised: {
    readonly id: string;
    readonly direction: string;
    readonly operator: string;
  } | null;
  /** Ids of the configurations that were looked through. */
  readonly listed: readonly string[];
}
