import { atlas } from "@kvane/core/kvectors";
import { changeBasis } from "@kvane/core/spacegroups";
import { changedSite, changedWave, randomChange } from "../support/axes.js";
import { configurationCase, randomFraction, randomHalfThirdQuarter } from "../support/configurations-cases.js";
import { groupOf } from "../support/parsed-groups.js";
import { type Random, seeded } from "../support/random.js";
import { generalSite, specialSite } from "../support/random-cases.js";
import type { Counts, Subject, Unit } from "./subject.js";

const sweeps = {
  configurations: {
    what: "230 groups at 3 random k with 2k, 3k or 4k in L*, a general and a special site: every configuration",
    seed: 301,
  },
  "several-arms": { what: "230 groups at a random k with 2k in L*, all arms, a special site", seed: 302 },
  modulated: { what: "230 groups at every kind of k with letters, one site: incommensurate configurations", seed: 303 },
  "other-axes": {
    what: "230 groups in random axes with the origin shifted, at a random k with 2k or 3k in L*",
    seed: 304,
  },
};

const groups = Array.from({ length: 230 }, (_, index) => index + 1);
type Case = Parameters<typeof configurationCase>;

/** Configurations and their magnetic groups against explicit fields, without sampling. */
export const subject: Subject = {
  name: "configurations",
  sweeps,
  units: () => [
    ...groups.map((number) =>
      unit("configurations", number, (random) => {
        const group = groupOf(number);
        return [0, 1, 2].map((round): Case => {
          // General sites of the larger groups make lists of hundreds of atoms: one k of three is enough.
          const site = round === 0 ? generalSite(random) : specialSite(group, random);
          return [group, randomHalfThirdQuarter(group, random), [site], options(number, "pair", 20)];
        });
      }),
    ),
    ...groups.map((number) =>
      unit("several-arms", number, (random) => {
        const group = groupOf(number);
        return [[group, randomFraction(group, 2, random), [specialSite(group, random)], options(number, "all", 12)]];
      }),
    ),
    ...groups.map((number) =>
      unit("modulated", number, (random) => {
        const group = groupOf(number);
        return atlas(group, { withInversion: false })
          .filter(({ dimension }) => dimension > 0)
          .map(({ k }): Case => {
            const site = random.below(3) === 0 ? generalSite(random) : specialSite(group, random);
            return [group, k, [site], options(number, "pair", 20)];
          });
      }),
    ),
    ...groups.map((number) =>
      unit("other-axes", number, (random) => {
        const group = groupOf(number);
        const change = randomChange(random);
        const k = changedWave(randomFraction(group, random.pick([2, 3]), random), change);
        const site = changedSite(specialSite(group, random), change);
        return [[changeBasis(group, change), k, [site], options(number, "pair", 12)]];
      }),
    ),
  ],
};

function options(seed: number, arms: "pair" | "all", most: number): Case[3] {
  return { seed, arms, most, mostAtoms: 100 };
}

function unit(sweep: keyof typeof sweeps, number: number, cases: (random: Random) => readonly Case[]): Unit {
  return {
    sweep,
    number,
    run: async (): Promise<Counts> => {
      const problems: string[] = [];
      let fields = 0;
      const list = cases(seeded(10_000 * sweeps[sweep].seed + number));
      for (const entry of list) {
        const found = await configurationCase(...entry);
        problems.push(...found.problems);
        fields += found.configurations;
      }
      return { cases: list.length, fields, problems };
    },
  };
}
