import { dotIntegers, modulo, safe, vectorFrom } from "../numbers/index.js";
import type { Lattice } from "../spacegroups/index.js";
import { type ActingRotation, fixedDimension } from "./acting-rotations.js";
import { pointDenominator } from "./flats.js";
import { rotateRow } from "./integer-form.js";
import { combine, type DualBasis, descend, neighbourSteps, plainer } from "./plainest.js";
import type { PlacedFlat } from "./plainest-flat.js";
import type { WaveVector } from "./types.js";
import { exactWaveVector } from "./wave-vector.js";

const half = pointDenominator / 2;

/**
 * The k with 2k ∈ L* that are of a kind and of no smaller one, one of each star, on the kind as it is printed: those
 * whose place along it is 0 or 1/2, moved along it by L* to read plainly; the plainest first.
 */
export function halfLatticePoints(
  placed: PlacedFlat,
  acting: readonly ActingRotation[],
  lattice: Lattice,
  dual: DualBasis,
): readonly WaveVector[] {
  const { rows, inverse } = placed.flat.lattice;
  if (placed.flat.across.some((entry) => entry % half !== 0)) return [];
  const stars = new Map<string, (readonly number[])[]>();
  for (let code = 0; code < 2 ** rows.length; code++) {
    const place = rows.map((_, index) => (code >> index) & 1);
    const point = rotateRow([...place.map((entry) => half * entry), ...placed.flat.across], inverse);
    const images = acting.map(({ matrix }) => cornerOf(rotateRow(point, matrix)));
    const fixing = acting.filter((_, index) => images[index] === images[0]);
    if (fixedDimension(fixing) !== rows.length) continue;
    const star = [...new Set(images)].sort().join(" ");
    stars.set(star, [...(stars.get(star) ?? []), place]);
  }
  return stars.size === 0 ? [] : plainestOfStars(placed, [...stars.values()], lattice, dual);
}

/** Which of the eight halves of L* it is, as a digit. */
function cornerOf(point: readonly number[]): number {
  return point.reduce((code, entry) => 2 * code + (modulo(entry, pointDenominator) === 0 ? 0 : 1), 0);
}

/** Of the points of a placed flat at the places of each star, in halves along it, the one that reads most plainly. */
function plainestOfStars(
  { flat, frame, base }: PlacedFlat,
  stars: readonly (readonly (readonly number[])[])[],
  lattice: Lattice,
  dual: DualBasis,
): readonly WaveVector[] {
  const along = flat.lattice.rows.map((row) => combine(row, dual.rows));
  // Places along the flat in parts of 1/parts, points in the axes of the setting in parts of 1/denominator.
  const parts = safe(frame.denominator * lattice.denominator);
  const denominator = safe(parts * dual.denominator);
  const start = rotateRow(
    lattice.vectors.map((vector) => dotIntegers(base, vector)),
    flat.lattice.coordinates,
  );
  const fromBase = (place: readonly number[]): number[] =>
    combine(
      [denominator / frame.denominator, ...place.map((entry, index) => (entry * parts) / 2 - (start[index] as number))],
      [base, ...along],
    );
  const steps = neighbourSteps(along.map((row) => row.map((entry) => safe(entry * parts))));
  const inOrder = (a: readonly number[], b: readonly number[]): number => (plainer(a, b) ? -1 : plainer(b, a) ? 1 : 0);
  return stars
    .map((places) => places.map((place) => descend(fromBase(place), steps)).sort(inOrder)[0] as readonly number[])
    .sort(inOrder)
    .map((point) => exactWaveVector(vectorFrom(point, denominator)));
}
