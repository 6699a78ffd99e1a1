import { KvaneError } from "@kvane/core/errors";
import {
  changeMagneticBasis,
  composeMagnetic,
  familyGroup,
  formatMagneticTriplet,
  formatSuperspace,
  identifyMagneticGroup,
  invertMagnetic,
  magneticGroup,
  magneticGroupByNumber,
  magneticPointGroupSymbol,
  parseMagneticTriplet,
  parseSuperspace,
  sameMagneticOperator,
  unprimedSubgroup,
} from "@kvane/core/magneticgroups";
import { formatBasisChange, latticeFromVectors, parseBasisChange, standardSetting } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { problemsOf } from "../support/problems-of.js";

const primitive = latticeFromVectors([
  [
    [1, 1],
    [0, 1],
    [0, 1],
  ],
  [
    [0, 1],
    [1, 1],
    [0, 1],
  ],
  [
    [0, 1],
    [0, 1],
    [1, 1],
  ],
]);

function groupOf(...triplets: readonly string[]) {
  return magneticGroup(
    primitive,
    triplets.map((text) => parseMagneticTriplet(text)),
  );
}

describe("triplets with time reversal", () => {
  it.each([
    ["-x,y+1/2,-z,-1", "-x,y+1/2,-z,-1"],
    [" x, Y, z, 1 ", "x,y,z,+1"],
    ["y,x,-z,+1", "y,x,-z,+1"],
    ["x,y,z+0.5,\u22121", "x,y,z+1/2,-1"],
  ])("%s", (text, written) => {
    expect(formatMagneticTriplet(parseMagneticTriplet(text))).toBe(written);
  });

  it.each([
    ["x,y,z", 5],
    ["x,y,z,2", 7],
    ["x,y,z,", 7],
    ["x,y,z,+1,-1", 10],
    ["x,q,z,+1", 3],
  ])("refuses %s at column %i", async (text, column) => {
    const [problem] = await problemsOf(() => parseMagneticTriplet(text));
    expect(problem).toMatchObject({ code: "syntax", where: { column } });
  });
});

describe("groups from generators", () => {
  it("close, are typed and ordered", () => {
    const group = groupOf("-x,y+1/2,-z+1/2,-1", "-x,-y,-z,+1");
    expect(group.operators.map(formatMagneticTriplet)).toEqual([
      "x,y,z,+1",
      "-x,-y,-z,+1",
      "-x,y+1/2,-z+1/2,-1",
      "x,-y+1/2,z+1/2,-1",
    ]);
    expect(group).toMatchObject({ type: 3, pointGroup: "2'/m'" });
  });

  it("have the four types", () => {
    expect(groupOf("-x,-y,-z,+1")).toMatchObject({ type: 1, pointGroup: "-1" });
    expect(groupOf("-x,-y,-z,+1", "x,y,z,-1")).toMatchObject({ type: 2, pointGroup: "-11'" });
    expect(groupOf("-x,-y,-z,-1")).toMatchObject({ type: 3, pointGroup: "-1'" });
    expect(groupOf("-x,-y,-z,+1", "x,y,z+1/2,-1")).toMatchObject({ type: 4, pointGroup: "-11'" });
  });

  it("do not depend on how they are given", () => {
    const group = magneticGroupByNumber("167.106");
    expect(magneticGroup(group.lattice, [...group.operators].reverse())).toEqual(group);
  });

  it.each([
    [["x+1/2,y,z,+1"], "not in the lattice"],
    [["x,y,z+1/3,-1"], "not in the lattice"],
    [["-x,-y,z,+1", "-x,-y,z+1/2,+1"], "not in the lattice"],
    [["x+y,y,z,+1"], "infinitely many"],
    [["x/2,2y,z,+1"], "does not map the translation lattice"],
  ])("refuses %j", async (triplets, message) => {
    const [problem] = await problemsOf(() => groupOf(...triplets));
    expect(problem?.code).toBe("not-a-group");
    expect(problem?.message).toContain(message);
  });

  it("are plain data", () => {
    const group = magneticGroupByNumber("15.90");
    expect(JSON.parse(JSON.stringify(group))).toEqual(group);
    expect(structuredClone(identifyMagneticGroup(group))).toEqual(identifyMagneticGroup(group));
  });
});

describe("operators", () => {
  const group = magneticGroupByNumber("14.79");
  it("multiply and invert within the group", () => {
    for (const a of group.operators)
      for (const b of group.operators) {
        const product = composeMagnetic(a, b);
        expect(group.operators.filter((one) => sameMagneticOperator(group, one, product))).toHaveLength(1);
        const undone = composeMagnetic(product, invertMagnetic(b));
        expect(sameMagneticOperator(group, undone, a)).toBe(true);
      }
  });
});

