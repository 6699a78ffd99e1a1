import {
  atlas,
  canonicalPlacement,
  equivalentWaveVectors,
  exactComponents,
  exactWaveVector,
  firstZoneRepresentative,
  formatWaveVector,
  isHalfLattice,
  kindOf,
  littleGroup,
  manifold,
  nearbyKinds,
  numericWaveVector,
  parseWaveVector,
  placeWaveVector,
  plainestRepresentative,
  pointOnManifold,
  reducedRepresentative,
  specialPoints,
  star,
  type WaveVector,
} from "@kvane/core/kvectors";
import { lengthInMetric, reciprocalMetric, type SpaceGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import type { RationalVector } from "#core/numbers/index.js";
import {
  componentsOf,
  countArms,
  type FloatGroup,
  floatGroup,
  inner,
  inverse,
  isReciprocalVector,
  minus,
  operatorsTaking,
  plus,
  turnRow,
} from "../support/float-group.js";
import { floatKind, randomKindProblems } from "../support/kinds-in-floats.js";
import { distancesToKinds } from "../support/nearby-twin.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { randomWaveVector } from "../support/random-cases.js";
import { randomCell } from "../support/random-cells.js";
import { reduced, wave } from "../support/written.js";

/** Every lattice type, every crystal system, with and without −1, some axes of one's own; each quick by itself. */
const names = [
  ...["P 1", "P -1", "P 2", "C 1 2/c 1", "P m c 21", "C 2 2 2", "A b m 2", "I m m a", "F d d 2", "F m m m"],
  ...["P 4", "I -4", "P 4/m m m", "I 41/a m d:2", "P 3", "P -3 m 1", "R 3:H", "R -3 m:R", "P 6", "P -6 2 m"],
  ...["P 63/m m c", "P 2 3", "F 4 3 2", "I 21 3", "F -4 3 m", "I m -3 m", "P 2/m (a,b,a+c)", "I 4 (a+b,b,2c)"],
];

/** Small vectors of L*. */
function shiftsOf(float: FloatGroup, largest: number): number[][] {
  const steps = Array.from({ length: 2 * largest + 1 }, (_, at) => at - largest);
  return steps.flatMap((l) =>
    steps.flatMap((m) =>
      steps.map((n) =>
        [0, 1, 2].map((axis) => {
          const column = float.dual.map((row) => row[axis] as number);
          return inner([l, m, n], column);
        }),
      ),
    ),
  );
}
const parts = (group: SpaceGroup) => ({ group, float: floatGroup(group), random: seeded(group.operators.length + 5) });

describe("the kinds of k", () => {
  test.each(names.slice(0, 26))("of %s hold each k once, with the dimension and order that it has", (name) => {
    const { group, random } = parts(groupOf(name));
    expect(randomKindProblems(group, random, 4)).toEqual([]);
  });

  test.each(names)("of %s come by dimension and arms, and hold all eight halves of L*", (name) => {
    const { group, float } = parts(groupOf(name));
    for (const withInversion of [false, true]) {
      const kinds = atlas(group, { withInversion });
      const dimensionOf = (kind: (typeof kinds)[number]) => (withInversion ? kind.dimensionPM : kind.dimension);
      const order = kinds.map((kind) => 1000 * dimensionOf(kind) + kind.arms);
      expect(order).toEqual([...order].sort((a, b) => a - b));
      let halves = 0;
      kinds.forEach((kind, index) => {
        const k = componentsOf(kind.k);
        expect(kind.arms).toBe(countArms(float, k));
        expect(kind.littleCoGroup.order).toBe(group.operators.length / kind.arms);
        expect(kind.littleCoGroup.symbol).toBe(littleGroup(group, kind.k).symbol);
        expect(kind.minusK).toBe(star(group, kind.k).minusK);
        expect(manifold(group, kind.k, { withInversion }).dimension).toBe(dimensionOf(kind));
        expect(kind.dimension).toBe(manifold(group, kind.k, { withInversion: false }).dimension);
        expect(kind.dimensionPM).toBe(manifold(group, kind.k, { withInversion: true }).dimension);
        const halfRows = kind.halfLattice.map((half) => componentsOf(half));
        halfRows.slice(1).forEach((row, at) => {
          expect(isPlainer(row, halfRows[at] as number[])).toBe(false);
        });
        const { base, directions } = floatKind(float, kind.k, false);
        for (const row of halfRows) {
          // On the form as it stands: the step from its base is made of its directions.
          const step = minus(row, base);
          const along = directions.map((direction) => direction.findIndex((one) => Math.abs(one) > 1e-9));
          const rest = directions.reduce((left, direction, at) => {
            const pivot = along[at] as number;
            const turns = (left[pivot] as number) / (direction[pivot] as number);
            return left.map((one, axis) => one - turns * (direction[axis] as number));
          }, step);
          expect(Math.max(...rest.map(Math.abs))).toBeLessThan(1e-9);
        }
        for (const half of kind.halfLattice) {
          expect(isHalfLattice(group, half)).toBe(true);
          expect(kindOf(group, kinds, half, { withInversion })).toBe(index);
          halves += countArms(float, componentsOf(half));
        }
      });
      // The halves of L* modulo L* are eight, whatever the group.
      expect(halves).toBe(8);
    }
  });

  test.each(names)("of %s of no dimension are the special points", (name) => {
    const { group, float } = parts(groupOf(name));
    const points = specialPoints(group);
    const kinds = atlas(group, { withInversion: true }).filter(({ dimensionPM }) => dimensionPM === 0);
    expect(points.map(({ k }) => formatWaveVector(k)).sort()).toEqual(kinds.map(({ k }) => formatWaveVector(k)).sort());
    const places = points.map(({ armPairs, k }) => [armPairs, ...componentsOf(k)]);
    places.slice(1).forEach((place, at) => {
      expect(isBefore(place, places[at] as number[])).toBe(false);
    });
    for (const { k, arms, armPairs, minusK, littleCoGroup } of points) {
      const row = componentsOf(k);
      const reversing = operatorsTaking(float, row, -1).length > 0;
      const own = operatorsTaking(float, row, 1).length;
      expect([arms, littleCoGroup.order]).toEqual([countArms(float, row), own]);
      const equivalent = isReciprocalVector(float, plus(row, row));
      expect(minusK).toBe(equivalent ? "equivalent" : reversing ? "in star" : "not in star");
      expect(armPairs).toBe(equivalent || !reversing ? arms : arms / 2);
    }
  });
});

describe("places of a k", () => {
  test.each(names)("in %s: little groups come with H = kR − k, arms with the operators that reach them", (name) => {
    const { group, float, random } = parts(groupOf(name));
    for (let count = 0; count < 4; count++) {
      const k = randomWaveVector(group, random);
      const row = componentsOf(k);
      const { operators, shifts } = littleGroup(group, k);
      expect([...operators].sort((a, b) => a - b)).toEqual(operatorsTaking(float, row, 1));
      operators.forEach((operator, at) => {
        const moved = minus(turnRow(row, float.operators[operator]?.rotation ?? []), row);
        const given = [0, 1, 2].map((axis) =>
          inner(
            shifts[at] as readonly number[],
            float.dual.map((one) => one[axis] as number),
          ),
        );
        expect(Math.max(...minus(moved, given).map(Math.abs))).toBeLessThan(1e-9);
      });
      const { arms, representatives, reversing } = star(group, k);
      expect(arms.length).toBe(countArms(float, row));
      arms.forEach((arm, at) => {
        const rotation = inverse(float.operators[representatives[at] as number] as never).rotation;
        expect(Math.max(...minus(componentsOf(arm), turnRow(row, rotation)).map(Math.abs))).toBeLessThan(1e-9);
      });
      expect([...reversing].sort((a, b) => a - b)).toEqual(
        float.operators.flatMap(({ rotation }, at) =>
          isReciprocalVector(float, plus(turnRow(row, rotation), row)) ? [at] : [],
        ),
      );
    }
  });

  test.each(names)("in %s: the canonical k is one for all equivalent k and all arms of a line", (name) => {
    const { group, float, random } = parts(groupOf(name));
    for (let count = 0; count < 4; count++) {
      const k = randomWaveVector(group, random);
      const { canonical, operator } = canonicalPlacement(group, k);
      // k ≡ canonical · R⁻¹.
      const back = turnRow(componentsOf(canonical), inverse(float.operators[operator] as never).rotation);
      expect(isReciprocalVector(float, minus(back, componentsOf(k)))).toBe(true);
      const { form, dimension } = manifold(group, canonical, { withInversion: false });
      for (const arm of star(group, k).arms) {
        const other = canonicalPlacement(group, arm).canonical;
        if (dimension === 0) expect(other).toEqual(canonical);
        // On a line or plane the places along it may be those of different arms.
        else
          expect(formatWaveVector(manifold(group, other, { withInversion: false }).form)).toBe(formatWaveVector(form));
      }
      const [first] = shiftsOf(float, 1);
      const moved = shifted(k, first as number[]);
      expect(equivalentWaveVectors(group, k, moved)).toBe(true);
      expect(canonicalPlacement(group, moved)).toEqual({ canonical, operator });
      expect(equivalentWaveVectors(group, k, shifted(k, [1 / 97, 0, 0]))).toBe(false);
    }
  });

  test.each(names)("in %s: no equivalent k reads more plainly than the plainest", (name) => {
    const { group, float, random } = parts(groupOf(name));
    const shifts = shiftsOf(float, 1);
    for (let count = 0; count < 3; count++) {
      const k = randomWaveVector(group, random);
      const plainest = componentsOf(plainestRepresentative(group, k));
      let reached = false;
      for (const { rotation } of float.operators)
        for (const sign of [1, -1]) {
          const image = turnRow(componentsOf(k), rotation).map((entry) => sign * entry);
          reached ||= isReciprocalVector(float, minus(image, plainest));
          for (const shift of shifts) expect(isPlainer(plus(image, shift), plainest)).toBe(false);
        }
      expect(reached).toBe(true);
    }
  });

  test.each(names)(
    "in %s: a line or plane passes through its points, shifted by L* or not, and through no others",
    (name) => {
      const { group, float, random } = parts(groupOf(name));
      for (const kind of atlas(group, { withInversion: false })) {
        if (kind.dimension === 0 || kind.dimension === 3) continue;
        const through = manifold(group, kind.k, { withInversion: false });
        const values = [0, 1, 2].map(() => (random.below(11) - 5) / 7);
        const at = through.form.components.map((form) =>
          form.coefficients.reduce(
            (sum, [top, bottom], letter) => sum + (top / bottom) * (values[letter] as number),
            form.constant[0] / form.constant[1],
          ),
        );
        const exact = exactWaveVector(
          at.map((entry) => reduced(Math.round(entry * 84), 84)) as unknown as RationalVector,
        );
        const plain = pointOnManifold(group, through, exact);
        expect(plain?.map(([top, bottom]) => top / bottom)).toEqual(
          values.slice(0, kind.dimension).map((value) => expect.closeTo(value, 9)),
        );
        const moved = shifted(exact, random.pick(shiftsOf(float, 1)));
        const found = pointOnManifold(group, through, moved);
        expect(found).toHaveLength(kind.dimension);
        const back = through.form.components.map((form) =>
          form.coefficients.reduce(
            (sum, [top, bottom], letter) =>
              sum + (top / bottom) * ((found?.[letter]?.[0] ?? 0) / (found?.[letter]?.[1] ?? 1)),
            form.constant[0] / form.constant[1],
          ),
        );
        expect(isReciprocalVector(float, minus(back, componentsOf(moved)))).toBe(true);
        // A step of a seventeenth off a line or plane, along an axis that leaves it.
        const off = [0, 1, 2].filter((axis) => {
          const step = [0, 1, 2].map((other) => (other === axis ? 1 / 17 : 0));
          return pointOnManifold(group, through, shifted(exact, step)) === null;
        });
        expect(off.length).toBeGreaterThan(0);
        expect(pointOnManifold(group, through, kind.k)).toBeNull();
      }
    },
  );

  test.each(names.slice(0, 26))("in %s: the k in the first zone is the shortest, of several the largest", (name) => {
    const { group, float, random } = parts(groupOf(name));
    const cell = randomCell(group, random, 100);
    const metric = reciprocalMetric(cell);
    const shifts = shiftsOf(float, 2);
    for (let count = 0; count < 3; count++) {
      const k = randomWaveVector(group, random);
      const found = componentsOf(firstZoneRepresentative(group, cell, k));
      expect(isReciprocalVector(float, minus(found, componentsOf(k)))).toBe(true);
      const length = lengthInMetric(metric, found);
      for (const shift of shifts) {
        const other = plus(found, shift);
        const step = lengthInMetric(metric, other) - length;
        expect(step).toBeGreaterThan(-1e-8);
        if (Math.abs(step) < 1e-10) expect(isLater(found, other)).toBe(true);
      }
    }
  });
});

describe("measured k", () => {
  test.each(names)("in %s go onto a special point within the tolerance, and keep off it beyond", (name) => {
    const { group, random } = parts(groupOf(name));
    for (const { k } of specialPoints(group)) {
      const exact = exactComponents(k)?.map(([top, bottom]) => top / bottom) ?? [];
      const near = exact.map((entry) => entry + (random.next() - 0.5) * 1.6e-4);
      const written = (row: readonly number[]) => parseWaveVector(row.map((entry) => entry.toFixed(7)).join(","));
      const placed = placeWaveVector(group, written(near));
      expect(formatWaveVector(placed.k)).toBe(formatWaveVector(k));
      expect(placed.assumed).toHaveLength(1);
      const far = placeWaveVector(group, written(exact.map((entry, axis) => entry + [0.011, 0.0131, 0.0173][axis]!)));
      expect(numericWaveVector(far.k)).toEqual(
        exact.map((entry, axis) => expect.closeTo(entry + [0.011, 0.0131, 0.0173][axis]!, 6)),
      );
      expect(far.assumed).toEqual([]);
    }
  });
});

describe("kinds nearby", () => {
  test.each(["P -1", "C 1 2/c 1", "F d d 2", "I -4 2 m", "R 3 m:H", "P 63/m"])(
    "in %s are those that a search over every arm and shift finds",
    (name) => {
      const { group, random } = parts(groupOf(name));
      const cell = randomCell(group, random, 100);
      const text = [0, 1, 2].map(() => (0.5 * random.next() - 0.25 + 0.0123).toFixed(5)).join(",");
      const { k } = placeWaveVector(group, parseWaveVector(text));
      const kinds = atlas(group, { withInversion: true });
      const slow = distancesToKinds(group, cell, kinds, numericWaveVector(k) as readonly number[], true);
      const own = kindOf(group, kinds, k, { withInversion: true });
      const found = nearbyKinds(group, cell, k, { withInversion: true, distance: 0.35 });
      expect(found.map(({ index }) => index).sort((a, b) => a - b)).toEqual(
        slow.flatMap((distance, index) => (index !== own && distance <= 0.35 ? [index] : [])),
      );
      expect(found.map(({ distance }) => distance)).toEqual(
        found.map(({ index }) => expect.closeTo(slow[index] as number, 9)),
      );
      expect(found.map(({ distance }) => distance)).toEqual(
        found.map(({ distance }) => distance).sort((a, b) => a - b),
      );
    },
  );

  test("of a k with a special neighbour in every direction are points, lines and planes", () => {
    const group = groupOf("P m m m");
    const cell = { a: 4, b: 5, c: 6, alpha: 90, beta: 90, gamma: 90 };
    const { k } = placeWaveVector(group, parseWaveVector("0.51,0.02,0.03"));
    const found = nearbyKinds(group, cell, k, { withInversion: true, distance: 0.2 });
    expect(found.map(({ nearest }) => formatWaveVector(nearest)).sort()).toEqual(
      ["(1/2, 0, 0)", "(1/2, 0, u)", "(1/2, u, 0)", "(1/2, u, v)", "(u, 0, 0)", "(u, 0, v)", "(u, v, 0)"].sort(),
    );
    const [first] = found;
    expect(first?.distance).toBeCloseTo((2 * Math.PI * 0.01) / 4, 10);
  });
});

/** The k moved by a row of small fractions. */
function shifted(k: WaveVector, step: readonly number[]): WaveVector {
  const [a, b, c] = k.components.map((form, axis) => {
    const value = form.constant[0] / form.constant[1] + (step[axis] as number);
    const bottom = form.constant[1] * 97 * 17 * 12;
    return { ...form, constant: reduced(Math.round(value * bottom), bottom) };
  });
  return { ...k, components: [a, b, c] as unknown as WaveVector["components"] };
}

/** Fewer components other than 0, then smaller squares, then fewer minus signs, then first in order. */
function isPlainer(a: readonly number[], b: readonly number[]): boolean {
  const key = (row: readonly number[]): number[] => [
    row.filter((entry) => Math.abs(entry) > 1e-9).length,
    inner(row, row),
    row.filter((entry) => entry < -1e-9).length,
    ...row,
  ];
  return isBefore(key(a), key(b));
}

function isLater(a: readonly number[], b: readonly number[]): boolean {
  return !isBefore(a, b);
}

function isBefore(a: readonly number[], b: readonly number[]): boolean {
  const at = a.findIndex((entry, index) => Math.abs(entry - (b[index] as number)) > 1e-9);
  return at >= 0 && (a[at] as number) < (b[at] as number);
}

describe("the k + H that reads most plainly", () => {
  test.each([
    ["P m m m", "7,1/4,-9/2", "(0, 1/4, 1/2)"],
    ["P m m m", "-11/3,0,13", "(1/3, 0, 0)"],
    // (1,1,1) and (2,0,0) are in L* of an F lattice, (1,0,0) is not.
    ["F m -3 m", "9,8,8", "(1, 0, 0)"],
    ["F m -3 m", "7/2,-9/2,1/2", "(1/2, 1/2, -1/2)"],
    ["I m -3 m", "5,4,-7", "(0, 0, 0)"],
  ])("in %s of (%s) is %s", (name, text, plain) => {
    const { k } = placeWaveVector(groupOf(name), parseWaveVector(text));
    expect(formatWaveVector(reducedRepresentative(groupOf(name), k))).toBe(plain);
  });

  test("is k itself where it is too far out to tell, and takes an open letter for 0", () => {
    const group = groupOf("P m m m");
    const far = placeWaveVector(group, parseWaveVector("41,0,0")).k;
    expect(reducedRepresentative(group, far)).toBe(far);
    const near = placeWaveVector(group, parseWaveVector("40,0,0")).k;
    expect(formatWaveVector(reducedRepresentative(group, near))).toBe("(0, 0, 0)");
    const open = placeWaveVector(group, parseWaveVector("u,3,1/2")).k;
    expect(formatWaveVector(reducedRepresentative(group, open))).toBe("(u, 0, 1/2)");
    const plain = placeWaveVector(group, parseWaveVector("0,1/3,0")).k;
    expect(reducedRepresentative(group, plain)).toBe(plain);
  });
});

describe("wave vectors as they are written", () => {
  test("in the tables' form, with values where there are some", () => {
    const { form } = manifold(groupOf("P m -3 m"), wave("1/5 1/5 0"), { withInversion: false });
    expect(formatWaveVector(form)).toBe("(u, u, 0)");
    expect(formatWaveVector(form, true)).toBe("(u, u, 0) with u = 0.2");
    expect(formatWaveVector({ ...form, values: null }, true)).toBe("(u, u, 0)");
    expect(numericWaveVector({ ...form, values: null })).toBeNull();
    expect(numericWaveVector(form)).toEqual([0.2, 0.2, 0]);
    expect(exactComponents(form)).toBeNull();
  });
});
