import type { SiteModes } from "@kvane/core/modes";
import { describe, expect, test } from "vitest";
import { irrepsHolding, modesOf, patternVector } from "../support/decomposition.js";
import { groupOf } from "../support/parsed-groups.js";
import { floatModes, rankOf } from "../support/validate-modes.js";

/**
 * Mode tables of the perovskites at k = 0: Bertaut in Magnetism III (1963); Acta Cryst. A24, 217 (1968); White, J. Appl.
 * Phys. 40, 1061 (1969). B site: memory 95, re-derived by hand. Rare-earth site: memory 88, re-derived by hand. The sets
 * for Pnma: memory 90, the same by relabelling of the axes.
 */
const signs: Readonly<Record<string, readonly number[]>> = {
  F: [1, 1, 1, 1],
  G: [1, -1, 1, -1],
  C: [1, 1, -1, -1],
  A: [1, -1, -1, 1],
};

/** `G_x` on the four atoms in Bertaut's order. */
function bertautVector(group: string, modes: SiteModes, atoms: readonly string[], name: string) {
  const [letter = "", axisName = ""] = name.split("_");
  const axis = ["x", "y", "z"].indexOf(axisName);
  const pattern = signs[letter] as readonly number[];
  return patternVector(
    group,
    modes,
    atoms,
    pattern.map((sign) => [0, 1, 2].map((at) => (at === axis ? sign : 0))),
  );
}

/** The label of the one irrep that holds every vector of the set, and nothing besides. */
function irrepOf(group: string, modes: SiteModes, atoms: readonly string[], set: string): string {
  const vectors = set.split(" ").map((name) => bertautVector(group, modes, atoms, name));
  const labels = vectors.map((vector) => irrepsHolding(group, modes, vector));
  const [label = ""] = labels[0] ?? [];
  expect(labels).toEqual(vectors.map(() => [label]));
  const read = floatModes(groupOf(group), modes);
  const own = read.modes[read.irreps.labels.indexOf(label)] ?? [];
  expect(own).toHaveLength(vectors.length);
  expect(rankOf([...own, ...vectors], 12)).toBe(vectors.length);
  return label;
}

/** B site, 4b of Pbnm. */
const bAtoms = ["1/2 0 0", "1/2 0 1/2", "0 1/2 1/2", "0 1/2 0"];
/** Rare-earth site, 4c of Pbnm with x = -0.017, y = 0.07: (x,y,1/4), (-x,-y,3/4), (1/2+x,1/2-y,3/4), (1/2-x,1/2+y,1/4). */
const aAtoms = ["-0.017 0.07 1/4", "0.017 -0.07 3/4", "0.483 0.43 3/4", "0.517 0.57 1/4"];

describe("Bertaut's modes in Pbnm at k = 0", () => {
  const bModes = modesOf("P b n m", "0 0 0", bAtoms[0] as string);
  const aModes = modesOf("P b n m", "0 0 0", aAtoms[0] as string);

  test("4b: each of four irreps holds one set, vector by vector", () => {
    const labels = ["A_x G_y C_z", "F_x C_y G_z", "C_x F_y A_z", "G_x A_y F_z"].map((set) =>
      irrepOf("P b n m", bModes, bAtoms, set),
    );
    expect(new Set(labels).size).toBe(4);
  });

  test("4c: eight irreps, two vectors in four of them, one in the others", () => {
    const sets = ["F_x C_y", "C_x F_y", "G_x A_y", "A_x G_y", "C_z", "F_z", "A_z", "G_z"];
    expect(new Set(sets.map((set) => irrepOf("P b n m", aModes, aAtoms, set))).size).toBe(8);
  });

  test.for([
    ["F_x C_y G_z", "F_x C_y"],
    ["C_x F_y A_z", "C_x F_y"],
    ["G_x A_y F_z", "F_z"],
    ["A_x G_y C_z", "C_z"],
  ])("4b %s goes with 4c %s", ([b = "", a = ""]) => {
    expect(irrepOf("P b n m", aModes, aAtoms, a)).toBe(irrepOf("P b n m", bModes, bAtoms, b));
  });

  test("NdMnO3: A-type along b, and Mn and Nd ferro along c are one irrep [read: JPCM 21, 306001 (2009)]", () => {
    const mn = ["A_y", "F_z"].flatMap((name) =>
      irrepsHolding("P b n m", bModes, bertautVector("P b n m", bModes, bAtoms, name)),
    );
    const nd = irrepsHolding("P b n m", aModes, bertautVector("P b n m", aModes, aAtoms, "F_z"));
    expect(new Set([...mn, ...nd]).size).toBe(1);
  });

  test("LaFeO3: G along a with weak ferromagnetism along c [memory 85: Koehler et al., Phys. Rev. 118, 58 (1960)]", () => {
    const labels = ["G_x", "F_z"].map((name) =>
      irrepsHolding("P b n m", bModes, bertautVector("P b n m", bModes, bAtoms, name)),
    );
    expect(labels[0]).toHaveLength(1);
    expect(labels[1]).toEqual(labels[0]);
  });
});

describe("the same in Pnma", () => {
  // x, y, z of Pbnm are z, x, y of Pnma: (1/2,0,0), (1/2,0,1/2), (0,1/2,1/2), (0,1/2,0) become these.
  const atoms = ["0 0 1/2", "0 1/2 1/2", "1/2 1/2 0", "1/2 0 0"];
  const modes = modesOf("P n m a", "0 0 0", atoms[0] as string);

  test("4b: four sets", () => {
    const sets = ["G_x C_y A_z", "C_x G_y F_z", "F_x A_y C_z", "A_x F_y G_z"];
    expect(new Set(sets.map((set) => irrepOf("P n m a", modes, atoms, set))).size).toBe(4);
  });
});
