import { describe, expect, test } from "vitest";
import {
  choleskyFactor,
  choleskyInverse,
  choleskyLogDeterminant,
  choleskySolve,
  gaussNewton,
} from "#core/algorithms/index.js";
import { seeded } from "../support/random.ts";

describe("Cholesky", () => {
  test("L Lᵀ, solution, inverse and determinant of a matrix known by hand", () => {
    // (4 2; 2 5) = (2 0; 1 2)(2 1; 0 2), determinant 16.
    const factor = choleskyFactor([4, 2, 2, 5], 2) as Float64Array;
    expect([...factor]).toEqual([2, 0, 1, 2]);
    expect([...choleskySolve(factor, [8, 12])]).toEqual([1, 2]);
    expect([...choleskyInverse(factor, 2)]).toEqual([5 / 16, -1 / 8, -1 / 8, 1 / 4]);
    expect(choleskyLogDeterminant(factor, 2)).toBeCloseTo(Math.log(16), 12);
  });

  test("null when not positive definite", () => {
    expect(choleskyFactor([1, 2, 2, 4], 2)).toBeNull();
    expect(choleskyFactor([1, 2, 2, 1], 2)).toBeNull();
    expect(choleskyFactor([0], 1)).toBeNull();
    expect(choleskyFactor([Number.NaN], 1)).toBeNull();
  });
});

describe("Gauss and Newton", () => {
  test("a straight line: the closed form of linear regression, with its covariance", () => {
    const random = seeded(8);
    const x = Array.from({ length: 12 }, (_, index) => index / 3);
    const y = x.map((value) => 1.5 + 0.7 * value + 0.1 * (random.next() - 0.5));
    const s = 0.05;
    const fit = gaussNewton([0, 0], ([a, b]) => ({
      residuals: Float64Array.from(
        x,
        (value, index) => ((y[index] as number) - (a as number) - (b as number) * value) / s,
      ),
      jacobian: Float64Array.from(x.flatMap((value) => [1 / s, value / s])),
    }));
    const n = x.length;
    const mean = (list: readonly number[]): number => list.reduce((sum, value) => sum + value, 0) / n;
    const sxx = x.reduce((sum, value) => sum + (value - mean(x)) ** 2, 0);
    const sxy = x.reduce((sum, value, index) => sum + (value - mean(x)) * ((y[index] as number) - mean(y)), 0);
    expect(fit?.parameters[1]).toBeCloseTo(sxy / sxx, 10);
    expect(fit?.parameters[0]).toBeCloseTo(mean(y) - (sxy / sxx) * mean(x), 10);
    expect(fit?.covariance[3]).toBeCloseTo(s ** 2 / sxx, 12);
    expect(fit?.covariance[0]).toBeCloseTo(s ** 2 * (1 / n + mean(x) ** 2 / sxx), 12);
    expect(fit?.converged).toBe(true);
  });

  test("a start from which whole steps run away: arctan x = 0 from x = 3", () => {
    const fit = gaussNewton([3], ([x]) => ({
      residuals: Float64Array.of(-Math.atan(x as number)),
      jacobian: Float64Array.of(1 / (1 + (x as number) ** 2)),
    }));
    expect(fit?.parameters[0]).toBeCloseTo(0, 6);
    expect(fit?.chiSquared).toBeLessThan(1e-12);
  });

  test("null when the observations do not fix the parameters", () => {
    const fit = gaussNewton([0, 0], () => ({
      residuals: Float64Array.of(1, 2),
      jacobian: Float64Array.of(1, 1, 2, 2),
    }));
    expect(fit).toBeNull();
  });
});
