import { exactWaveVector, formatWaveVector, specialPoints } from "@kvane/core/kvectors";
import { expect, test } from "vitest";
import { mappedModesProblems } from "../support/map-modes.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { randomBasis } from "../support/random-bases.js";
import { randomWaveVector, specialSite } from "../support/random-cases.js";

/** npm run certify takes 300. */
const seeds = Array.from({ length: 14 }, (_, seed) => seed);

test.for(seeds)("mode spaces map onto each other in random bases, centred too, with any origin (seed %i)", (seed) => {
  const random = seeded(700 + seed);
  const group = groupOf(random.below(230) + 1);
  const k = seed % 2 === 0 ? random.pick(specialPoints(group)).k : randomWaveVector(group, random);
  const problems = mappedModesProblems(group, k, specialSite(group, random), randomBasis(random));
  expect(problems, `${group.name.hermannMauguin} ${formatWaveVector(k)}`).toEqual([]);
});

test("a phase of the wrong sign is noticed", () => {
  const group = groupOf(19);
  const random = seeded(3);
  const noticed = Array.from({ length: 4 }, () => {
    const k = exactWaveVector([
      [1, 5],
      [0, 1],
      [0, 1],
    ]);
    return mappedModesProblems(group, k, specialSite(group, random), randomBasis(random), -1).length;
  });
  expect(noticed.some((count) => count > 0)).toBe(true);
});
