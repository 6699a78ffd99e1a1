import { type FlatFrame, lettersAt } from "./flat-frame.js";
import type { FlatFindings } from "./search-flat.js";
import type { Region } from "./types.js";
import type { Wedge } from "./wedge.js";

/** Leaves that touch one another, corners included, are one region. */
export interface MergedRegions {
  readonly regions: readonly Region[];
  /** Region of each settled leaf. */
  readonly ofLeaf: Int32Array;
  /** Region of each undecided box. */
  readonly ofUndecided: Int32Array;
}

/**
 * Joins the leaves of one kind to regions. Leaves are cells of one grid; a box that was left open below a leaf counts
 * with the whole cell that it is part of. A region without a settled leaf is one that could not be decided.
 */
export function mergeLeaves(frame: FlatFrame, wedge: Wedge, findings: FlatFindings): MergedRegions {
  const { dimension } = frame;
  const half = findings.leafHalf;
  const size = Array.from(half, (width, axis) => Math.max(1, Math.round((wedge.half[axis] as number) / width)));
  const place = (centre: Float64Array): number[] =>
    Array.from(centre, (entry, axis) => {
      const low = (wedge.centre[axis] as number) - (wedge.half[axis] as number);
      return Math.min(
        (size[axis] as number) - 1,
        Math.max(0, Math.floor((entry - low) / (2 * (half[axis] as number)))),
      );
    });
  const keyOf = (cell: readonly number[]): number =>
    cell.reduce((key, entry, axis) => key * ((size[axis] as number) + 2) + entry + 1, 0);
  const cells = new Map<number, { readonly cell: readonly number[]; settled: boolean; region: number }>();
  const enter = (centre: Float64Array, settled: boolean): number => {
    const cell = place(centre);
    const key = keyOf(cell);
    const known = cells.get(key);
    if (known === undefined) cells.set(key, { cell, settled, region: -1 });
    else if (settled) known.settled = true;
    return key;
  };
  const keys = findings.leaves.map((centre) => enter(centre, true));
  const openKeys = findings.undecided.map((centre) => enter(centre, false));
  const steps = neighbours(dimension);
  const regions: Region[] = [];
  for (const first of cells.values()) {
    if (first.region >= 0) continue;
    first.region = regions.length;
    const members = [first];
    for (let at = 0; at < members.length; at++)
      for (const step of steps) {
        const next = cells.get(
          keyOf((members[at] as typeof first).cell.map((entry, axis) => entry + (step[axis] as number))),
        );
        if (next === undefined || next.region >= 0) continue;
        next.region = regions.length;
        members.push(next);
      }
    regions.push(
      describe(
        frame,
        wedge,
        half,
        members.map(({ cell }) => cell),
        members.some(({ settled }) => settled),
      ),
    );
  }
  const regionOf = (key: number): number => cells.get(key)?.region ?? -1;
  return { regions, ofLeaf: Int32Array.from(keys, regionOf), ofUndecided: Int32Array.from(openKeys, regionOf) };
}

function neighbours(dimension: number): number[][] {
  return Array.from({ length: dimension }).reduce<number[][]>(
    (all) => all.flatMap((step) => [-1, 0, 1].map((next) => [...step, next])),
    [[]],
  );
}

function describe(
  frame: FlatFrame,
  wedge: Wedge,
  half: Float64Array,
  cells: readonly (readonly number[])[],
  decided: boolean,
): Region {
  const low = frame.originLetters.map(() => Number.POSITIVE_INFINITY);
  const high = frame.originLetters.map(() => Number.NEGATIVE_INFINITY);
  // How far a letter moves within half a cell.
  const spread = frame.originLetters.map((_, letter) =>
    Array.from(half).reduce(
      (sum, width, axis) => sum + width * Math.abs(frame.lettersFromAxes[letter * frame.dimension + axis] as number),
      0,
    ),
  );
  for (const cell of cells) {
    const t = cell.map(
      (entry, axis) =>
        (wedge.centre[axis] as number) - (wedge.half[axis] as number) + (2 * entry + 1) * (half[axis] as number),
    );
    lettersAt(frame, t).forEach((value, letter) => {
      low[letter] = Math.min(low[letter] as number, value - (spread[letter] as number));
      high[letter] = Math.max(high[letter] as number, value + (spread[letter] as number));
    });
  }
  return { kind: frame.form, from: low, to: high, leaves: cells.length, decided };
}
