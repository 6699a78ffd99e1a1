import { atlas, type KindOfK, usedParameters, waveVectorToJson } from "../../kvectors/index.js";
import { toNumber } from "../../numbers/index.js";
import type { SpaceGroup } from "../../spacegroups/index.js";
import type { CellRecord, KRecord } from "../records/common.js";
import type { RunRecord } from "../records/run.js";
import { kForm, kShort } from "../text/names.js";
import { groupOf, waveVectorOf } from "./group-of-record.js";
import { combine, directAxes, dualAxes, plus, size, times, type Vector } from "./space.js";
import { imagesInZone, lineInZone, type ZoneFace, type ZoneShape, zoneShape } from "./zone-shape.js";

/** A kind of k that the drawing shows; `number` is its number in the list of kinds. */
export interface ZonePoint {
  readonly number: number;
  readonly k: string;
  /** All its places in the closed zone, Å⁻¹, those of ±k as it is written first. */
  readonly places: readonly Vector[];
  /** How many of the places are those of ±k as it is written: one of them bears the label. */
  readonly own: number;
}

export interface ZoneLine {
  readonly number: number;
  readonly k: string;
  readonly ends: readonly [Vector, Vector];
}

/** A candidate for k with all arms of its star, and −k, in the zone. */
export interface ZoneMark {
  readonly name: string;
  readonly k: string;
  readonly followed: boolean;
  /** As those of a point. */
  readonly places: readonly Vector[];
  readonly own: number;
  /** The line of its kind through one arm; null for points, planes and the general kind. */
  readonly line: readonly [Vector, Vector] | null;
}

/** All that the drawing of the first zone shows, as plain data. */
export interface ZoneData {
  readonly faces: readonly ZoneFace[];
  readonly axes: readonly { readonly name: string; readonly to: Vector }[];
  readonly points: readonly ZonePoint[];
  readonly lines: readonly ZoneLine[];
  readonly marks: readonly ZoneMark[];
}

/** Candidates that are marked, where their evidence says anything at all. */
const shownCandidates = 6;

/** The zone of a run; null without a cell, or where the group has no name. */
export function zoneData(record: RunRecord): ZoneData | null {
  const group = groupOf(record.group);
  if (group === null || record.cell === null) return null;
  const dual = dualAxes(directAxes(record.cell));
  const shape = zoneShape(reciprocalBasis(group, record.cell));
  const turns = rotations(group);
  const kinds = atlas(group, { withInversion: true });
  const place = (k: readonly number[]) => combine(dual, k);
  return {
    faces: shape.faces,
    axes: ["a*", "b*", "c*"].map((name, index) => ({ name, to: axisEnd(shape, dual[index] as Vector) })),
    points: kinds.flatMap((kind, index): ZonePoint[] => {
      if (kind.dimensionPM !== 0) return [];
      const { base } = affine(kind);
      return [{ number: index + 1, k: formOf(kind), ...everywhere(shape, turns, base, place) }];
    }),
    lines: kinds.flatMap((kind, index): ZoneLine[] => {
      if (kind.dimensionPM !== 1) return [];
      const { base, directions } = affine(kind);
      const ends = nearestLine(shape, place(base), place(directions[0] ?? [0, 0, 0]));
      return ends === null ? [] : [{ number: index + 1, k: formOf(kind), ends }];
    }),
    marks: zoneMarks(record, shape, turns, place),
  };
}

/** A basis of L* with 2π: the dual of the primitive basis. */
function reciprocalBasis({ lattice }: SpaceGroup, cell: CellRecord): readonly [Vector, Vector, Vector] {
  const axes = directAxes(cell);
  const primitive = lattice.vectors.map((row) => times(combine(axes, row), 1 / lattice.denominator));
  return dualAxes(primitive as [Vector, Vector, Vector]);
}

/** The rotations of the group and their negatives, acting on rows. */
function rotations(group: SpaceGroup): ((k: readonly number[]) => number[])[] {
  return group.operators.flatMap(({ rotation, rotationDenominator }) =>
    [1, -1].map(
      (sign) => (k: readonly number[]) =>
        [0, 1, 2].map(
          (column) =>
            (sign * k.reduce((sum, entry, row) => sum + entry * (rotation[3 * row + column] ?? 0), 0)) /
            rotationDenominator,
        ),
    ),
  );
}

