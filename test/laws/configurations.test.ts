import { atlas } from "@kvane/core/kvectors";
import { changeBasis } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { changedSite, changedWave, randomChange } from "../support/axes.js";
import { configurationCase, randomFraction, randomHalfThirdQuarter } from "../support/configurations-cases.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { generalSite, specialSite } from "../support/random-cases.js";

/**
 * A seeded sample of what `npm run certify` does for all 230 groups: every operator of every listed group leaves the
 * explicit field unchanged for random amplitudes, no other operator of the grey parent does, and the counts are those of
 * random fields. Another sample: KVANE_SWEEP_SEED=n.
 */
const seed = Number(process.env["KVANE_SWEEP_SEED"] ?? "20");
const tens = Array.from({ length: 23 }, (_, ten) => ({
  from: 10 * ten + 1,
  list: Array.from({ length: 10 }, (__, unit) => 10 * ten + unit + 1),
}));

/** One in nine groups in each case, others for each. */
function picked(list: readonly number[], part: number): number[] {
  return list.filter((number) => number % 9 === (seed + part) % 9);
}

describe(`configurations of a sample of groups, seed ${seed}`, { timeout: 120_000 }, () => {
  test.for(tens)("commensurate k, groups from $from", async ({ list }) => {
    for (const number of picked(list, 0)) {
      const group = groupOf(number);
      const random = seeded(1000 * seed + number);
      const k = randomHalfThirdQuarter(group, random);
      const site = number < 75 && random.below(2) === 0 ? generalSite(random) : specialSite(group, random);
      const found = await configurationCase(group, k, [site], { arms: "pair", seed: number, mostAtoms: 48, most: 4 });
      expect(found.problems).toEqual([]);
    }
  });

  test.for(tens)("random axes, groups from $from", async ({ list }) => {
    for (const number of picked(list, 5)) {
      const group = groupOf(number);
      const random = seeded(1000 * seed + 500 + number);
      const change = randomChange(random);
      const k = changedWave(randomFraction(group, 2, random), change);
      const site = changedSite(specialSite(group, random), change);
      const found = await configurationCase(changeBasis(group, change), k, [site], {
        arms: "pair",
        seed: number,
        mostAtoms: 48,
        most: 3,
      });
      expect(found.problems).toEqual([]);
    }
  });

  test.for([16, 47, 75, 99, 123, 155, 166, 195])("all arms at 2k ∈ L*, group %i", async (number) => {
    const group = groupOf(number);
    const random = seeded(1000 * seed + 300 + number);
    const found = await configurationCase(group, randomFraction(group, 2, random), [specialSite(group, random)], {
      arms: "all",
      seed: number,
      mostAtoms: 48,
      most: 4,
    });
    expect(found.problems).toEqual([]);
  });

  test.for(tens)("incommensurate k, groups from $from", async ({ list }) => {
    for (const number of picked(list, 2)) {
      const group = groupOf(number);
      const random = seeded(1000 * seed + 700 + number);
      const kinds = atlas(group, { withInversion: false }).filter(({ dimension }) => dimension > 0);
      const site = random.below(3) === 0 ? generalSite(random) : specialSite(group, random);
      const found = await configurationCase(group, random.pick(kinds).k, [site], {
        arms: "pair",
        seed: number,
        mostAtoms: 48,
        most: 4,
      });
      expect(found.problems).toEqual([]);
    }
  });
});
