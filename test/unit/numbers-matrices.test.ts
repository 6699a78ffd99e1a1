import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  add,
  addVectors,
  adjugate,
  cross,
  determinant,
  dot,
  dotIntegers,
  equal,
  gcd,
  gcdOf,
  hermiteNormalForm,
  identityMatrix,
  integerDeterminant,
  invert,
  invertUnimodular,
  lcm,
  matrixFrom,
  modulo,
  multiply,
  multiplyIntegerMatrices,
  multiplyMatrices,
  negateVector,
  nullSpace,
  overCommonDenominator,
  type Rational,
  type RationalVector,
  rational,
  rationalField,
  reducedEchelon,
  reduceModulo,
  rowTimes,
  subtractVectors,
  timesColumn,
  transpose,
  transposeIntegers,
  vectorFrom,
  zeroVector,
} from "#core/numbers/index.js";

const seed = 20261203;
const entry = fc.integer({ min: -5, max: 5 });
const integerMatrices = fc.array(entry, { minLength: 9, maxLength: 9 });
const vectors = fc
  .tuple(entry, entry, entry, fc.integer({ min: 1, max: 6 }))
  .map(([x, y, z, denominator]) => vectorFrom([x, y, z], denominator));
const identity = [1, 0, 0, 0, 1, 0, 0, 0, 1];

/** The product of two matrices of plain numbers, written out row by column. */
function plainProduct(a: readonly number[], b: readonly number[]): number[] {
  return Array.from({ length: 9 }, (_, at) =>
    [0, 1, 2].reduce((sum, k) => sum + (a[3 * Math.floor(at / 3) + k] ?? 0) * (b[3 * k + (at % 3)] ?? 0), 0),
  ).map((value) => value + 0);
}

describe("integers", () => {
  it("have divisors, multiples and remainders without a sign", () => {
    expect([gcd(-12, 18), gcd(12, -18), gcd(0, -7), gcd(0, 0)]).toEqual([6, 6, 7, 0]);
    expect([lcm(-4, 6), lcm(4, -6), lcm(0, 5), lcm(5, 0)]).toEqual([12, 12, 0, 0]);
    expect([modulo(-1, 5), modulo(-5, 5), modulo(7, 5), modulo(0, 5)]).toEqual([4, 0, 2, 0]);
    expect([gcdOf([12, -18, 30]), gcdOf([]), gcdOf([0, 0])]).toEqual([6, 0, 0]);
  });
});

describe("integer matrices", () => {
  it("multiply as rows times columns, and their determinants with them", () => {
    fc.assert(
      fc.property(integerMatrices, integerMatrices, (a, b) => {
        const product = multiplyIntegerMatrices(a, b);
        expect(product).toEqual(plainProduct(a, b));
        expect(integerDeterminant(product)).toBe(integerDeterminant(a) * integerDeterminant(b) + 0);
        expect(transposeIntegers(product)).toEqual(multiplyIntegerMatrices(transposeIntegers(b), transposeIntegers(a)));
      }),
      { seed },
    );
  });

  it("never hold −0", () => {
    const products = multiplyIntegerMatrices([-1, 0, 0, 0, -1, 0, 0, 0, -1], [0, 0, 0, 0, 0, 0, 0, 0, 0]);
    expect(products).toEqual([0, 0, 0, 0, 0, 0, 0, 0, 0]);
    expect(invertUnimodular([-1, 0, 0, 0, -1, 0, 0, 0, -1])).toEqual([-1, 0, 0, 0, -1, 0, 0, 0, -1]);
    expect(dotIntegers([0, 0, -1], [-1, 0, 0])).toBe(0);
    expect(dotIntegers([0, 0, 0], [-1, -1, -1])).toBe(0);
  });

  it("times their adjugate are the determinant", () => {
    fc.assert(
      fc.property(integerMatrices, (m) => {
        const det = integerDeterminant(m);
        expect(plainProduct(m, adjugate(m))).toEqual(identity.map((one) => one * det + 0));
      }),
      { seed },
    );
  });

  it("have an integer inverse exactly when the determinant is 1 or −1", () => {
    for (const m of [
      [1, 2, 3, 0, 1, 4, 0, 0, 1],
      [0, 1, 0, 1, 0, 0, 0, 0, 1],
    ])
      expect(plainProduct(m, invertUnimodular(m))).toEqual(identity);
    for (const m of [
      [2, 0, 0, 0, 1, 0, 0, 0, 1],
      [1, 0, 0, 1, 0, 0, 0, 0, 1],
    ])
      expect(() => invertUnimodular(m)).toThrowError(expect.objectContaining({ code: "singular-basis" }));
  });
});

