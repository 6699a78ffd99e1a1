import {
  atlas,
  canonicalPlacement,
  equivalentWaveVectors,
  exactWaveVector,
  firstZoneRepresentative,
  formatWaveVector,
  isHalfLattice,
  type KindOfK,
  kindOf,
  nearbyKinds,
  parseWaveVector,
  placeWaveVector,
  plainestRepresentative,
  star,
  type WaveVector,
} from "@kvane/core/kvectors";
import { type Cell, lengthInMetric, reciprocalMetric } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { closestPoints } from "#core/kvectors/closest-points.js";
import { directionTable } from "#core/kvectors/flats.js";
import { plainer } from "#core/kvectors/plainest.js";
import { settingRotation } from "#core/kvectors/rotations.js";
import { isReciprocalLatticeVector } from "#core/kvectors/wave-vector.js";
import { vectorFrom } from "#core/numbers/index.js";
import { componentsOf, inner } from "../support/float-group.js";
import { groupOf } from "../support/parsed-groups.js";
import { wave } from "../support/written.js";

describe("a k in the first zone", () => {
  const cell = { a: 4, b: 5, c: 7, alpha: 90, beta: 90, gamma: 90 };

  test.each([
    ["(a,b,c)", [1, 0, 0, 0, 1, 0, 0, 0, 1]],
    ["(a,b,7a+c)", [1, 0, 7, 0, 1, 0, 0, 0, 1]],
    ["(a,b,-7a+c)", [1, 0, -7, 0, 1, 0, 0, 0, 1]],
    ["(a+7c,b,c)", [1, 0, 0, 0, 1, 0, 7, 0, 1]],
    ["(a-7c,b,c)", [1, 0, 0, 0, 1, 0, -7, 0, 1]],
    ["(a,6a+b,c)", [1, 6, 0, 0, 1, 0, 0, 0, 1]],
    ["(a,b-6c,c)", [1, 0, 0, 0, 1, 0, 0, -6, 1]],
  ])("is the shortest however skew the axes %s are", (axes, matrix) => {
    const group = groupOf(`P m m m ${axes}`);
    const skew = cellOf([4, 5, 7], matrix);
    for (const [k, shortest] of [
      ["5/7 11/7 -13/3", [2 / 7, 3 / 7, 1 / 3]],
      ["1/2 1/5 0", [1 / 2, 1 / 5, 0]],
      ["0 0 6", [0, 0, 0]],
    ] as const) {
      // k·(a', b', c') from k·(a, b, c); in an orthogonal P lattice every component of the shortest is at most 1/2.
      const [x, y, z] = wave(k).components.map(({ constant: [top, bottom] }) => top / bottom) as [
        number,
        number,
        number,
      ];
      const carried = [0, 1, 2].map(
        (column) =>
          x * (matrix[column] as number) + y * (matrix[3 + column] as number) + z * (matrix[6 + column] as number),
      );
      const given = exactWaveVector(
        vectorFrom(
          carried.map((entry) => Math.round(210 * entry)),
          210,
        ),
      );
      const found = componentsOf(firstZoneRepresentative(group, skew, given));
      expect(lengthInMetric(reciprocalMetric(skew), found)).toBeCloseTo(
        Math.hypot(shortest[0] / 4, shortest[1] / 5, shortest[2] / 7),
        9,
      );
    }
  });

  test("keeps the values of its letters and their uncertainties", () => {
    const { k } = placeWaveVector(groupOf("P m m m"), parseWaveVector("0,1.4721,3"));
    const known = { ...k, uncertainties: [0.0004] };
    const found = firstZoneRepresentative(groupOf("P m m m"), cell, known);
    expect([found.values, found.uncertainties]).toEqual([[1.4721], [0.0004]]);
    expect(formatWaveVector(found)).toBe("(0, u-1, 0)");
  });
});

