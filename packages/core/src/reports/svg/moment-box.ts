import type { Vector } from "./space.js";

/** Atoms in a box of cells, as they are drawn. */
export interface MomentBox {
  /** a, b, c of one cell in Å. */
  readonly axes: readonly [Vector, Vector, Vector];
  readonly cells: readonly [number, number, number];
  readonly sites: readonly string[];
  /** Which site an atom is of, and where it is, in cells. */
  readonly atoms: readonly { readonly site: number; readonly at: readonly [number, number, number] }[];
}

/** A box with a moment on each atom, Cartesian, the longest of length 1. */
export interface MomentPicture extends MomentBox {
  readonly name: string;
  readonly vectors: readonly Vector[];
}