describe("exact matrices and vectors", () => {
  it("obey the laws of vector algebra", () => {
    fc.assert(
      fc.property(vectors, vectors, vectors, (a, b, c) => {
        expect(subtractVectors(addVectors(a, b), b)).toEqual(a);
        expect(addVectors(a, negateVector(a))).toEqual(zeroVector);
        expect(dot(a, cross(a, b))).toEqual([0, 1]);
        expect(dot(a, cross(b, c))).toEqual(determinant([a, b, c]));
        // a × (b × c) = b (a·c) − c (a·b)
        const scaled = (factor: Rational, v: RationalVector): RationalVector => [
          multiply(factor, v[0]),
          multiply(factor, v[1]),
          multiply(factor, v[2]),
        ];
        expect(cross(a, cross(b, c))).toEqual(subtractVectors(scaled(dot(a, c), b), scaled(dot(a, b), c)));
      }),
      { seed },
    );
  });

  it("act on columns from the left and on rows from the right", () => {
    fc.assert(
      fc.property(integerMatrices, integerMatrices, vectors, vectors, (p, q, row, column) => {
        const [m, n] = [matrixFrom(p, 2), matrixFrom(q, 3)];
        expect(dot(rowTimes(row, m), column)).toEqual(dot(row, timesColumn(m, column)));
        expect(timesColumn(multiplyMatrices(m, n), column)).toEqual(timesColumn(m, timesColumn(n, column)));
        expect(rowTimes(row, m)).toEqual(timesColumn(transpose(m), row));
      }),
      { seed },
    );
  });

  it("are read row by row", () => {
    const m = matrixFrom([1, 2, 3, 4, 5, 6, 7, 8, 10], 2);
    expect(m).toEqual([
      [rational(1, 2), rational(1), rational(3, 2)],
      [rational(2), rational(5, 2), rational(3)],
      [rational(7, 2), rational(4), rational(5)],
    ]);
    expect(determinant(m)).toEqual([-3, 8]);
    expect(multiplyMatrices(m, invert(m))).toEqual(identityMatrix);
    expect(matrixFrom(identity)).toEqual(identityMatrix);
    expect(vectorFrom([1, -2, 0])).toEqual([rational(1), rational(-2), rational(0)]);
  });

  it("without a determinant are refused", () => {
    expect(() => invert(matrixFrom([1, 2, 3, 2, 4, 6, 0, 0, 1]))).toThrowError(
      expect.objectContaining({ code: "singular-basis" }),
    );
  });

  it("have a least common denominator", () => {
    expect(overCommonDenominator([rational(1, 4), rational(-5, 6), rational(2)])).toEqual({
      numerators: [3, -10, 24],
      denominator: 12,
    });
    expect(overCommonDenominator([])).toEqual({ numerators: [], denominator: 1 });
  });
});

