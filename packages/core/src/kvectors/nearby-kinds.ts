import { fail } from "../errors/index.js";
import { roundNumber, sameLineInverseAngstrom } from "../numbers/index.js";
import { type Cell, reciprocalMetric, type SpaceGroup } from "../spacegroups/index.js";
import { extendedPointGroup, fixedDimension, fixingForm } from "./acting-rotations.js";
import { atlasWithOrbits } from "./atlas.js";
import { closestPoints } from "./closest-points.js";
import { type DirectionLattice, type Flat, pointDenominator } from "./flats.js";
import { rotateRow, toIntegerForm } from "./integer-form.js";
import { combine, dualBasis } from "./plainest.js";
import { type PlacedFlat, plainestOf, type SettingFrames, settingFrames, waveVectorOf } from "./plainest-flat.js";
import type { KindOfK, NearbyKind, WaveVector } from "./types.js";
import { numericWaveVector } from "./wave-vector.js";

/**
 * The kinds of lower dimension than that of k itself that come within a distance of k, each with the nearest point of
 * any of its flats (all arms, all shifts by L*); nearest first, then by dimension and in the order of the atlas.
 * Distances are lengths in reciprocal space with 2π, |Q − Q'| in Å⁻¹.
 *
 * Where several points of a kind are equally near, to 1e-7 Å⁻¹ (`sameLineInverseAngstrom`), the plainest is given.
 *
 * @param cell must have the metric symmetry of the group (`checkCellAgainstGroup`)
 * @param options.distance Å⁻¹; a kind at this distance still counts
 * @throws `k-needs-values` while a letter of k is left open, `invalid-number` for a negative distance or none
 */
export function nearbyKinds(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  options: { readonly withInversion: boolean; readonly distance: number },
): readonly NearbyKind[] {
  const numbers = numericWaveVector(k);
  if (numbers === null)
    fail("k-needs-values", "special wave vectors nearby need numbers for the open letters of k", {
      remedy: "give k as three numbers",
    });
  if (!(options.distance >= 0 && Number.isFinite(options.distance)))
    fail("invalid-number", "the distance within which to look for special wave vectors is no length", {
      expected: "a number of Å⁻¹, 0 or more",
      found: String(options.distance),
    });
  const { withInversion, distance } = options;
  const dimensionOf = (kind: KindOfK): number => (withInversion ? kind.dimensionPM : kind.dimension);
  const acting = extendedPointGroup(group).filter(({ own }) => own || withInversion);
  const dimension = fixedDimension(fixingForm(acting, toIntegerForm(group.lattice, k)));
  const space = reciprocalSpace(group, cell, numbers);
  return atlasWithOrbits(group, withInversion)
    .flatMap(({ kind, orbit }, index) => {
      const nearest = dimensionOf(kind) < dimension ? nearestOfFlats(orbit.flats, space, distance) : null;
      return nearest === null ? [] : [{ kind, index, ...nearest }];
    })
    .sort((a, b) => a.distance - b.distance || dimensionOf(a.kind) - dimensionOf(b.kind) || a.index - b.index);
}

/** What the search for the nearest point of a flat needs to know of the place of k. */
interface ReciprocalSpace {
  /** k in the axes of the setting, and in primitive coordinates. */
  readonly k: readonly number[];
  readonly primitive: readonly number[];
  /** Rows of the dual of the primitive basis, in the axes of the setting. */
  readonly basis: readonly (readonly number[])[];
  /** Scalar products of `basis` with 2π, Å⁻². */
  readonly metric: readonly (readonly number[])[];
  readonly frames: SettingFrames;
}

function reciprocalSpace(group: SpaceGroup, cell: Cell, k: readonly number[]): ReciprocalSpace {
  const { vectors, denominator } = group.lattice;
  const dual = dualBasis(group);
  const basis = dual.rows.map((row) => row.map((entry) => entry / dual.denominator));
  const setting = reciprocalMetric(cell);
  const rows = [0, 3, 6].map((row) => setting.slice(row, row + 3).map((entry) => 4 * Math.PI ** 2 * entry));
  return {
    k,
    primitive: vectors.map((vector) => dot(k, vector) / denominator),
    basis,
    metric: products(rows, basis),
    frames: settingFrames(dual),
  };
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, index) => sum + entry * (b[index] as number), 0);
}

/** Scalar products of rows in a metric. */
function products(metric: readonly (readonly number[])[], rows: readonly (readonly number[])[]): number[][] {
  return rows.map((left) =>
    rows.map((right) =>
      dot(
        left,
        metric.map((row) => dot(row, right)),
      ),
    ),
  );
}

/** A point of a flat, near to k. */
interface NearPoint {
  readonly placed: PlacedFlat;
  /** In the axes of the setting. */
  readonly point: readonly number[];
  readonly distance: number;
}

function nearestOfFlats(
  flats: readonly Flat[],
  space: ReciprocalSpace,
  reach: number,
): Omit<NearbyKind, "kind" | "index"> | null {
  const metrics = new Map<DirectionLattice, number[][]>();
  const near: NearPoint[] = [];
  let limit = reach;
  for (const flat of flats) {
    const { lattice } = flat;
    const metric =
      metrics.get(lattice) ??
      products(
        space.metric,
        [0, 3, 6].map((row) => lattice.inverse.slice(row, row + 3)),
      );
    metrics.set(lattice, metric);
    for (const point of pointsOfFlat(flat, metric, space, limit)) {
      near.push(point);
      limit = Math.min(limit, point.distance);
    }
  }
  const nearest = near.filter(({ distance }) => distance <= limit + sameLineInverseAngstrom);
  if (nearest.length === 0) return null;
  const best = plainestOf(nearest.map(({ placed }) => placed));
  const { placed, point, distance } = nearest.find((one) => one.placed === best) as NearPoint;
  const values = placed.frame.pivots.map((pivot, index) =>
    roundNumber((point[pivot] as number) / (placed.frame.directions[index]?.[pivot] as number)),
  );
  return {
    nearest: { ...waveVectorOf(placed), values, uncertainties: values.map(() => null) },
    distance: roundNumber(distance),
  };
}

function pointsOfFlat(
  flat: Flat,
  metric: readonly (readonly number[])[],
  space: ReciprocalSpace,
  limit: number,
): NearPoint[] {
  const { lattice, across } = flat;
  const free = lattice.rows.length;
  const start = rotateRow(space.primitive, lattice.coordinates);
  const offset = start.map((entry, index) =>
    index < free ? 0 : (across[index - free] as number) / pointDenominator - entry,
  );
  const frame = space.frames(lattice);
  return closestPoints(metric, offset, free, limit, sameLineInverseAngstrom).map(({ shift, coordinates, distance }) => {
    const step = rotateRow(coordinates, lattice.inverse);
    const place = across.map((entry, index) => entry + pointDenominator * (shift[free + index] as number));
    return {
      placed: { flat, frame, base: combine(place, frame.units) },
      point: space.k.map(
        (entry, axis) =>
          entry +
          dot(
            step,
            space.basis.map((row) => row[axis] as number),
          ),
      ),
      distance,
    };
  });
}
