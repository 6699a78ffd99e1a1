/** The points x with `normal · x ≤ offset`; the normal has length 1. */
export interface HalfSpace {
  readonly normal: readonly number[];
  readonly offset: number;
}

/** A bounded convex set in one to three dimensions. */
export interface Polytope {
  readonly vertices: readonly (readonly number[])[];
  /** Indices of the half-spaces that bound it. */
  readonly active: readonly number[];
}

/** Share of the size within which a point counts as on a half-space. */
const slackShare = 1e-9;

/**
 * The polytope that half-spaces cut out. They are taken one after another; those that cut nothing off are dropped at
 * once, so that few are active at a time and every vertex can be found from every set of active planes (the plain form of
 * the double description method; G. M. Ziegler, Lectures on Polytopes, 1995, lecture 1). The first ones must bound it.
 */
export function polytope(halfSpaces: readonly HalfSpace[], dimension: number): Polytope {
  let active: number[] = [];
  let vertices: number[][] = [];
  let size = 1;
  halfSpaces.forEach((halfSpace, index) => {
    const begun = vertices.length > 0;
    if (begun && vertices.every((vertex) => along(halfSpace, vertex) <= slackShare * size)) return;
    active.push(index);
    const all = verticesOf(active, halfSpaces, dimension, slackShare * size);
    if (active.length < 2 * dimension) return;
    vertices = all;
    size = Math.max(...vertices.map((vertex) => Math.hypot(...vertex)), Number.MIN_VALUE);
    active = active.filter((at) =>
      vertices.some((vertex) => Math.abs(along(halfSpaces[at] as HalfSpace, vertex)) <= 2 * slackShare * size),
    );
  });
  return { vertices, active };
}

function along({ normal, offset }: HalfSpace, point: readonly number[]): number {
  return normal.reduce((sum, entry, axis) => sum + entry * (point[axis] as number), -offset);
}

function verticesOf(
  active: readonly number[],
  halfSpaces: readonly HalfSpace[],
  dimension: number,
  slack: number,
): number[][] {
  const planes = active.map((index) => halfSpaces[index] as HalfSpace);
  const found: number[][] = [];
  const visit = (chosen: readonly HalfSpace[], from: number): void => {
    if (chosen.length === dimension) {
      const point = meetingPoint(chosen);
      if (point !== null && planes.every((plane) => along(plane, point) <= slack)) found.push(point);
      return;
    }
    for (let index = from; index < planes.length; index++) visit([...chosen, planes[index] as HalfSpace], index + 1);
  };
  visit([], 0);
  return found;
}

/** Where d planes meet, by Cramer's rule; null when they do not meet in one point. */
function meetingPoint(planes: readonly HalfSpace[]): number[] | null {
  const rows = planes.map(({ normal }) => normal);
  const whole = determinant(rows);
  if (Math.abs(whole) < 1e-9) return null;
  return rows.map(
    (_, column) =>
      determinant(rows.map((row, index) => row.map((entry, at) => (at === column ? offsetOf(planes, index) : entry)))) /
      whole,
  );
}

function offsetOf(planes: readonly HalfSpace[], index: number): number {
  return (planes[index] as HalfSpace).offset;
}

function determinant(rows: readonly (readonly number[])[]): number {
  const at = (row: number, column: number): number => rows[row]?.[column] as number;
  if (rows.length === 1) return at(0, 0);
  if (rows.length === 2) return at(0, 0) * at(1, 1) - at(0, 1) * at(1, 0);
  return (
    at(0, 0) * (at(1, 1) * at(2, 2) - at(1, 2) * at(2, 1)) -
    at(0, 1) * (at(1, 0) * at(2, 2) - at(1, 2) * at(2, 0)) +
    at(0, 2) * (at(1, 0) * at(2, 1) - at(1, 1) * at(2, 0))
  );
}
