import { groundOf } from "@kvane/core/exchange";
import { analyseScan } from "@kvane/core/onsets";
import { againstTwin, randomModel } from "../support/exchange-twin.js";
import { seeded } from "../support/random.js";
import { madeScan, randomScan } from "../support/scans.js";
import type { Counts, Subject, Unit } from "./subject.js";

const modelSeed = 8_000_000;
const scanSeed = 8_300_000;
const pairSeed = 8_400_000;
/** What the rates are counted over. */
const scansInAll = 100;

/** The certified minimum of a random model against a dense grid worked out anew. */
export async function modelCounts(seed: number): Promise<Counts> {
  const made = await randomModel(modelSeed + seed);
  const { energy, certificate } = await groundOf(made.model);
  return { cases: 1, problems: againstTwin(made, { energy, ...certificate }, 20) };
}

export interface Coverage {
  readonly scans: number;
  /** With an onset found. */
  readonly found: number;
  /** Of those, T_N and β within 2.5 s.u. of the truth. */
  readonly transitions: number;
  readonly betas: number;
}

/** Simulated scans of one peak with 2 % noise. */
export function coverageOf(first: number, count: number): Coverage {
  let [found, transitions, betas] = [0, 0, 0];
  for (let seed = first; seed < first + count; seed++) {
    const { law, series } = randomScan(scanSeed + seed);
    const fit = analyseScan([series]).peaks[0]?.fit;
    if (!fit) continue;
    found += 1;
    const within = ({ value, su }: { value: number; su: number | null }, truth: number) =>
      su !== null && Math.abs(value - truth) <= 2.5 * su;
    if (within(fit.transition, law.transition)) transitions += 1;
    if (within(fit.beta, law.beta)) betas += 1;
  }
  return { scans: count, found, transitions, betas };
}

/** Peaks with transitions at 40 K and 42 K (or all at 40 K), measured in steps of 0.25 K: how many are told right. */
export function toldApart(first: number, count: number): { readonly apart: number; readonly together: number } {
  let [apart, together] = [0, 0];
  for (let seed = first; seed < first + count; seed++) {
    const random = seeded(pairSeed + seed);
    const peak = (name: string, transition: number) =>
      madeScan(
        name,
        { transition, beta: 0.15 + 0.35 * random.next(), amplitude: 60 + 40 * random.next(), background: 5 },
        { from: 2, to: 50, step: 0.25 },
        () => 2,
        random,
      );
    const two = analyseScan([peak("a", 40), peak("b", 42), peak("c", 40)]).transitions;
    if (two.length === 2 && two[0]?.series.join() === "0,2" && two[1]?.series.join() === "1") apart += 1;
    if (analyseScan([peak("a", 40), peak("b", 40), peak("c", 40)]).transitions.length === 1) together += 1;
  }
  return { apart, together };
}

function scanCounts(): Counts {
  const { scans, found, transitions, betas } = coverageOf(0, scansInAll);
  const least = 0.95 * scans;
  const problems = [
    ...(found < scans ? [`scans: ${scans - found} of ${scans} without an onset`] : []),
    ...(transitions < least ? [`scans: T_N within 2.5 s.u. in ${transitions} of ${scans}`] : []),
    ...(betas < least ? [`scans: β within 2.5 s.u. in ${betas} of ${scans}`] : []),
  ];
  return { cases: scans, problems, note: `T_N within 2.5 s.u. in ${transitions}, β in ${betas} of ${scans}` };
}

function pairCounts(): Counts {
  const { apart, together } = toldApart(0, scansInAll);
  const least = 0.9 * scansInAll;
  const problems = [
    ...(apart < least ? [`transitions: two told apart in ${apart} of ${scansInAll}`] : []),
    ...(together < least ? [`transitions: one split in ${scansInAll - together} of ${scansInAll}`] : []),
  ];
  return {
    cases: 2 * scansInAll,
    problems,
    note: `40 K and 42 K told apart in ${apart}, one found where there is one in ${together} of ${scansInAll}`,
  };
}

export const subject: Subject = {
  name: "exchange",
  sweeps: {
    models: { what: "exchange models of up to three sublattices against a dense grid", seed: modelSeed },
    scans: { what: "simulated temperature scans with 2 % noise: T_N and β within 2.5 s.u.", seed: scanSeed },
    transitions: { what: "peaks with one or two transitions, 40 K and 42 K", seed: pairSeed },
  },
  units: () => [
    ...numbers(100).map((number): Unit => ({ sweep: "models", number, run: () => modelCounts(number) })),
    { sweep: "scans", number: 1, run: scanCounts },
    { sweep: "transitions", number: 1, run: pairCounts },
  ],
};

function numbers(count: number): number[] {
  return Array.from({ length: count }, (_, index) => index);
}
