import { expect, test } from "vitest";
import { unitsModulo } from "#core/numbers/cyclotomic-field.js";
import { lcm, unitComplex } from "#core/numbers/index.js";

test("the least common multiple with 0 is 0", () => {
  expect(lcm(0, 0)).toBe(0);
  expect(lcm(0, 6)).toBe(0);
  expect(lcm(-4, 6)).toBe(12);
});

test("a point of the unit circle and its mirror images have the same digits", () => {
  // cos(π − x) = −cos x and cos(−x) = cos x, which rounding would break in the last place.
  const cosine = (turns: number): number => unitComplex(turns)[0];
  const turns = Array.from({ length: 100 }, (_, part) => part / 512);
  expect(turns.map((one) => cosine(0.5 - one))).toEqual(turns.map((one) => 0 - cosine(one)));
  expect(turns.map((one) => cosine(1 - one))).toEqual(turns.map(cosine));
  expect(Math.max(...turns.map((one) => Math.abs(cosine(one) - Math.cos(2 * Math.PI * one))))).toBeLessThan(1e-15);
});

test("the residues prime to N are φ(N), each once, for N = 1 too", () => {
  expect(unitsModulo(1)).toEqual([0]);
  expect(unitsModulo(12)).toEqual([1, 5, 7, 11]);
});
