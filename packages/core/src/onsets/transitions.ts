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
      const least = profile(transition);
      const softened = su === null ? profile : noSteeper(profile, { transition, su, least });
      return [{ index, transition, su: su ?? 0.02 * transition, profile: softened, least }];
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

/** S.u. beyond which the parabola stands for the profile. */
const farOff = 6;

/**
 * A rise of χ² no steeper than the s.u. allows: χ² about a cusp rises at once and sinks again in a second hollow, so that
 * a test by its wall would be harder than the s.u. that is printed.
 */
function noSteeper(
  profile: (transition: number) => number,
  { transition, su, least }: { readonly transition: number; readonly su: number; readonly least: number },
): (transition: number) => number {
  return (one) => {
    const away = Math.abs(one - transition) / su;
    return away > farOff ? least + away * away : Math.min(profile(one), least + away * away);
  };
}

const evenPlaces = 64;
const mostPlaces = 400;

/** Lowest rise of χ² of members start … end − 1 over places near them; sums up to each member are worked out once. */
function risesOf(members: readonly Member[]): (start: number, end: number) => number {
  const [low, high] = [members[0]?.transition ?? 0, members.at(-1)?.transition ?? 0];
  const near = members.flatMap(({ transition, su }) => [-1, -0.5, 0, 0.5, 1].map((n) => transition + n * su));
  const every = Math.ceil(near.length / mostPlaces);
  const even = Array.from({ length: evenPlaces }, (_, n) => low + ((n + 0.5) / evenPlaces) * (high - low));
  const places = [...near.sort((a, b) => a - b).filter((_, n) => n % every === 0), ...even];
  const sums = [new Float64Array(places.length)];
  for (const { profile, least } of members) {
    const before = sums.at(-1) as Float64Array;
    sums.push(before.map((sum, n) => sum + profile(places[n] as number) - least));
  }
  return (start, end) => {
    if (end - start === 1) return 0;
    const [from, to] = [sums[start] as Float64Array, sums[end] as Float64Array];
    return Math.max(
      0,
      to.reduce((lowest, sum, n) => Math.min(lowest, sum - (from[n] as number)), Infinity),
    );
  };
}

/** Contiguous groups: the best way to cut the first n members, for every n. */
function fewestGroups(members: readonly Member[]): Member[][] {
  const riseOf = risesOf(members);
  const best: { groups: Member[][]; rise: number }[] = [{ groups: [], rise: 0 }];
  for (let end = 1; end <= members.length; end++) {
    let chosen: { groups: Member[][]; rise: number } | null = null;
    for (let start = end - 1; start >= 0; start--) {
      const group = members.slice(start, end);
      const rise = riseOf(start, end);
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
