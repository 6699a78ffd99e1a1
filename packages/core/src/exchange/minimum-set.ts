import type { Interaction } from "./interaction.js";
import type { Leaf, ZoneMinimum } from "./minimise.js";
import { descend } from "./polish.js";
import { sameZonePoint, starOfZone } from "./wedge.js";
import { fromCartesian } from "./zone-frame.js";

/** The minima that the boxes left over hold, as q of the frame. */
export interface ZoneMinima {
  /** Of the part of k that bonds notice. */
  readonly dimension: number;
  /** One of each star; some of a continuous set. */
  readonly points: readonly (readonly number[])[];
  /** The lowest eigenvalue that was met: lower than that of the search where a box hid it. */
  readonly lowest: number;
}

/** Share of the zone within which a heap of boxes counts as one place. */
const placeShare = 0.02;
const mostSamples = 60;

/**
 * Sorts the boxes that may hold a minimum into heaps. A heap of the extent of a few boxes is one isolated minimum; in a
 * larger one descents from many of its boxes show whether its points all are minima, and how many dimensions they fill.
 */
export function minimaOf(interaction: Interaction, found: ZoneMinimum, tolerance: number): ZoneMinima {
  const { frame } = interaction;
  if (frame.rank === 0) return { dimension: 0, points: [[]], lowest: found.value };
  const limit = found.value + tolerance;
  const near = Math.max(placeShare * found.size, 6 * found.leafRadius);
  const points: number[][] = [];
  let dimension = 0;
  let lowest = found.value;
  for (const heap of heaps(found.leaves)) {
    const samples = spread(heap, extentOf(heap) <= near ? 3 : mostSamples);
    const descents = samples.map(({ centre }) => descend(found.branch, centre, found.size, interaction.scale));
    lowest = descents.reduce((least, { value }) => Math.min(least, value), lowest);
    const ends = descents
      .filter(({ value }) => value <= limit)
      .sort((a, b) => a.value - b.value)
      .map(({ x }) => [...x]);
    const distinct = separate(ends, 1e-4 * found.size);
    const large = extentOf(heap) > near;
    const flat = large && distinct.length > 0.4 * ends.length && distinct.length > 5;
    if (flat) dimension = Math.max(dimension, localDimension(distinct, frame.rank));
    // Where the second derivative nearly vanishes, descents end here and there about one minimum.
    const kept = flat ? distinct : large ? separate(ends, near / 2) : ends.slice(0, 1);
    points.push(...kept.map((x) => fromCartesian(frame, x)));
  }
  // The deepest point alone, where no descent from the boxes that are left over ended in its narrow hollow.
  if (points.length === 0) points.push(fromCartesian(frame, found.x));
  return { dimension, points: oneOfEachStar(found, points), lowest };
}

/** Points that no operator and no vector of the reciprocal lattice makes equal. */
function oneOfEachStar(found: ZoneMinimum, points: readonly (readonly number[])[]): number[][] {
  const kept: { readonly q: readonly number[]; readonly star: readonly (readonly number[])[] }[] = [];
  for (const q of points)
    if (!kept.some(({ star }) => star.some((one) => sameZonePoint(one, q, 1e-5))))
      kept.push({ q, star: starOfZone(found.wedge.actions, q) });
  return kept.map(({ q }) => [...q]);
}

/** Boxes that touch, directly or through others. All have one shape. */
function heaps(leaves: readonly Leaf[]): Leaf[][] {
  const first = leaves[0];
  if (!first) return [];
  const placeOf = ({ centre }: Leaf) =>
    Array.from(centre, (entry, a) =>
      Math.round((entry - (first.centre[a] as number)) / (2 * (first.half[a] as number))),
    );
  const byPlace = new Map(leaves.map((leaf) => [placeOf(leaf).join(), leaf]));
  const result: Leaf[][] = [];
  const open = new Set(byPlace.keys());
  for (const start of byPlace.keys()) {
    if (!open.delete(start)) continue;
    const heap: Leaf[] = [];
    const queue = [start];
    for (let key = queue.pop(); key !== undefined; key = queue.pop()) {
      heap.push(byPlace.get(key) as Leaf);
      for (const next of around(key.split(",").map(Number))) if (open.delete(next)) queue.push(next);
    }
    result.push(heap);
  }
  return result;
}

