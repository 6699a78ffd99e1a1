import { specialPoints } from "@kvane/core/kvectors";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { generalSite, randomWaveVector, specialSite } from "../support/random-cases.js";
import { type SweepResult, sweepCase } from "../support/sweep-case.js";

/**
 * A seeded sample of what `npm run certify` does in full: every one of the 230 groups once at a special point and, every
 * third, at a random rational k, with irreps, modes and real fields in a supercell checked by the validators. Another
 * sample: KVANE_SWEEP_SEED=n.
 */
const seed = Number(process.env["KVANE_SWEEP_SEED"] ?? "20");
const options = (number: number) => ({ cells: 8, seed, polar: number % 5 === 0 });
const tens = Array.from({ length: 23 }, (_, ten) => Array.from({ length: 10 }, (_, unit) => 10 * ten + unit + 1));

function problemsOf(results: readonly SweepResult[]): readonly string[] {
  return results.flatMap((result) => result.problems);
}

describe(`sample of the sweep over all groups, seed ${seed}`, { timeout: 120_000 }, () => {
  test.for(tens.map((numbers) => ({ from: numbers[0], numbers })))(
    "ten groups from $from at special points",
    ({ numbers }) => {
      const results = numbers.map((number) => {
        const group = groupOf(number);
        const random = seeded(1000 * seed + number);
        return sweepCase(group, random.pick(specialPoints(group)).k, [specialSite(group, random)], options(number));
      });
      expect(problemsOf(results)).toEqual([]);
      expect(results.every((result) => result.irreps > 0 && result.fields >= 1)).toBe(true);
    },
  );

  test.for(tens.map((numbers) => ({ from: numbers[0], numbers })))(
    "of ten groups from $from at random k",
    ({ numbers }) => {
      const results = numbers
        .filter((number) => number % 3 === seed % 3)
        .map((number) => {
          const group = groupOf(number);
          const random = seeded(1000 * seed + 500 + number);
          const site = random.below(4) === 0 ? generalSite(random) : specialSite(group, random);
          return sweepCase(group, randomWaveVector(group, random), [site], options(number));
        });
      expect(problemsOf(results)).toEqual([]);
    },
  );
});
