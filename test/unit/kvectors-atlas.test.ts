import {
  atlas,
  exactWaveVector,
  formatWaveVector,
  isHalfLattice,
  kindOf,
  nearbyKinds,
  numericWaveVector,
  parseWaveVector,
  placeWaveVector,
  type WaveVector,
} from "@kvane/core/kvectors";
import {
  type Cell,
  changeBasis,
  directMetric,
  groupFromSetting,
  lengthInMetric,
  parseCell,
  reciprocalMetric,
  tabulatedSettings,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { closestPoints } from "#core/kvectors/closest-points.js";
import { floatGroup, inner, inverse, plus, turnRow } from "../support/float-group.js";
import { floatKind } from "../support/kinds-in-floats.js";
import { distancesToKinds } from "../support/nearby-twin.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { carriedWave, randomBasis } from "../support/random-bases.js";
import { randomCell } from "../support/random-cells.js";
import { reduced } from "../support/written.js";

const k = (group: string, text: string): WaveVector => placeWaveVector(groupOf(group), parseWaveVector(text)).k;
const formsOf = (group: string, withInversion = false): string[] =>
  atlas(groupOf(group), { withInversion }).map((kind) => formatWaveVector(kind.k));

describe("atlas", () => {
  it("of Fm-3m lists the positions of Im-3m with doubled coordinates", () => {
    // International Tables A, Im-3m, from memory: 2a 6b 8c 12d; 12e x00, 16f xxx, 24g x01/2, 24h 0yy, 48i 1/4,y,-y+1/2;
    // 48j 0yz, 48k xxz; 96l. The F cell's reciprocal axes are half those of the I cell that L* is.
    expect(formsOf("F m -3 m")).toEqual([
      ...["(0, 0, 0)", "(0, 0, 1)", "(1/2, 1/2, 1/2)", "(0, 1/2, 1)"],
      ...["(0, 0, u)", "(u, u, u)", "(0, u, u)", "(0, 1, u)", "(1/2, u, u+1)"],
      ...["(0, u, v)", "(u, u, v)", "(u, v, w)"],
    ]);
  });

  it("of P6/mmm has the points, lines and planes of the hexagonal zone", () => {
    // Bradley & Cracknell (1972), fig. 3.11 and table 3.6, and International Tables A, P6/mmm, both from memory.
    expect(new Set(formsOf("P 6/m m m"))).toEqual(
      new Set([
        ...["(0, 0, 0)", "(0, 0, 1/2)", "(1/3, 1/3, 0)", "(1/3, 1/3, 1/2)", "(0, 1/2, 0)", "(0, 1/2, 1/2)"],
        ...["(0, 0, u)", "(1/3, 1/3, u)", "(0, 1/2, u)", "(0, u, 0)", "(0, u, 1/2)", "(u, u, 0)", "(u, u, 1/2)"],
        ...["(0, u, v)", "(u, u, v)", "(u, v, 0)", "(u, v, 1/2)", "(u, v, w)"],
      ]),
    );
  });

  it("of Pnma has every choice of 0, 1/2 and a letter, the choices with three letters once", () => {
    const choices = ["0", "1/2", "x"];
    const expected = choices
      .flatMap((a) => choices.flatMap((b) => choices.map((c) => `(${a}, ${b}, ${c})`)))
      .map((text) => ["u", "v", "w"].reduce((rest, letter) => rest.replace("x", letter), text));
    expect(formsOf("P n m a").sort()).toEqual(expected.sort());
  });

  it("tells both classifications apart in groups without inversion", () => {
    expect(formsOf("C 1 2 1")).toEqual(["(0, u, 0)", "(0, u, 1/2)", "(u, v, w)"]);
    const [first] = atlas(groupOf("C 1 2 1"), { withInversion: false });
    expect(first).toMatchObject({ dimension: 1, dimensionPM: 1, arms: 1, minusK: "not in star" });
    expect(first?.littleCoGroup).toEqual({ symbol: "2", order: 2 });
    const points = atlas(groupOf("C 1 2 1"), { withInversion: true }).filter((kind) => kind.dimensionPM === 0);
    expect(points.map((kind) => [kind.dimension, kind.minusK])).toEqual([
      ...new Array(4).fill([1, "equivalent"]),
      ...new Array(2).fill([3, "equivalent"]),
    ]);
    // With −1 a polar axis loses its points, and a plane across it appears: −k is the image under the twofold axis.
    const plane = atlas(groupOf("C 1 2 1"), { withInversion: true }).find((kind) => kind.dimensionPM === 2);
    expect(formatWaveVector(plane?.k as WaveVector)).toBe("(u, 0, v)");
    expect(plane).toMatchObject({ dimension: 3, minusK: "in star" });
  });

  it("lists the halves of L* on the kind as printed", () => {
    const halves = (group: string): string[][] =>
      atlas(groupOf(group), { withInversion: false }).map((kind) =>
        kind.halfLattice.map((half) => formatWaveVector(half)),
      );
    expect(halves("C 1 2 1")).toEqual([
      ["(0, 0, 0)", "(0, 1, 0)"],
      ["(0, 0, 1/2)", "(0, 1, 1/2)"],
      // On the general position: (1/2, 1/2, 0) and (-1/2, 1/2, 0) are the two arms of one star.
      ["(1/2, 1/2, 0)", "(1/2, 1/2, 1/2)"],
    ]);
    expect(halves("P 1")[0]).toHaveLength(8);
    for (const number of [44, 119, 146, 160, 216])
      for (const kind of atlas(groupOf(number), { withInversion: false }))
        for (const half of kind.halfLattice) {
          expect(isHalfLattice(groupOf(number), half)).toBe(true);
          expect(kindOf(groupOf(number), [kind], half, { withInversion: false })).toBe(0);
        }
  });

  it("writes the forms of every third of the 530 settings with small fractions, each letter alone or in one sum", () => {
    const components = new Set<string>();
    for (const setting of tabulatedSettings().filter((_, row) => row % 3 === 0))
      for (const kind of atlas(groupFromSetting(setting), { withInversion: false }))
        for (const text of formatWaveVector(kind.k).slice(1, -1).split(", ")) components.add(text);
    const plain = ["0", "1", "1/2", "1/3", "3/2", "-1/2", "-1/3", "u", "v", "w", "-u", "u+1"];
    expect([...components].filter((text) => !plain.includes(text))).toEqual([]);
  });

  it("has no arm or shift of a point or line that reads more plainly", () => {
    const plainer: string[] = [];
    for (const symbol of ["C m c m", "I 41/a m d:2", "F d d 2", "R -3 c:H", "R 3:R", "F 4 3 2"]) {
      const float = floatGroup(groupOf(symbol));
      const rotations = float.operators.map((operator) => inverse(operator).rotation);
      const shifts = smallShifts(float.dual);
      for (const kind of atlas(groupOf(symbol), { withInversion: false })) {
        const { base, directions } = floatKind(float, kind.k, false);
        if (directions.length > 1) continue;
        const direction = directions[0] ?? [0, 0, 0];
        const printed = plainness(base, direction);
        for (const rotation of rotations) {
          const [arm, along] = [turnRow(base, rotation), turnRow(direction, rotation)];
          for (const shift of shifts)
            if (isSmaller(plainness(plus(arm, shift), along), printed))
              plainer.push(`${symbol} ${formatWaveVector(kind.k)}: ${plus(arm, shift)} along ${along}`);
        }
      }
    }
    expect(plainer).toEqual([]);
  });
});

function smallShifts(dual: readonly (readonly number[])[]): number[][] {
  const steps = [-2, -1, 0, 1, 2];
  return steps.flatMap((l) =>
    steps.flatMap((m) =>
      steps.map((n) =>
        [0, 1, 2].map((axis) =>
          inner(
            [l, m, n],
            dual.map((row) => row[axis] as number),
          ),
        ),
      ),
    ),
  );
}

/** Non-zero entries, minus signs and squares of the direction; the same of the point where its first component is 0. */
function plainness(point: readonly number[], direction: readonly number[]): number[] {
  const pivot = direction.findIndex((entry) => Math.abs(entry) > 1e-9);
  const turns = pivot < 0 ? 0 : (point[pivot] as number) / (direction[pivot] as number);
  const base = point.map((entry, axis) => entry - turns * (direction[axis] as number));
  const oriented = pivot >= 0 && (direction[pivot] as number) < 0 ? direction.map((entry) => -entry) : direction;
  const count = (row: readonly number[], test: (entry: number) => boolean): number => row.filter(test).length;
  const isNot0 = (entry: number): boolean => Math.abs(entry) > 1e-9;
  const isNegative = (entry: number): boolean => entry < -1e-9;
  return [
    ...[count(oriented, isNot0), count(oriented, isNegative), inner(oriented, oriented)],
    ...[count(base, isNot0), inner(base, base), count(base, isNegative)],
  ];
}

function isSmaller(a: readonly number[], b: readonly number[]): boolean {
  const index = a.findIndex((entry, at) => Math.abs(entry - (b[at] as number)) > 1e-6);
  return index >= 0 && (a[index] as number) < (b[index] as number);
}

describe("the kind of a k", () => {
  it("is found for fractions, open letters and measured values", () => {
    const group = groupOf("F m -3 m");
    const kinds = atlas(group, { withInversion: false });
    const form = (text: string): string =>
      formatWaveVector(kinds[kindOf(group, kinds, k("F m -3 m", text), { withInversion: false })]?.k as WaveVector);
    expect(form("1,0,0")).toBe("(0, 0, 1)");
    expect(form("3/2,-1/2,1/2")).toBe("(1/2, 1/2, 1/2)");
    // From the point (1/2,1/2,1/2) to (1/2,1,0); and (1/3,1/3,2) is one more step of L* from (-2/3,-2/3,1).
    expect(form("1/2,3/5,2/5")).toBe("(1/2, u, u+1)");
    expect(form("1/3,1/3,0")).toBe("(0, u, u)");
    expect(form("1,u,0")).toBe("(0, 1, u)");
    expect(form("u,u,1")).toBe("(0, u, u)");
    expect(form("0.31,0.27,0.27")).toBe("(u, u, v)");
    expect(form("0.31,0.27,0.11")).toBe("(u, v, w)");
  });
});

describe("special kinds nearby", () => {
  const near = (group: string, cell: string, text: string, distance: number) =>
    nearbyKinds(groupOf(group), parseCell(cell), k(group, text), { withInversion: true, distance }).map((one) => [
      formatWaveVector(one.nearest, true),
      one.distance,
    ]);

  it("are given with the nearest arm and shift, and the distance in Å⁻¹", () => {
    const step = (2 * Math.PI) / 4;
    const [first, ...others] = near("P m -3 m", "4 4 4 90 90 90", "0,0.48,0", 0.5);
    expect(first?.[0]).toBe("(0, 1/2, 0)");
    expect(first?.[1]).toBeCloseTo(0.02 * step, 10);
    expect(others).toEqual([]);
    const both = near("P m -3 m", "4 4 4 90 90 90", "0,0.48,0", 0.48 * step);
    expect(both.map(([text]) => text)).toEqual(["(0, 1/2, 0)", "(0, 0, 0)"]);
    // In a hexagonal cell (δ, δ, 0) has the length 2δ · 2π/a.
    const [corner] = near("P 6/m m m", "5 5 4 90 90 120", "0.32,0.32,0", 0.1);
    expect(corner?.[0]).toBe("(1/3, 1/3, 0)");
    expect(corner?.[1]).toBeCloseTo((2 * (1 / 3 - 0.32) * 2 * Math.PI) / 5, 10);
  });

  it("carry the values of their letters", () => {
    const found = near("P n m a", "6 8 5 90 90 90", "0.48,0.02,0.31", 0.05);
    expect(found.map(([text]) => text)).toEqual([
      "(u, 0, v) with u = 0.48, v = 0.31",
      "(1/2, u, v) with u = 0.02, v = 0.31",
      "(1/2, 0, u) with u = 0.31",
    ]);
    expect(found[2]?.[1]).toBeCloseTo(2 * Math.PI * Math.hypot(0.02 / 6, 0.02 / 8), 10);
  });

  it("do not include the kind of k itself or larger ones, and none for a special point", () => {
    expect(near("P m -3 m", "4 4 4 90 90 90", "0,1/2,0", 10)).toEqual([]);
    expect(near("P m -3 m", "4 4 4 90 90 90", "0,0,1/3", 10)).toHaveLength(4);
  });

  it("need numbers, and a distance that is a length", () => {
    const ask = (text: string, distance: number) => () => near("P n m a", "6 8 5 90 90 90", text, distance);
    expect(ask("0,u,0", 1)).toThrowError(expect.objectContaining({ code: "k-needs-values" }));
    expect(ask("0,0.1234,0", Number.NaN)).toThrowError(expect.objectContaining({ code: "invalid-number" }));
    expect(ask("0,0.1234,0", -1)).toThrowError(expect.objectContaining({ code: "invalid-number" }));
  });

  it("are the same in skew axes of the same lattice", () => {
    const random = seeded(32);
    for (let round = 0; round < 12; round++) {
      const group = groupOf(random.pick(["P -1", "C m c m", "I 4 m m", "R -3 m:H", "F d -3 m:2"]));
      const change = randomBasis(random);
      const changed = changeBasis(group, change);
      const cell = randomCell(group, random, 100);
      const matrix = change.matrix.map((row) => row.map(([top, bottom]) => top / bottom));
      const vector = exactWaveVector([0, 1, 2].map(() => reduced(random.below(401) - 200, 997)) as never);
      const options = { withInversion: true, distance: 0.5 };
      const here = nearbyKinds(group, cell, vector, options).map((one) => one.distance);
      const there = nearbyKinds(changed, changedCell(cell, matrix), carriedWave(vector, change), options);
      expect(here.length).toBeGreaterThan(0);
      expect(there.map((one) => one.distance.toFixed(8))).toEqual(here.map((distance) => distance.toFixed(8)));
    }
  });

  it("are all that a search over every arm and shift finds, at the same distances", () => {
    const random = seeded(31);
    for (const symbol of ["P -1", "C 1 2/c 1", "C m c 21", "F d d 2", "I -4 2 m", "R 3 m:H", "P 63/m", "F m -3 m"]) {
      const group = groupOf(symbol);
      const cell = randomCell(group, random, 100);
      const vector = k(symbol, [0, 1, 2].map(() => (0.5 * random.next() - 0.25 + 0.0123).toFixed(5)).join(","));
      const withInversion = random.below(2) === 0;
      const kinds = atlas(group, { withInversion });
      const found = nearbyKinds(group, cell, vector, { withInversion, distance: 0.35 });
      const numbers = numericWaveVector(vector) as readonly number[];
      const slow = distancesToKinds(group, cell, kinds, numbers, withInversion);
      const own = kindOf(group, kinds, vector, { withInversion });
      expect(own).toBe(kinds.length - 1);
      const expected = slow.flatMap((distance, index) => (index !== own && distance <= 0.35 ? [index] : []));
      expect(found.map((one) => one.index).sort((a, b) => a - b)).toEqual(expected);
      for (const one of found) {
        expect(one.distance).toBeCloseTo(slow[one.index] as number, 9);
        expect(kindOf(group, kinds, one.nearest, { withInversion })).toBe(one.index);
        // The point that is named is at that distance, with no shift left to be guessed.
        const point = numericWaveVector(one.nearest) as readonly number[];
        const step = point.map((entry, axis) => entry - (numbers[axis] as number));
        expect(2 * Math.PI * lengthInMetric(reciprocalMetric(cell), step)).toBeCloseTo(one.distance, 9);
      }
    }
  });
});

/** The cell of the axes `(a,b,c) P`, from its metric `Pᵀ G P`. */
function changedCell(cell: Cell, matrix: readonly (readonly number[])[]): Cell {
  const metric = directMetric(cell);
  const axes = [0, 1, 2].map((column) => matrix.map((row) => row[column] as number));
  const product = (i: number, j: number): number =>
    axes[i]?.reduce(
      (sum, entry, row) => sum + entry * inner(metric.slice(3 * row, 3 * row + 3), axes[j] as number[]),
      0,
    ) ?? 0;
  const length = (i: number): number => Math.sqrt(product(i, i));
  const angle = (i: number, j: number): number => (Math.acos(product(i, j) / (length(i) * length(j))) * 180) / Math.PI;
  return { a: length(0), b: length(1), c: length(2), alpha: angle(1, 2), beta: angle(0, 2), gamma: angle(0, 1) };
}

describe("closest points of parallel flats", () => {
  it("are those of a search over all small shifts, in skew metrics too", () => {
    const random = seeded(33);
    for (let round = 0; round < 150; round++) {
      const size = 1 + random.below(3);
      const free = random.below(size);
      // Lower triangular with sides around 2, 0.8 and 0.3: a long way along a short side may be the nearest.
      const sides = [2, 0.8, 0.3].slice(0, size).map((side) => side * (0.8 + 0.4 * random.next()));
      const axes = sides.map((side, row) =>
        sides.map((other, column) => (row === column ? side : row > column ? (random.next() - 0.5) * other : 0)),
      );
      const metric = axes.map((left) => axes.map((right) => inner3(left, right)));
      const offset = axes.map((_, index) => (index < free ? 0 : 2 * random.next() - 1));
      const [best] = closestPoints(metric, offset, free, 10, 1e-9);
      // The free coordinates are those of the first axes: their parts are taken away (Gram and Schmidt).
      const distance = (shift: readonly number[]): number => {
        const place = offset.map((entry, index) => entry + (shift[index] as number));
        const vector = [0, 1, 2].map((axis) =>
          place.reduce((sum, entry, row) => sum + entry * (axes[row]?.[axis] ?? 0), 0),
        );
        const units: number[][] = [];
        const rest = (v: readonly number[]): number[] =>
          units.reduce(
            (left, unit) => left.map((entry, axis) => entry - inner(left, unit) * (unit[axis] as number)),
            [...v],
          );
        for (const row of axes.slice(0, free)) {
          const across = rest([0, 1, 2].map((axis) => row[axis] ?? 0));
          units.push(across.map((entry) => entry / Math.hypot(...across)));
        }
        return Math.hypot(...rest(vector));
      };
      const steps = Array.from({ length: 21 }, (_, index) => index - 10);
      const shifts = offset.reduce<number[][]>(
        (list, _, index) =>
          list.flatMap((shift) => (index < free ? [[...shift, 0]] : steps.map((step) => [...shift, step]))),
        [[]],
      );
      const smallest = Math.min(...shifts.map(distance));
      expect(best?.distance).toBeCloseTo(smallest, 9);
      expect(distance(best?.shift ?? [])).toBeCloseTo(smallest, 9);
      expect(closestPoints(metric, offset, free, 0.99 * smallest - 1e-6, 1e-9)).toEqual([]);
    }
  });
});

function inner3(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, entry, index) => sum + entry * (b[index] as number), 0);
}