describe("echelon forms", () => {
  const rows = fc.array(fc.array(entry, { minLength: 4, maxLength: 4 }), { minLength: 1, maxLength: 5 });

  it("have leading ones with zeros above and below, pivots from left to right, no row of zeros", () => {
    fc.assert(
      fc.property(rows, (m) => {
        const given = m.map((row) => row.map((value) => rational(value)));
        const copy = structuredClone(given);
        const { rows: reduced, pivots } = reducedEchelon(given, rationalField);
        expect(given).toEqual(copy);
        expect(reduced.length).toBe(pivots.length);
        expect(pivots).toEqual([...new Set(pivots)].sort((a, b) => a - b));
        pivots.forEach((pivot, at) => {
          expect(reduced.map((row) => row[pivot])).toEqual(reduced.map((_, other) => rational(other === at ? 1 : 0)));
          expect((reduced[at] as Rational[]).slice(0, pivot).every(([numerator]) => numerator === 0)).toBe(true);
        });
        // Each row is the sum of the reduced rows with its own entries at the pivots.
        for (const row of given)
          row.forEach((value, column) => {
            const sum = pivots.reduce<Rational>(
              (total, pivot, at) =>
                add(total, multiply(row[pivot] as Rational, (reduced[at] as Rational[])[column] as Rational)),
              [0, 1],
            );
            expect(equal(sum, value)).toBe(true);
          });
        for (const vector of nullSpace(given, 4, rationalField, [0, 1], [1, 1]))
          for (const row of given)
            expect(row.reduce<Rational>((s, v, at) => add(s, multiply(v, vector[at] as Rational)), [0, 1])).toEqual([
              0, 1,
            ]);
      }),
      { seed },
    );
  });

  it("come of the first row that has an entry, which keeps a reduced basis in the safe range", () => {
    // (1, 0) and (2^27, 1/(2^27 − 1)) are independent; divided by 2^27 the second would have a denominator near 2^54.
    const large = [rational(2 ** 27), rational(1, 2 ** 27 - 1)];
    expect(reducedEchelon([[rational(1), rational(0)], large], rationalField)).toEqual({
      rows: [
        [rational(1), rational(0)],
        [rational(0), rational(1)],
      ],
      pivots: [0, 1],
    });
  });

  it("of no rows are empty, and every vector is a null vector", () => {
    expect(reducedEchelon([], rationalField)).toEqual({ rows: [], pivots: [] });
    expect(nullSpace([], 2, rationalField, [0, 1], [1, 1])).toEqual([
      [
        [1, 1],
        [0, 1],
      ],
      [
        [0, 1],
        [1, 1],
      ],
    ]);
  });
});

describe("Hermite forms", () => {
  const rows = fc.array(fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 3, maxLength: 3 }), {
    minLength: 0,
    maxLength: 4,
  });

  it("are triangular with positive pivots and reduced entries above them, and leave what they are given alone", () => {
    fc.assert(
      fc.property(rows, (m) => {
        const copy = structuredClone(m);
        const form = hermiteNormalForm(m, 3);
        expect(m).toEqual(copy);
        const pivots = form.map((row) => row.findIndex((value) => value !== 0));
        expect(pivots).toEqual([...new Set(pivots)].filter((at) => at >= 0).sort((a, b) => a - b));
        form.forEach((row, at) => {
          const column = pivots[at] as number;
          const pivot = row[column] as number;
          expect(pivot).toBeGreaterThan(0);
          for (const above of form.slice(0, at)) {
            expect(above[column]).toBeGreaterThanOrEqual(0);
            expect(above[column]).toBeLessThan(pivot);
          }
        });
      }),
      { seed },
    );
  });

  it("give one representative a coset, with entries at the pivots in [0, pivot)", () => {
    const triples = fc.tuple(entry, entry, entry);
    fc.assert(
      fc.property(rows, triples, triples, (m, vector, factors) => {
        const form = hermiteNormalForm(m, 3);
        const rest = reduceModulo(vector, form);
        form.forEach((row) => {
          const column = row.findIndex((value) => value !== 0);
          expect(rest[column]).toBeGreaterThanOrEqual(0);
          expect(rest[column]).toBeLessThan(row[column] as number);
        });
        const moved = vector.map((value, at) =>
          form.reduce((sum, row, index) => sum + (factors[index] ?? 0) * (row[at] as number), value),
        );
        expect(reduceModulo(moved, form)).toEqual(rest);
        // What was taken away is in the lattice: it changes no form.
        const taken = vector.map((value, at) => value - (rest[at] as number));
        expect(hermiteNormalForm([...form, taken], 3)).toEqual(form);
      }),
      { seed },
    );
  });

  it("of a known lattice: (2,4,4), (-6,6,12), (10,4,16)", () => {
    // The index is the determinant, 2·(96 − 48) − 4·(−96 − 120) + 4·(−24 − 60) = 624; the first column has the divisor 2.
    const form = hermiteNormalForm(
      [
        [2, 4, 4],
        [-6, 6, 12],
        [10, 4, 16],
      ],
      3,
    );
    expect(form.reduce((product, row, at) => product * (row[at] as number), 1)).toBe(624);
    expect(form[0]?.[0]).toBe(2);
  });
});
