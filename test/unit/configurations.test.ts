import { configurationsOf } from "@kvane/core/configurations";
import { formatSuperspace } from "@kvane/core/magneticgroups";
import { formatTriplet } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { listed } from "../support/configurations-listed.js";
import { modesOf } from "../support/decomposition.js";
import { groupOf } from "../support/parsed-groups.js";

describe("what a list holds", () => {
  test("results are plain data: a JSON round trip changes nothing", async () => {
    const commensurate = await listed("P 4/m m m", "1/2,0,0", ["A: 0 0 0"], { cell: "4 4 5 90 90 90" });
    const modulated = await listed("P b n m", "0,u,0", ["A: 1/2 0 0"], { cell: "5.3 5.9 7.4 90 90 90" });
    for (const { set } of [commensurate, modulated]) {
      expect(JSON.parse(JSON.stringify(set))).toEqual(set);
      expect(structuredClone(set)).toEqual(set);
    }
  });

  test("the same input gives the same list", async () => {
    const first = await listed("P 6/m m m", "1/3,1/3,0", ["A: 0 0 0"]);
    const second = await listed("P 6/m m m", "1/3,1/3,0", ["A: 0 0 0"]);
    expect(second.set).toEqual(first.set);
  });

  test("P 4/m m m, k = 0, one atom: the vector representation of the plane has (a, 0), (a, a) and (a, b)", async () => {
    // The image of the two-dimensional irrep with −1 is the dihedral group of order 8: two classes of mirrors, then all.
    const { set } = await listed("P 4/m m m", "0,0,0", ["A: 0 0 0"]);
    const plane = set.configurations.filter(({ irreps }) => irreps[0] === "Γ9" || irreps[0] === "Γ10");
    expect(plane.map(({ direction }) => direction)).toEqual(["(a, 0)", "(a, a)", "(a, b)"]);
    expect(plane.map(({ index }) => index)).toEqual([4, 4, 8]);
    expect(plane[2]?.subgroupOf).toEqual([plane[0]?.id, plane[1]?.id]);
  });

  test("the child cell doubles an axis with k = 1/2 along it, and the centrings carry the anti-translation", async () => {
    const { set } = await listed("P m m m", "0,0,1/2", ["A: 0 0 0"]);
    for (const { cell, magneticGroup } of set.configurations) {
      expect(cell.cellFromParent.matrix[2][2]).toEqual([2, 1]);
      expect(magneticGroup.type).toBe(4);
      expect(cell.centrings.map(({ operator, timeReversal }) => `${formatTriplet(operator)},${timeReversal}`)).toEqual([
        "x,y,z,1",
        "x,y,z+1/2,-1",
      ]);
    }
  });

  test("superspace operators keep the lattice centring and half a period with time reversal", async () => {
    const { set } = await listed("I m m m", "0,0,u", ["A: 0 0 0"]);
    expect(set.kind).toBe("incommensurate");
    expect(set.modulated[0]?.superspace.centrings.map(formatSuperspace)).toEqual([
      "x1,x2,x3,x4,+1",
      "x1+1/2,x2+1/2,x3+1/2,x4,+1",
      "x1,x2,x3,x4+1/2,-1",
      "x1+1/2,x2+1/2,x3+1/2,x4+1/2,-1",
    ]);
  });

  test("k on the face of the zone: H is written out", async () => {
    const { set } = await listed("P m m m", "u,0,1/2", ["A: 0 0 0"]);
    const texts = set.modulated.flatMap(({ superspace }) => superspace.operators.map(formatSuperspace));
    expect(texts.some((text) => text.split(",")[3]?.includes("x3"))).toBe(true);
  });
});

describe("options", () => {
  const group = groupOf("P b n m");
  const modes = modesOf("P b n m", "0 0 0", "1/2 0 0");
  const irreps = modes.representations;

  test("several irreps at once are flagged and have both", async () => {
    const labels = modes.irreps.filter(({ multiplicity }) => multiplicity > 0).map(({ irrep }) => irrep.label);
    const set = await configurationsOf(group, irreps, [modes], null, { together: [labels.slice(0, 2)] });
    expect(set.configurations.length).toBeGreaterThan(0);
    for (const configuration of set.configurations) {
      expect(configuration.severalIrreps).toBe(true);
      expect(configuration.irreps).toEqual(labels.slice(0, 2));
      expect(configuration.direction).toBe("(a | b)");
      expect(configuration.freeParameters).toEqual({ irreps: 6, group: 6 });
    }
  });

  test("different irreps on different sites", async () => {
    const { set, modes: both } = await listed("P b n m", "0,0,0", ["Fe: 1/2 0 0", "Tb: 0.98 0.08 1/4"]);
    const on = (site: number): string[] =>
      (both[site]?.irreps ?? []).filter(({ multiplicity }) => multiplicity > 0).map(({ irrep }) => irrep.label);
    const iron = on(0)[0] as string;
    const terbium = on(1).find((label) => label !== iron) as string;
    const mixed = await configurationsOf(group, set.irreps, both, null, {
      together: [[iron, terbium]],
      onSites: { Fe: [iron], Tb: [terbium] },
    });
    expect(mixed.configurations).toHaveLength(1);
    const free = await configurationsOf(group, set.irreps, both, null, { together: [[iron, terbium]] });
    expect(mixed.configurations[0]?.magneticGroup).toEqual(free.configurations[0]?.magneticGroup);
    expect(mixed.configurations[0]?.freeParameters.irreps).toBeLessThan(
      free.configurations[0]?.freeParameters.irreps as number,
    );
  });

  test("chosen arms: only arrangements on all of them", async () => {
    const { set } = await listed("P 4/m m m", "1/2,0,0", ["A: 0 0 0"], { arms: [0, 1] });
    expect(set.configurations.length).toBeGreaterThan(0);
    expect(set.configurations.every(({ arms }) => arms.length === 2)).toBe(true);
    expect(set.configurations.every(({ domains }) => domains.k === 1)).toBe(true);
  });

  test("a limit that is hit is said", async () => {
    const { set } = await listed("F m -3 m", "1/2,1/2,1/2", ["A: 0 0 0"], { arms: "all", limit: 100 });
    expect(set.configurations).toEqual([]);
    expect(set.bounded[0]).toContain("limit of 100");
    const later = await listed("P 6/m m m", "1/3,1/3,0", ["A: 0 0 0"], { limit: 600 });
    expect(later.set.bounded).toEqual([]);
  });

  test("several arms of an incommensurate k are said to be left out", async () => {
    const { set } = await listed("P 4/m m m", "u,0,0", ["A: 0 0 0"], { arms: "all" });
    expect(set.modulated.length).toBeGreaterThan(0);
    expect(set.bounded[0]).toContain("only the pair");
  });

  test("an unknown irrep, arm or site is refused with what there is", async () => {
    await expect(configurationsOf(group, irreps, [modes], null, { together: [["Γ99"]] })).rejects.toMatchObject({
      problems: [{ code: "invalid-argument", found: "Γ99" }],
    });
    await expect(configurationsOf(group, irreps, [modes], null, { arms: [4] })).rejects.toMatchObject({
      problems: [{ code: "invalid-argument" }],
    });
    await expect(configurationsOf(group, irreps, [modes], null, { onSites: { X: [] } })).rejects.toMatchObject({
      problems: [{ code: "invalid-argument", found: "X" }],
    });
  });

  test("a cancelled list throws", async () => {
    await expect(
      configurationsOf(group, irreps, [modes], null, {}, { signal: { aborted: true } }),
    ).rejects.toMatchObject({ problems: [{ code: "interrupted" }] });
  });
});
