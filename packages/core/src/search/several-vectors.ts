import { breathe, type WorkHost } from "../algorithms/index.js";
import {
  equivalentWaveVectors,
  exactComponents,
  isReciprocalLatticeVector,
  type WaveVector,
} from "../kvectors/index.js";
import type { SpaceGroup } from "../spacegroups/index.js";
import type { Weighed } from "./candidate.js";
import { multipleOf, sumsOf } from "./derived-vectors.js";
import type { PeakModel } from "./explanation.js";
import type { StarDistance } from "./near-in-k.js";
import type { ModelledPeaks } from "./peak-model.js";
import { refineHarmonics } from "./refine-harmonics.js";
import { searchOfFew } from "./search-of-few.js";
import { type TunedSet, tunedSet } from "./tuned-set.js";
import type { EvidenceCharges, SearchOptions, SeveralVectors, VectorFind, VectorStage } from "./types.js";
import { type MixedVector, mixtureOf } from "./vector-mixture.js";

/** First vectors that are tried with harmonics, and with a second vector; the best by evidence. */
const mostFirst = 8;

/** Second vectors that are weighed for each first one. */
const mostSecond = 3;

/** Pairs whose sums are tried, and finds that are returned. */
const mostPairs = 3;
const mostFinds = 6;

/** Peaks that must be left over for a second vector to be looked for. */
const leastLeftOver = 3;

/**
 * Boxes that one kind may take in the search of a first and of each second vector: a part of the peaks restricts k little,
 * and a stage must not take longer than the search for one vector.
 */
const boxesOfFirst = 100_000;
const boxesOfSecond = 40_000;

/** A box costs as its peaks do: beyond so many peaks the budgets shrink in proportion. */
const usualPeaks = 20;

function budgetsFor(total: number): { readonly first: number; readonly second: number } {
  const share = Math.min(1, usualPeaks / total);
  return { first: Math.ceil(share * boxesOfFirst), second: Math.ceil(share * boxesOfSecond) };
}

/** A shorter list says nothing of two vectors. */
const leastPeaks = 6;

/** What the stages work with. */
export interface StageInput {
  readonly group: SpaceGroup;
  readonly peaks: ModelledPeaks;
  readonly options: SearchOptions;
  readonly distance: StarDistance;
  /** The candidates of the search for one vector, best first, and whether the first matches as many as asked. */
  readonly candidates: readonly Weighed[];
  readonly enough: boolean;
}

/**
 * More than one vector, stage by stage: harmonics 2k and 3k of the best vectors (nothing is searched for them), a second
 * independent vector for the peaks that a first one leaves over, and sums and differences of the two. By the pigeonhole
 * principle one of two vectors that explain n peaks explains n/2 of them, so the first is searched with that demand. Null
 * where the first candidate leaves no peak over.
 */
export async function severalVectors(input: StageInput, host: WorkHost): Promise<SeveralVectors | null> {
  const { candidates, options, peaks, enough } = input;
  const left = candidates[0]?.candidate.unmatched.length ?? peaks.model.total;
  // A chance k with all letters free may leave little over: only one that is found settles the matter.
  const settled = candidates[0]?.candidate.evidence.reading === "found" || peaks.model.total < leastPeaks;
  if (options.severalVectors === false || (enough && left === 0 && settled)) return null;
  const wider = !enough || !settled || left >= leastLeftOver;
  const half = Math.ceil((peaks.model.total - options.unmatched) / 2);
  const budget = budgetsFor(peaks.model.total);
  const broad =
    wider && half >= 2
      ? await searchOfFew(input.group, options, peaks.model, half, budget.first, "first of two vectors", host)
      : null;
  const first = distinct([...candidates, ...(broad?.weighed ?? [])], input).slice(0, wider ? mostFirst : 1);
  if (first.length === 0) return null;
  const bestSingle = (first[0] as Weighed).candidate.evidence.value;
  const harmonics: VectorFind[] = [];
  for (const one of first) {
    await breathe(host);
    harmonics.push(...harmonicsOf(input, one, bestSingle));
  }
  const stages: VectorStage[] = [
    // Of the vectors that the searches came to: no more complete than they are.
    {
      stage: "harmonics",
      tried: harmonics.length,
      boxes: 0,
      exhaustive: broad?.exhaustive ?? true,
      minimumMatched: broad === null ? [] : [half],
    },
  ];
  const pairs = broad === null ? null : await secondVectors(input, first, bestSingle, host);
  if (pairs !== null && broad !== null)
    stages.push({
      stage: "second vector",
      tried: pairs.found.length,
      boxes: broad.boxes + pairs.boxes,
      exhaustive: broad.exhaustive && pairs.exhaustive,
      minimumMatched: [half, ...pairs.minimumMatched],
    });
  const two = byEvidence(pairs?.found ?? []);
  const sums: VectorFind[] = [];
  for (const pair of two.slice(0, mostPairs)) {
    await breathe(host);
    sums.push(...withSums(input, pair, bestSingle));
  }
  if (two.length > 0)
    stages.push({ stage: "sums", tried: sums.length, boxes: 0, exhaustive: true, minimumMatched: [] });
  const found: VectorFind[] = [];
  for (const find of byEvidence([...harmonics, ...two.map((pair) => pair.find), ...sums]))
    if (find.gain > 0 && found.length < mostFinds && !found.some((better) => isBeside(input, better, find)))
      found.push(find);
  return { stages, found, single: singleOf(first[0] as Weighed) };
}

