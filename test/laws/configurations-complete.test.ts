import { configurationsOf } from "@kvane/core/configurations";
import { describe, expect, test } from "vitest";
import { bruteSupergroups } from "../support/brute-graph.js";
import { allSubgroups, bruteIsotropy } from "../support/brute-isotropy.js";
import { modesOf } from "../support/decomposition.js";
import { groupOf } from "../support/parsed-groups.js";

/** Group, k, site, arms: image groups of at most 48 elements, of all kinds of reality and with several arms. */
const cases: readonly (readonly [string, string, string, "pair" | "all"])[] = [
  ["P 4/m m m", "0 0 0", "0 0 0", "pair"],
  ["P 42/m n m", "0 0 0", "0 0 0", "pair"],
  ["P 6/m m m", "1/3 1/3 0", "0 0 0", "pair"],
  ["P 3", "1/3 1/3 0", "0 0 0", "pair"],
  ["P -4", "0 0 1/4", "0 0 0", "pair"],
  ["P 4/m m m", "1/4 0 0", "0 0 0", "pair"],
  ["F m -3 m", "1/2 1/2 1/2", "0 0 0", "pair"],
  ["P m m m", "1/2 0 0", "0 0 0", "pair"],
  ["P 4/m m m", "1/2 0 0", "0 0 0", "all"],
  ["P 21 3", "1/2 1/2 1/2", "1/10 1/10 1/10", "pair"],
  ["P b n m", "0 1/4 0", "1/2 0 0", "pair"],
  ["R -3 m:H", "0 1/2 1", "0 0 0", "pair"],
];

describe("completeness against all subgroups", () => {
  test("the brute force itself: the dihedral group of order 8 has 10 subgroups, the quaternion group 6", () => {
    const dihedral = (a: number, b: number): number => {
      const [r, s, u, v] = [a % 4, Math.floor(a / 4), b % 4, Math.floor(b / 4)];
      return ((r + (s === 0 ? u : 4 - u)) % 4) + 4 * ((s + v) % 2);
    };
    const quaternion = (a: number, b: number): number => {
      const [r, s, u, v] = [a % 4, Math.floor(a / 4), b % 4, Math.floor(b / 4)];
      return ((r + (s === 0 ? u : 4 - u) + 2 * s * v) % 4) + 4 * ((s + v) % 2);
    };
    const table = (product: (a: number, b: number) => number): number[][] =>
      Array.from({ length: 8 }, (_, a) => Array.from({ length: 8 }, (_, b) => product(a, b)));
    expect(allSubgroups(table(dihedral))).toHaveLength(10);
    expect(allSubgroups(table(quaternion))).toHaveLength(6);
  });

  test.for(cases)("%s at %s, site %s, arms %s", async ([name, k, position, arms]) => {
    const group = groupOf(name);
    const modes = modesOf(name, k, position);
    const set = await configurationsOf(group, modes.representations, [modes], null, { arms });
    const found = new Map<string, string[]>();
    for (const { irreps, index, freeParameters } of set.configurations) {
      const key = irreps.join("+");
      found.set(key, [...(found.get(key) ?? []), `${index}:${freeParameters.irreps}`].sort());
    }
    expect(found.size).toBeGreaterThan(0);
    let compared = 0;
    for (const [key, list] of found) {
      const brute = bruteIsotropy(group, modes, key.split("+"), arms, 48);
      if (brute === null) continue;
      compared += 1;
      expect(brute.map(({ index, dimension }) => `${index}:${dimension}`).sort(), key).toEqual(list);
    }
    expect(compared).toBeGreaterThan(0);
  });
});

describe("the graph of subgroups against all conjugates", () => {
  const lists: readonly (readonly [string, string, string, "pair" | "all"])[] = [
    ["P 6/m m m", "1/3 1/3 0", "0 0 0", "pair"],
    ["F m -3 m", "1/2 1/2 1/2", "0 0 0", "pair"],
    ["P 4/m m m", "1/2 0 0", "0 0 0", "all"],
    ["P 42/m n m", "0 0 0", "0 0 0", "pair"],
    ["P b n m", "0 1/4 0", "1/2 0 0", "pair"],
    ["P 4/m m m", "1/5 2/5 0", "0 0 0", "pair"],
  ];
  test.for(lists)("%s at %s, site %s, arms %s", async ([name, k, position, arms]) => {
    const group = groupOf(name);
    const modes = modesOf(name, k, position);
    const set = await configurationsOf(group, modes.representations, [modes], null, { arms });
    const brute = bruteSupergroups(group, set.configurations);
    expect(set.configurations.map(({ id, subgroupOf }) => [id, [...subgroupOf].sort()])).toEqual(
      set.configurations.map(({ id }, index) => [id, [...(brute[index] ?? [])].sort()]),
    );
  });
});
