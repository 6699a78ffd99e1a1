import { invertUnimodular, overCommonDenominator, type RationalVector } from "../numbers/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../spacegroups/index.js";
import { adaptedCoordinates, type Flat, flatKey, flatThrough, integerKernel, rotateFlat, saturated } from "./flats.js";
import { fromPrimitiveIntegers, rotateRow, toIntegerForm } from "./integer-form.js";
import { equivalentWaveVectors, isHalfLattice, littleGroup, star } from "./little-group.js";
import { manifold, manifoldSet } from "./manifold.js";
import { plainestFlat } from "./plainest-flat.js";
import { pointDenominator } from "./special-points.js";
import type { KindOfK, WaveVector } from "./types.js";
import { exactWaveVector } from "./wave-vector.js";

/**
 * Every kind of k of a group: the Wyckoff positions of the symmorphic group L* ⋊ P (the reciprocal-space group;
 * Wintgen, Math. Ann. 118 (1941) 195; Boyle & Kenney, Bull. Am. Math. Soc. 1982), from the general position down to
 * the points, found without tables. With `withInversion` the point group is extended by −1.
 *
 * A flat is a kind when the operators that fix each of its points fix nothing larger. Its direction is that of a
 * single operator's fixed set (a group that fixes just a line contains a rotation about it, one that fixes a plane is a
 * mirror), and its place across has a denominator dividing 12 as for points. So a finite list of candidates is complete.
 */
export function atlas(group: SpaceGroup, options: { readonly withInversion: boolean }): readonly KindOfK[] {
  const operators = signedRotations(group, options.withInversion);
  const seen = new Set<string>();
  const kinds: KindOfK[] = [];
  const halves = halfLatticePoints(group);
  for (const flat of flatsOfKinds(operators)) {
    if (seen.has(flatKey(flat))) continue;
    const orbit = new Map<string, Flat>();
    for (const { rotation, sign } of operators) {
      const image = rotateFlat(flat, rotation, sign);
      orbit.set(flatKey(image), image);
    }
    for (const key of orbit.keys()) seen.add(key);
    kinds.push(describeKind(group, [...orbit.values()], halves, options.withInversion));
  }
  return kinds.sort((a, b) => compareKinds(a, b, options.withInversion));
}

/** The kind of `kinds` (made by `atlas` with the same options) that k lies on; its index. */
export function kindOf(group: SpaceGroup, kinds: readonly KindOfK[], k: WaveVector, options: { readonly withInversion: boolean }): number {
  const wanted = flatOf(group, k, options.withInversion);
  const operators = signedRotations(group, options.withInversion);
  const images = new Set(operators.map(({ rotation, sign }) => flatKey(rotateFlat(wanted, rotation, sign))));
  const index = kinds.findIndex((kind) => images.has(flatKey(flatOf(group, kind.k, options.withInversion))));
  if (index < 0) throw new Error("a wave vector lies on no kind of the atlas");
  return index;
}

interface SignedRotation {
  readonly number: number;
  readonly rotation: readonly number[];
  readonly sign: 1 | -1;
}

function signedRotations(group: SpaceGroup, withInversion: boolean): SignedRotation[] {
  const plain = group.primitive.rotations.map((rotation, number) => ({ number, rotation, sign: 1 as const }));
  const inversion = (rotation: readonly number[]): boolean => rotation.every((entry, index) => entry === (index % 4 === 0 ? -1 : 0));
  if (!withInversion || group.primitive.rotations.some(inversion)) return plain;
  return [...plain, ...plain.map(({ number, rotation }) => ({ number: number + plain.length, rotation, sign: -1 as const }))];
}

/** The flat that the manifold of k is modulo L*, over the denominator of points. */
function flatOf(group: SpaceGroup, k: WaveVector, withInversion: boolean): Flat {
  const set = manifoldSet(group, k, { withInversion });
  const directions = saturated(set.directions.map((row) => overCommonDenominator(toPrimitiveRow(group.lattice, row)).numerators));
  const base = toIntegerForm(group.lattice, exactWaveVector(set.base));
  const flat = flatThrough(directions, base.base, base.denominator);
  // Across a manifold every coordinate is a multiple of 1/12, whatever k itself is.
  return {
    ...flat,
    across: flat.across.map((entry) => (entry * pointDenominator) / base.denominator),
    denominator: pointDenominator,
  };
}