/** What the finds are held against: the best vector on its own, however many peaks it leaves over. */
function singleOf({ candidate: { k, evidence, matched, total } }: Weighed): SeveralVectors["single"] {
  return { k, evidence, matched, total };
}

/** A pair with what its sums need. */
interface Pair {
  readonly find: VectorFind;
  readonly evidence: VectorFind["evidence"];
  readonly members: readonly [MixedVector, MixedVector];
  readonly charges: EvidenceCharges;
  readonly corrections: readonly number[];
}

function byEvidence<Found extends Pick<VectorFind, "evidence">>(found: readonly Found[]): readonly Found[] {
  return [...found].sort((a, b) => b.evidence.value - a.evidence.value);
}

/** Best first, one of each star. */
function distinct(weighed: readonly Weighed[], { distance, peaks }: StageInput): readonly Weighed[] {
  const kept: Weighed[] = [];
  for (const one of [...weighed].sort((a, b) => b.candidate.evidence.value - a.candidate.evidence.value))
    if (kept.every((other) => distance(one.candidate.k, other.candidate.k) > 2 * peaks.model.kTolerance))
      kept.push(one);
  return kept;
}

/** Second, third and both harmonics of one vector; those that fall on ±k or on 0 are no news. */
function harmonicsOf({ group, peaks }: StageInput, one: Weighed, bestSingle: number): readonly VectorFind[] {
  const { model } = peaks;
  const { k, evidence } = one.candidate;
  const corrections = one.candidate.corrections.map(({ value }) => value);
  const orders = ([2, 3] as const).filter((order) => !isNoNews(group, multipleOf(k, order), k));
  const choices = [...orders.map((order) => [order]), ...(orders.length === 2 ? [orders] : [])];
  // One more question was asked than without harmonics: which of them.
  const asked = Math.log(Math.max(1, choices.length));
  return choices.flatMap((chosen) => {
    const refined = refineHarmonics(model, k, chosen, corrections);
    const [base, ...others] = refined.explanations as readonly [
      MixedVector["explanation"],
      ...MixedVector["explanation"][],
    ];
    if (others.some((explanation) => !explainsMore(explanation, base))) return [];
    const tuning = refined.tuning(tunedSetOf(group, model, refined.k)) ?? evidence.charges.tuning;
    const charges = { ...evidence.charges, tuning, kinds: evidence.charges.kinds + asked };
    const letters = (k.values ?? []).length;
    const members = chosen.map(
      (order, place): MixedVector => ({
        name: `${order} k1`,
        k: multipleOf(refined.k, order),
        explanation: others[place] as MixedVector["explanation"],
      }),
    );
    const first: MixedVector = { name: "k1", k: refined.k, explanation: base };
    return [mixtureOf("harmonics", model, [refined.k], [first, ...members], { charges, letters }, bestSingle)];
  });
}

function tunedSetOf(group: SpaceGroup, model: PeakModel, k: WaveVector): TunedSet | null {
  return (k.values ?? []).length === 0 ? null : tunedSet(group, k, model.metric, 2 * model.tolerance);
}

function isNoNews(group: SpaceGroup, harmonic: WaveVector, k: WaveVector): boolean {
  const exact = exactComponents(harmonic);
  if (exact !== null && isReciprocalLatticeVector(group, exact)) return true;
  return equivalentWaveVectors(group, harmonic, k) || equivalentWaveVectors(group, harmonic, multipleOf(k, -1));
}

/** Whether the lines of one hold a peak that those of the other do not. */
function explainsMore(one: MixedVector["explanation"], other: MixedVector["explanation"]): boolean {
  return one.assignments.some(({ peak }) => other.unmatched.includes(peak));
}

interface SecondVectors {
  readonly found: readonly Pair[];
  readonly boxes: number;
  readonly exhaustive: boolean;
  readonly minimumMatched: readonly number[];
}

