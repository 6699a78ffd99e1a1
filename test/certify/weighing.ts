import { extinctionSample } from "../support/extinct-samples.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { generalSite, randomWaveVector, specialSite } from "../support/random-cases.js";
import { randomCell } from "../support/random-cells.js";
import { studyRates } from "../support/weigh-cases.js";
import type { Counts, Subject } from "./subject.js";

const sweeps = {
  extinctions: {
    what: "230 groups at 3 random rational k, a general and two special sites: extinct exactly where random arrangements give nothing",
    seed: 301,
  },
  studies: {
    what: "200 powder data sets with 3 % noise of random configurations: the true one first or tied first, pulls of the parameters",
    seed: 302,
  },
} as const;

/** Intensities: extinctions by symmetry, and the weighing of configurations. */
export const subject: Subject = {
  name: "weighing",
  sweeps,
  units: () => [
    ...Array.from({ length: 230 }, (_, index) => ({
      sweep: "extinctions",
      number: index + 1,
      run: () => extinctionCounts(index + 1),
    })),
    { sweep: "studies", number: 1, run: studyCounts },
  ],
};

function extinctionCounts(number: number): Counts {
  const random = seeded(1000 * sweeps.extinctions.seed + number);
  const group = groupOf(number);
  const cell = randomCell(group, random, 40);
  const results = [0, 1, 2].map((which) =>
    extinctionSample(
      group,
      cell,
      randomWaveVector(group, random),
      which === 0 ? generalSite(random) : specialSite(group, random),
      random,
      { qMax: number > 194 && which === 0 ? 3.5 : 5, generic: which === 0 },
    ),
  );
  return {
    cases: results.reduce((sum, { satellites }) => sum + satellites, 0),
    problems: results.flatMap(({ problems }) => problems).slice(0, 10),
    note: `${results.reduce((sum, { extinct }) => sum + extinct, 0)} extinct, ${results.reduce((sum, { unruled }) => sum + unruled, 0)} at special coordinates only`,
  };
}

async function studyCounts(): Promise<Counts> {
  const rates = await studyRates(1000 * sweeps.studies.seed, 200);
  const { studies, first, parameters, within, spread, missed } = rates;
  const problems = [
    ...(studies < 200 ? [`only ${studies} studies came about`] : []),
    ...(first < 0.95 * studies ? [`the true configuration is first in ${first} of ${studies}`, ...missed] : []),
    ...(within < 0.95 ? [`${(100 * within).toFixed(1)} % of ${parameters} parameters lie within 2.5 s.u.`] : []),
    ...(spread < 0.8 || spread > 1.2 ? [`the pulls have r.m.s. ${spread.toFixed(2)}`] : []),
  ];
  return {
    cases: studies,
    problems,
    note: `first in ${first} of ${studies}; ${(100 * within).toFixed(1)} % of ${parameters} parameters within 2.5 s.u., r.m.s. ${spread.toFixed(2)}`,
  };
}