describe("a k as it is written", () => {
  test("with fractions of any denominator is exact, and open letters have no values", () => {
    const written = parseWaveVector("1/5,2/7,-3/11");
    expect(written.measured).toEqual([false, false, false]);
    expect(placeWaveVector(groupOf("P 1"), written).k).toEqual(wave("1/5 2/7 -3/11"));
    const { k } = placeWaveVector(groupOf("P m m m"), parseWaveVector("0,u,1/5"));
    expect([k.values, k.uncertainties]).toEqual([null, null]);
  });

  test("is a vector of L* only with all its components", () => {
    const isVector = (group: string, row: readonly number[]): boolean =>
      isReciprocalLatticeVector(groupOf(group), vectorFrom(row));
    // Reflection conditions of the lattices: F all even or all odd, I even sums, C h + k even, R obverse −h + k + l = 3n.
    expect(isVector("F m m m", [1, 1, 1])).toBe(true);
    expect(isVector("F m m m", [1, 1, 0])).toBe(false);
    expect(isVector("F m m m", [0, 0, 1])).toBe(false);
    expect(isVector("I m m m", [1, 1, 0])).toBe(true);
    expect(isVector("I m m m", [1, 1, 1])).toBe(false);
    expect(isVector("C m m m", [1, 0, 0])).toBe(false);
    expect(isVector("C m m m", [1, 1, 1])).toBe(true);
    expect(isVector("R 3:H", [1, 0, 1])).toBe(true);
    expect(isVector("R 3:H", [1, 0, 0])).toBe(false);
  });
});

test("the canonical place of a point is the one with every primitive component in [0, 1)", () => {
  // The threefold axis leaves the corners (1/3, 1/3, z) and (2/3, 2/3, z) of the hexagonal zone where they are modulo
  // L*, the mirror across it every z with 2z whole: in P -6 each is a point, and the only arm of its star.
  for (const [given, canonical] of [
    ["-1/3 2/3 0", "2/3 2/3 0"],
    ["2/3 -1/3 1", "2/3 2/3 0"],
    ["5/3 -4/3 -1/2", "2/3 2/3 1/2"],
    ["-2/3 -2/3 3/2", "1/3 1/3 1/2"],
  ] as const)
    expect(canonicalPlacement(groupOf("P -6"), wave(given)).canonical).toEqual(wave(canonical));
});

const identity = [1, 0, 0, 0, 1, 0, 0, 0, 1];

function placed(group: string, text: string): WaveVector {
  return placeWaveVector(groupOf(group), parseWaveVector(text)).k;
}

/** The cell of the axes `(a,b,c) P` of an orthogonal lattice. */
function cellOf(lengths: readonly number[], matrix: readonly number[]): Cell {
  const axes = [0, 1, 2].map((column) =>
    lengths.map((length, row) => length * (matrix[3 * row + column] as number)),
  ) as [number[], number[], number[]];
  const [a, b, c] = axes.map((axis) => Math.hypot(...axis)) as [number, number, number];
  const angle = (i: 0 | 1 | 2, j: 0 | 1 | 2): number =>
    (Math.acos(inner(axes[i], axes[j]) / (Math.hypot(...axes[i]) * Math.hypot(...axes[j]))) * 180) / Math.PI;
  return { a, b, c, alpha: angle(1, 2), beta: angle(0, 2), gamma: angle(0, 1) };
}

