import { expect, test } from "vitest";
import { extinctionSample } from "../support/extinct-samples.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { generalSite, randomWaveVector, specialSite } from "../support/random-cases.js";
import { randomCell } from "../support/random-cells.js";

/** All 230 groups are swept by `npm run certify`; here every crystal system and kind of centring. */
const numbers = [2, 9, 15, 20, 43, 52, 62, 88, 122, 142, 155, 165, 178, 190, 212, 229];

test.for(numbers)("group %i: extinct exactly where random arrangements give nothing", (number) => {
  const random = seeded(900 + number);
  const group = groupOf(number);
  const cell = randomCell(group, random, 25);
  const results = [true, false].map((generic) =>
    extinctionSample(
      group,
      cell,
      randomWaveVector(group, random),
      generic ? generalSite(random) : specialSite(group, random),
      random,
      { qMax: generic && number > 194 ? 2.5 : 3.5, generic },
    ),
  );
  expect(results.flatMap(({ problems }) => problems).slice(0, 5)).toEqual([]);
  expect(results.every(({ satellites }) => satellites > 0)).toBe(true);
});
