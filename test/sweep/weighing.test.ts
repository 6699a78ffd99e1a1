import { expect, test } from "vitest";
import { studyRates } from "../support/weigh-cases.js";

/** `npm run certify -- weighing` does 200; a fair coin's spread is left for this few. */
test("made studies: the true configuration first or tied first, parameters within their uncertainties", async () => {
  const { studies, first, parameters, within, spread, missed } = await studyRates(7_028, 10, 12);
  expect(studies).toBe(10);
  expect(missed).toEqual([]);
  expect(first).toBe(10);
  expect(parameters).toBeGreaterThan(8);
  expect(within).toBeGreaterThan(0.85);
  expect(spread).toBeGreaterThan(0.6);
  expect(spread).toBeLessThan(1.5);
});
