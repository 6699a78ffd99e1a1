import { expect, test } from "vitest";
import { lcm, unitComplex } from "#core/numbers/index.js";

test("the least common multiple with 0 is 0", () => {
  expect(lcm(0, 0)).toBe(0);
  expect(lcm(0, 6)).toBe(0);
  expect(lcm(-4, 6)).toBe(12);
});

test("a point of the unit circle and its mirror images have the same digits", () => {
  // cos(π − x) = −cos x and cos(−x) = cos x, which rounding would break in the last place.
  for (let part = 0; part <= 1000; part++) {
    const turns = part / 4096;
    const [cosine] = unitComplex(turns);
    expect(cosine).toBeCloseTo(Math.cos(2 * Math.PI * turns), 14);
    expect(unitComplex(0.5 - turns)[0]).toBe(-cosine + 0);
    expect(unitComplex(-turns)[0]).toBe(cosine);
    expect(unitComplex(1 - turns)[0]).toBe(cosine);
  }
});
