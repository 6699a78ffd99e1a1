import type { KvaneError } from "@kvane/core/errors";
import { bondTable, exchangeModel } from "@kvane/core/exchange";
import { parseGroup, parseSite, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { cellOf, lattices } from "../support/exchange-models.js";

async function shellsOf(name: keyof typeof lattices, shells: number) {
  const [symbol, cell, sites] = lattices[name];
  const group = await parseGroup(symbol);
  return bondTable(
    group,
    cell,
    sites.map((site) => siteOrbit(group, parseSite(site), cell)),
    { shells },
  );
}

describe("shells of neighbours", () => {
  // Numbers of neighbours and squared distances: C. Kittel, Introduction to Solid State Physics, table of lattice sums,
  // and by counting points on the planar nets.
  const known: readonly [keyof typeof lattices, readonly (readonly [number, number])[]][] = [
    [
      "simpleCubic",
      [
        [1, 6],
        [2, 12],
        [3, 8],
        [4, 6],
        [5, 24],
      ],
    ],
    [
      "faceCentred",
      [
        [1 / 2, 12],
        [1, 6],
        [3 / 2, 24],
        [2, 12],
        [5 / 2, 24],
      ],
    ],
    [
      "bodyCentred",
      [
        [3 / 4, 8],
        [1, 6],
        [2, 12],
        [11 / 4, 24],
        [3, 8],
      ],
    ],
    [
      "diamond",
      [
        [3 / 16, 4],
        [1 / 2, 12],
        [11 / 16, 12],
        [1, 6],
        [19 / 16, 12],
      ],
    ],
    [
      "square",
      [
        [1, 4],
        [2, 4],
        [4, 4],
        [5, 8],
        [8, 4],
      ],
    ],
    [
      "triangular",
      [
        [1, 6],
        [3, 6],
        [4, 6],
        [7, 12],
      ],
    ],
    [
      "honeycomb",
      [
        [1 / 3, 3],
        [1, 6],
        [4 / 3, 3],
        [7 / 3, 6],
      ],
    ],
    [
      "kagome",
      [
        [1 / 4, 4],
        [3 / 4, 4],
        [1, 6],
        [7 / 4, 8],
      ],
    ],
    [
      "pyrochlore",
      [
        [1 / 8, 6],
        [3 / 8, 12],
        [1 / 2, 12],
        [5 / 8, 12],
      ],
    ],
  ];
  it.each(known)("of the %s lattice have the known distances and numbers", async (name, shells) => {
    const table = await shellsOf(name, shells.length);
    const { a } = lattices[name][1];
    table.shells.forEach((shell, index) => {
      const [square, neighbours] = shells[index] as readonly [number, number];
      expect(shell.distance).toBeCloseTo(a * Math.sqrt(square), 6);
      expect(shell.classes.reduce((sum, one) => sum + (one.neighbours[0]?.count ?? 0), 0)).toBe(neighbours);
      // Every bond counted once: N z / 2.
      const bonds = shell.classes.reduce((sum, one) => sum + one.bonds.length, 0);
      expect(bonds).toBe((table.atoms.length * neighbours) / 2);
    });
  });

  it("lists bonds of one length apart that symmetry does not relate", async () => {
    // Third neighbours of kagome: four along the chains through an atom, two across a hexagon.
    const kagome = (await shellsOf("kagome", 3)).shells[2];
    expect(kagome?.classes.map(({ name }) => name)).toEqual(["3a", "3b"]);
    expect(kagome?.classes.map(({ neighbours }) => neighbours[0]?.count).sort()).toEqual([2, 4]);
    // Third neighbours of pyrochlore: six with an atom between, six without.
    const pyrochlore = (await shellsOf("pyrochlore", 3)).shells[2];
    expect(pyrochlore?.classes.map(({ neighbours }) => neighbours[0]?.count)).toEqual([6, 6]);
  });

  it("lists bonds between different sites apart though their length is one", async () => {
    const group = await parseGroup("P m -3 m");
    const cell = cellOf(4, 4, 4);
    const orbits = ["A 0 0 0", "B 1/2 1/2 1/2"].map((site) => siteOrbit(group, parseSite(site), cell));
    const table = bondTable(group, cell, orbits, { shells: 2 });
    expect(table.shells[0]?.classes.map(({ labels }) => labels.join("–"))).toEqual(["A–B"]);
    expect(table.shells[1]?.classes.map(({ name, labels }) => `${name} ${labels.join("–")}`)).toEqual([
      "2a A–A",
      "2b B–B",
    ]);
  });

  it("gives every bond as a vector of the length of its shell", async () => {
    const group = await parseGroup("P n m a");
    const cell = cellOf(9.4, 6.9, 8.2);
    const table = bondTable(group, cell, [siteOrbit(group, parseSite("M 0.137 0.25 0.308"), cell)], { shells: 6 });
    for (const { distance, classes } of table.shells)
      for (const { vector } of classes)
        expect(Math.hypot(vector[0] * 9.4, vector[1] * 6.9, vector[2] * 8.2)).toBeCloseTo(distance, 3);
  });

  it("finds the same shells in another setting and in a primitive cell", async () => {
    const shapes = ["F m -3 m", "F m -3 m (1/2b+1/2c,1/2a+1/2c,1/2a+1/2b;0,0,0)"].map(async (symbol, index) => {
      const group = await parseGroup(symbol);
      const short = 4 / Math.SQRT2;
      const cell = index === 0 ? cellOf(4, 4, 4) : cellOf(short, short, short, 60, 60, 60);
      const table = bondTable(group, cell, [siteOrbit(group, parseSite("M 0 0 0"), cell)], { shells: 5 });
      return table.shells.map(({ distance, classes }) => [
        distance.toFixed(4),
        classes.map(({ bonds }) => bonds.length),
      ]);
    });
    const [first, second] = await Promise.all(shapes);
    expect(second).toEqual(first);
  });
});

describe("constants", () => {
  const codes = async (given: Parameters<typeof exchangeModel>[1]) => {
    const table = await shellsOf("kagome", 3);
    try {
      exchangeModel(table, given);
    } catch (error) {
      return (error as KvaneError).problems.map(({ code, where }) => `${code} ${where.path ?? ""}`.trim());
    }
    return [];
  };

  it("may be given for a shell, for one class or between two sites", async () => {
    const table = await shellsOf("kagome", 3);
    const model = exchangeModel(table, [
      { bond: "3b", between: null, j: -0.3 },
      { bond: "1", between: ["M", "M"], j: 1 },
    ]);
    expect(model.couplings.map(({ bonds, j }) => [bonds.name, j])).toEqual([
      ["1", 1],
      ["3b", -0.3],
    ]);
  });

  it("are refused all at once for bonds that are not there or have one already", async () => {
    expect(
      await codes([
        { bond: "9", between: null, j: 1, where: { path: "exchange[0]" } },
        { bond: "1", between: ["M", "N"], j: 1, where: { path: "exchange[1]" } },
        { bond: "3", between: null, j: 1 },
        { bond: "3a", between: null, j: 2, where: { path: "exchange[3]" } },
      ]),
    ).toEqual(["invalid-argument exchange[0]", "invalid-argument exchange[1]", "conflicting-arguments exchange[3]"]);
  });
});
