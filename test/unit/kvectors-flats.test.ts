import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  type AffineSet,
  affineForms,
  affineParameters,
  type Condition,
  fixingConditions,
  solveConditions,
} from "#core/kvectors/affine.js";
import { adaptedCoordinates, crossProduct, directionTable, integerKernel, saturated } from "#core/kvectors/flats.js";
import { rotateRow } from "#core/kvectors/integer-form.js";
import {
  add,
  constantForm,
  dot,
  evaluateForm,
  gcdOf,
  hermiteNormalForm,
  integerDeterminant,
  invertUnimodular,
  matrixFrom,
  multiply,
  type Rational,
  type RationalVector,
  rational,
  rowTimes,
  subtractVectors,
  vectorFrom,
} from "#core/numbers/index.js";

const seed = 20261205;
const entry = fc.integer({ min: -4, max: 4 });
const triple = fc.tuple(entry, entry, entry);
const rows = fc.array(triple, { minLength: 0, maxLength: 2 });
const inner = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, value, at) => sum + value * (b[at] as number), 0);
const isZero = (row: readonly number[]): boolean => row.every((value) => value === 0);

/** The point of the set at these parameters. */
function pointOf({ base, directions }: AffineSet, parameters: readonly Rational[]): RationalVector {
  const [x, y, z] = base.map((start, axis) =>
    directions.reduce(
      (sum, direction, at) => add(sum, multiply(parameters[at] as Rational, direction[axis] as Rational)),
      start,
    ),
  );
  return [x, y, z] as RationalVector;
}

/** The rank of up to two rows. */
function rankOf(some: readonly (readonly number[])[]): number {
  const [first, second] = some.filter((row) => !isZero(row));
  if (first === undefined) return 0;
  return second !== undefined && !isZero(crossProduct(first, second)) ? 2 : 1;
}

describe("lattices of integer rows", () => {
  it("that some rows annihilate hold every such row, and are as many as the rank leaves", () => {
    fc.assert(
      fc.property(rows, triple, (given, other) => {
        const kernel = integerKernel(given);
        expect(kernel.length).toBe(3 - rankOf(given));
        for (const row of kernel) for (const one of given) expect(inner(row, one)).toBe(0);
        // Any row that is annihilated changes nothing of the lattice.
        if (given.every((one) => inner(one, other) === 0))
          expect(hermiteNormalForm([...kernel, [...other]], 3)).toEqual(hermiteNormalForm(kernel, 3));
      }),
      { seed },
    );
  });

  it("that are saturated hold the rows, and every integer row in their span", () => {
    fc.assert(
      fc.property(rows, fc.integer({ min: 2, max: 4 }), (given, factor) => {
        const full = saturated(given.map((row) => row.map((value) => factor * value)));
        expect(full.length).toBe(rankOf(given));
        for (const row of given) expect(hermiteNormalForm([...full, [...row]], 3)).toEqual(hermiteNormalForm(full, 3));
        for (const row of full) expect(gcdOf(row)).toBe(1);
      }),
      { seed },
    );
  });

  it("are the first unit rows in coordinates that fit them", () => {
    fc.assert(
      fc.property(rows, (given) => {
        const lattice = saturated(given);
        const coordinates = adaptedCoordinates(lattice);
        expect(Math.abs(integerDeterminant(coordinates))).toBe(1);
        lattice.forEach((row, at) => {
          const image = [0, 1, 2].map((column) =>
            inner(
              row,
              [0, 3, 6].map((start) => coordinates[start + column] as number),
            ),
          );
          expect(image).toEqual([0, 1, 2].map((column) => (column === at ? 1 : 0)));
        });
      }),
      { seed },
    );
  });

  it("are one record for one span, whatever rows it is given by", () => {
    const table = directionTable();
    const plane = table([
      [1, 0, 0],
      [0, 1, 0],
    ]);
    expect(
      table([
        [1, 1, 0],
        [1, -2, 0],
      ]),
    ).toBe(plane);
    expect(table([[2, -4, 6]])).toBe(table([[-1, 2, -3]]));
    expect(table([[0, 0, -3]]).rows.map((row) => row.map(Math.abs))).toEqual([[0, 0, 1]]);
    expect(table([])).toBe(table([]));
    expect(table([]).name).not.toBe(plane.name);
    expect(invertUnimodular(plane.coordinates)).toEqual(plane.inverse);
  });
});

