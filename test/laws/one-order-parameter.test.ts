import { smallIrreps } from "@kvane/core/irreps";
import { siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { orderParameterProblems } from "../support/validate-order-parameter.js";
import { site, wave } from "../support/written.js";

/**
 * The table of one order parameter, `S = Σ λ_c ξ_p e_{c,p}`: a coupling is one number for all components ξ of the order
 * parameter, and the star of a complex one stands at the coupling, not at ξ. Real irreps with −k in the star; those of
 * two and more dimensions, with complex couplings and with components that differ by √2 or 2 in size, are the hard ones.
 */
describe("one order parameter, with the relation between k and −k", () => {
  test.for([
    ["P b n m", "0 0.27 0", "-0.017 0.07 1/4"],
    ["P 4/m m m", "0 0 1/5", "0.1 0.2 0.3"],
    ["P 63 c m", "1/3 1/3 0", "0 0 1/3"],
    ["I 41 m d", "1/2 1/2 1/2", "-1/4 -3/4 0"],
    ["F 41 3 2", "0 1/2 1", "0 -1/4 -3/8"],
    ["I a -3 d", "1/2 1/2 1/2", "0 0 0"],
    ["I a -3 d", "1/2 1/2 1/2", "0.1 0.1 0.1"],
    ["P b c a (a+c,a+b+c,-b+c;3/16,5/16,9/16)", "1/6 7/6 -1/2", "2 -27/16 -11/8"],
    ["P -3 m 1 (a+c,a+b+c,-b+c;1/3,3/16,15/16)", "1/3 2/3 -1/3", "3/16 -25/48 -29/48"],
  ] as const)("%s at (%s), site %s", ([name, k, at]) => {
    const group = groupOf(name);
    const modes = siteModes(group, smallIrreps(group, wave(k)), siteOrbit(group, site("M", at), null));
    expect(modes.irreps.some((entry) => (entry.minusK?.constraint ?? null) !== null)).toBe(true);
    expect(orderParameterProblems(group, modes)).toEqual([]);
  });
});
