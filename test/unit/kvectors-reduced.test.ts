import { equivalentWaveVectors, numericWaveVector } from "@kvane/core/kvectors";
import { parseGroup } from "@kvane/core/spacegroups";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { parseWaveVector, placeWaveVector, reducedRepresentative } from "#core/kvectors/index.js";

const seed = 20261202;
const groups = ["P n m a", "F m -3 m", "I 41/a m d:2", "R -3 m:H", "C 2/c", "P 63/m m c"].map((text) =>
  parseGroup(text),
);
const component = fc.tuple(fc.integer({ min: -14, max: 14 }), fc.constantFrom(1, 2, 3, 4));

describe("the plainest of all k + H", () => {
  test("differs from k by a vector of L*, is no longer, and is its own", () => {
    fc.assert(
      fc.property(fc.constantFrom(...groups), fc.tuple(component, component, component), (group, parts) => {
        const text = parts.map(([top, bottom]) => `${top}/${bottom}`).join(",");
        const { k } = placeWaveVector(group, parseWaveVector(text));
        const reduced = reducedRepresentative(group, k);
        expect(equivalentWaveVectors(group, k, reduced)).toBe(true);
        expect(reducedRepresentative(group, reduced)).toEqual(reduced);
        const used = (one: typeof k) => (numericWaveVector(one) ?? []).filter((entry) => entry !== 0).length;
        expect(used(reduced)).toBeLessThanOrEqual(used(k));
      }),
      { seed, numRuns: 150 },
    );
  });

  test("a measured k keeps its letter and its value", () => {
    const { k } = placeWaveVector(groups[0] as (typeof groups)[number], parseWaveVector("0,2.28,0"));
    const reduced = reducedRepresentative(groups[0] as (typeof groups)[number], k);
    expect(numericWaveVector(reduced)?.[1]).toBeCloseTo(0.28, 12);
    expect(reduced.values).toEqual(k.values);
  });

  test("is found where an axis is half a vector of the lattice", () => {
    // With a' = a/2 the component of a* along a'* is a*·a' = 1/2, so 7/10 and 1/5 name one k.
    const half = parseGroup("P m m m (1/2a,b,c)");
    const { k } = placeWaveVector(half, parseWaveVector("7/10,0,0"));
    expect(numericWaveVector(reducedRepresentative(half, k))).toEqual([0.2, 0, 0]);
  });
});
