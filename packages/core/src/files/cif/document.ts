import type { Problem } from "../../errors/index.js";

/** Which of the two standards a file is written in. */
export type CifVersion = "1.1" | "2.0";

/**
 * A CIF as it stands. Values are not copied out: a value is the offset of its first character in `text`, and
 * `valueAt` reads it. So a file of a hundred thousand atoms costs little more than its text.
 */
export interface CifDocument {
  readonly file: string;
  readonly version: CifVersion;
  /** The file without its byte-order mark and with `\n` at every line end. */
  readonly text: string;
  /** Offset of the first character of every line. */
  readonly lineStarts: readonly number[];
  readonly blocks: readonly CifBlock[];
  /** What breaks the letter of the standard or its limits, and yet has one meaning. */
  readonly warnings: readonly Problem[];
}

/** A data block or a save frame. */
export interface CifBlock {
  /** As written behind `data_` or `save_`. */
  readonly code: string;
  /** Offset of the heading. */
  readonly start: number;
  readonly items: readonly CifItem[];
  readonly loops: readonly CifLoop[];
  readonly frames: readonly CifBlock[];
}

/** A data name as written, `_` included. */
export interface CifName {
  readonly name: string;
  readonly start: number;
}

/** A name with its one value. */
export interface CifItem extends CifName {
  readonly value: number;
}

/** A loop: the offsets of its values row by row, a whole number of rows. */
export interface CifLoop {
  readonly start: number;
  readonly names: readonly CifName[];
  readonly values: readonly number[];
}

/** A value that was read. Line and column count from 1. */
export type CifValue = CifText | CifList | CifTable;

/** A value of a CIF as text: what stands in the file between its delimiters, with its place. */
export interface CifText {
  readonly shape: "text";
  /** How it was written: only a bare `?` is unknown, only a bare `.` inapplicable, only a bare word a number. */
  readonly form: "bare" | "quoted" | "text field";
  /** What is meant: without delimiters, folded lines joined, line prefixes taken off. */
  readonly text: string;
  /** What stands in the file. */
  readonly raw: string;
  readonly line: number;
  readonly column: number;
}

/** `[…]` of CIF 2.0. */
export interface CifList {
  readonly shape: "list";
  readonly items: readonly CifValue[];
  readonly raw: string;
  readonly line: number;
  readonly column: number;
}

/** `{…}` of CIF 2.0. */
export interface CifTable {
  readonly shape: "table";
  readonly entries: readonly { readonly key: string; readonly value: CifValue }[];
  readonly raw: string;
  readonly line: number;
  readonly column: number;
}

/** Line and column (from 1) of an offset. */
export function placeAt(lineStarts: readonly number[], offset: number): { line: number; column: number } {
  let low = 0;
  let high = lineStarts.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((lineStarts[middle] as number) <= offset) low = middle;
    else high = middle - 1;
  }
  return { line: low + 1, column: offset - (lineStarts[low] ?? 0) + 1 };
}
