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
 * The polytope that half-spaces cut out. They are taken one after another: one that cuts nothing off is passed over, one
 * that does takes its vertices away and adds those where it meets the planes of the others (the double description
 * method; T. S. Motzkin et al., Contributions to the Theory of Games 2, 1953, 51). The first ones must bound it: a
 * box, as pairs of opposite planes.
 */
export function polytope(halfSpaces: readonly HalfSpace[], dimension: number): Polytope {
  const sides = 2 * dimension;
  let active = Array.from({ length: sides }, (_, index) => index);
  let vertices = verticesWith(null, active, halfSpaces, dimension, slackShare);
  for (let index = sides; index < halfSpaces.length; index++) {
    const added = halfSpaces[index] as HalfSpace;
    const size = Math.max(...vertices.map((vertex) => Math.hypot(...vertex)), Number.MIN_VALUE);
    const slack = slackShare * size;
    const kept = vertices.filter((vertex) => above(added, vertex) <= slack);
    if (kept.length === vertices.length) continue;
    vertices = [...kept, ...verticesWith(index, active, halfSpaces, dimension, slack)];
    active = [...active, index].filter((at) =>
      vertices.some((vertex) => Math.abs(above(halfSpaces[at] as HalfSpace, vertex)) <= 2 * slack),
    );
  }
  return { vertices, active };
}

function above({ normal, offset }: HalfSpace, point: readonly number[]): number {
  let sum = -offset;
  for (let axis = 0; axis < point.length; axis++) sum += (normal[axis] as number) * (point[axis] as number);
  return sum;
}

/** Where planes of `active` (and, if given, the plane `added` every time) meet without another cutting the point off. */
function verticesWith(
  added: number | null,
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
      if (point === null || planes.some((plane) => above(plane, point) > slack)) return;
      found.push(point);
      return;
    }
    for (let index = from; index < planes.length; index++) visit([...chosen, planes[index] as HalfSpace], index + 1);
  };
  visit(added === null ? [] : [halfSpaces[added] as HalfSpace], 0);
  return found;
}

/** Where d planes meet, by Cramer's rule; null when they do not meet in one point. */
function meetingPoint(planes: readonly HalfSpace[]): number[] | null {
  const [first, second, third] = planes as [HalfSpace, HalfSpace, HalfSpace];
  const [a0, a1, a2] = first.normal as [number, number, number];
  if (planes.length === 1) return [first.offset / a0];
  const [b0, b1, b2] = second.normal as [number, number, number];
  if (planes.length === 2) {
    const whole = a0 * b1 - a1 * b0;
    if (Math.abs(whole) < leastAngle) return null;
    return [(first.offset * b1 - a1 * second.offset) / whole, (a0 * second.offset - first.offset * b0) / whole];
  }
  const [c0, c1, c2] = third.normal as [number, number, number];
  const [bc0, bc1, bc2] = [b1 * c2 - b2 * c1, b2 * c0 - b0 * c2, b0 * c1 - b1 * c0];
  const whole = a0 * bc0 + a1 * bc1 + a2 * bc2;
  if (Math.abs(whole) < leastAngle) return null;
  const [ca0, ca1, ca2] = [c1 * a2 - c2 * a1, c2 * a0 - c0 * a2, c0 * a1 - c1 * a0];
  const [ab0, ab1, ab2] = [a1 * b2 - a2 * b1, a2 * b0 - a0 * b2, a0 * b1 - a1 * b0];
  const [p, q, r] = [first.offset / whole, second.offset / whole, third.offset / whole];
  return [p * bc0 + q * ca0 + r * ab0, p * bc1 + q * ca1 + r * ab1, p * bc2 + q * ca2 + r * ab2];
}

/** Planes whose normals span less than this are taken as parallel. */
const leastAngle = 1e-9;
