import { modulo, overCommonDenominator, type Rational, type RationalVector, rational, toNumber } from "../numbers/index.js";
import { fromPrimitiveColumn, type SpaceGroup } from "../spacegroups/index.js";
import { type AffineSet, affineForms, type Condition, solveConditions } from "./affine.js";
import { adaptedCoordinates, type Flat } from "./flats.js";
import type { WaveVector } from "./types.js";

/**
 * Of the flats of one kind, shifted by L* as needed, the one whose parametric form reads most plainly: directions with
 * fewest non-zero entries, fewest minus signs and smallest numbers, then the base likewise, then lexicographic order.
 */
export function plainestFlat(group: SpaceGroup, orbit: readonly Flat[]): WaveVector {
  const frames = new Map<string, Frame>();
  let best: { readonly key: readonly number[]; readonly set: AffineSet } | null = null;
  for (const flat of orbit) {
    const name = flat.directions.map((row) => row.join(" ")).join(";");
    const frame = frames.get(name) ?? frameOf(group, flat.directions);
    frames.set(name, frame);
    for (const across of shiftedPlaces(flat)) {
      const base = baseAt(frame, across, flat.denominator);
      const key = [...frame.key, ...baseKey(base)];
      if (best === null || isBefore(key, best.key)) best = { key, set: { ...frame.set, base: asRationals(base) } };
    }
  }
  const { set } = best as unknown as { set: AffineSet };
  const open = set.directions.length > 0;
  return { components: affineForms(set), values: open ? null : [], uncertainties: open ? null : [] };
}

/** The base point of a flat with given directions is linear in its place across: `base = Σ s_i units[i]`. */
interface Frame {
  readonly set: AffineSet;
  readonly units: readonly (readonly number[])[];
  readonly denominator: number;
  readonly key: readonly number[];
}

interface Base {
  readonly numerators: readonly number[];
  readonly denominator: number;
}

function frameOf(group: SpaceGroup, directions: Flat["directions"]): Frame {
  const coordinates = adaptedCoordinates(directions);
  const columns = [0, 1, 2].slice(directions.length).map((column) => {
    const entries = [0, 1, 2].map((row) => rational(coordinates[3 * row + column] as number));
    return fromPrimitiveColumn(group.lattice, entries as unknown as RationalVector);
  });
  // κ·n with κ = k B is k·(B n): one condition per coordinate across.
  const solve = (unit: number): AffineSet =>
    solveConditions(
      columns.map((coefficients, index): Condition => ({ coefficients, value: rational(index === unit ? 1 : 0) })),
    ) as AffineSet;
  const sets = columns.map((_, unit) => solve(unit));
  const { numerators, denominator } = overCommonDenominator(sets.flatMap((set) => [...set.base]));
  const set = sets[0] ?? solve(-1);
  const entries = set.directions.flat().map(toNumber);
  return {
    set,
    units: sets.map((_, index) => numerators.slice(3 * index, 3 * index + 3)),
    denominator,
    key: [
      entries.filter((entry) => entry !== 0).length,
      entries.filter((entry) => entry < 0).length,
      entries.reduce((sum, entry) => sum + entry * entry, 0),
      ...entries,
    ],
  };
}

/** The place across moved by whole numbers, −2 … 2 around the centred one. */
function* shiftedPlaces(flat: Flat): Generator<number[]> {
  const { denominator } = flat;
  const centred = flat.across.map((entry) => {
    const rest = modulo(entry, denominator);
    return 2 * rest > denominator ? rest - denominator : rest;
  });
  for (let code = 0; code < 5 ** centred.length; code++)
    yield centred.map((entry, index) => entry + denominator * ((Math.floor(code / 5 ** index) % 5) - 2));
}

function baseAt(frame: Frame, across: readonly number[], denominator: number): Base {
  return {
    numerators: [0, 1, 2].map((axis) => across.reduce((sum, entry, index) => sum + entry * (frame.units[index]?.[axis] as number), 0)),
    denominator: denominator * frame.denominator,
  };
}

function baseKey({ numerators, denominator }: Base): number[] {
  return [
    numerators.filter((entry) => entry !== 0).length,
    numerators.reduce((sum, entry) => sum + entry * entry, 0) / denominator ** 2,
    numerators.filter((entry) => entry < 0).length,
    ...numerators.map((entry) => entry / denominator),
  ];
}

function asRationals({ numerators, denominator }: Base): RationalVector {
  const [a, b, c] = numerators.map((entry) => rational(entry, denominator)) as [Rational, Rational, Rational];
  return [a, b, c];
}

function isBefore(a: readonly number[], b: readonly number[]): boolean {
  for (let index = 0; index < a.length; index++) {
    const difference = (a[index] as number) - (b[index] as number);
    // Keys are short fractions: differences are either rounding or at least 1/144.
    if (Math.abs(difference) > 1e-9) return difference < 0;
  }
  return false;
}
