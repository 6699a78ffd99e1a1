import type { WaveVector } from "../kvectors/index.js";
import { roundNumber } from "../numbers/index.js";
import { visitBall } from "../reflections/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import type { KindBudget, KindFindings, Solution } from "./explanation.js";
import { alongAxes, type FlatFrame, flatFrame, lettersAt, pointAt, type Triple } from "./flat-frame.js";
import { distinctPoints } from "./search-flat.js";
import { mostSolutionsOfKind } from "./solve-flat.js";
import type { Region } from "./types.js";
import { extendedRotations, foldInto, rotated, type Wedge, wedgeOf } from "./wedge.js";

/** A peak of a crystal with the radius in Å⁻¹ of a ball that holds its tolerance, whatever way it is turned. */
export interface CrystalTarget {
  readonly hkl: Triple;
  readonly reach: number;
}

/**
 * The k of one kind where enough h k l of a crystal may match. Here no box need be split: a k that explains `wanted` of n
 * peaks explains one of the first n − wanted + 1, so it lies in the ball about an image of that one. All such balls that
 * reach the wedge are tried; at k every other matched peak has an image within both radii, which bounds the count.
 *
 * @param metric of the dual of the primitive basis, Å⁻² with 4π²
 */
export function solveCrystal(
  group: SpaceGroup,
  form: WaveVector,
  targets: readonly CrystalTarget[],
  metric: readonly number[],
  budget: KindBudget,
): KindFindings {
  const frame = flatFrame(group, form, metric);
  const wedge = wedgeOf(group, frame);
  const widest = Math.max(...targets.map(({ reach }) => reach));
  const images = targets.map((target) => imagesNear(group, frame, wedge, target, 3 * widest));
  const points: { t: Float64Array; matched: number; score: number; decided: boolean }[] = [];
  let tried = 0;
  targets.slice(0, targets.length - budget.wanted + 1).forEach(({ reach }, first) => {
    for (const start of images[first] as readonly Image[]) {
      if (start.across > reach * reach) continue;
      tried += 1;
      const near = targets.map((target, index) =>
        nearestImage(images[index] as readonly Image[], start.t, target.reach + reach),
      );
      if (near.filter((image) => image !== null).length < budget.wanted) continue;
      const t = meanOf(near, frame.dimension);
      const matched = targets.filter(
        (target, index) => nearestImage(images[index] as readonly Image[], t, target.reach) !== null,
      ).length;
      foldInto(wedge, t);
      points.push({ t, matched, score: matched, decided: matched >= budget.wanted });
    }
  });
  points.sort((a, b) => b.score - a.score);
  const { kept, complete } = distinctPoints(wedge, points, 2 * widest, mostSolutionsOfKind);
  return {
    solutions: kept.map(({ t, matched }, region): Solution => ({ k: waveVectorAt(frame, t), matched, region })),
    regions: kept.map(({ t, decided }) => regionAround(frame, t, widest, decided)),
    boxes: tried,
    smallestBox: widest,
    leaves: points.length,
    unexplored: 0,
    stopped: null,
    complete,
  };
}

interface Image {
  readonly t: Float64Array;
  /** Square of the distance from the flat. */
  readonly across: number;
}

function imagesNear(
  group: SpaceGroup,
  frame: FlatFrame,
  wedge: Wedge,
  { hkl }: CrystalTarget,
  margin: number,
): readonly Image[] {
  const { lattice } = group;
  const row = lattice.vectors.map(
    (vector) => vector.reduce((sum, entry, axis) => sum + entry * (hkl[axis] as number), 0) / lattice.denominator,
  ) as unknown as Triple;
  const middle = pointAt(frame, wedge.centre);
  const radius = Math.hypot(...wedge.half) + margin;
  const found: Image[] = [];
  for (const rotation of extendedRotations(group)) {
    const [x, y, z] = rotated(row, rotation);
    visitBall(frame.metric, [x - middle[0], y - middle[1], z - middle[2]], radius * radius, (n1, n2, n3) => {
      const { origin } = frame;
      const { along, across } = alongAxes(frame, [x + n1 - origin[0], y + n2 - origin[1], z + n3 - origin[2]]);
      if (across <= margin * margin) found.push({ t: Float64Array.from(along), across });
    });
  }
  return found;
}

function nearestImage(images: readonly Image[], t: Float64Array, within: number): Image | null {
  let best: Image | null = null;
  let least = within * within;
  for (const image of images) {
    let square = image.across;
    for (let a = 0; a < t.length; a++) square += ((image.t[a] as number) - (t[a] as number)) ** 2;
    if (square <= least) {
      least = square;
      best = image;
    }
  }
  return best;
}

function meanOf(images: readonly (Image | null)[], dimension: number): Float64Array {
  const used = images.filter((image) => image !== null);
  return Float64Array.from(
    { length: dimension },
    (_, axis) => used.reduce((sum, { t }) => sum + (t[axis] as number), 0) / used.length,
  );
}

function waveVectorAt(frame: FlatFrame, t: Float64Array): WaveVector {
  return {
    components: frame.form.components,
    values: lettersAt(frame, t).map((value) => roundNumber(value)),
    uncertainties: frame.originLetters.map(() => null),
  };
}

function regionAround(frame: FlatFrame, t: Float64Array, reach: number, decided: boolean): Region {
  const letters = lettersAt(frame, t);
  const spread = letters.map(
    (_, letter) =>
      reach *
      Math.hypot(...frame.lettersFromAxes.slice(letter * frame.dimension, letter * frame.dimension + frame.dimension)),
  );
  return {
    kind: frame.form,
    from: letters.map((value, letter) => value - (spread[letter] as number)),
    to: letters.map((value, letter) => value + (spread[letter] as number)),
    leaves: 1,
    decided,
  };
}