type Turns = ReturnType<typeof rotations>;
type Place = (k: readonly number[]) => Vector;

/** Every image of k in the closed zone, once; those of ±k itself, modulo L*, first. */
function everywhere(
  shape: ZoneShape,
  turns: Turns,
  k: readonly number[],
  place: Place,
): Pick<ZonePoint, "places" | "own"> {
  const scale = 1e-5 * size(shape.near[0] as Vector);
  const found: Vector[] = [];
  const add = (vector: readonly number[]) => {
    for (const image of imagesInZone(shape, place(vector)))
      if (!found.some((other) => size(plus(other, image, -1)) < scale)) found.push(image);
  };
  add(k);
  add(k.map((entry) => -entry));
  const own = found.length;
  for (const turn of turns) add(turn(k));
  return { places: found, own };
}

function affine({ k }: KindOfK): { readonly base: number[]; readonly directions: readonly number[][] } {
  return {
    base: k.components.map(({ constant }) => toNumber(constant)),
    directions: ([0, 1, 2] as const)
      .map((letter) => k.components.map(({ coefficients }) => toNumber(coefficients[letter])))
      .filter((direction) => direction.some((entry) => entry !== 0)),
  };
}

/** The line, or that of its equivalents that comes nearest to the centre, inside the zone. */
function nearestLine(shape: ZoneShape, base: Vector, direction: Vector): readonly [Vector, Vector] | null {
  const square = size(direction) ** 2;
  const foot = (point: Vector) => {
    const along = (point[0] * direction[0] + point[1] * direction[1] + point[2] * direction[2]) / square;
    return size(plus(point, direction, -along));
  };
  const starts = [base, ...shape.near.map((vector) => plus(base, vector, -1))]
    .map((start, index) => ({ start, index, distance: Number(foot(start).toPrecision(9)) }))
    .sort((a, b) => a.distance - b.distance || a.index - b.index);
  for (const { start } of starts) {
    const ends = lineInZone(shape, start, direction);
    if (ends !== null) return ends;
  }
  return null;
}

/** From the centre through the surface of the zone, and a little beyond. */
function axisEnd(shape: ZoneShape, axis: Vector): Vector {
  const ends = lineInZone(shape, [0, 0, 0], axis);
  const reach = ends === null ? 0.5 * size(axis) : size(ends[1]);
  return times(axis, (reach * 1.28) / size(axis));
}

function formOf({ k }: KindOfK): string {
  return kForm(waveVectorToJson(k));
}

function zoneMarks(record: RunRecord, shape: ZoneShape, turns: Turns, place: Place): ZoneMark[] {
  const branches = record.branches.map((branch, index) => ({
    k: branch.k,
    manifold: branch.star.manifoldPM,
    name: branch.candidate === null ? `k${index + 1}` : `k${branch.candidate + 1}`,
    followed: true,
    candidate: branch.candidate,
  }));
  const others = (record.search?.candidates ?? [])
    .map(({ k, manifold, evidence: { reading } }, candidate) => ({
      k,
      manifold,
      name: `k${candidate + 1}`,
      followed: false,
      candidate,
      reading,
    }))
    .filter((one) => one.candidate < shownCandidates && !branches.some(({ candidate }) => candidate === one.candidate))
    .filter(({ reading }) => reading !== "not informative");
  return [...branches, ...others].flatMap(({ k, manifold, name, followed }) => {
    if (k.numeric === null) return [];
    const { places, own } = everywhere(shape, turns, k.numeric, place);
    const first = places[0] as Vector;
    const direction = lineDirection(manifold);
    const line = direction === null || !followed ? null : lineInZone(shape, first, place(direction));
    return [{ name, k: kShort(k), followed, places, own, line }];
  });
}

/** The direction of a form in one letter; null for other kinds. */
function lineDirection(form: KRecord): number[] | null {
  const k = waveVectorOf(form);
  const [letter, second] = usedParameters(k);
  if (letter === undefined || second !== undefined) return null;
  return k.components.map(({ coefficients }) => toNumber(coefficients[letter as 0 | 1 | 2]));
}
