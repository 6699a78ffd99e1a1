import { type ConfigurationSet, configurationsOf } from "@kvane/core/configurations";
import { smallIrreps } from "@kvane/core/irreps";
import { exactWaveVector, formatWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { type Site, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import { floatGroup } from "./float-group.js";
import type { Random } from "./random.js";
import { configurationProblems } from "./validate-configurations.js";
import { modulatedProblems } from "./validate-modulated.js";
import { reduced } from "./written.js";

/** A random k with 2k, 3k or 4k in the reciprocal lattice: a small row of its basis over 2, 3 or 4. */
export function randomHalfThirdQuarter(group: SpaceGroup, random: Random): WaveVector {
  return randomFraction(group, random.pick([1, 2, 2, 2, 3, 3, 4, 4]), random);
}

/** A random k with n·k in the reciprocal lattice. */
export function randomFraction(group: SpaceGroup, denominator: number, random: Random): WaveVector {
  const { dual } = floatGroup(group);
  const weights = [0, 1, 2].map(() => random.pick([0, 0, 1, 1, 2, -1]));
  if (random.below(3) === 0) weights[2] = weights[0] as number;
  const row = [0, 1, 2].map((axis) =>
    weights.reduce((sum, weight, index) => sum + (weight * (dual[index]?.[axis] as number)) / denominator, 0),
  );
  const [a, b, c] = row.map(fraction) as [Pair, Pair, Pair];
  return exactWaveVector([a, b, c]);
}

type Pair = [number, number];

function fraction(value: number): Pair {
  const top = Math.round(value * 144);
  if (Math.abs(top - value * 144) > 1e-6) throw new Error(`${value} is no multiple of 1/144`);
  return reduced(top, 144);
}

export interface CaseOptions {
  readonly arms: "pair" | "all";
  readonly seed: number;
  readonly mostAtoms: number;
  readonly most: number;
}

/** The list for one group, k and sites against the validators; whatever is thrown counts as a problem. */
export async function configurationCase(
  group: SpaceGroup,
  k: WaveVector,
  sites: readonly Site[],
  options: CaseOptions,
): Promise<{ readonly problems: readonly string[]; readonly configurations: number }> {
  const where = sites.map((site) => site.position.map((entry) => entry.join("/")).join(",")).join("; ");
  const name = `${group.name.hermannMauguin} ${group.name.basisChange} k ${formatWaveVector(k)} at ${where} ${options.arms}`;
  try {
    const irreps = smallIrreps(group, k);
    const modes = sites.map((site) => siteModes(group, irreps, siteOrbit(group, site, null)));
    const set: ConfigurationSet = await configurationsOf(group, irreps, modes, null, { arms: options.arms });
    const problems = [
      ...configurationProblems(group, set, modes, options),
      ...modulatedProblems(group, set, modes, options.seed),
      ...(set.configurations.length + set.modulated.length === 0 ? ["nothing is listed"] : []),
    ];
    return {
      problems: problems.map((problem) => `${name}: ${problem}`),
      configurations: set.configurations.length + set.modulated.length,
    };
  } catch (error) {
    return {
      problems: [`${name}: threw ${error instanceof Error ? error.message : String(error)}`],
      configurations: 0,
    };
  }
}