/** The flats that are kinds, one or more of each orbit. */
function* flatsOfKinds(operators: readonly SignedRotation[]): Generator<Flat> {
  const lattices = new Map<string, number[][]>();
  for (const lattice of [identityRows, ...operators.map(fixedLattice), [] as number[][]])
    lattices.set(lattice.map((row) => row.join(" ")).join(";"), lattice);
  for (const directions of [...lattices.values()].sort((a, b) => b.length - a.length)) {
    const along = operators.filter((operator) => fixesDirections(directions, operator));
    const back = invertUnimodular(adaptedCoordinates(directions));
    const dimensions = new Map<string, number>();
    const places = 3 - directions.length;
    for (let code = 0; code < pointDenominator ** places; code++) {
      const across = Array.from({ length: places }, (_, index) => Math.floor(code / pointDenominator ** index) % pointDenominator);
      const point = rotateRow([...directions.map(() => 0), ...across], back);
      const fixing = along.filter((operator) => fixesPoint(point, operator));
      const name = fixing.map((operator) => operator.number).join(" ");
      const dimension = dimensions.get(name) ?? fixedDimension(fixing);
      dimensions.set(name, dimension);
      if (dimension === directions.length) yield { directions, across, denominator: pointDenominator };
    }
  }
}

const identityRows = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];

/** Integer rows d with `sign·dR = d`. */
function fixedLattice({ rotation, sign }: SignedRotation): number[][] {
  const columns = [0, 1, 2].map((column) => [0, 1, 2].map((row) => sign * (rotation[3 * row + column] as number) - (row === column ? 1 : 0)));
  return integerKernel(columns);
}

function fixesDirections(directions: readonly (readonly number[])[], { rotation, sign }: SignedRotation): boolean {
  return directions.every((row) => rotateRow(row, rotation).every((entry, axis) => sign * entry === row[axis]));
}

/** Whether `sign·κR ≡ κ`, κ over the denominator of points. */
function fixesPoint(point: readonly number[], { rotation, sign }: SignedRotation): boolean {
  return rotateRow(point, rotation).every((entry, axis) => (sign * entry - (point[axis] as number)) % pointDenominator === 0);
}

/** Dimension of the rows fixed by all of them: the rank of their sum divided by their number. */
function fixedDimension(fixing: readonly SignedRotation[]): number {
  const columns = fixing.flatMap(({ rotation, sign }) =>
    [0, 1, 2].map((column) => [0, 1, 2].map((row) => sign * (rotation[3 * row + column] as number) - (row === column ? 1 : 0))),
  );
  return integerKernel(columns).length;
}

function describeKind(group: SpaceGroup, orbit: readonly Flat[], halves: readonly WaveVector[], withInversion: boolean): KindOfK {
  const k = plainestFlat(group, orbit);
  const little = littleGroup(group, k);
  const { arms, minusK } = star(group, k);
  return {
    k,
    dimension: manifold(group, k, { withInversion: false }).dimension,
    dimensionPM: manifold(group, k, { withInversion: true }).dimension,
    littleCoGroup: { symbol: little.symbol, order: little.operators.length },
    arms: arms.length,
    minusK,
    halfLattice: halves.filter(
      (half) =>
        liesOn(group, half, orbit) &&
        manifold(group, half, { withInversion }).dimension === (orbit[0] as Flat).directions.length,
    ),
  };
}

function liesOn(group: SpaceGroup, k: WaveVector, orbit: readonly Flat[]): boolean {
  const form = toIntegerForm(group.lattice, k);
  const scale = pointDenominator / form.denominator;
  return orbit.some((flat) => {
    const there = flatThrough(flat.directions, form.base.map((entry) => entry * scale), pointDenominator);
    return flatKey(there) === flatKey(flat);
  });
}

/** One of each star of the k with 2k ∈ L*. */
function halfLatticePoints(group: SpaceGroup): WaveVector[] {
  const found: WaveVector[] = [];
  for (let code = 0; code < 8; code++) {
    const row: RationalVector = fromPrimitiveIntegers(group, [code & 1, (code >> 1) & 1, code >> 2], 2);
    const k = exactWaveVector(row);
    const { arms } = star(group, k);
    if (!isHalfLattice(group, k) || found.some((other) => arms.some((arm) => equivalentWaveVectors(group, arm, other)))) continue;
    found.push(k);
  }
  return found;
}

function compareKinds(a: KindOfK, b: KindOfK, withInversion: boolean): number {
  const dimensions = withInversion ? a.dimensionPM - b.dimensionPM : a.dimension - b.dimension;
  if (dimensions !== 0) return dimensions;
  if (a.arms !== b.arms) return a.arms - b.arms;
  for (const axis of [0, 1, 2] as const) {
    const [left, right] = [a.k.components[axis], b.k.components[axis]];
    const rows = [left.constant, ...left.coefficients].map((entry, index) => {
      const other = index === 0 ? right.constant : (right.coefficients[index - 1] as readonly [number, number]);
      return entry[0] * other[1] - other[0] * entry[1];
    });
    const difference = rows.find((entry) => entry !== 0);
    if (difference !== undefined) return difference;
  }
  return 0;
}
