import { compare } from "../numbers/index.js";
import { pointGroupSymbol, type SpaceGroup } from "../spacegroups/index.js";
import { type ActingRotation, extendedPointGroup, fixedDimension } from "./acting-rotations.js";
import { type FlatOrbit, flatOrbits } from "./flat-orbits.js";
import { type Flat, pointDenominator } from "./flats.js";
import { halfLatticePoints } from "./half-lattice-points.js";
import { type DualBasis, dualBasis } from "./plainest.js";
import { plainestFlat, type SettingFrames, settingFrames, waveVectorOf } from "./plainest-flat.js";
import type { KindOfK, MinusK } from "./types.js";

/**
 * Every kind of k of a group: the Wyckoff positions of the symmorphic group L* ⋊ P, the reciprocal-space group
 * (Wintgen, Math. Ann. 118 (1941) 195; International Tables for Crystallography B, chapter 1.5), found without tables.
 * They come by dimension, then by the number of arms, the general position last. With `withInversion` the point group
 * is extended by −1.
 *
 * A flat is a kind when the operators that fix each of its points fix nothing larger (`flat-orbits.ts`).
 */
export function atlas(group: SpaceGroup, options: { readonly withInversion: boolean }): readonly KindOfK[] {
  return atlasWithOrbits(group, options.withInversion).map(({ kind }) => kind);
}

/** A kind with all its flats. */
export interface KindWithOrbit {
  readonly kind: KindOfK;
  readonly orbit: FlatOrbit;
}

/**
 * The atlas with what it was made from.
 *
 * @param dimensions which kinds are wanted, all by default
 */
export function atlasWithOrbits(
  group: SpaceGroup,
  withInversion: boolean,
  dimensions: readonly number[] = [0, 1, 2, 3],
): readonly KindWithOrbit[] {
  const extended = extendedPointGroup(group);
  const acting = extended.filter(({ own }) => own || withInversion);
  const dual = dualBasis(group);
  const frames = settingFrames(dual);
  return flatOrbits(extended, withInversion, dimensions)
    .map((orbit) => ({ kind: describeKind(group, orbit, acting, extended, dual, frames), orbit }))
    .sort((a, b) => compareKinds(a.kind, b.kind, withInversion));
}

function describeKind(
  group: SpaceGroup,
  orbit: FlatOrbit,
  acting: readonly ActingRotation[],
  extended: readonly ActingRotation[],
  dual: DualBasis,
  frames: SettingFrames,
): KindOfK {
  const placed = plainestFlat(frames, orbit.flats);
  const own = orbit.fixing.filter((rotation) => rotation.own);
  return {
    k: waveVectorOf(placed),
    dimension: fixedDimension(own),
    dimensionPM: fixedDimension(orbit.fixing),
    littleCoGroup: { symbol: pointGroupSymbol(own.map(({ matrix }) => matrix)), order: own.length },
    arms: extended.filter((rotation) => rotation.own).length / own.length,
    minusK: minusKOf(orbit, extended),
    halfLattice: halfLatticePoints(placed, acting, group.lattice, dual),
  };
}

/** For a k of no special value on the kind. With −1 in the group, −k is an arm of every star. */
function minusKOf({ flats, fixing }: FlatOrbit, extended: readonly ActingRotation[]): MinusK {
  const [{ lattice, across }] = flats as readonly [Flat];
  if (lattice.rows.length === 0 && across.every((entry) => (2 * entry) % pointDenominator === 0)) return "equivalent";
  // −R fixes k: R takes k to −k.
  const reversed = extended.every(({ own }) => own) || fixing.some(({ own }) => !own);
  return reversed ? "in star" : "not in star";
}

function compareKinds(a: KindOfK, b: KindOfK, withInversion: boolean): number {
  const dimensions = withInversion ? a.dimensionPM - b.dimensionPM : a.dimension - b.dimension;
  if (dimensions !== 0) return dimensions;
  if (a.arms !== b.arms) return a.arms - b.arms;
  for (const axis of [0, 1, 2] as const) {
    const [left, right] = [a.k.components[axis], b.k.components[axis]];
    const differences = [
      compare(left.constant, right.constant),
      ...left.coefficients.map((entry, letter) => compare(entry, right.coefficients[letter as 0 | 1 | 2])),
    ];
    const difference = differences.find((entry) => entry !== 0);
    if (difference !== undefined) return difference;
  }
  return 0;
}
