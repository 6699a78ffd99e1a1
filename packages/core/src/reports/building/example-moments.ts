import { roundNumber } from "../../numbers/index.js";
import { type Cell, directMetric, lengthInMetric } from "../../spacegroups/index.js";
import { limitOf, type NamedSite } from "./parent-sites.js";

/** μB. The largest moment of an example where nothing says what the ion can have. */
const unknownMoment = 1;

/** Digits of an example in μB. */
const momentDigits = 8;

/** Vectors in lattice components that stand on a site of the parent. */
export interface ExampleVectors {
  readonly parentSite: string;
  readonly vectors: readonly (readonly number[])[];
}

/**
 * Turns lattice components of an example into μB along the unit vectors of the axes, with one scale for all sites such that
 * none exceeds what its free ion can have.
 */
export function exampleScale(
  cell: Cell,
  named: readonly NamedSite[],
  examples: readonly ExampleVectors[],
): (vector: readonly number[]) => readonly number[] {
  const metric = directMetric(cell);
  const lengths = [cell.a, cell.b, cell.c];
  let scale = Number.POSITIVE_INFINITY;
  for (const { parentSite, vectors } of examples) {
    const own = named.find(({ orbit }) => orbit.label === parentSite);
    const limit = (own && limitOf(own)) || unknownMoment;
    for (const vector of vectors) {
      const size = lengthInMetric(metric, vector);
      if (size > 0) scale = Math.min(scale, limit / size);
    }
  }
  return (vector) =>
    vector.map((entry, axis) =>
      entry === 0 ? 0 : roundNumber(entry * scale * (lengths[axis] as number), 1, momentDigits),
    );
}
