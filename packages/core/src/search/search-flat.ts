import { type BoxSearch, boxSearch, breathe, type WorkHost } from "../algorithms/index.js";
import { strayShare } from "./evidence.js";
import type { FlatFrame } from "./flat-frame.js";
import { leafPolisher, type PolishedPoint } from "./leaf-polish.js";
import { pairFilter } from "./pair-filter.js";
import { type AcceptedInterval, pairTable } from "./peak-pairs.js";
import { foldInto, inverseImage, type Wedge } from "./wedge.js";

/** Boxes between two looks at the clock. */
const boxesAtATime = 512;

/** Halvings of an open leaf along each axis before it is left undecided: the box is then a quarter of the leaf. */
const halvingsBelowLeaf = 2;

export interface FlatSearchSettings {
  /** Peaks that must match. */
  readonly wanted: number;
  /** Å⁻¹: half-diagonal of a leaf. */
  readonly leafRadius: number;
  /** Boxes after which the search is stopped. */
  readonly budget: number;
  /** Leaves after which the kind counts as saturated and the search is stopped. */
  readonly mostLeaves: number;
}

/** What branch and bound made of one flat. */
export interface FlatFindings {
  /** One point a settled leaf, in the order of `leaves`, mapped into the wedge. */
  readonly points: readonly PolishedPoint[];
  /** Centres of the settled leaves, `dimension` numbers each, and of those that could be neither settled nor excluded. */
  readonly leaves: readonly Float64Array[];
  readonly undecided: readonly Float64Array[];
  readonly leafHalf: Float64Array;
  /** Half-widths of the undecided boxes. */
  readonly openHalf: Float64Array;
  readonly boxes: number;
  /** Half-diagonal of the smallest box that was looked at. */
  readonly smallestBox: number;
  /** Share of the root box that was not looked at. */
  readonly unexplored: number;
  readonly stopped: "boxes" | "leaves" | null;
}

/**
 * Every part of a flat where at least `wanted` peaks match, by branch and bound over its wedge: what is not inside a
 * returned leaf is proved to match fewer. A leaf is settled when least squares from its middle finds a point that matches
 * enough; one where that fails is split further until it is excluded, settled, or far below any uncertainty.
 */
export async function searchFlat(
  frame: FlatFrame,
  wedge: Wedge,
  peaks: readonly AcceptedInterval[],
  settings: FlatSearchSettings,
  host: WorkHost,
): Promise<FlatFindings> {
  const table = pairTable(frame, wedge, peaks);
  const filter = pairFilter(table, wedge, peaks.length - settings.wanted);
  const { polish, judge } = leafPolisher(table, frame.dimension, {
    wanted: settings.wanted,
    drops: Math.min(2, peaks.length - settings.wanted),
    density: smoothDensity(frame, wedge),
    strayShare,
  });
  const points: PolishedPoint[] = [];
  const leaves: Float64Array[] = [];
  const undecided: Float64Array[] = [];
  let deepest = 0;
  const search: BoxSearch = boxSearch({
    centre: wedge.centre,
    half: wedge.half,
    leafRadius: settings.leafRadius,
    levelsBelowLeaf: halvingsBelowLeaf * frame.dimension,
    admits: filter.admits,
    settles: (level, centre) => {
      deepest = Math.max(deepest, level);
      // Below a leaf only boxes that are halved along every axis are looked into.
      if ((level - search.leafLevel) % frame.dimension !== 0) return false;
      const lists = filter.lists(level);
      const point = level === search.leafLevel ? polish(lists, centre) : judge(lists, centre);
      if (point.matched < settings.wanted) return false;
      leaves.push(centre.slice());
      points.push(point);
      return true;
    },
    leavesOpen: (_, centre) => undecided.push(centre.slice()),
  });
  let stopped: FlatFindings["stopped"] = null;
  for (;;) {
    if (search.advance(Math.min(boxesAtATime, settings.budget - search.boxes()))) break;
    if (search.boxes() >= settings.budget) stopped = "boxes";
    if (leaves.length + undecided.length >= settings.mostLeaves) stopped = "leaves";
    if (stopped !== null) break;
    await breathe(host);
  }
  for (const { t } of points) foldInto(wedge, t);
  return {
    points,
    leaves,
    undecided,
    leafHalf: search.halfAt(search.leafLevel),
    openHalf: search.halfAt(search.leafLevel + halvingsBelowLeaf * frame.dimension),
    boxes: search.boxes(),
    smallestBox: Math.hypot(...search.halfAt(deepest)),
    unexplored: search.unexplored(),
    stopped,
  };
}

