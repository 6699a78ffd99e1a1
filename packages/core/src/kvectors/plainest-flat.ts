import { gcd, gcdOf, lcm, type RationalVector, safe, vectorFrom } from "../numbers/index.js";
import { type AffineSet, affineForms } from "./affine.js";
import { type DirectionLattice, type Flat, pointDenominator } from "./flats.js";
import { combine, type DualBasis, descend, minusSigns, neighbourSteps, nonZeros, sumOfSquares } from "./plainest.js";
import type { WaveVector } from "./types.js";

/** How flats along one direction lattice are written in the axes of the setting. */
export interface SettingFrame {
  /** Integer directions in reduced echelon form. */
  readonly directions: readonly (readonly number[])[];
  readonly pivots: readonly number[];
  /** The base point is `Σ s_i units[i] / denominator`, s the whole place across, in `pointDenominator` parts. */
  readonly units: readonly (readonly number[])[];
  readonly denominator: number;
  /** Moves of the base by small vectors of L*, in its parts. */
  readonly steps: readonly (readonly number[])[];
}

/** Gives the frame of a direction lattice; each is made once. */
export type SettingFrames = (lattice: DirectionLattice) => SettingFrame;

export function settingFrames(dual: DualBasis): SettingFrames {
  const known = new Map<DirectionLattice, SettingFrame>();
  return (lattice) => {
    const frame = known.get(lattice) ?? frameOf(lattice, dual);
    known.set(lattice, frame);
    return frame;
  };
}

function frameOf(lattice: DirectionLattice, dual: DualBasis): SettingFrame {
  const rows = [0, 3, 6].map((row) => combine(lattice.inverse.slice(row, row + 3), dual.rows));
  const { directions, pivots } = integerEchelon(rows.slice(0, lattice.rows.length));
  const scale = directions.reduce((common, row, index) => lcm(common, row[pivots[index] as number] as number), 1);
  // The base vanishes at the pivots, as in tables: (u, u, 1/2), not (u+1/2, u+1/2, 1/2).
  const units = rows.slice(lattice.rows.length).map((row) =>
    row.map((entry, axis) =>
      directions.reduce(
        (rest, direction, index) => {
          const pivot = pivots[index] as number;
          const turns = (scale / (direction[pivot] as number)) * (row[pivot] as number);
          return safe(rest - safe(turns * (direction[axis] as number)));
        },
        safe(scale * entry),
      ),
    ),
  );
  return {
    directions,
    pivots,
    units,
    denominator: safe(scale * dual.denominator * pointDenominator),
    steps: neighbourSteps(units.map((unit) => unit.map((entry) => safe(entry * pointDenominator)))),
  };
}

/** Reduced echelon form of independent integer rows, each cleared to coprime integers with a positive pivot. */
function integerEchelon(rows: readonly (readonly number[])[]): { directions: number[][]; pivots: number[] } {
  const work = rows.map((row) => [...row]);
  const pivots: number[] = [];
  for (let column = 0; column < 3 && pivots.length < work.length; column++) {
    const top = pivots.length;
    const found = work.findIndex((row, index) => index >= top && row[column] !== 0);
    if (found < 0) continue;
    [work[top], work[found]] = [work[found] as number[], work[top] as number[]];
    const pivotRow = work[top];
    const pivot = pivotRow[column] as number;
    work.forEach((row, index) => {
      const factor = row[column] as number;
      if (index === top || factor === 0) return;
      const common = gcd(pivot, factor);
      work[index] = row.map((entry, axis) =>
        safe((pivot / common) * entry - (factor / common) * (pivotRow[axis] as number)),
      );
    });
    pivots.push(column);
  }
  const directions = work.map((row, index) => {
    const divisor = gcdOf(row) * Math.sign(row[pivots[index] as number] as number);
    return row.map((entry) => entry / divisor + 0);
  });
  return { directions, pivots };
}

/** A flat in its place among the parametric forms: `base / denominator` along the frame's directions. */
export interface PlacedFlat {
  readonly flat: Flat;
  readonly frame: SettingFrame;
  readonly base: readonly number[];
}

/**
 * Of the flats of one kind, shifted by L* as needed, the one whose parametric form reads most plainly: directions with
 * fewest non-zero entries, fewest minus signs and smallest numbers, then the base as in `plainestRepresentative`, then
 * component by component (0 before fractions, fractions before letters, u before v before w).
 */
export function plainestFlat(frames: SettingFrames, flats: readonly Flat[]): PlacedFlat {
  const placed = flats.map((flat) => {
    const frame = frames(flat.lattice);
    return { flat, frame, base: descend(startOf(flat, frame), frame.steps) };
  });
  return plainestOf(placed);
}

/** The plainest of some flats as they stand. */
export function plainestOf(placed: readonly PlacedFlat[]): PlacedFlat {
  const [first, ...others] = placed.map((place) => ({ place, key: plainnessKey(place) }));
  if (first === undefined) throw new Error("a kind of k without a flat");
  return others.reduce((best, next) => (isBefore(next.key, best.key) ? next : best), first).place;
}

/** The base with the place across centred. */
function startOf(flat: Flat, frame: SettingFrame): readonly number[] {
  return combine(
    flat.across.map((entry) => (2 * entry > pointDenominator ? entry - pointDenominator : entry)),
    frame.units,
  );
}

// Quotients of small integers are equal floats exactly when they are equal fractions.
function plainnessKey({ frame, base }: PlacedFlat): readonly number[] {
  const entries = frame.directions.flat();
  return [
    nonZeros(entries),
    minusSigns(entries),
    sumOfSquares(entries),
    nonZeros(base),
    sumOfSquares(base) / frame.denominator ** 2,
    minusSigns(base),
    ...[0, 1, 2].flatMap((axis) => [
      ...[2, 1, 0].map((letter) => frame.directions[letter]?.[axis] ?? 0),
      (base[axis] as number) / frame.denominator,
    ]),
  ];
}

function isBefore(a: readonly number[], b: readonly number[]): boolean {
  const index = a.findIndex((entry, position) => entry !== b[position]);
  return index >= 0 && (a[index] as number) < (b[index] as number);
}

/** The affine set of a placed flat. */
export function affineSetOf({ frame, base }: PlacedFlat): AffineSet {
  return {
    base: vectorFrom(base, frame.denominator),
    directions: frame.directions.map((direction): RationalVector => vectorFrom(direction)),
    pivots: frame.pivots,
  };
}

/** A placed flat as a wave vector with open letters; a point has none. */
export function waveVectorOf(placed: PlacedFlat): WaveVector {
  const open = placed.frame.directions.length > 0;
  return { components: affineForms(affineSetOf(placed)), values: open ? null : [], uncertainties: open ? null : [] };
}
