import { type SmallIrreps, smallIrreps } from "@kvane/core/irreps";
import { formatWaveVector, type WaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { type Site, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import { componentsOf, floatGroup } from "./float-group.js";
import { constraintProblems } from "./validate-constraints.js";
import { fieldProblems, supercellSize } from "./validate-field.js";
import { irrepProblems } from "./validate-irreps.js";
import { relationProblems, reversalProblems } from "./validate-minus-k.js";
import { modeProblems } from "./validate-modes.js";
import { orderParameterProblems } from "./validate-order-parameter.js";

/** What one group at one k with some sites came to. */
export interface SweepResult {
  readonly irreps: number;
  readonly modes: number;
  readonly fields: number;
  readonly problems: readonly string[];
}

export interface SweepOptions {
  /** Cells of the supercell compared one by one. */
  readonly cells: number;
  readonly seed: number;
  /** Also displacements (polar vectors), on the first site. */
  readonly polar: boolean;
}

/** Supercells above this many cells are left to the transformation law, which needs none. */
export const largestSupercell = 4096;

/**
 * Small irreps of a group at k, and for every site its modes: all validators. Whatever is thrown counts as a problem.
 */
export function sweepCase(
  group: SpaceGroup,
  k: WaveVector,
  sites: readonly Site[],
  options: SweepOptions,
): SweepResult {
  const name = `${group.name.hermannMauguin ?? group.name.hall} ${group.name.choice} ${group.name.basisChange} k ${formatWaveVector(k)}`;
  const problems: string[] = [];
  let fields = 0;
  let modes = 0;
  let irreps: SmallIrreps | null = null;
  const guarded = (where: string, check: () => readonly string[]): void => {
    try {
      for (const problem of check()) problems.push(`${where}: ${problem}`);
    } catch (error) {
      problems.push(`${where}: threw ${error instanceof Error ? error.message : String(error)}`);
    }
  };
  guarded(name, () => {
    irreps = smallIrreps(group, k);
    return [...irrepProblems(group, irreps), ...relationProblems(group, irreps)];
  });
  if (irreps !== null)
    for (const site of sites)
      for (const axial of options.polar && site === sites[0] ? [true, false] : [true])
        guarded(
          `${name} site ${site.position.map((entry) => entry.join("/")).join(",")}${axial ? "" : " polar"}`,
          () => {
            const found = siteModes(group, irreps as SmallIrreps, siteOrbit(group, site, null), { axial });
            modes += 3 * found.orbit.positions.length;
            const wrong = [
              ...modeProblems(group, found),
              ...constraintProblems(group, found),
              ...reversalProblems(group, found),
              ...orderParameterProblems(group, found),
            ];
            if (!isRational(k) || supercellSize(floatGroup(group), componentsOf(k)) > largestSupercell) return wrong;
            fields += 1;
            return [...wrong, ...fieldProblems(group, found, options)];
          },
        );
  return { irreps: (irreps as SmallIrreps | null)?.irreps.length ?? 0, modes, fields, problems };
}

function isRational(k: WaveVector): boolean {
  return k.components.every((form) => form.coefficients.every(([top]) => top === 0));
}
