import type { Problem } from "../../errors/index.js";

/** How a space group is called in every result. */
export interface GroupRecord {
  readonly number: number | null;
  readonly hall: string | null;
  readonly hermannMauguin: string | null;
  readonly choice: string;
  /** (P, p) of International Tables A from the tabulated setting to this one, `a,b,c;0,0,0` when none. */
  readonly basisChange: string;
}

/** A wave vector: `components` decide symmetry; `values` and `su` hold the letters that have numbers. */
export interface KRecord {
  readonly components: readonly string[];
  readonly values: { readonly [letter: string]: number };
  readonly su: { readonly [letter: string]: number | null };
  readonly numeric: readonly number[] | null;
}

/** `[real, imaginary]`. */
export type ComplexRecord = readonly [number, number];

/** Unit cell, Å and degrees. */
export interface CellRecord {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly alpha: number;
  readonly beta: number;
  readonly gamma: number;
}

/** The little group of a k: `order` and `symbol` are of the little co-group, `operators` one per coset of L. */
export interface LittleGroupRecord {
  readonly order: number;
  readonly symbol: string;
  readonly operators: readonly string[];
}

/** Something that was not said by the user and was taken all the same. */
export interface AssumedRecord {
  readonly what: string;
  readonly value: string;
  readonly because: string;
}

/** What was asked, as it was understood: strings as typed with blanks tidied, null for what was not given. */
export interface InputRecord {
  readonly [option: string]: string | number | boolean | null | readonly string[];
}

/** The one object that every command answers with. `format` rises with a breaking change. */
export interface Envelope<Result = unknown> {
  readonly kvane: string;
  readonly format: 1;
  readonly command: string;
  readonly input: InputRecord;
  /** Null exactly when `errors` is not empty. */
  readonly result: Result | null;
  readonly errors: readonly Problem[];
  readonly warnings: readonly Problem[];
  readonly assumed: readonly AssumedRecord[];
}
