import { atlas, manifold, specialPoints, type WaveVector } from "@kvane/core/kvectors";
import { changeBasis, groupFromSetting, type Site, type SpaceGroup, tabulatedSettings } from "@kvane/core/spacegroups";
import { symmorphicNumbers } from "../fixtures/make-wyckoff-counts.mjs";
import { changedSite, changedWave, randomChange } from "../support/axes.js";
import { randomKindProblems } from "../support/kinds-in-floats.js";
import { mappedModesProblems } from "../support/map-modes.js";
import { groupOf } from "../support/parsed-groups.js";
import { type Random, seeded } from "../support/random.js";
import { randomBasis } from "../support/random-bases.js";
import { generalSite, randomWaveVector, specialSite } from "../support/random-cases.js";
import {
  type CharacterCase,
  characterCaseProblems,
  type DecompositionCase,
  decompositionCaseProblems,
  readCases,
} from "../support/reference-cases.js";
import { type SweepOptions, type SweepResult, sweepCase } from "../support/sweep-case.js";
import type { Counts, Subject, Unit } from "./subject.js";

/** What each sweep goes over, and its seed. */
const sweeps = {
  points: {
    what: "230 standard settings at every special point; a general and a special site, moments and displacements",
    seed: 101,
  },
  random: {
    what: "230 standard settings at 12 random rational k each, and on their lines and planes with open letters",
    seed: 102,
  },
  axes: {
    what: "230 groups in 2 random bases each, origin shifted, at a special point and a random rational k",
    seed: 103,
  },
  kinds: {
    what: "230 groups at every kind of k of the atlas, letters left open; a special site, moments and displacements",
    seed: 105,
  },
  bases: {
    what: "300 random settings (sheared, centred, halved bases, any origin): the mode spaces map onto each other",
    seed: 107,
  },
  atlas: {
    what: "200 random k in each of the 73 arithmetic classes, each in exactly one kind, under P and with −1",
    seed: 106,
  },
  settings: { what: "530 tabulated settings at a special point and a random rational k", seed: 104 },
  characters: { what: "reference sets of characters (898)", seed: null },
  decompositions: { what: "reference decompositions (153)", seed: null },
} as const;

type SweepName = keyof typeof sweeps;

/** Irreps and modes of every group. */
export const subject: Subject = { name: "symmetry", sweeps, units: allUnits };

const cells = 256;
/** Random k in each arithmetic class. */
const randomKinds = 200;
const groups = Array.from({ length: 230 }, (_, index) => index + 1);

function allUnits(): Unit[] {
  const settings = tabulatedSettings();
  return [
    ...caseUnits<CharacterCase>("characters", characterCaseProblems),
    ...caseUnits<DecompositionCase>("decompositions", decompositionCaseProblems),
    ...groups.map((number) => unit("points", number, (random) => pointResults(groupOf(number), random))),
    ...groups.map((number) => unit("random", number, (random) => randomResults(groupOf(number), random))),
    ...groups.map((number) => unit("axes", number, (random) => axesResults(groupOf(number), random))),
    ...groups.map((number) => unit("kinds", number, (random) => kindResults(groupOf(number), random))),
    ...Array.from({ length: 300 }, (_, index) => ({
      sweep: "bases" as const,
      number: index + 1,
      run: () => mappedCounts(seeded(10_000 * sweeps.bases.seed + index)),
    })),
    ...symmorphicNumbers.map((number) => ({
      sweep: "atlas" as const,
      number,
      run: () => ({
        cases: randomKinds,
        irreps: 0,
        modes: 0,
        fields: 0,
        problems: randomKindProblems(groupOf(number), seeded(10_000 * sweeps.atlas.seed + number), randomKinds),
      }),
    })),
    ...settings.map((setting, row) =>
      unit("settings", row + 1, (random) => {
        const group = groupFromSetting(setting);
        return [pick(random, specialPoints(group)).k, randomWaveVector(group, random)].map((k) =>
          sweepCase(group, k, [specialSite(group, random)], options(random)),
        );
      }),
    ),
  ];
}

function unit(sweep: SweepName, number: number, run: (random: Random) => readonly SweepResult[]): Unit {
  return { sweep, number, run: () => total(run(seeded(10_000 * (sweeps[sweep].seed ?? 0) + number))) };
}

function caseUnits<Case>(
  sweep: "characters" | "decompositions",
  problemsOf: (entry: Case) => readonly string[],
): Unit[] {
  const cases = readCases<Case>(`${sweep}.jsonl`);
  const size = 50;
  return Array.from({ length: Math.ceil(cases.length / size) }, (_, part) => ({
    sweep,
    number: part * size + 1,
    run: () => {
      const some = cases.slice(part * size, (part + 1) * size);
      return { cases: some.length, irreps: 0, modes: 0, fields: 0, problems: some.flatMap(problemsOf) };
    },
  }));
}

function options(random: Random): SweepOptions {
  return { cells, seed: random.below(1_000_000), polar: true };
}

function pick<T>(random: Random, items: readonly T[]): T {
  return random.pick(items);
}

function pointResults(group: SpaceGroup, random: Random): SweepResult[] {
  return specialPoints(group).map(({ k }) =>
    sweepCase(group, k, [generalSite(random), specialSite(group, random), specialSite(group, random)], options(random)),
  );
}

function mappedCounts(random: Random): Counts {
  const group = groupOf(random.below(230) + 1);
  const k = random.below(2) === 0 ? pick(random, specialPoints(group)).k : randomWaveVector(group, random);
  const problems = mappedModesProblems(group, k, specialSite(group, random), randomBasis(random));
  return { cases: 1, irreps: 0, modes: 0, fields: 0, problems };
}

function kindResults(group: SpaceGroup, random: Random): SweepResult[] {
  return atlas(group, { withInversion: false }).map(({ k }) =>
    sweepCase(group, k, [specialSite(group, random)], options(random)),
  );
}

function randomResults(group: SpaceGroup, random: Random): SweepResult[] {
  return Array.from({ length: 12 }, (_, sample) => {
    const k = randomWaveVector(group, random);
    const sites: Site[] = [sample % 4 === 0 ? generalSite(random) : specialSite(group, random)];
    const { form, dimension } = manifold(group, k, { withInversion: false });
    const exact = sweepCase(group, k, sites, options(random));
    return dimension === 0 ? [exact] : [exact, sweepCase(group, openLetters(form), sites, options(random))];
  }).flat();
}

function openLetters(form: WaveVector): WaveVector {
  return { ...form, values: null, uncertainties: null };
}

function axesResults(group: SpaceGroup, random: Random): SweepResult[] {
  return [0, 1].flatMap(() => {
    const change = randomChange(random);
    const changed = changeBasis(group, change);
    return [pick(random, specialPoints(group)).k, randomWaveVector(group, random)].map((k) => {
      const site = specialSite(group, random);
      return sweepCase(changed, changedWave(k, change), [changedSite(site, change)], options(random));
    });
  });
}

function total(results: readonly SweepResult[]): Counts {
  const sum = (of: (result: SweepResult) => number): number => results.reduce((value, result) => value + of(result), 0);
  return {
    cases: results.length,
    irreps: sum((result) => result.irreps),
    modes: sum((result) => result.modes),
    fields: sum((result) => result.fields),
    problems: results.flatMap((result) => result.problems),
  };
}
