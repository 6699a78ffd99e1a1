import { combine, cross, dot, plus, size, times, unit, type Vector } from "./space.js";

/** One face of the first zone: the lattice vector that it halves, and its corners in order. */
export interface ZoneFace {
  readonly normal: Vector;
  readonly corners: readonly Vector[];
}

/** The first zone of a lattice, with the lattice vectors that can bound it, shortest first. */
export interface ZoneShape {
  readonly faces: readonly ZoneFace[];
  readonly near: readonly Vector[];
}

/** Share of a length below which two points of a drawing are one. */
const same = 1e-7;

/**
 * The Wigner–Seitz cell of the lattice spanned by `basis`: all points nearer to 0 than to any other lattice point
 * (Ashcroft & Mermin, Solid State Physics (1976), chapter 4). Each face is a large square in its plane, cut by all others.
 */
export function zoneShape(basis: readonly [Vector, Vector, Vector]): ZoneShape {
  const near = shortVectors(reduced(basis));
  const reach = 4 * size(near[near.length - 1] as Vector);
  const faces = near.flatMap((normal) => {
    const corners = near.reduce<readonly Vector[]>(
      (polygon, other) => (other === normal ? polygon : cut(polygon, other)),
      square(normal, reach),
    );
    const clean = corners.filter((corner, index) => {
      const before = corners[(index + corners.length - 1) % corners.length] as Vector;
      return size(plus(corner, before, -1)) > same * size(normal);
    });
    return clean.length < 3 ? [] : [{ normal, corners: clean }];
  });
  return { faces, near };
}

/** The basis with each vector as short as the others can make it (pairwise Gauss reduction). */
function reduced(basis: readonly [Vector, Vector, Vector]): readonly [Vector, Vector, Vector] {
  const found: [Vector, Vector, Vector] = [...basis];
  for (let changed = true; changed; ) {
    changed = false;
    for (const i of [0, 1, 2] as const)
      for (const j of [0, 1, 2] as const) {
        if (i === j) continue;
        const steps = Math.round(dot(found[i], found[j]) / dot(found[j], found[j]));
        if (steps === 0) continue;
        const shorter = plus(found[i], found[j], -steps);
        if (size(shorter) >= size(found[i]) * (1 - 1e-9)) continue;
        found[i] = shorter;
        changed = true;
      }
  }
  return found;
}

/** Vectors with coefficients up to ±2: all that can bound the zone of a reduced basis. */
function shortVectors(basis: readonly [Vector, Vector, Vector]): Vector[] {
  const steps = [-2, -1, 0, 1, 2];
  return steps
    .flatMap((x) => steps.flatMap((y) => steps.map((z) => combine(basis, [x, y, z]))))
    .filter((vector) => size(vector) > 0)
    .map((vector, index) => ({ vector, index }))
    .sort((a, b) => roundedSize(a.vector) - roundedSize(b.vector) || a.index - b.index)
    .map(({ vector }) => vector);
}

/** So that equal lengths keep their order. */
function roundedSize(vector: Vector): number {
  return Number(size(vector).toPrecision(10));
}

function square(normal: Vector, reach: number): Vector[] {
  const foot = times(normal, 0.5);
  const [x, y, z] = normal.map(Math.abs) as [number, number, number];
  const off: Vector = x <= y && x <= z ? [1, 0, 0] : y <= z ? [0, 1, 0] : [0, 0, 1];
  const first = unit(cross(normal, off));
  const second = unit(cross(normal, first));
  return [
    [1, 1],
    [-1, 1],
    [-1, -1],
    [1, -1],
  ].map(([u = 0, v = 0]) => plus(plus(foot, first, u * reach), second, v * reach));
}

/** The part of a polygon on this side of the plane that halves `other` (Sutherland & Hodgman, CACM 17 (1974) 32). */
function cut(polygon: readonly Vector[], other: Vector): Vector[] {
  const half = dot(other, other) / 2;
  const over = (point: Vector) => dot(point, other) / half - 1;
  return polygon.flatMap((point, index) => {
    const next = polygon[(index + 1) % polygon.length] as Vector;
    const [here, there] = [over(point), over(next)];
    const inside = here <= same;
    const crosses = (here > same && there < -same) || (here < -same && there > same);
    const crossing = crosses ? [plus(point, plus(next, point, -1), here / (here - there))] : [];
    return [...(inside ? [point] : []), ...crossing];
  });
}

/** The equivalents of a point in the closed zone: one inside, several on its surface; in the order of `near`. */
export function imagesInZone({ near }: ZoneShape, point: Vector): Vector[] {
  let inside = point;
  for (;;) {
    const step = near.find((vector) => size(plus(inside, vector, -1)) < size(inside) * (1 - 1e-9) - 1e-12);
    if (step === undefined) break;
    inside = plus(inside, step, -1);
  }
  const length = size(inside);
  const scale = size(near[0] as Vector);
  const others = near
    .map((vector) => plus(inside, vector, -1))
    .filter((image) => Math.abs(size(image) - length) < 1e-6 * scale && size(plus(image, inside, -1)) > 1e-6 * scale);
  return [inside, ...others];
}

/** The part of a line inside the closed zone, or null. */
export function lineInZone({ near }: ZoneShape, base: Vector, direction: Vector): readonly [Vector, Vector] | null {
  let [from, to] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  for (const vector of near) {
    const half = dot(vector, vector) / 2;
    const slope = dot(direction, vector);
    const room = half * (1 + 1e-6) - dot(base, vector);
    if (Math.abs(slope) < 1e-9 * half) {
      if (room < 0) return null;
    } else if (slope > 0) to = Math.min(to, room / slope);
    else from = Math.max(from, room / slope);
  }
  return to - from > 1e-5 ? [plus(base, direction, from), plus(base, direction, to)] : null;
}
