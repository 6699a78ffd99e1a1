import { goldenSection } from "../algorithms/index.js";
import { roundNumber } from "../numbers/index.js";
import type { FittedSeries } from "./fit-series.js";
import { profileUncertainty } from "./power-law.js";
import { chiSquaredTail } from "./statistics.js";
import type { Transition } from "./types.js";

/** Probability of the scatter of onsets below which they are not one transition. */
const leastProbability = 0.001;

interface Member {
  readonly index: number;
  readonly transition: number;
  readonly su: number;
  readonly least: number;
  readonly profile: (transition: number) => number;
}

interface Common {
  readonly transition: number;
  readonly su: number | null;
  /** Rise of χ² over the separate fits. */
  readonly rise: number;
}

/**
 * Peaks sorted into as few transitions as their onsets allow. A common T_N raises χ² over that of separate fits by a
 * number that follows χ² with one degree of freedom less than peaks (the likelihood-ratio test; S. S. Wilks, Ann. Math.
 * Stat. 9 (1938) 60); neighbours in temperature are joined while that is not improbable at 0.1 %, and of all ways with the fewest
 * transitions the one with the lowest χ² is taken.
 */
export function transitionsOf(fitted: readonly FittedSeries[]): Transition[] {
  const members: Member[] = fitted
    .flatMap(({ onset, profile }, index) => {
      const su = onset.fit?.transition.su ?? null;
      if (!onset.fit || !profile) return [];
      const transition = onset.fit.transition.value;
      return [{ index, transition, su: su ?? 0.02 * transition, profile, least: profile(transition) }];
    })
    .sort((a, b) => a.transition - b.transition || a.index - b.index);
  const groups = fewestGroups(members);
  return groups.map((group) => {
    const common = commonOf(group);
    return {
      temperature: { value: roundNumber(common.transition), su: common.su === null ? null : roundNumber(common.su) },
      series: group.map(({ index }) => index).sort((a, b) => a - b),
      probability: group.length === 1 ? null : roundNumber(chiSquaredTail(common.rise, group.length - 1)),
    };
  });
}

/** Contiguous groups: the best way to cut the first n members, for every n. */
function fewestGroups(members: readonly Member[]): Member[][] {
  const best: { groups: Member[][]; rise: number }[] = [{ groups: [], rise: 0 }];
  for (let end = 1; end <= members.length; end++) {
    let chosen: { groups: Member[][]; rise: number } | null = null;
    for (let start = end - 1; start >= 0; start--) {
      const group = members.slice(start, end);
      const { rise } = commonOf(group);
      if (group.length > 1 && chiSquaredTail(rise, group.length - 1) < leastProbability) continue;
      const before = best[start] as { groups: Member[][]; rise: number };
      const way = { groups: [...before.groups, group], rise: before.rise + rise };
      const fewer = chosen === null || way.groups.length < chosen.groups.length;
      if (fewer || (chosen !== null && way.groups.length === chosen.groups.length && way.rise < chosen.rise))
        chosen = way;
    }
    best.push(chosen as { groups: Member[][]; rise: number });
  }
  return best.at(-1)?.groups ?? [];
}

function commonOf(group: readonly Member[]): Common {
  const [only] = group;
  if (!only) throw new Error("a group of peaks is empty");
  const joint = (transition: number) => group.reduce((sum, { profile }) => sum + profile(transition), 0);
  const least = group.reduce((sum, member) => sum + member.least, 0);
  if (group.length === 1) return { transition: only.transition, su: only.su, rise: 0 };
  const low = Math.min(...group.map(({ transition }) => transition));
  const high = Math.max(...group.map(({ transition }) => transition));
  const margin = Math.min(...group.map(({ su }) => su));
  const transition = lowestOf(joint, low - margin, high + margin);
  const value = joint(transition);
  const steps = Array.from({ length: 16 }, (_, n) => (margin / 8) * 1.45 ** n);
  const grid = [...steps.map((step) => transition - step).reverse(), ...steps.map((step) => transition + step)];
  const su = profileUncertainty(joint, transition, value, grid);
  return { transition, su, rise: Math.max(0, value - least) };
}

/** χ² is kinked at every measured temperature: a grid first. */
function lowestOf(value: (x: number) => number, from: number, to: number): number {
  const count = 24;
  const step = (to - from) / count;
  let best = from;
  let least = Number.POSITIVE_INFINITY;
  for (let n = 0; n <= count; n++) {
    const one = value(from + n * step);
    if (one < least) [best, least] = [from + n * step, one];
  }
  return goldenSection(value, best - step, best + step, 24);
}
