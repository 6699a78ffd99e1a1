import { dirichletCell, type HalfSpace, type PointImage } from "../algorithms/index.js";
import { visitBall } from "../reflections/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import { alongAxes, type FlatFrame, inner, type Triple } from "./flat-frame.js";

/** `t → matrix t + shift`: an isometry of the flat. */
export interface FlatMap {
  /** dimension × dimension row by row. */
  readonly matrix: Float64Array;
  readonly shift: Float64Array;
}

/** One asymmetric part of a flat, in the coordinates of its frame. */
export interface Wedge {
  /** Bounding half-spaces, nearest first. */
  readonly walls: readonly HalfSpace[];
  /** For each wall the map that leads from the origin's part to the one behind it. */
  readonly beyond: readonly FlatMap[];
  /** The box that just holds it. */
  readonly centre: Float64Array;
  readonly half: Float64Array;
  /** Operations of ±P that leave every point of the flat in place. */
  readonly fixing: number;
}

/** Å⁻¹ (or r.l.u.). Images nearer than this are one; the origin is chosen so that others are much further. */
const sameImage = 1e-7;

/** Square of it for what stands off the flat: rounding leaves some 1e-15, the next image is off by a good part of L*. */
const acrossFlat = 1e-10;

/**
 * The Dirichlet cell of the frame's origin among its images under the point group extended by −1 and L*, as far as these
 * map the flat onto itself: no table of zones is needed (used for reciprocal space by International Tables B, section 1.5).
 * Every k of the kind has an image in it.
 */
export function wedgeOf(group: SpaceGroup, frame: FlatFrame): Wedge {
  const longest = Math.sqrt(Math.max(...[0, 4, 8].map((index) => frame.metric[index] as number)));
  const actions = actionsOn(group, frame);
  const origin = new Array<number>(frame.dimension).fill(0);
  let fixing = 0;
  const { images, centre, half } = dirichletCell(origin, firstReach * longest, (within) => {
    const found = imagesOfOrigin(frame, actions, within);
    fixing = found.fixing;
    return found.images;
  });
  return {
    walls: images.map(({ halfSpace }) => halfSpace),
    beyond: images.map(({ map }) => map),
    centre: Float64Array.from(centre),
    half: Float64Array.from(half),
    fixing,
  };
}

/** Times the longest axis of L*: first distance up to which images are tried. */
const firstReach = 1.05;

interface Image extends PointImage {
  readonly distance: number;
  readonly map: FlatMap;
}

/** A rotation that keeps the direction of the flat. */
interface Action {
  readonly matrix: Float64Array;
  /** Image of the origin less the origin, before a vector of L* is added. */
  readonly shift: Triple;
}

function actionsOn(group: SpaceGroup, frame: FlatFrame): readonly Action[] {
  return extendedRotations(group).flatMap((rotation) => {
    const matrix = flatMatrix(frame, rotation);
    if (matrix === null) return [];
    const [x, y, z] = rotated(frame.origin, rotation);
    return [{ matrix, shift: [x - frame.origin[0], y - frame.origin[1], z - frame.origin[2]] as const }];
  });
}

function imagesOfOrigin(
  frame: FlatFrame,
  actions: readonly Action[],
  within: number,
): { images: Image[]; fixing: number } {
  const images: Image[] = [];
  let fixing = 0;
  for (const { matrix, shift } of actions)
    visitBall(frame.metric, shift, within * within, (n1, n2, n3) => {
      const { along, across } = alongAxes(frame, [shift[0] + n1, shift[1] + n2, shift[2] + n3]);
      if (across > acrossFlat) return;
      const distance = Math.hypot(...along);
      if (distance < sameImage) {
        fixing += 1;
        return;
      }
      images.push({
        distance,
        halfSpace: { normal: along.map((entry) => entry / distance), offset: distance / 2 },
        map: { matrix, shift: Float64Array.from(along) },
      });
    });
  return { images: images.sort((a, b) => a.distance - b.distance), fixing };
}

/** The point group extended by −1, as integer matrices on primitive rows. */
export function extendedRotations(group: SpaceGroup): readonly (readonly number[])[] {
  const both = group.primitive.rotations.flatMap((rotation) => [rotation, rotation.map((entry) => 0 - entry)]);
  return [...new Map(both.map((rotation) => [rotation.join(), rotation])).values()];
}

/** How a rotation acts along the flat, or null when it turns the flat into another direction. */
function flatMatrix(frame: FlatFrame, rotation: readonly number[]): Float64Array | null {
  const { dimension, axes, metric } = frame;
  const matrix = new Float64Array(dimension * dimension);
  for (let a = 0; a < dimension; a++) {
    const image = rotated(axes[a] as Triple, rotation);
    let inside = 0;
    for (let b = 0; b < dimension; b++) {
      const entry = inner(metric, image, axes[b] as Triple);
      matrix[b * dimension + a] = entry;
      inside += entry * entry;
    }
    // An isometry up to the rounding of the averaged metric: all of the unit vector stays inside, or it does not.
    if (inside < 1 - 1e-6) return null;
  }
  return matrix;
}

/** `row · rotation`. */
export function rotated(row: Triple, rotation: readonly number[]): [number, number, number] {
  const at = (column: 0 | 1 | 2): number =>
    row[0] * (rotation[column] as number) +
    row[1] * (rotation[3 + column] as number) +
    row[2] * (rotation[6 + column] as number);
  return [at(0), at(1), at(2)];
}

/** The image of a point inside the wedge, found by walking through its walls; changes `t` in place. */
export function foldInto(wedge: Wedge, t: Float64Array): void {
  for (let step = 0; step < mostFolds; step++) {
    let worst = -1;
    let excess = 1e-12;
    wedge.walls.forEach(({ normal, offset }, index) => {
      const beyond = normal.reduce((sum, entry, axis) => sum + entry * (t[axis] as number), -offset);
      if (beyond > excess) {
        worst = index;
        excess = beyond;
      }
    });
    if (worst < 0) return;
    t.set(inverseImage(wedge.beyond[worst] as FlatMap, t));
  }
}

const mostFolds = 100;

/** `matrixᵀ (t − shift)`. */
export function inverseImage({ matrix, shift }: FlatMap, t: ArrayLike<number>): Float64Array {
  const dimension = shift.length;
  const result = new Float64Array(dimension);
  for (let a = 0; a < dimension; a++)
    for (let b = 0; b < dimension; b++)
      result[a] =
        (result[a] as number) + (matrix[b * dimension + a] as number) * ((t[b] as number) - (shift[b] as number));
  return result;
}