describe("related space groups", () => {
  it("MnO: family, unprimed subgroup and the way to the BNS setting", () => {
    const group = changeMagneticBasis(magneticGroupByNumber("15.90"), parseBasisChange("a,b,a+c;1/4,0,0"));
    expect(standardSetting(unprimedSubgroup(group)).setting.number).toBe(15);
    // The chain C2/m (family, which the OG number begins with), C2/c (unprimed, BNS) is that of the halved axis c.
    expect(standardSetting(familyGroup(group)).setting.number).toBe(12);
    const { name, toBns } = identifyMagneticGroup(group);
    expect(name).toEqual({ bns: { number: "15.90", symbol: "C_c2/c" }, og: { number: "12.8.73" } });
    expect(changeMagneticBasis(group, toBns)).toEqual(magneticGroupByNumber("15.90"));
  });

  it("a group in the BNS setting needs no change", () => {
    expect(formatBasisChange(identifyMagneticGroup(magneticGroupByNumber("62.448")).toBns)).toBe("a,b,c;0,0,0");
  });

  it("any origin and very oblique axes will do", () => {
    for (const number of ["136.499", "227.131", "166.101", "62.448", "2.7", "12.63", "185.197"]) {
      const change = parseBasisChange("a+7b-31c,b+12c,5a+35b-154c;123/1000,1/7,5/11");
      const group = changeMagneticBasis(magneticGroupByNumber(number), change);
      const { name, toBns } = identifyMagneticGroup(group);
      expect(name.bns.number).toBe(number);
      expect(changeMagneticBasis(group, toBns)).toEqual(magneticGroupByNumber(number));
    }
  });

  it("Pbnm is three axes away from Pnma", () => {
    const pbnm = changeMagneticBasis(magneticGroupByNumber("62.448"), parseBasisChange("c,a,b"));
    expect(formatBasisChange(identifyMagneticGroup(pbnm).toBns)).toMatch(/^-?b,-?c,-?a;/);
  });

  it("an unknown number is refused", async () => {
    for (const number of ["15.900", "0.1", "231.1", "abc", "15.9"])
      expect((await problemsOf(() => magneticGroupByNumber(number)))[0]?.code).toBe("unknown-group");
  });
});

describe("magnetic point groups", () => {
  const rotation = (text: string) => {
    const { operator, timeReversal } = parseMagneticTriplet(text);
    return { rotation: operator.rotation, timeReversal };
  };
  it("are named in any basis", () => {
    expect(magneticPointGroupSymbol(["x,y,z,1", "-x,-y,z,-1"].map(rotation))).toBe("2'");
    expect(magneticPointGroupSymbol(["x,y,z,1", "x,y,z,-1"].map(rotation))).toBe("11'");
  });
  it("a set that is no group is refused", () => {
    expect(() => magneticPointGroupSymbol(["x,y,z,1", "-x,-y,z,-1", "x,y,z,-1"].map(rotation))).toThrow(KvaneError);
  });
});

describe("text of superspace operators", () => {
  it.each([
    ["x1,x2,-x3,-x4+1/2,-1", "x1,x2,-x3,-x4+1/2,-1"],
    ["x1-x2, x1, x3+1/2, 1/4 + x4 - x3, +1", "x1-x2,x1,x3+1/2,-x3+x4+1/4,+1"],
    ["X1,x2,x3,x4", "x1,x2,x3,x4,+1"],
    ["x1,x2,x3,x4+0.5,-1", "x1,x2,x3,x4+1/2,-1"],
    ["x1/2+x2/2,x2,x3,-x4,1", "x1/2+x2/2,x2,x3,-x4,+1"],
  ])("%s", (text, written) => {
    expect(formatSuperspace(parseSuperspace(text))).toBe(written);
  });

  it("reads what it means", () => {
    expect(parseSuperspace("-x1,x2+1/2,-x3,x1-x4+1/3,-1")).toMatchObject({
      timeReversal: -1,
      epsilon: -1,
      shift: [
        [1, 1],
        [0, 1],
        [0, 1],
      ],
      delta: [1, 3],
    });
  });

  it.each([
    ["x1,x2,x3+x4,x4,1", 7],
    ["x1,x2,x3,2x4,1", 10],
    ["x1,x2,x3,x4,2", 13],
    ["x1,x2,x3", 1],
    ["x1,,x3,x4", 4],
    ["x1,x2y,x3,x4", 6],
    ["x1,x2,x3,x1,+1", 10],
  ])("refuses %s at column %i", async (text, column) => {
    const [problem] = await problemsOf(() => parseSuperspace(text));
    expect(problem).toMatchObject({ code: "syntax", where: { column } });
  });
});