function around(place: readonly number[]): string[] {
  return place
    .reduce<number[][]>((rows, entry) => rows.flatMap((row) => [-1, 0, 1].map((step) => [...row, entry + step])), [[]])
    .map((row) => row.join());
}

function extentOf(heap: readonly Leaf[]): number {
  const rank = (heap[0] as Leaf).centre.length;
  return Math.hypot(
    ...Array.from({ length: rank }, (_, a) => {
      const along = heap.map(({ centre }) => centre[a] as number);
      return along.reduce((x, y) => Math.max(x, y)) - along.reduce((x, y) => Math.min(x, y));
    }),
  );
}

/** At most `count` of them, evenly through the list. */
function spread<T>(items: readonly T[], count: number): T[] {
  if (items.length <= count) return [...items];
  return Array.from({ length: count }, (_, n) => items[Math.floor(((n + 0.5) * items.length) / count)] as T);
}

function separate(points: readonly number[][], within: number): number[][] {
  const kept: number[][] = [];
  for (const point of points) if (!kept.some((one) => apart(one, point) < within)) kept.push(point);
  return kept;
}

function apart(a: readonly number[], b: readonly number[]): number {
  return Math.hypot(...a.map((entry, axis) => entry - (b[axis] as number)));
}

/** How many dimensions points fill near one of them: principal axes of the nearest neighbours, the middle of all. */
function localDimension(points: readonly number[][], rank: number): number {
  const dimensions = points
    .map((point) => {
      const near = [...points].sort((a, b) => apart(a, point) - apart(b, point)).slice(1, 2 + 2 * rank);
      return filledBy(
        near.map((one) => one.map((entry, axis) => entry - (point[axis] as number))),
        rank,
      );
    })
    .sort((a, b) => a - b);
  return dimensions[Math.floor(dimensions.length / 2)] as number;
}

/** Smallest share of the longest principal axis, squared, that counts. */
const filledShare = 0.05;

function filledBy(steps: readonly (readonly number[])[], rank: number): number {
  let rest = steps.map((step) => [...step]);
  let longest = 0;
  let dimension = 0;
  for (let axis = 0; axis < rank; axis++) {
    const direction = principal(rest);
    const along = rest.map((step) => step.reduce((sum, entry, a) => sum + entry * (direction[a] as number), 0));
    const square = along.reduce((sum, entry) => sum + entry * entry, 0);
    if (axis === 0) longest = square;
    if (square <= filledShare * longest) break;
    dimension += 1;
    rest = rest.map((step, index) =>
      step.map((entry, a) => entry - (along[index] as number) * (direction[a] as number)),
    );
  }
  return Math.max(1, dimension);
}

/** Unit vector along which the steps are longest, by repeated multiplication. */
function principal(steps: readonly (readonly number[])[]): number[] {
  const start = [...steps].sort((a, b) => Math.hypot(...b) - Math.hypot(...a))[0] as readonly number[];
  let direction = [...start];
  for (let step = 0; step < 30; step++) {
    const next = direction.map(() => 0);
    for (const one of steps) {
      const along = one.reduce((sum, entry, a) => sum + entry * (direction[a] as number), 0);
      one.forEach((entry, a) => {
        next[a] = (next[a] as number) + along * entry;
      });
    }
    const length = Math.hypot(...next);
    if (length === 0) break;
    direction = next.map((entry) => entry / length);
  }
  const length = Math.hypot(...direction);
  return direction.map((entry) => (length === 0 ? 0 : entry / length));
}
