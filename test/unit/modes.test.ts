import { smallIrreps } from "@kvane/core/irreps";
import { manifold } from "@kvane/core/kvectors";
import { type SiteModes, siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { modesOf } from "../support/decomposition.js";
import { groupOf } from "../support/parsed-groups.js";
import { constraintProblems } from "../support/validate-constraints.js";
import { fieldProblems } from "../support/validate-field.js";
import { reversalProblems } from "../support/validate-minus-k.js";
import { modeProblems } from "../support/validate-modes.js";
import { orderParameterProblems } from "../support/validate-order-parameter.js";
import { site, wave } from "../support/written.js";

/** Orbits that split, several copies, dimensions above 1, complex and pseudoreal irreps, k ≡ −k, in the star and not. */
const cases: readonly (readonly [string, string, string])[] = [
  ["P 1", "1/5 0 0", "0.1 0.2 0.3"],
  ["P n m a", "0 0 0", "0 0 1/2"],
  ["P n m a", "0 1/5 0", "0.1 0.2 0.3"],
  ["P n m a", "1/2 1/2 1/2", "0.1 1/4 0.3"],
  ["P b n m", "0 2/7 0", "-0.017 0.07 1/4"],
  ["P 2/c", "-1/4 1/2 1/2", "1/2 0.685 1/4"],
  ["P 41", "0 0 1/2", "0.1 0.2 0.3"],
  ["P 61", "0 0 1/4", "0.1 0.2 0.3"],
  ["P 63/m m c", "1/3 1/3 0", "1/3 2/3 1/4"],
  ["P 63/m m c", "1/3 1/3 1/2", "0.17 0.34 1/4"],
  ["P 21 3", "1/5 1/5 1/5", "0.138 0.138 0.138"],
  ["P 21 3", "1/2 1/2 1/2", "0.138 0.138 0.138"],
  ["I 41/a m d:2", "1/2 1/2 1/2", "0 1/4 3/8"],
  ["R -3 m:H", "1/3 1/3 0", "0 0 1/2"],
  ["F d -3 m:2", "0 1/2 1", "1/2 1/2 1/2"],
  ["F m -3 m", "1/2 1/2 1/2", "0 0 0"],
  ["P 4/n:1", "1/2 1/2 1/2", "0 0 0.2"],
];

function problemsOf(group: string, modes: SiteModes): string[] {
  const parsed = groupOf(group);
  return [
    ...modeProblems(parsed, modes),
    ...reversalProblems(parsed, modes),
    ...constraintProblems(parsed, modes),
    ...orderParameterProblems(parsed, modes),
  ];
}

describe("modes", () => {
  test.each(cases)("of %s at %s, site %s obey the laws", (group, k, position) => {
    const modes = modesOf(group, k, position);
    expect(problemsOf(group, modes)).toEqual([]);
    expect(fieldProblems(groupOf(group), modes)).toEqual([]);
  });

  test.each(cases.slice(0, 6))("of %s at %s, site %s obey them for displacements", (group, k, position) => {
    const parsed = groupOf(group);
    const irreps = smallIrreps(parsed, wave(k));
    const modes = siteModes(parsed, irreps, siteOrbit(parsed, site("M", position), null), { axial: false });
    expect(modeProblems(parsed, modes)).toEqual([]);
    expect(fieldProblems(parsed, modes)).toEqual([]);
  });

  test.each([
    ["P n m a", "0 1/5 0", "0.1 1/4 0.3"],
    ["P 63 c m", "1/3 1/3 1/5", "1/3 2/3 0"],
    ["I 41/a", "0 0 1/5", "0 1/4 1/8"],
    ["P b n m", "0 2/7 0", "-0.017 0.07 1/4"],
    ["P 21 1 1", "1/5 0 0", "0.1 0.2 0.3"],
    ["P 1 1 n", "1/5 1/7 0", "0.1 0.2 0.3"],
  ])("of %s on the line through %s, site %s obey them with open letters", (group, k, position) => {
    const { form } = manifold(groupOf(group), wave(k), { withInversion: false });
    expect(problemsOf(group, modesOf(group, { ...form, values: null, uncertainties: null }, position))).toEqual([]);
  });

  test("say which atoms have no moment for any amplitude", () => {
    const modes = modesOf("P n m a", "1/2 0 0", "0 0 0");
    for (const part of modes.irreps) {
      const empty = modes.orbit.positions.flatMap((_, atom) =>
        part.modes.every((mode) =>
          mode.moments[atom]?.vector.every(({ coefficients }) => coefficients.every((c) => c === 0)),
        )
          ? [atom]
          : [],
      );
      expect(part.vanishingAtoms).toEqual(part.multiplicity === 0 ? [] : empty);
    }
  });
});
