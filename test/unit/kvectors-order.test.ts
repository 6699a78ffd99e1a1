import {
  atlas,
  canonicalPlacement,
  exactComponents,
  formatWaveVector,
  nearbyKinds,
  parseWaveVector,
  placeWaveVector,
  specialPoints,
} from "@kvane/core/kvectors";
import { parseCell } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { wave } from "../support/written.js";

const placed = (group: string, text: string) => placeWaveVector(groupOf(group), parseWaveVector(text)).k;

describe("the canonical place", () => {
  // An axis of 222 is its own image, u going to −u: what represents the line must not change to and fro.
  test.each(["P 2 2 2", "P 4 2 2", "P m m 2"])("of a canonical k is that k, in %s", (name) => {
    const group = groupOf(name);
    const kinds = atlas(group, { withInversion: false }).map(({ k }) => k);
    for (const k of [...kinds, placed(name, "0,0,0.3"), placed(name, "0.2,1/2,0")]) {
      const { canonical } = canonicalPlacement(group, k);
      expect(canonicalPlacement(group, canonical).canonical).toEqual(canonical);
    }
  });

  // A point has no directions, so all its components are places across: in [0, 1), in the axes of a P lattice.
  test.each(["P m m m", "P 4/m m m", "P 3 m 1"])("of a point has components from 0 to below 1, in %s", (name) => {
    const group = groupOf(name);
    for (const { k } of specialPoints(group)) {
      const row = exactComponents(canonicalPlacement(group, k).canonical) ?? [];
      expect(row.filter(([top, bottom]) => top < 0 || top >= bottom)).toEqual([]);
    }
  });

  test("of half of a reciprocal cell's diagonal is that half, from wherever it is given", () => {
    for (const k of ["1/2 1/2 1/2", "-1/2 1/2 3/2", "-5/2 -3/2 -1/2"])
      expect(canonicalPlacement(groupOf("P m m m"), wave(k)).canonical).toEqual(wave("1/2 1/2 1/2"));
  });
});

// Of 422 the lines (u, 0, w) and (0, u, w), w fixed, are one kind. Along the axes 2a+b and a+2b they read 2u, u and
// u, 2u, with the same entries in another order, over different denominators; the one that begins with u reads first.
describe("of two lines with the same numbers in another order", () => {
  test("the one with the smaller first component stands in the atlas", () => {
    const kinds = atlas(groupOf("P 4 2 2 (2a+b,a+2b,c)"), { withInversion: false }).map(({ k }) => formatWaveVector(k));
    expect(kinds.filter((text) => text === "(u, 2u, 0)" || text === "(2u, u, 0)")).toEqual(["(u, 2u, 0)"]);
    expect(kinds.filter((text) => text === "(u, 2u, 1/2)" || text === "(2u, u, 1/2)")).toEqual(["(u, 2u, 1/2)"]);
  });

  test("the one with the smaller component is given where both are equally near, below 0 as above", () => {
    const name = "P 4 2 2 (c,2a+b,a+2b)";
    // Of axes 4, 4, 6 Å: |2a+b|² = |a+2b|² = 5·4², and the cosine of their angle is 4/5.
    const length = 4 * Math.sqrt(5);
    const cell = parseCell(`6 ${length} ${length} ${(Math.acos(4 / 5) * 180) / Math.PI} 90 90`);
    // (x, x, w) in the axes a, b, c, a little off w = ±1/2: as far from (x, 0, w) as from (0, x, w).
    const lines = (text: string): string[] =>
      nearbyKinds(groupOf(name), cell, placed(name, text), { withInversion: true, distance: 0.2 }).flatMap(
        ({ kind, nearest }) => (kind.dimensionPM === 1 ? [formatWaveVector(nearest)] : []),
      );
    expect(lines("-0.48,0.3,0.3")).toContain("(-1/2, u, 2u)");
    expect(lines("0.48,0.3,0.3")).toContain("(1/2, u, 2u)");
  });
});

// Of 4mm the planes (0, y, z) and (x, 0, z) are one kind. Along the axes c, −a−b+c, −a−2b+3c they read (z, z−y, 3z−2y) =
// (u, v, u+2v) and (z, z−x, 3z−x) = (u, v, 2u+v), and a turn of the axes by 90° exchanges them: the same numbers, but
// for the last component, where fewer v come first.
test.each(["P 4 m m (c,-a-b+c,-a-2b+3c)", "P 4 m m (c,a-b+c,2a-b+3c)"])(
  "of two planes that differ in the last component the one with the smaller multiple of v stands in the atlas, in %s",
  (name) => {
    const kinds = atlas(groupOf(name), { withInversion: false }).map(({ k }) => formatWaveVector(k));
    const planes = ["(u, v, u+2v)", "(u, v, 2u+v)", "(u, v, u+2v+1/2)", "(u, v, 2u+v+1/2)"];
    expect(planes.filter((plane) => kinds.includes(plane))).toEqual(["(u, v, 2u+v)", "(u, v, 2u+v+1/2)"]);
  },
);
