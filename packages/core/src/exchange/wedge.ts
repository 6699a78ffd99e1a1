import { dirichletCell, type HalfSpace, type PointImage } from "../algorithms/index.js";
import { invertUnimodular } from "../numbers/index.js";
import { visitBall } from "../reflections/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { fromZone, toCartesian, toZone, type ZoneFrame } from "./zone-frame.js";

/** One asymmetric part of the zone of a frame, in Cartesian x, and the box that just holds it. */
export interface ZoneWedge {
  readonly walls: readonly HalfSpace[];
  readonly centre: readonly number[];
  readonly half: readonly number[];
  /** How the point group extended by −1 acts on q: r × r matrices on columns, `q' = M q`. */
  readonly actions: readonly (readonly number[])[];
  /** The q with 2q in the lattice of q, in Cartesian x: two branches often cross in a narrow hollow about one of them. */
  readonly halves: readonly (readonly number[])[];
}

/** A q on no element of symmetry, in the middle of nowhere. */
const generic = [0.1234567, 0.3127043, 0.2211953];

/** The Dirichlet cell of a generic point among its images under the point group extended by −1 and the lattice of q. */
export function zoneWedge(group: SpaceGroup, frame: ZoneFrame): ZoneWedge {
  const { rank } = frame;
  const actions = zoneActions(group, frame);
  const start = generic.slice(0, rank);
  const metric = threeDimensional(frame);
  const longest = Math.max(...Array.from({ length: rank }, (_, a) => Math.sqrt(frame.metric[a * rank + a] as number)));
  const { images, centre, half } = dirichletCell(toCartesian(frame, start), longest, (within) =>
    imagesOf(frame, actions, start, metric, within),
  );
  return { walls: images.map(({ halfSpace }) => halfSpace), actions, halves: halfPoints(frame), centre, half };
}

function halfPoints(frame: ZoneFrame): number[][] {
  return Array.from({ length: 1 << frame.rank }, (_, bits) =>
    toCartesian(
      frame,
      Array.from({ length: frame.rank }, (_, a) => (bits & (1 << a) ? 0.5 : 0)),
    ),
  );
}

/** `κ → κ R⁻¹` as seen by q; both signs, each once. */
export function zoneActions(group: SpaceGroup, frame: ZoneFrame): number[][] {
  const { rank } = frame;
  const found = new Map<string, number[]>();
  for (const rotation of group.primitive.rotations) {
    const inverse = invertUnimodular(rotation);
    const columns = Array.from({ length: rank }, (_, a) => {
      const kappa = fromZone(
        frame,
        Array.from({ length: rank }, (_, b) => (a === b ? 1 : 0)),
      );
      return toZone(
        frame,
        [0, 1, 2].map((axis) =>
          kappa.reduce((sum, entry, row) => sum + entry * (inverse[3 * row + axis] as number), 0),
        ),
      );
    });
    for (const sign of [1, -1]) {
      const matrix = Array.from(
        { length: rank * rank },
        (_, at) => sign * Math.round(columns[at % rank]?.[Math.floor(at / rank)] as number) + 0,
      );
      found.set(matrix.join(), matrix);
    }
  }
  return [...found.values()];
}

/** The images of the point at most this far from it, nearest first. */
function imagesOf(
  frame: ZoneFrame,
  actions: readonly (readonly number[])[],
  start: readonly number[],
  metric: readonly number[],
  within: number,
): PointImage[] {
  const { rank } = frame;
  const origin = toCartesian(frame, start);
  const found: (PointImage & { readonly distance: number })[] = [];
  for (const action of actions) {
    const image = start.map((_, row) =>
      start.reduce((sum, entry, b) => sum + (action[row * rank + b] as number) * entry, 0),
    );
    const step = [0, 1, 2].map((a) => (a < rank ? (image[a] as number) - (start[a] as number) : 0));
    visitBall(metric, step, within * within, (n1, n2, n3, square) => {
      const length = Math.sqrt(square);
      if (length < 1e-9) return;
      const q = [n1, n2, n3].slice(0, rank).map((n, a) => n + (image[a] as number));
      const normal = toCartesian(frame, q).map((entry, a) => (entry - (origin[a] as number)) / length);
      const offset = normal.reduce((sum, entry, a) => sum + entry * (origin[a] as number), length / 2);
      found.push({ halfSpace: { normal, offset }, distance: length });
    });
  }
  return found.sort((a, b) => a.distance - b.distance);
}

/** The metric of q with the axes that are not there so long that no vector along them is short. */
function threeDimensional({ rank, metric }: ZoneFrame): number[] {
  const longest = Math.max(...metric.map(Math.abs));
  return Array.from({ length: 9 }, (_, at) => {
    const [row, column] = [Math.floor(at / 3), at % 3];
    if (row < rank && column < rank) return metric[row * rank + column] as number;
    return row === column ? 1e12 * longest : 0;
  });
}

/** Whether the whole box lies beyond a wall: its points have images inside, which other boxes look at. */
export function beyondWalls(walls: readonly HalfSpace[], centre: ArrayLike<number>, half: ArrayLike<number>): boolean {
  for (const { normal, offset } of walls) {
    let near = -offset;
    for (let a = 0; a < normal.length; a++)
      near += (normal[a] as number) * (centre[a] as number) - Math.abs(normal[a] as number) * (half[a] as number);
    if (near > 1e-9 * Math.abs(offset) + 1e-12) return true;
  }
  return false;
}

/** All q of the star of a q, in [0, 1), without repetition. */
export function starOfZone(actions: readonly (readonly number[])[], q: readonly number[]): number[][] {
  const rank = q.length;
  const found: number[][] = [];
  for (const action of actions) {
    const image = q.map((_, row) => q.reduce((sum, entry, b) => sum + (action[row * rank + b] as number) * entry, 0));
    const reduced = image.map((entry) => entry - Math.floor(entry + sameQ));
    if (!found.some((one) => sameZonePoint(one, reduced))) found.push(reduced);
  }
  return found;
}

/** Share of a reciprocal lattice vector within which two computed q are one. */
const sameQ = 1e-6;

/** Whether two q differ by integers. */
export function sameZonePoint(a: readonly number[], b: readonly number[], within = sameQ): boolean {
  return a.every((entry, axis) => {
    const step = entry - (b[axis] as number);
    return Math.abs(step - Math.round(step)) < within;
  });
}