/** How one undecided box came out after a closer look. */
export type Decision = PolishedPoint | "excluded" | "open";

/** Halvings along each axis, and boxes, that a closer look may take. */
const closerHalvings = 6;
const closerBoxes = 4000;

/** A closer look at boxes that the search left undecided, far below any uncertainty. */
export function decideBox(
  frame: FlatFrame,
  wedge: Wedge,
  peaks: readonly AcceptedInterval[],
  wanted: number,
  centre: Float64Array,
  half: Float64Array,
): { readonly decision: Decision; readonly boxes: number } {
  const part: Wedge = { ...wedge, centre, half };
  const table = pairTable(frame, part, peaks);
  const filter = pairFilter(table, part, peaks.length - wanted);
  const settings = { wanted, drops: peaks.length - wanted, density: smoothDensity(frame, wedge), strayShare };
  const { polish, judge } = leafPolisher(table, frame.dimension, settings);
  let found: PolishedPoint | null = null;
  let open = 0;
  const search = boxSearch({
    centre,
    half,
    leafRadius: Number.POSITIVE_INFINITY,
    levelsBelowLeaf: closerHalvings * frame.dimension,
    admits: (level, middle, widths) => found === null && filter.admits(level, middle, widths),
    settles: (level, middle) => {
      const point = level === 0 ? polish(filter.lists(level), middle) : judge(filter.lists(level), middle);
      if (point.matched < wanted) return false;
      found = point;
      return true;
    },
    leavesOpen: () => {
      open += 1;
    },
  });
  const done = search.advance(closerBoxes);
  const decision: Decision = (found as PolishedPoint | null) ?? (done && open === 0 ? "excluded" : "open");
  if (typeof decision !== "string") foldInto(wedge, decision.t);
  return { decision, boxes: search.boxes() };
}

/** Lines per Å⁻¹ over q²: vectors of a shell over the volume of L*'s cell and over the images that coincide on the flat. */
function smoothDensity(frame: FlatFrame, wedge: Wedge): number {
  const [a, b, c, , e, f, , , i] = frame.metric as unknown as Nine;
  const determinant = a * (e * i - f * f) - b * (b * i - f * c) + c * (b * f - e * c);
  return (4 * Math.PI) / (Math.sqrt(determinant) * wedge.fixing);
}

type Nine = readonly [number, number, number, number, number, number, number, number, number];

/** The first points that are apart from one another by more than `apart`, images by the wedge's walls counted as one. */
export function distinctPoints<Point extends PolishedPoint>(
  wedge: Wedge,
  points: readonly Point[],
  apart: number,
  most: number,
): { readonly kept: readonly Point[]; readonly complete: boolean } {
  const kept: Point[] = [];
  for (const point of points) {
    if (kept.some((other) => nearest(wedge, point.t, other.t) <= apart)) continue;
    if (kept.length === most) return { kept, complete: false };
    kept.push(point);
  }
  return { kept, complete: true };
}

function nearest(wedge: Wedge, a: Float64Array, b: Float64Array): number {
  let least = distance(a, b);
  for (const map of wedge.beyond) least = Math.min(least, distance(inverseImage(map, a), b));
  return least;
}

function distance(a: Float64Array, b: Float64Array): number {
  let square = 0;
  for (let axis = 0; axis < a.length; axis++) square += ((a[axis] as number) - (b[axis] as number)) ** 2;
  return Math.sqrt(square);
}
