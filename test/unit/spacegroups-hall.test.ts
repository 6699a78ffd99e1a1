import { KvaneError } from "@kvane/core/errors";
import { formatTriplet, operatorsModuloIntegers, parseGroup } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";

const triplets = (text: string): string[] => parseGroup(text).operators.map(formatTriplet);
const expanded = (text: string): string[] => operatorsModuloIntegers(parseGroup(text)).map(formatTriplet);

/** The first problem that reading `text` gives, as code and column. */
function problemOf(text: string): [string, number | null] | null {
  try {
    parseGroup(text);
    return null;
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    return [error.code, error.problems[0]?.where.column ?? null];
  }
}

describe("Hall symbols", () => {
  // International Tables B, tables A1.4.2.3 and A1.4.2.4: the matrices, written out by hand as what a rotation about
  // that axis does to a point.
  it.each([
    ["P 2x", "x,-y,-z"],
    ["P 3x", "x,-z,y-z"],
    ["P 4x", "x,-z,y"],
    ["P 6x", "x,y-z,y"],
    ["P 2y", "-x,y,-z"],
    ["P 3y", "-x+z,y,-x"],
    ["P 4y", "z,y,-x"],
    ["P 6y", "z,y,-x+z"],
    ["P 2", "-x,-y,z"],
    ["P 3", "-y,x-y,z"],
    ["P 4", "-y,x,z"],
    ["P 6", "x-y,x,z"],
    ["P 3*", "z,x,y"],
    ["P 2'", "-y,-x,-z"],
    ['P 2"', "y,x,-z"],
    ["P 2x'", "-x,-z,-y"],
    ['P 2x"', "-x,z,y"],
    ["P 2y'", "-z,-y,-x"],
    ['P 2y"', "z,-y,x"],
    ["P -1", "-x,-y,-z"],
    ["P -2", "x,y,-z"],
    ["P -4", "y,-x,-z"],
  ])("%s has the operator %s", (symbol, operator) => {
    expect(triplets(`hall:${symbol}`)).toContain(operator);
  });

  it("reads every lattice symbol", () => {
    expect(expanded("hall:A 1")).toEqual(["x,y,z", "x,y+1/2,z+1/2"]);
    expect(expanded("hall:B 1")).toEqual(["x,y,z", "x+1/2,y,z+1/2"]);
    expect(expanded("hall:C 1")).toEqual(["x,y,z", "x+1/2,y+1/2,z"]);
    expect(expanded("hall:I 1")).toEqual(["x,y,z", "x+1/2,y+1/2,z+1/2"]);
    expect(expanded("hall:R 1")).toEqual(["x,y,z", "x+1/3,y+2/3,z+2/3", "x+2/3,y+1/3,z+1/3"]);
    expect(expanded("hall:H 1")).toEqual(["x,y,z", "x+1/3,y+2/3,z", "x+2/3,y+1/3,z"]);
    expect(expanded("hall:F 1")).toHaveLength(4);
    expect(expanded("hall:-P 1")).toEqual(["x,y,z", "-x,-y,-z"]);
  });

  it("reads every translation: letters add up, digits are screws along the axis", () => {
    expect(triplets("hall:P -2a")).toContain("x+1/2,y,-z");
    expect(triplets("hall:P -2n")).toContain("x+1/2,y+1/2,-z+1/2");
    expect(triplets("hall:F -2d")).toContain("x+1/4,y+1/4,-z+1/4");
    expect(triplets("hall:P 4w")).toEqual(triplets("hall:P 41"));
    expect(triplets("hall:P 4cw")).toEqual(triplets("hall:P 43"));
    expect(triplets("hall:P 61")).toContain("x-y,x,z+1/6");
    expect(triplets("hall:P 2xa")).toEqual(triplets("hall:P 2x1"));
    expect(triplets("hall:F 2uv")).toContain("-x+1/4,-y+1/4,z");
  });

  it("finds default axes by position and preceding order", () => {
    expect(triplets("hall:P 2 2")).toContain("x,-y,-z");
    expect(triplets("hall:P 4 2")).toContain("x,-y,-z");
    expect(triplets("hall:P 3 2")).toContain("-y,-x,-z");
    expect(triplets("hall:P 6 2")).toContain("-y,-x,-z");
    expect(triplets("hall:P 2 2 3")).toContain("z,x,y");
  });

  it("refers ' and \" to the axis before, as International Tables B have it", () => {
    expect(triplets("hall:P 4x 2'")).toContain("-x,-z,-y");
    expect(triplets('hall:P 4y 2"')).toContain("z,-y,x");
  });

  it("moves the origin by Hall's three integers, in 12ths and of any size: x' = x + v", () => {
    expect(triplets("hall:P 2 (1 2 0)")).toContain("-x+1/6,-y+1/3,z");
    expect(triplets("hall:P 2x (0 0 -1)")).toContain("x,-y,-z+5/6");
    expect(triplets("hall:P 2x (0 0 14)")).toEqual(triplets("hall:P 2x (0 0 2)"));
    // International Tables B and its first edition spell number 151 in two ways.
    expect(triplets("hall:P 31 2c (0 0 1)")).toEqual(triplets("hall:P 31 2 (0 0 4)"));
  });

  it("changes the basis by Hall's operator: x' = V x, mixed with fractions", () => {
    // The rhombohedral cell from the hexagonal one: the example of International Tables B, A1.4.2.3.
    const rhombohedral = parseGroup("hall:R 3 (-y+z,x+z,-x+y+z)");
    expect(rhombohedral.name).toMatchObject({ number: 146, choice: "R", basisChange: "a,b,c;0,0,0" });
    const turned = parseGroup("hall:P 4 2 (x-y, x+y, z+1/4)");
    expect(turned.name).toMatchObject({ number: 89, basisChange: "a/2-b/2,a/2+b/2,c;0,0,-1/4" });
    expect(turned.operators.map(formatTriplet)).toContain("y,x,-z+1/2");
  });

  it("keeps a symbol that no table row has as the name", () => {
    expect(parseGroup("hall: p  2X' ").name).toMatchObject({ number: null, hall: "P 2x'", hermannMauguin: null });
  });

  it("takes both changes of basis, Hall's first", () => {
    expect(parseGroup("hall:P 2x (0 0 3) (a,b,2c)").name.basisChange).toBe("a,b,2c;0,0,-1/4");
  });

  it.each([
    ["hall:", "syntax", 6],
    ["hall:Q 2", "syntax", 6],
    ["hall:-P", "syntax", 8],
    ["hall:P 5", "syntax", 8],
    ["hall:P 2 4", "syntax", 11],
    ["hall:P 2q", "syntax", 9],
    ["hall:P 45", "syntax", 9],
    ["hall:P 2x*", "syntax", 10],
    ["hall:P 4*", "syntax", 8],
    ["hall:P 2 2 3 -1n -1", "syntax", 18],
    ["hall:P 2 (0 0 x 1)", "syntax", 11],
    ["hall:P 2 (0 0)", "syntax", 11],
    ["hall:P 2 (x,y)", "syntax", 11],
    ["hall:P 2 (x,y,x)", "singular-basis", 11],
    ["hall:P 2 (x,y,z", "syntax", 10],
    ["hall:P 2 (a,b,c) (0 0 1)", "syntax", 10],
    ["hall:P 2w 2", "not-a-group", 8],
    ["hall:C 3", "not-a-group", 8],
  ])("%s is refused with %s at column %i", (text, code, column) => {
    expect(problemOf(text)).toEqual([code, column]);
  });
});