async function secondVectors(
  input: StageInput,
  first: readonly Weighed[],
  bestSingle: number,
  host: WorkHost,
): Promise<SecondVectors> {
  const { peaks, options } = input;
  const found: Pair[] = [];
  const demands = new Set<number>();
  let boxes = 0;
  let exhaustive = true;
  for (const one of first) {
    const left = new Set(one.candidate.unmatched);
    const wanted = left.size - options.unmatched;
    if (left.size < leastLeftOver || wanted < 2) continue;
    const model = peaks.modelOf((peak) => left.has(peak));
    const search = await searchOfFew(
      input.group,
      options,
      model,
      wanted,
      budgetsFor(peaks.model.total).second,
      "second vector",
      host,
    );
    demands.add(wanted);
    boxes += search.boxes;
    exhaustive &&= search.exhaustive;
    for (const other of search.weighed.slice(0, mostSecond)) {
      const pair = pairOf(peaks.model, one, other, bestSingle);
      if (!found.some((earlier) => isSamePair(input, earlier.find, pair.find))) found.push(pair);
    }
  }
  return { found, boxes, exhaustive, minimumMatched: [...demands].sort((a, b) => a - b) };
}

function pairOf(model: PeakModel, first: Weighed, second: Weighed, bestSingle: number): Pair {
  const corrections = first.candidate.corrections.map(({ value }) => value);
  const [a, b] = [first.candidate, second.candidate];
  const members: [MixedVector, MixedVector] = [
    { name: "k1", k: a.k, explanation: first.explanation },
    { name: "k2", k: b.k, explanation: model.explain(b.k, corrections) },
  ];
  const charges = {
    dimensions: a.evidence.charges.dimensions + b.evidence.charges.dimensions,
    kinds: a.evidence.charges.kinds + b.evidence.charges.kinds,
    tuning: a.evidence.charges.tuning + b.evidence.charges.tuning,
  };
  const letters = (a.k.values ?? []).length + (b.k.values ?? []).length;
  const find = mixtureOf("second vector", model, [a.k, b.k], members, { charges, letters }, bestSingle);
  return { find, evidence: find.evidence, members, charges, corrections };
}

function isSamePair({ distance, peaks }: StageInput, one: VectorFind, other: VectorFind): boolean {
  const near = (a: WaveVector | undefined, b: WaveVector | undefined) =>
    a !== undefined && b !== undefined && distance(a, b) <= 2 * peaks.model.kTolerance;
  const [[a, b], [c, d]] = [one.vectors, other.vectors];
  return (near(a, c) && near(b, d)) || (near(a, d) && near(b, c));
}

/** Whether a find is the better one over again: the same members, and vectors that may look the same. */
function isBeside({ distance, peaks }: StageInput, better: VectorFind, find: VectorFind): boolean {
  const names = (one: VectorFind) => one.members.map(({ name }) => name).join();
  if (names(better) !== names(find)) return false;
  const near = (a: WaveVector | undefined, b: WaveVector | undefined) =>
    a !== undefined && b !== undefined && distance(a, b) <= peaks.model.blur;
  const [[a, b], [c, d]] = [better.vectors, find.vectors];
  if (b === undefined || d === undefined) return near(a, c);
  return (near(a, c) && near(b, d)) || (near(a, d) && near(b, c));
}

/** The pair with the sum or difference that explains most of what it leaves over. */
function withSums(
  { group, peaks, distance }: StageInput,
  { find, members, charges, corrections }: Pair,
  bestSingle: number,
): readonly VectorFind[] {
  const { model } = peaks;
  if (find.unmatched.length === 0) return [];
  const [first, second] = find.vectors as readonly [WaveVector, WaveVector];
  const all = sumsOf(group, first, second);
  const sums = all.filter((sum, place) => all.findIndex((other) => distance(sum, other) <= model.kTolerance) === place);
  const asked = Math.log(Math.max(1, sums.length));
  const letters = (first.values ?? []).length + (second.values ?? []).length;
  return sums.flatMap((k, place) => {
    const explanation = model.explain(k, corrections);
    if (!explanation.assignments.some(({ peak }) => find.unmatched.includes(peak))) return [];
    const name = all.indexOf(sums[place] as WaveVector) % 2 === 0 ? "k1 + k2" : "k1 − k2";
    const more = { ...charges, kinds: charges.kinds + asked };
    return [
      mixtureOf(
        "sums",
        model,
        [first, second],
        [...members, { name, k, explanation }],
        { charges: more, letters },
        bestSingle,
      ),
    ];
  });
}
