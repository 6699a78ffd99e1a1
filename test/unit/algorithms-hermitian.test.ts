import { describe, expect, it } from "vitest";
import {
  goldenSection,
  type HermitianMatrix,
  hermitianAbove,
  hermitianEigen,
  hermitianMatrix,
  levenbergMarquardt,
} from "#core/algorithms/index.js";
import { type Random, seeded } from "../support/random.js";

function randomHermitian(size: number, random: Random, degenerate: boolean): HermitianMatrix {
  const matrix = hermitianMatrix(size);
  for (let i = 0; i < size; i++)
    for (let k = 0; k <= i; k++) {
      const [re, im] = degenerate ? [1, 0] : [2 * random.next() - 1, i === k ? 0 : 2 * random.next() - 1];
      matrix.real[i * size + k] = matrix.real[k * size + i] = re;
      matrix.imaginary[i * size + k] = im;
      matrix.imaginary[k * size + i] = -im;
    }
  return matrix;
}

describe("eigenvectors of Hermitian matrices", () => {
  it.each([1, 2, 3, 5, 8, 16])("of %d rows solve A v = λ v, are of unit length and at right angles", (size) => {
    const random = seeded(size);
    for (const degenerate of [false, true]) {
      const matrix = randomHermitian(size, random, degenerate);
      const { values, real, imaginary } = hermitianEigen(matrix);
      for (let n = 0; n < size; n++) {
        if (n > 0) expect(values[n]).toBeGreaterThanOrEqual((values[n - 1] as number) - 1e-12);
        for (let i = 0; i < size; i++) {
          let [re, im] = [0, 0];
          for (let k = 0; k < size; k++) {
            const [ar, ai] = [matrix.real[i * size + k] as number, matrix.imaginary[i * size + k] as number];
            const [vr, vi] = [real[k * size + n] as number, imaginary[k * size + n] as number];
            re += ar * vr - ai * vi;
            im += ar * vi + ai * vr;
          }
          expect(re).toBeCloseTo((values[n] as number) * (real[i * size + n] as number), 11);
          expect(im).toBeCloseTo((values[n] as number) * (imaginary[i * size + n] as number), 11);
        }
        for (let m = 0; m <= n; m++) {
          let [re, im] = [0, 0];
          for (let k = 0; k < size; k++) {
            const [ar, ai] = [real[k * size + m] as number, imaginary[k * size + m] as number];
            const [br, bi] = [real[k * size + n] as number, imaginary[k * size + n] as number];
            re += ar * br + ai * bi;
            im += ar * bi - ai * br;
          }
          expect(re).toBeCloseTo(n === m ? 1 : 0, 11);
          expect(im).toBeCloseTo(0, 11);
        }
      }
    }
  });

  it("lie above a number exactly when Cholesky's factors exist", () => {
    const random = seeded(77);
    for (let round = 0; round < 200; round++) {
      const size = 1 + random.below(5);
      const matrix = randomHermitian(size, random, false);
      const lowest = hermitianEigen(matrix).values[0] as number;
      expect(hermitianAbove(matrix, lowest - 1e-9, hermitianMatrix(size))).toBe(true);
      expect(hermitianAbove(matrix, lowest + 1e-9, hermitianMatrix(size))).toBe(false);
    }
  });
});

describe("damped least squares", () => {
  it("end on a circle though it does not fix the angle", () => {
    const found = levenbergMarquardt([3, 0.5], ([x = 0, y = 0]) => ({
      residuals: Float64Array.of(1 - x * x - y * y),
      jacobian: Float64Array.of(2 * x, 2 * y),
    }));
    expect(Math.hypot(...found.parameters)).toBeCloseTo(1, 9);
    expect(found.chiSquared).toBeLessThan(1e-16);
  });
});

describe("golden sections", () => {
  it.each([0.1, 2.7, -3.9])("find the lowest place %d", (place) => {
    expect(goldenSection((x) => Math.abs(x - place), -5, 5)).toBeCloseTo(place, 9);
  });
});
