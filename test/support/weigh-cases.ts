import { configurationsOf } from "@kvane/core/configurations";
import {
  configurationSpaces,
  lineForms,
  lorentzFactor,
  type MomentSpace,
  magneticFormFactor,
  quadraticForm,
} from "@kvane/core/diffraction";
import { smallIrreps } from "@kvane/core/irreps";
import { numericWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { type Cell, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import {
  type IntensityData,
  type IntensityDatum,
  type WeighedCandidate,
  type Weighing,
  weigh,
} from "@kvane/core/weighing";
import { groupOf } from "./parsed-groups.js";
import { type Random, seeded } from "./random.js";
import { specialSite } from "./random-cases.js";
import { randomCell } from "./random-cells.js";
import { wave } from "./written.js";

/** A made study whose answer is known. */
export interface MadeStudy {
  readonly name: string;
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly k: WaveVector;
  readonly candidates: readonly MomentSpace[];
  readonly truth: MomentSpace;
  readonly amplitudes: readonly number[];
  readonly data: IntensityData;
}

export interface StudyOptions {
  /** Relative noise of every intensity, beside a background of 0.3 % of the strongest. */
  readonly noise: number;
  readonly qMax: number;
  readonly scale: number | null;
  readonly mostCandidates: number;
}

const numbers = [
  2, 12, 14, 15, 36, 55, 58, 61, 62, 63, 64, 71, 87, 127, 136, 139, 148, 161, 164, 166, 167, 176, 185, 194,
];
const waves = [
  "0 0 0",
  "0 0 1/2",
  "1/2 0 0",
  "0 1/2 0",
  "1/2 1/2 0",
  "1/2 1/2 1/2",
  "1/3 1/3 0",
  "0 0 1/3",
  "0 1/4 0",
  "1/2 0 1/2",
];

/** Largest number of amplitudes of a made study. */
const mostAmplitudes = 6;

/** Powder intensities of a random configuration of a random group and k, with noise; null where it is no fair study. */
export async function madeStudy(seed: number, options: StudyOptions): Promise<MadeStudy | null> {
  const random = seeded(seed);
  const group = groupOf(random.pick(numbers));
  const cell = randomCell(group, random, 60 + 240 * random.next());
  const k = wave(random.pick(waves));
  const site = specialSite(group, random);
  const irreps = smallIrreps(group, k);
  const modes = siteModes(group, irreps, siteOrbit(group, site, null));
  if (modes.orbit.positions.length > 8) return null;
  const formFactor = magneticFormFactor({ ion: random.pick(["Mn2+", "Fe3+", "Cr3+", "Ni2+"]) });
  const set = await configurationsOf(group, irreps, [modes], cell);
  const candidates = configurationSpaces(set, cell, [{ modes, formFactor }]);
  const small = candidates.filter(({ basis }) => basis.length <= mostAmplitudes);
  if (small.length === 0 || candidates.length > options.mostCandidates || set.bounded.length > 0) return null;
  const truth = random.pick(small);
  // Up to a moment of a few μB; none so small that the arrangement is in fact a simpler one.
  const amplitudes = truth.basis.map(() => (random.next() < 0.5 ? -1 : 1) * (0.6 + 2.4 * random.next()));
  const data = powderData(group, cell, k, truth, amplitudes, random, options);
  if (data.data.length < 12) return null;
  const name = `seed ${seed}: ${group.name.hermannMauguin} k ${numericWaveVector(k)} ${truth.id} of ${candidates.length}`;
  return { name, group, cell, k, candidates, truth, amplitudes, data };
}

/** Normally distributed (Box and Muller). */
export function gaussian(random: Random): number {
  return Math.sqrt(-2 * Math.log(1 - random.next())) * Math.cos(2 * Math.PI * random.next());
}

/** Line groups nearer than 0.015 Å⁻¹ are one peak, at most 60 of them. */
function powderData(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  space: MomentSpace,
  amplitudes: readonly number[],
  random: Random,
  { noise, qMax, scale }: StudyOptions,
): IntensityData {
  const geometry = { kind: "powder", wavelengthAngstrom: 1.5 } as const;
  const peaks: { q: number; first: number; last: number; intensity: number }[] = [];
  for (const { line, matrix } of lineForms(group, cell, k, space, { qMax })) {
    const intensity = (scale ?? 50) * quadraticForm(matrix, amplitudes) * lorentzFactor(geometry, line.q);
    const last = peaks.at(-1);
    if (last && line.q - last.last <= 0.015) {
      last.last = line.q;
      last.q = (last.first + last.last) / 2;
      last.intensity += intensity;
    } else if (peaks.length < 60) peaks.push({ q: line.q, first: line.q, last: line.q, intensity });
    else break;
  }
  const strongest = Math.max(...peaks.map(({ intensity }) => intensity), 1e-9);
  const data = peaks.map(({ q, intensity }, index): IntensityDatum => {
    const uncertainty = Math.hypot(noise * intensity, 0.003 * strongest);
    return {
      label: `peak ${index + 1}`,
      q,
      hkl: null,
      observed: intensity + uncertainty * gaussian(random),
      uncertainty,
    };
  });
  return { sample: "powder", data, geometry, scale, nuclear: [], displacement: 0, resolution: 0.015 };
}

/** How one weighing did. */
export interface StudyOutcome {
  readonly name: string;
  readonly first: boolean;
  /** (fitted − true)/s.u. of the sizes that the data determine, true and fit brought to the nearest equal minimum. */
  readonly pulls: readonly number[];
  readonly weighing: Weighing;
}

export async function outcomeOf(study: MadeStudy): Promise<StudyOutcome> {
  const { group, cell, k, data, candidates, truth } = study;
  const weighing = await weigh(group, cell, k, data, candidates);
  const place = weighing.ranking.findIndex(({ id }) => id === truth.id);
  const best = weighing.ranking[0];
  const first = place === 0 || (place > 0 && best !== undefined && best.sameAs.includes(truth.id));
  // Parameters can only be compared in the minimum of the truth: of several equal ones that too is asked for, apart from
  // the ranking.
  const apart = await weigh(group, cell, k, data, [truth], { from: { [truth.id]: study.amplitudes } });
  const own = apart.ranking[0];
  return { name: study.name, first, pulls: own ? amplitudePulls(study, own) : [], weighing };
}

/**
 * A powder does not tell signs: each true amplitude is compared with the nearest of ±, in whichever of the equal minima it is
 * nearest. What the data do not determine is left out.
 */
function amplitudePulls({ amplitudes }: MadeStudy, own: WeighedCandidate): number[] {
  if (own.freePhase) return [];
  const pulls = own.minima.map((minimum, place) =>
    amplitudes.flatMap((value, index) => {
      const { determined = false, uncertainty = null } = own.amplitudes[index] ?? {};
      if (!determined || uncertainty === null) return [];
      // Of the best minimum the uncertainties that are reported, of others those there.
      const there = place === 0 ? uncertainty : (minimum.uncertainties[index] as number);
      return [(Math.abs(minimum.amplitudes[index] as number) - Math.abs(value)) / there];
    }),
  );
  pulls.sort((a, b) => sumOfSquares(a) - sumOfSquares(b));
  return pulls[0] ?? [];
}

function sumOfSquares(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value * value, 0);
}

/** What many made studies came to. */
export interface StudyRates {
  readonly studies: number;
  /** The true configuration first, or in the family of the first. */
  readonly first: number;
  readonly parameters: number;
  /** Share of fitted parameters within 2.5 s.u., and the r.m.s. of the pulls. */
  readonly within: number;
  readonly spread: number;
  readonly missed: readonly string[];
}

/** Weighs made studies from the seed on until there are `count` fair ones. */
export async function studyRates(seed: number, count: number, mostCandidates = 30): Promise<StudyRates> {
  const missed: string[] = [];
  const pulls: number[] = [];
  let studies = 0;
  let first = 0;
  for (let offset = 0; studies < count && offset < 20 * count; offset++) {
    const study = await madeStudy(seed + offset, { noise: 0.03, qMax: 5, scale: 50, mostCandidates });
    if (study === null) continue;
    const outcome = await outcomeOf(study);
    studies += 1;
    if (outcome.first) first += 1;
    else missed.push(outcome.name);
    pulls.push(...outcome.pulls);
  }
  return {
    studies,
    first,
    parameters: pulls.length,
    within: pulls.filter((pull) => Math.abs(pull) <= 2.5).length / pulls.length,
    spread: Math.sqrt(sumOfSquares(pulls) / pulls.length),
    missed,
  };
}
