import { describe, expect, it } from "vitest";
import {
  addCyclotomic,
  addCyclotomicMatrices,
  adjointCyclotomicMatrix,
  type CyclotomicMatrix,
  cyclotomicFromRational,
  cyclotomicToComplex,
  identityCyclotomicMatrix,
  multiplyCyclotomic,
  multiplyCyclotomicMatrices,
  negate,
  rational,
  rootOfUnity,
  scaleCyclotomicMatrix,
  traceCyclotomicMatrix,
} from "#core/numbers/index.js";

describe("matrices of roots of unity", () => {
  const third = rootOfUnity([1, 3]);
  const i = rootOfUnity([1, 4]);
  const zero = cyclotomicFromRational([0, 1]);
  const a: CyclotomicMatrix = [
    [third, zero],
    [i, cyclotomicFromRational([1, 2])],
  ];
  const b: CyclotomicMatrix = [
    [i, third, zero],
    [zero, i, addCyclotomic(third, i)],
  ];
  const values = (m: CyclotomicMatrix) => m.map((row) => row.map(cyclotomicToComplex));
  const close = (m: CyclotomicMatrix, expected: readonly (readonly (readonly [number, number])[])[]): void => {
    expect(m.map((row) => row.length)).toEqual(expected.map((row) => row.length));
    values(m).forEach((row, at) => {
      row.forEach(([re, im], column) => {
        expect(re).toBeCloseTo(expected[at]?.[column]?.[0] ?? Number.NaN, 10);
        expect(im).toBeCloseTo(expected[at]?.[column]?.[1] ?? Number.NaN, 10);
      });
    });
  };
  const half = Math.sqrt(3) / 2;

  it("of sizes n × 0 and 0 × 0 have a product without columns", () => {
    expect(multiplyCyclotomicMatrices([[], []], [])).toEqual([[], []]);
  });

  it("multiply, add, scale, and have traces and adjoints", () => {
    // ζ₃·i = e^{2πi·7/12}, ζ₃² = e^{−2πi/3}; second row: i·i = −1, i·ζ₃ + i/2, (ζ₃ + i)/2.
    close(multiplyCyclotomicMatrices(a, b), [
      [
        [-half, -0.5],
        [-0.5, -half],
        [0, 0],
      ],
      [
        [-1, 0],
        [-half, 0],
        [-0.25, (half + 1) / 2],
      ],
    ]);
    close(addCyclotomicMatrices(a, a), [
      [
        [-1, 2 * half],
        [0, 0],
      ],
      [
        [0, 2],
        [1, 0],
      ],
    ]);
    close(scaleCyclotomicMatrix(i, a), [
      [
        [-half, -0.5],
        [0, 0],
      ],
      [
        [-1, 0],
        [0, 0.5],
      ],
    ]);
    close(adjointCyclotomicMatrix(b), [
      [
        [0, -1],
        [0, 0],
      ],
      [
        [-0.5, -half],
        [0, -1],
      ],
      [
        [0, 0],
        [-0.5, -half - 1],
      ],
    ]);
    close([[traceCyclotomicMatrix(a)]], [[[0, half]]]);
    close(identityCyclotomicMatrix(2), [
      [
        [1, 0],
        [0, 0],
      ],
      [
        [0, 0],
        [1, 0],
      ],
    ]);
    expect(adjointCyclotomicMatrix([])).toEqual([]);
    expect(multiplyCyclotomicMatrices([], [])).toEqual([]);
  });

  it("of the field of fractions multiply as fractions do", () => {
    const [p, q] = [rational(-3, 4), rational(10, 9)];
    expect(multiplyCyclotomic(cyclotomicFromRational(p), cyclotomicFromRational(q))).toEqual(
      cyclotomicFromRational([-5, 6]),
    );
    expect(negate([0, 1])).toEqual([0, 1]);
  });
});
