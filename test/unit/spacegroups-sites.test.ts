import { KvaneError, type Problem } from "@kvane/core/errors";
import { type Cell, parseCell, parseGroup, parseSite, type SiteOrbit, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { formatRational } from "#core/numbers/index.js";

function orbitOf(group: string, position: string, cell: Cell | null = null): SiteOrbit {
  return siteOrbit(parseGroup(group), parseSite(`A ${position}`), cell);
}

function problemsOf(action: () => unknown): readonly Problem[] {
  try {
    action();
    return [];
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    return error.problems;
  }
}

const texts = (orbit: SiteOrbit): string[] => orbit.positions.map((position) => position.map(formatRational).join());

describe("orbits of sites", () => {
  // International Tables A, the pages of the groups (multiplicity, letter, site symmetry up to orientation, coordinates);
  // entered from memory.
  it.each([
    ["14", "0 0 0", 2, "-1", "0,0,0"],
    ["14", "0.1 0.2 0.3", 4, "1", "x,y,z"],
    ["62", "0 0 0", 4, "-1", "0,0,0"],
    ["62", "0 0 1/2", 4, "-1", "0,0,1/2"],
    ["62", "0.1 1/4 0.3", 4, "m", "x,1/4,z"],
    ["62", "0.1 0.2 0.3", 8, "1", "x,y,z"],
    ["64", "0 0 0", 4, "2/m", "0,0,0"],
    ["64", "0 0.1 0.2", 8, "m", "0,y,z"],
    ["64", "1/4 0.1 1/4", 8, "2", "1/4,y,1/4"],
    ["136", "0 0 0", 2, "mmm", "0,0,0"],
    ["136", "0.3 0.3 0", 4, "mm2", "x,x,0"],
    ["139", "0 0 0", 2, "4/mmm", "0,0,0"],
    ["139", "0 1/2 1/4", 4, "-42m", "0,1/2,1/4"],
    ["139", "0 0 0.36", 4, "4mm", "0,0,z"],
    ["166", "0 0 0.2", 6, "3m", "0,0,z"],
    ["166", "0 1/2 1/2", 9, "2/m", "0,1/2,1/2"],
    ["167", "0 0 0", 6, "-3", "0,0,0"],
    ["167", "0 0 0.355", 12, "3", "0,0,z"],
    ["167", "0.3 0 1/4", 18, "2", "x,0,1/4"],
    ["194", "0 0 0", 2, "-3m", "0,0,0"],
    ["194", "0 0 1/4", 2, "-62m", "0,0,1/4"],
    ["194", "1/3 2/3 1/4", 2, "-62m", "1/3,2/3,1/4"],
    ["194", "1/3 2/3 3/4", 2, "-62m", "1/3,2/3,3/4"],
    ["194", "1/3 2/3 0.06", 4, "3m", "1/3,2/3,z"],
    ["194", "1/2 0 0", 6, "2/m", "1/2,0,0"],
    ["194", "0.17 0.34 1/4", 6, "mm2", "x,2x,1/4"],
    ["194", "0.17 0.34 0.1", 12, "m", "x,2x,z"],
    ["225", "0 0 0", 4, "m-3m", "0,0,0"],
    ["225", "1/4 1/4 1/4", 8, "-43m", "1/4,1/4,1/4"],
    ["225", "0 1/4 1/4", 24, "mmm", "0,1/4,1/4"],
    ["225", "0.2 0 0", 24, "4mm", "x,0,0"],
    ["225", "0.2 0.2 0.2", 32, "3m", "x,x,x"],
    ["227:1", "0 0 0", 8, "-43m", "0,0,0"],
    ["227:1", "5/8 5/8 5/8", 16, "-3m", "5/8,5/8,5/8"],
    ["227:2", "1/2 1/2 1/2", 16, "-3m", "1/2,1/2,1/2"],
    ["227:2", "0 0 0", 16, "-3m", "0,0,0"],
    ["227:2", "1/8 1/8 1/8", 8, "-43m", "1/8,1/8,1/8"],
    ["227:2", "0.4 1/8 1/8", 48, "mm2", "x,1/8,1/8"],
    ["230", "0 0 0", 16, "-3", "0,0,0"],
    ["230", "1/8 0 1/4", 24, "222", "1/8,0,1/4"],
    ["230", "3/8 0 1/4", 24, "-4", "3/8,0,1/4"],
  ])("%s at %s: multiplicity %i, symmetry %s, (%s)", (group, position, multiplicity, symmetry, form) => {
    const orbit = orbitOf(group, position);
    expect([orbit.multiplicity, orbit.siteSymmetryClass, orbit.freeCoordinates.join()]).toEqual([
      multiplicity,
      symmetry,
      form,
    ]);
    expect(orbit.snapped).toBeNull();
  });

  it("lists the coordinates of International Tables A for the magnetic sites of two textbook groups", () => {
    // Pnma 4a and 4c, origin as tabulated; modulo integers, so (1/2,0,1/2) and so on.
    expect(texts(orbitOf("62", "0 0 0")).sort()).toEqual(["0,0,0", "0,1/2,0", "1/2,0,1/2", "1/2,1/2,1/2"]);
    // x,1/4,z; -x+1/2,3/4,z+1/2; -x,3/4,-z; x+1/2,1/4,-z+1/2 with x = 1/10, z = 3/10.
    expect(texts(orbitOf("62", "1/10 1/4 3/10")).sort()).toEqual([
      "1/10,1/4,3/10",
      "2/5,3/4,4/5",
      "3/5,1/4,1/5",
      "9/10,3/4,7/10",
    ]);
    // R-3m 9d: one atom a primitive cell of three.
    expect(orbitOf("166", "0 1/2 1/2").positions).toHaveLength(3);
  });

  it("keeps the representative that was given, modulo integers", () => {
    const orbit = orbitOf("225", "-1/2 3/2 1");
    expect(texts(orbit)).toEqual(["1/2,1/2,0"]);
    expect(orbit.carriers[0]).toEqual({
      operator: 0,
      shift: [
        [0, 1],
        [0, 1],
        [0, 1],
      ],
    });
  });

  it("names free coordinates without fractions where that is possible", () => {
    expect(orbitOf("194", "0.34 0.17 1/4").freeCoordinates).toEqual(["2y", "y", "1/4"]);
    expect(orbitOf("194", "0.17 0.83 1/4").freeCoordinates).toEqual(["x", "-x", "1/4"]);
  });

  it("gives the moment directions that the site allows", () => {
    const moment = (group: string, position: string): string => orbitOf(group, position).allowedMoment.join();
    // A moment is an axial vector: along a rotation axis, normal to a mirror plane, free at an inversion centre.
    expect(moment("62", "0 0 0")).toBe("mx,my,mz");
    expect(moment("62", "0.1 1/4 0.3")).toBe("0,my,0");
    expect(moment("167", "0 0 0.355")).toBe("0,0,mz");
    expect(moment("167", "0.3 0 1/4")).toBe("mx,0,0");
    expect(moment("136", "0 0 0")).toBe("0,0,0");
    expect(moment("83", "0 0 0")).toBe("0,0,mz");
    // The mirror plane of 6c in P6_3cm holds a and c: moments along a + 2b, which is normal to a (hexagonal YMnO3).
    expect(moment("185", "0.333 0 0")).toBe("mx,2mx,0");
    expect(moment("225", "0 0 0")).toBe("0,0,0");
  });

  it("counts atoms of a cell that is smaller or larger than the tabulated one", () => {
    expect(orbitOf("225 (a/2+b/2,b/2+c/2,a/2+c/2)", "0 0 0").multiplicity).toBe(1);
    expect(orbitOf("225 (a,b,2c)", "0 0 0").multiplicity).toBe(8);
    expect(orbitOf("225 (a,b,2c)", "0 0 0").positions).toHaveLength(1);
  });
});

describe("snapping", () => {
  it("makes 0.3333 and 0.333 thirds, and tells", () => {
    const orbit = orbitOf("194", "0.3333 0.6667 0.25");
    expect(orbit.position).toEqual([
      [1, 3],
      [2, 3],
      [1, 4],
    ]);
    expect(orbit.snapped).toEqual({
      from: [
        [3333, 10000],
        [6667, 10000],
        [1, 4],
      ],
      distanceAngstrom: null,
    });
    expect(orbitOf("194", "0.333 0.667 0.75").position).toEqual([
      [1, 3],
      [2, 3],
      [3, 4],
    ]);
    expect(orbitOf("194", "0.33 0.67 0.75").snapped).toBeNull();
  });

  it("measures in Å when there is a cell", () => {
    const cell = parseCell("10 6 5 90 90 90");
    // 0.252 is 0.012 Å off the mirror plane at 1/4, 0.254 is 0.024 Å; the limit is 0.02 Å.
    const near = orbitOf("62", "0.1 0.252 0.3", cell);
    expect(near.position).toEqual([
      [1, 10],
      [1, 4],
      [3, 10],
    ]);
    expect(near.snapped?.distanceAngstrom).toBe(0.012);
    expect(orbitOf("62", "0.1 0.254 0.3", cell).snapped).toBeNull();
    expect(orbitOf("62", "0.1 0.252 0.3").snapped).toBeNull();
    const far = parseCell("100 60 50 90 90 90");
    expect(orbitOf("62", "0.1 0.2503 0.3", far).position[1]).toEqual([1, 4]);
    expect(orbitOf("62", "0.1 0.2504 0.3", far).snapped).toBeNull();
  });

  it("goes to the most special position in reach and no farther", () => {
    expect(orbitOf("225", "0.0003 0.0002 -0.0001").siteSymmetryClass).toBe("m-3m");
    // x and y within reach of one another, not of the axis.
    const diagonal = orbitOf("225", "0.2002 0.1999 0.2001");
    expect(diagonal.freeCoordinates).toEqual(["x", "x", "x"]);
    expect(diagonal.position[0]).toEqual(diagonal.position[1]);
  });

  it("works with the longest decimals that a site may have", () => {
    expect(orbitOf("225", "0.333333333333 0.333333333334 0.333333333333").freeCoordinates).toEqual(["x", "x", "x"]);
    expect(orbitOf("166", "0.333333333333 0.666666666667 0.166666666667").position).toEqual([
      [1, 3],
      [2, 3],
      [1, 6],
    ]);
  });
});

describe("reading a site", () => {
  it("takes coordinates exactly as written", () => {
    expect(parseSite("Fe1 0 -1/2 0.3333")).toEqual({
      label: "Fe1",
      position: [
        [0, 1],
        [-1, 2],
        [3333, 10000],
      ],
    });
    expect(parseSite(" Mn2+, .5, 1, \u22120.25 ").position).toEqual([
      [1, 2],
      [1, 1],
      [-1, 4],
    ]);
  });

  it.each([
    ["", [1]],
    ["Fe1", [4]],
    ["Fe1 0 0", [8]],
    ["0 0 0", [1]],
    ["Fe1 0 0 0 0", [11]],
    ["Fe1 a 0 NaN", [5, 9]],
    ["Fe1 1e-3 0 1/0", [5, 12]],
    ["Fe1 0.3333333333333333 0 0", [5]],
  ])("refuses `%s` at columns %j", (text, columns) => {
    const problems = problemsOf(() => parseSite(text));
    expect(problems.map((one) => one.code)).toEqual(columns.map(() => "invalid-site"));
    expect(problems.map((one) => one.where.column)).toEqual(columns);
  });
});
