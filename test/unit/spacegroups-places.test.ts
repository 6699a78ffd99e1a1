import { changeBasis, parseBasisChange, parseGroup, parseGroupWithNotes, parseTriplet } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { problemsOf } from "../support/problems-of.js";

/** Codes and columns of all problems, columns counted by hand. */
async function placesOf(read: () => unknown): Promise<[string, number | null][]> {
  return (await problemsOf(async () => read())).map(({ code, where }) => [code, where.column]);
}

describe("what is wrong with a change of basis is placed", () => {
  it.each<[string, string, number]>([
    ["(a,b,c;0,0)", "syntax", 8],
    ["(a,b,c;0,x,0)", "syntax", 10],
    ["a,b,c;0, q,0", "syntax", 10],
    ["a,b,c;0,0,", "syntax", 11],
    ["a,b,q", "syntax", 5],
    ["a,b,c+1", "syntax", 1],
    ["(a,b,c;0,0,0;1)", "syntax", 2],
    ["a,b,a+b", "singular-basis", 1],
    [" (a,b,a+b)", "singular-basis", 3],
    ["a,b", "syntax", 1],
  ])("%s: %s at column %i", async (text, code, column) => {
    expect(await placesOf(() => parseBasisChange(text))).toEqual([[code, column]]);
    expect(await placesOf(() => parseBasisChange(text, 20))).toEqual([[code, column + 19]]);
  });
});

describe("what is wrong with a group is placed", () => {
  it.each<[string, [string, number][]]>([
    ["P 2)", [["syntax", 4]]],
    ["P 2 (a,b,c) (a,b,c)", [["syntax", 5]]],
    ["P 2 (a,b,c) (0 0 1)", [["syntax", 5]]],
    ["hall:P 2 (0 0 1) (0 0 1)", [["syntax", 10]]],
    ["P 2 (a,y,c)", [["syntax", 8]]],
    ["P (2 a", [["syntax", 3]]],
    ["P 2 (a,b,c) x", [["syntax", 5]]],
    ["hall:P 2 (0 0)", [["syntax", 11]]],
    ["hall:P 2 (x,x,z)", [["singular-basis", 11]]],
    ["hall:P 22", [["syntax", 9]]],
    ["hall:P 33", [["syntax", 9]]],
    ["hall:P 66", [["syntax", 9]]],
    ["hall:P 4 44", [["syntax", 11]]],
    ["62 (0 0 1)", [["conflicting-arguments", 5]]],
    ["x,y,z (0 0 1)", [["conflicting-arguments", 8]]],
    ["P n m a (x,y,z)", [["conflicting-arguments", 10]]],
    ["x,y,z; -x,q,z", [["syntax", 11]]],
    [
      "q,y,z; x,y,r",
      [
        ["syntax", 1],
        ["syntax", 12],
      ],
    ],
    ["", [["syntax", 1]]],
    ["_", [["unknown-group", 1]]],
    // A fourfold axis along c does not leave an A-centred lattice alone, nor does a threefold one.
    ["x,y+1/2,z+1/2; -y,x,z", [["not-a-group", 16]]],
    ["x,y+1/2,z+1/2; z,x,y", [["not-a-group", 16]]],
    // Two mirrors whose product has no finite order.
    ["-x,y,z; -x+y,y,z", [["not-a-group", 9]]],
    ["231", [["unknown-group", 1]]],
    ["0", [["unknown-group", 1]]],
    ["P n m a:xyz", [["unknown-group", 9]]],
  ])("%s: %j", async (text, expected) => {
    expect(await placesOf(() => parseGroup(text))).toEqual(expected);
  });
});

describe("what is expected", () => {
  it("is a code of a setting that there is", async () => {
    const expectedOf = async (text: string) => (await problemsOf(() => parseGroup(text)))[0]?.expected;
    // Pbnm is no standard symbol: its own code is the one there is.
    expect(await expectedOf("P b n m:zz")).toContain("cab");
    expect(await expectedOf("P n m a:zz")).toContain("cab");
    expect(await expectedOf("P 1:zz")).toContain("no code");
  });
});

describe("axes that are very oblique", () => {
  it("are read as long as products of three rotations are exact integers, and refused beyond", async () => {
    // A fourfold axis after a' = a + n b has the entries ±n, −1 and n² + 1, which may be 2¹⁷ = 131 072 at most.
    expect(await placesOf(() => parseGroup("P 4 (a+362b,b,c)"))).toEqual([]);
    expect((await problemsOf(() => parseGroup("P 4 (a+363b,b,c)"))).map(({ code }) => code)).toEqual([
      "number-overflow",
    ]);
  });
});

describe("groups in other axes", () => {
  it("keep their name, and say the change", () => {
    const group = parseGroup("P n m a");
    const changed = changeBasis(group, parseBasisChange("a,b,2c;0,0,1/4"));
    expect(changed.name).toEqual({ ...group.name, basisChange: "a,b,2c;0,0,1/4" });
    expect(group.name).toMatchObject({ number: 62, hermannMauguin: "P n m a", hall: "-P 2ac 2n" });
    expect(changed.pointGroup).toBe("mmm");
  });

  it("are known by their number when they are given by triplets", () => {
    expect(parseGroup("-x+1/2,-y,z+1/2; -x,y+1/2,-z; -x,-y,-z").name).toMatchObject({ number: 62 });
    expect(parseGroupWithNotes("x,y,z").group.name.number).toBe(1);
    expect(parseTriplet("-y,x-y,z+2/3")).toMatchObject({
      rotation: [0, -1, 0, 1, -1, 0, 0, 0, 1],
      rotationDenominator: 1,
    });
  });
});