describe("a rotated row", () => {
  it("has zeros, never −0, which JSON does not keep", () => {
    // Minus the permutations of the axes in turn: a sum of −0 alone at each of the three places.
    for (const matrix of [
      [-1, 0, 0, 0, -1, 0, 0, 0, -1],
      [0, -1, 0, 0, 0, -1, -1, 0, 0],
      [0, 0, -1, -1, 0, 0, 0, -1, 0],
    ])
      for (const [row, zeroAt] of [
        [[0, -1, -1], 0],
        [[-1, 0, -1], 1],
        [[-1, -1, 0], 2],
      ] as const) {
        // The column whose −1 meets the zero of the row.
        const column = [0, 1, 2].findIndex((at) => matrix[3 * zeroAt + at] === -1);
        expect(rotateRow(row, matrix)).toEqual([0, 1, 2].map((at) => (at === column ? 0 : 1)));
      }
  });
});

describe("affine sets", () => {
  const conditions = fc.array(fc.tuple(triple, fc.integer({ min: -6, max: 6 })), { minLength: 0, maxLength: 3 });
  const asCondition = ([coefficients, value]: readonly [readonly number[], number]): Condition => ({
    coefficients: coefficients.map((one) => rational(one)),
    value: rational(value, 2),
  });

  it("solve their conditions for all parameters, in the tables' form", () => {
    fc.assert(
      fc.property(conditions, triple, (given, numbers) => {
        const set = solveConditions(given.map(asCondition));
        if (set === null) return;
        const parameters = set.directions.map((_, at) => rational(numbers[at] as number, 3));
        const point = pointOf(set, parameters);
        for (const [coefficients, value] of given)
          expect(dot(vectorFrom(coefficients), point)).toEqual(rational(value, 2));
        expect(set.directions.length).toBe(set.pivots.length);
        set.directions.forEach((direction, at) => {
          expect(direction.every(([, bottom]) => bottom === 1)).toBe(true);
          expect(gcdOf(direction.map(([top]) => top))).toBe(1);
          set.pivots.forEach((pivot, other) => {
            expect((direction[pivot as 0] as Rational)[0] !== 0).toBe(other === at);
          });
          expect(set.base[set.pivots[at] as 0]).toEqual([0, 1]);
        });
        const forms = affineForms(set);
        const letters = [0, 1, 2].map((at) => parameters[at] ?? rational(0)) as unknown as RationalVector;
        expect(forms.map((form) => evaluateForm(form, letters))).toEqual([...point]);
        const back = affineParameters(
          set,
          point.map((value) => constantForm(value)),
        );
        expect(back.map(({ constant }) => constant)).toEqual(parameters);
      }),
      { seed },
    );
  });

  it("have the letters themselves as parameters of their forms", () => {
    const letters = [
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ].map((row) => ({ constant: rational(0), coefficients: vectorFrom(row) }));
    // Everything, the plane x + 2y = 1/2 along (2, −1, 0) and (0, 0, 1), and the line on it with z = x.
    const plane = [[1, 2, 0], 1] as const;
    for (const [given, dimension] of [
      [[], 3],
      [[plane], 2],
      [[plane, [[1, 0, -1], 0]], 1],
    ] as const) {
      const set = solveConditions(given.map(asCondition)) as AffineSet;
      expect(affineParameters(set, affineForms(set))).toEqual(letters.slice(0, dimension));
    }
  });

  it("are missing where the conditions contradict each other", () => {
    const contradiction = [
      [[1, 1, 0], 1],
      [[2, 2, 0], 1],
    ] as const;
    expect(solveConditions(contradiction.map(asCondition))).toBeNull();
    expect(solveConditions([asCondition([[0, 0, 0], 1])])).toBeNull();
    expect(solveConditions([])?.directions).toHaveLength(3);
    expect(solveConditions([asCondition([[0, 0, 0], 0])])?.directions).toHaveLength(3);
  });

  it("of a rotation are the k with ±kR − k = shift", () => {
    // The fourfold rotation (x, y, z) → (−y, x, z), as rows act: k R = (k₂, −k₁, k₃).
    const quarter = matrixFrom([0, -1, 0, 1, 0, 0, 0, 0, 1]);
    const shift = vectorFrom([1, 0, 0]);
    const set = solveConditions(fixingConditions(quarter, shift));
    expect(set?.base).toEqual([rational(-1, 2), rational(1, 2), rational(0)]);
    expect(set?.directions).toEqual([vectorFrom([0, 0, 1])]);
    const point = pointOf(set as NonNullable<typeof set>, [rational(2, 7)]);
    expect(subtractVectors(rowTimes(point, quarter), point)).toEqual(shift);
    const reversed = solveConditions(fixingConditions(quarter, vectorFrom([0, 0, 1]), -1));
    // −k₃ − k₃ = 1.
    expect(reversed?.base[2]).toEqual(rational(-1, 2));
  });
});