describe("kinds nearby", () => {
  const near = (group: string, text: string, distance: number): [string, number][] =>
    nearbyKinds(groupOf(group), cellOf([4, 5, 6], identity), placed(group, text), {
      withInversion: true,
      distance,
    }).map(({ nearest, distance: found }) => [formatWaveVector(nearest, true), found]);

  test("of a k some cells away are where it is, not moved into the first cell", () => {
    const found = near("P m m m", "2.98,0.31,-4.83", 0.05);
    expect(found.map(([text]) => text)).toEqual(["(3, u, v) with u = 0.31, v = -4.83"]);
    expect(found[0]?.[1]).toBeCloseTo((0.02 * 2 * Math.PI) / 4, 10);
  });

  test("at one distance come by dimension", () => {
    // In the plane across the axis of 2/m the foot of the perpendicular on the axis is the point 0.
    const found = near("P 1 2/m 1", "0.02,0,0.03", 0.1);
    expect(found.map(([text]) => text)).toEqual(["(0, 0, 0)", "(0, u, 0) with u = 0"]);
    expect(found[0]?.[1]).toBeCloseTo(2 * Math.PI * Math.hypot(0.02 / 4, 0.03 / 6), 10);
    expect(found[1]?.[1]).toBe(found[0]?.[1]);
  });

  test("are asked of a list that holds the kind of k", () => {
    const group = groupOf("P m m m");
    const [first, second] = atlas(group, { withInversion: false });
    const ask = (kinds: readonly KindOfK[]) => () =>
      kindOf(group, kinds, wave("1/5 1/7 1/3"), { withInversion: false });
    expect(ask([])).toThrow("no kind");
    expect(ask([first as KindOfK, second as KindOfK])).toThrow("no kind");
  });
});

describe("closest points", () => {
  test("are found on the very edge of the reach, and far out", () => {
    const found = closestPoints([[1]], [0.5], 0, 0.5, 0);
    expect(found.map(({ coordinates }) => coordinates[0]).sort()).toEqual([-0.5, 0.5]);
    // Places 100 apart, the nearest two at 50.
    const far = closestPoints([[10_000]], [0.5], 0, 60, 0);
    expect(far.map(({ distance }) => distance)).toEqual([50, 50]);
  });
});

test("of two triples the plainer has fewer entries, smaller squares, fewer minus signs, or is first in order", () => {
  const range = [-1, 0, 1, 2, 3];
  // Rising and falling ones alone: few, and every reason for a choice is among them.
  const triples = range.flatMap((a) =>
    range.flatMap((b) => range.filter((c) => (a <= b && b <= c) || (a >= b && b >= c)).map((c) => [a, b, c])),
  );
  const key = (row: readonly number[]): number[] => [
    row.filter((entry) => entry !== 0).length,
    inner(row, row),
    row.filter((entry) => entry < 0).length,
    ...row,
  ];
  const keys = triples.map(key);
  const wrong: string[] = [];
  for (const [first, a] of triples.entries())
    for (const [second, b] of triples.entries()) {
      const at = (keys[first] as number[]).findIndex((entry, place) => entry !== keys[second]?.[place]);
      const isPlainer = at >= 0 && (keys[first]?.[at] as number) < (keys[second]?.[at] as number);
      if (plainer(a, b) !== isPlainer) wrong.push(`${a} and ${b}`);
    }
  expect(wrong).toEqual([]);
});

test("in axes that are no vectors of the lattice the halves of L* are eight, on the kinds that list them", () => {
  for (const name of ["C 2 2 2 (1/2a,b,c)", "P 2/m (1/2a,b,1/2a+1/3c)"]) {
    const group = groupOf(name);
    const halves = atlas(group, { withInversion: false }).flatMap(({ halfLattice }) => halfLattice);
    expect(halves.filter((half) => !isHalfLattice(group, half))).toEqual([]);
    expect(halves.reduce((sum, half) => sum + star(group, half).arms.length, 0)).toBe(8);
    for (const [at, half] of halves.entries()) {
      const { arms } = star(group, half);
      expect(halves.slice(0, at).some((other) => arms.some((arm) => equivalentWaveVectors(group, arm, other)))).toBe(
        false,
      );
      const plainest = plainestRepresentative(group, half);
      expect(arms.some((arm) => equivalentWaveVectors(group, arm, plainest))).toBe(true);
    }
  }
});

test("an operator that the group does not have has no rotation", () => {
  expect(() => settingRotation(groupOf("P -1"), 2)).toThrow("no operator 2");
});

test("lines and planes of different directions are different records, whatever digits they are written with", () => {
  const table = directionTable();
  expect(table([[1, 10, 1]])).not.toBe(table([[11, 0, 1]]));
  expect(table([[1, 10, 1]]).rows).toEqual([[1, 10, 1]]);
  expect(table([[11, 0, 1]]).rows).toEqual([[11, 0, 1]]);
});
