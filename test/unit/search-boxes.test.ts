import { atlas, numericWaveVector } from "@kvane/core/kvectors";
import { cellVolume, parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { polytope } from "#core/algorithms/half-spaces.js";
import { boxSearch, dirichletCell } from "#core/algorithms/index.js";
import { reciprocalFrame } from "#core/reflections/index.js";
import { flatFrame, lettersAt, pointAt } from "#core/search/flat-frame.js";
import { foldInto, wedgeOf } from "#core/search/wedge.js";
import { seeded } from "../support/random.ts";
import { randomCell } from "../support/random-cells.ts";

describe("branch and bound over boxes", () => {
  test.each([1, 2, 3])("finds every point of a set in %i dimensions, and each leaf holds one", (dimension) => {
    const random = seeded(dimension);
    const points = Array.from({ length: 12 }, () => Array.from({ length: dimension }, () => 2 * random.next() - 1));
    const leaves: number[][] = [];
    const holds = (centre: Float64Array, half: Float64Array) =>
      points.filter((point) => point.every((x, a) => Math.abs(x - (centre[a] as number)) <= (half[a] as number)));
    const search = boxSearch({
      centre: new Float64Array(dimension),
      half: new Float64Array(dimension).fill(1),
      leafRadius: 1e-3,
      levelsBelowLeaf: 0,
      admits: (_, centre, half) => holds(centre, half).length > 0,
      settles: (_, centre, half) => {
        expect(Math.hypot(...half)).toBeLessThanOrEqual(1e-3);
        leaves.push(...holds(centre, half));
        return true;
      },
      leavesOpen: () => expect.fail("every leaf was settled"),
    });
    expect(search.unexplored()).toBe(1);
    let steps = 0;
    while (!search.advance(10)) steps += 1;
    expect(steps).toBeGreaterThan(3);
    expect(search.unexplored()).toBeCloseTo(0, 12);
    expect(new Set(leaves)).toEqual(new Set(points));
  });

  test("what was not visited is told, and open leaves are handed over", () => {
    let open = 0;
    const problem = {
      centre: [0],
      half: [1],
      leafRadius: 0.25,
      levelsBelowLeaf: 1,
      admits: () => true,
      settles: () => false,
      leavesOpen: () => {
        open += 1;
      },
    };
    const search = boxSearch(problem);
    expect(search.advance(3)).toBe(false);
    expect(search.boxes()).toBe(3);
    expect(search.unexplored()).toBe(1);
    search.advance(6);
    expect(search.unexplored()).toBeCloseTo(0.5, 12);
    while (!search.advance(100));
    expect(open).toBe(8);
  });
});

describe("cells cut out by half-spaces", () => {
  const box = (dimension: number) =>
    Array.from({ length: 2 * dimension }, (_, index) => ({
      normal: Array.from({ length: dimension }, (_, axis) => (axis === index >> 1 ? (index % 2 ? -1 : 1) : 0)),
      offset: 1,
    }));

  test("a cube has 8 vertices; planes that cut nothing off are not active", () => {
    const far = { normal: [1, 0, 0], offset: 3 };
    const { vertices, active } = polytope([...box(3), far], 3);
    expect(vertices.length).toBe(8);
    expect(active).toEqual([0, 1, 2, 3, 4, 5]);
  });

  test("a corner cut off a cube leaves 10 vertices, off a square 5", () => {
    const corner = (dimension: number) => ({
      normal: new Array<number>(dimension).fill(1 / Math.sqrt(dimension)),
      offset: (dimension - 0.5) / Math.sqrt(dimension),
    });
    expect(polytope([...box(3), corner(3)], 3).vertices.length).toBe(10);
    expect(polytope([...box(2), corner(2)], 2).vertices.length).toBe(5);
    expect(
      polytope([...box(1), { normal: [1], offset: 0.25 }], 1)
        .vertices.flat()
        .sort(),
    ).toEqual([-1, 0.25]);
  });

  test("the cell of a point among its lattice is a hexagon about it, whatever distance is tried first", () => {
    const origin = [0.3, -2];
    // A hexagonal lattice of unit length: the cell has its sides at 1/2, its corners 1/√3 away.
    const imagesWithin = (distance: number) => {
      const steps = Array.from({ length: 61 }, (_, at) => at - 30);
      const vectors = steps.flatMap((m) => steps.map((n) => [m - n / 2, (n * Math.sqrt(3)) / 2] as const));
      return vectors
        .map((vector) => ({ vector, length: Math.hypot(...vector) }))
        .filter(({ length }) => length > 1e-9 && length <= distance)
        .sort((a, b) => a.length - b.length)
        .map(({ vector: [x, y], length }) => {
          const normal = [x / length, y / length] as const;
          return { halfSpace: { normal, offset: length / 2 + normal[0] * 0.3 - normal[1] * 2 }, length };
        });
    };
    for (const first of [0.1, 1, 5]) {
      const { images, centre, half } = dirichletCell(origin, first, imagesWithin);
      expect(images.map(({ length }) => length)).toEqual(new Array(6).fill(expect.closeTo(1, 12)));
      expect(centre).toEqual([expect.closeTo(0.3, 8), expect.closeTo(-2, 8)]);
      expect(half).toEqual([expect.closeTo(1 / 2, 8), expect.closeTo(1 / Math.sqrt(3), 8)]);
    }
  });
});

describe("the wedge of a kind", () => {
  const groups = [
    "P -1",
    "P 1",
    "C 1 2/c 1",
    "P n m a",
    "F d d d",
    "I 4/m",
    "P 3",
    "R -3 m :H",
    "P 6/m",
    "P m -3",
    "F m -3 m",
  ];

  test.each(groups)("%s: the general one has the volume of the zone over the order of ±P", (symbol) => {
    const group = parseGroup(symbol);
    const cell = randomCell(group, seeded(7), 300);
    const frame = flatFrame(group, generalForm(group), metricOf(group, cell));
    const wedge = wedgeOf(group, frame);
    // (2π)³ / primitive volume, over the order of the point group extended by −1.
    const { rotations } = group.primitive;
    const centric = rotations.some((rotation) => rotation.join() === "-1,0,0,0,-1,0,0,0,-1");
    const order = centric ? rotations.length : 2 * rotations.length;
    const centring =
      group.lattice.vectors.reduce((product, vector, axis) => product * (vector[axis] as number), 1) /
      group.lattice.denominator ** 3;
    const expected = (2 * Math.PI) ** 3 / (cellVolume(cell) * centring) / order;
    const random = seeded(8);
    const samples = 20_000;
    let inside = 0;
    for (let index = 0; index < samples; index++) {
      const t = Array.from(wedge.half, (half, axis) => (wedge.centre[axis] as number) + half * (2 * random.next() - 1));
      if (wedge.walls.every(({ normal, offset }) => normal.reduce((s, n, a) => s + n * (t[a] as number), 0) <= offset))
        inside += 1;
    }
    const volume = (wedge.half.reduce((product, half) => product * 2 * half, 1) * inside) / samples;
    // Four standard deviations of the counting.
    expect(Math.abs(volume / expected - 1)).toBeLessThan(4 * Math.sqrt((samples - inside) / (samples * inside)) + 1e-6);
  });

  test.each(groups)("%s: every k of every kind has an image in its wedge, of the same kind", (symbol) => {
    const group = parseGroup(symbol);
    const metric = metricOf(group, randomCell(group, seeded(9), 300));
    const random = seeded(10);
    for (const kind of atlas(group, { withInversion: true })) {
      if (kind.dimensionPM === 0) continue;
      const frame = flatFrame(group, kind.k, metric);
      const wedge = wedgeOf(group, frame);
      for (let sample = 0; sample < 20; sample++) {
        const t = Float64Array.from(wedge.half, () => 8 * (random.next() - 0.5) * Math.max(...wedge.half));
        foldInto(wedge, t);
        t.forEach((entry, axis) => {
          expect(Math.abs(entry - (wedge.centre[axis] as number))).toBeLessThanOrEqual(
            (wedge.half[axis] as number) + 1e-9,
          );
        });
      }
    }
  });

  test("letters and coordinates of a flat belong together", () => {
    const group = parseGroup("F m -3 m");
    const metric = metricOf(group, randomCell(group, seeded(11), 300));
    for (const { k, dimensionPM } of atlas(group, { withInversion: true })) {
      if (dimensionPM === 0) continue;
      const frame = flatFrame(group, k, metric);
      const t = [0.21, -0.13, 0.4].slice(0, dimensionPM);
      const values = lettersAt(frame, t);
      const row = numericWaveVector({ ...k, values, uncertainties: values.map(() => null) }) as readonly number[];
      // κ = k B with the lattice vectors as columns of B.
      const kappa = group.lattice.vectors.map(
        (vector) =>
          vector.reduce((sum, entry, axis) => sum + entry * (row[axis] as number), 0) / group.lattice.denominator,
      );
      pointAt(frame, t).forEach((entry, axis) => {
        expect(entry).toBeCloseTo(kappa[axis] as number, 10);
      });
    }
  });
});

type Group = ReturnType<typeof parseGroup>;

function generalForm(group: Group) {
  const kind = atlas(group, { withInversion: true }).find(({ dimensionPM }) => dimensionPM === 3);
  if (kind === undefined) throw new Error("no general kind");
  return kind.k;
}

function metricOf(group: Group, cell: Parameters<typeof reciprocalFrame>[1]): number[] {
  return reciprocalFrame(group, cell).metric.map((entry) => 4 * Math.PI * Math.PI * entry);
}
