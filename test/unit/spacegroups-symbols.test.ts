import { KvaneError, type Problem } from "@kvane/core/errors";
import {
  formatTriplet,
  groupFromOperators,
  operatorsModuloIntegers,
  parseGroup,
  parseGroupWithNotes,
  parseTriplet,
  pointGroupSymbol,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";

function problemsOf(action: () => unknown): readonly Problem[] {
  try {
    action();
    return [];
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    return error.problems;
  }
}

const firstProblem = (text: string): Problem | undefined => problemsOf(() => parseGroup(text))[0];

describe("naming a space group", () => {
  it("gives the name as the JSON contract has it", () => {
    expect(parseGroup("62").name).toEqual({
      number: 62,
      hall: "-P 2ac 2n",
      hermannMauguin: "P n m a",
      choice: "",
      basisChange: "a,b,c;0,0,0",
    });
  });

  // Every line is one group in the trade's spellings; the setting is that of International Tables A or B.
  it.each([
    ["-P 2ac 2n", ["62", "P n m a", "Pnma", "pnma", "PNMA", "P 21/n 21/m 21/a", "P 2_1/n 2_1/m 2_1/a", "-P 2ac 2n"]],
    ["-P 2ybc", ["14", "P 1 21/c 1", "P 21/c", "P 2_1/c", "P2_1/c", "P21/c", "P 1 2_1/c 1", "P 21/c:b1"]],
    ["-P 2yn", ["P 21/n", "P2_1/n", "P 1 21/n 1", "P21/c:b2", "14:b2"]],
    ["-I 2ya", ["I 2/a", "I 1 2/a 1", "C 2/c:b3"]],
    ["-B 2b", ["B 2/b", "B 1 1 2/b"]],
    ['-R 3 2"', ["166", "R -3 m", "R-3m", "R -3 m:H", "R -3 2/m:h", "R -3 m H", "R \u22123 m"]],
    ["-P 3* 2", ["166:R", "R -3 m:R", "R-3m : r", "R -3 m R"]],
    ["F 4d 2 3 -1d", ["227:1", "F d -3 m:1", "Fd-3m:1", "F d -3 m S", "F 41/d -3 2/m:1"]],
    ["-F 4vw 2vw 3", ["227", "F d -3 m", "Fd-3m:2", "Fd-3m Z", "F d 3 m"]],
    ["-C 2bc 2", ["64", "C m c e", "C m c a", "Cmca"]],
    ["-B 2bc 2", ["B m e b", "B m a b", "Bmab"]],
    ["-P 2c 2ab", ["P b n m", "Pbnm", "Pnma:cab", "62:cab", "Pbnm:cab"]],
    ["P 32", ["145", "P 32", "P32", "P 3_2", "hall:P 32"]],
    ["P 3 2", ["149", "P 3 1 2", "P312", "P 3 2", "hall:P 3 2"]],
    ["P 4c", ["77", "P 42", "P42", "P 4_2"]],
    ["P 4 2", ["89", "P 4 2 2", "P422", "P 4 2"]],
    ["-F 4 2 3", ["225", "F m -3 m", "Fm-3m", "Fm3m", "F m 3 m", "F 4/m -3 2/m"]],
  ])("%s: %j", (hall, texts) => {
    expect(texts.map((text) => parseGroup(text).name.hall)).toEqual(texts.map(() => hall));
  });

  it("says what a symbol left open", () => {
    const note = (text: string): string =>
      parseGroupWithNotes(text)
        .assumed.map((one) => one.because)
        .join("; ");
    expect(note("62")).toBe("");
    expect(note("P 1 21/c 1")).toBe("");
    expect(note("Fd-3m")).toContain("origin choice 2");
    expect(note("167")).toContain("hexagonal axes");
    expect(note("P21/c")).toContain("unique axis b, cell choice 1");
    expect(note("B 2/b")).toContain("unique axis -c, cell choice 1");
    expect(note("Cmca")).toContain("older");
    expect(note("P 2")).toContain("hall:P 2");
    expect(note("P 3 2")).toContain("no Hermann–Mauguin symbol");
    expect(note("hall:P 2")).toBe("");
  });

  it("suggests symbols that are spelt alike", () => {
    expect(firstProblem("P n m q")).toMatchObject({ code: "unknown-group", where: { column: 1 }, found: "P n m q" });
    expect(firstProblem("Pmma a")?.remedy).toContain("P m m a");
    expect(firstProblem("quartz")?.remedy).toBeNull();
  });

  it.each([
    ["", "syntax", 1],
    ["0", "unknown-group", 1],
    ["231", "unknown-group", 1],
    ["62:b1", "unknown-group", 1],
    ["  P n m a:2", "unknown-group", 11],
    ["Aemm", "ambiguous-group", 1],
    ["P 2_1 3 2", "unknown-group", 1],
    ["P3_12", "unknown-group", 1],
    ["62 (0 0 1)", "conflicting-arguments", 5],
    ["P n m a (x,y,z+1/4)", "conflicting-arguments", 10],
    ["x,y,z (x,y,z)", "conflicting-arguments", 8],
    ["62 (a,y,2c)", "syntax", 7],
    ["62 (a,b,q)", "syntax", 9],
    ["62 (a,b)", "syntax", 5],
    ["62 (a,b,c;0,0)", "syntax", 11],
    ["62 (a,b,c;0,0,p)", "syntax", 15],
    ["62 (a,b+1/2,c)", "syntax", 5],
    ["62 (a,b,a)", "singular-basis", 5],
    ["62 (a,b,c", "syntax", 4],
    ["62 a,b,c)", "syntax", 9],
    ["62 (a,b,c) (a,b,2c)", "syntax", 4],
  ])("refuses `%s` with %s at column %i", (text, code, column) => {
    expect(firstProblem(text)).toMatchObject({ code, where: { column } });
  });

  it("names the codes and the settings to choose from", () => {
    expect(firstProblem("Pnma:2")?.expected).toContain("ba-c, cab");
    expect(firstProblem("Aemm")?.expected).toBe("one of A e m m:cab, A e m m:-cba");
  });
});

describe("groups from triplets", () => {
  it("closes generators, takes pure translations into the lattice, finds the name", () => {
    const group = parseGroup("-x,-y,-z; x+1/2,y+1/2,z; -x,y,-z+1/2");
    expect(group.name).toMatchObject({ number: 15, choice: "b1", hall: "-C 2yc" });
    expect(group.lattice).toEqual({
      vectors: [
        [1, 1, 0],
        [0, 2, 0],
        [0, 0, 2],
      ],
      denominator: 2,
    });
    expect(operatorsModuloIntegers(group)).toHaveLength(8);
  });

  it("takes new lines between triplets, terms in any order, decimals, blanks and capitals", () => {
    expect(parseGroup("X, Y, Z\n -x , 0.5 +Y, -z\n").name.number).toBe(4);
    expect(parseGroup("1/2+x,1/2-y,-z;x,y,z;").operators.map(formatTriplet)).toEqual(["x,y,z", "x+1/2,-y+1/2,-z"]);
  });

  it("leaves a group without a tabulated setting unnamed", () => {
    expect(parseGroup("-x+1/2,-y,-z").name).toEqual({
      number: null,
      hall: null,
      hermannMauguin: null,
      choice: "",
      basisChange: "a,b,c;0,0,0",
    });
  });

  it("refuses what does not close, naming the operator, its column and what is missing", () => {
    expect(firstProblem("x,y,z; x+y,y,z")).toMatchObject({
      code: "not-a-group",
      where: { column: 8 },
      found: "x+y,y,z",
    });
    expect(firstProblem("x,y,z;2x,y,z")).toMatchObject({ code: "not-a-group", where: { column: 7 } });
    expect(firstProblem("x,x,z")).toMatchObject({ code: "not-a-group", found: "x,x,z" });
    const screw = firstProblem("x,y,z;-x,y+1/3,-z");
    expect(screw?.message).toContain("2·2");
    expect(screw?.remedy).toContain("x,y+2/3,z");
    const pair = firstProblem("-y,x,z; z,x,y+1/4");
    expect(pair).toMatchObject({ code: "not-a-group" });
    const listed = firstProblem("-x,-y,z;-x,y,-z;x,-y,-z+1/2");
    expect(listed?.message).toContain("operator 3 (x,-y,-z+1/2) differs from");
    const centring = firstProblem("x+1/2,y,z; -y,x,z");
    expect(centring?.message).toContain("does not map the translation lattice");
    // Two fourfold axes of different lattices generate rotations without end.
    expect(firstProblem("-y,x,z;-x+y,-x,z")?.message).toContain("infinitely many");
  });

  it("tells all unreadable triplets at once", () => {
    const problems = problemsOf(() => parseGroup("x,y,z; x,y; q,y,z"));
    expect(problems.map((one) => [one.code, one.where.column])).toEqual([
      ["syntax", 8],
      ["syntax", 13],
    ]);
  });

  it("adds extra translations where they are given", () => {
    const group = groupFromOperators([parseTriplet("-x,-y,-z")], { hall: "made" }, [
      [
        [1, 2],
        [1, 2],
        [1, 2],
      ],
    ]);
    expect(group.name.hall).toBe("made");
    expect(operatorsModuloIntegers(group).map(formatTriplet)).toEqual([
      "x,y,z",
      "-x,-y,-z",
      "x+1/2,y+1/2,z+1/2",
      "-x+1/2,-y+1/2,-z+1/2",
    ]);
  });

  it("survives structuredClone and JSON", () => {
    const group = parseGroup("227 (a/2+b/2,b/2+c/2,a/2+c/2;1/8,1/8,1/8)");
    expect(structuredClone(group)).toEqual(group);
    expect(JSON.parse(JSON.stringify(group))).toEqual(group);
  });
});

describe("order of operators", () => {
  it("is readable: rotations first, by order and axis, then the same with inversion", () => {
    expect(parseGroup("62").operators.map(formatTriplet)).toEqual([
      "x,y,z",
      "-x+1/2,-y,z+1/2",
      "-x,y+1/2,-z",
      "x+1/2,-y+1/2,-z+1/2",
      "-x,-y,-z",
      "x+1/2,y,-z+1/2",
      "x,-y+1/2,z",
      "-x+1/2,y+1/2,z+1/2",
    ]);
    expect(parseGroup("P 4").operators.map(formatTriplet)).toEqual(["x,y,z", "-x,-y,z", "-y,x,z", "y,-x,z"]);
    expect(parseGroup("P 61").operators.map(formatTriplet)).toEqual([
      "x,y,z",
      "-x,-y,z+1/2",
      "-y,x-y,z+1/3",
      "-x+y,-x,z+2/3",
      "x-y,x,z+1/6",
      "y,-x+y,z+5/6",
    ]);
  });
});

describe("crystal classes", () => {
  // The class of a space group by its symbol with glides and screws taken off: International Tables A, table 2.1.1.1.
  it.each([
    ["1", "1"],
    ["2", "-1"],
    ["4", "2"],
    ["7", "m"],
    ["14", "2/m"],
    ["19", "222"],
    ["33", "mm2"],
    ["62", "mmm"],
    ["76", "4"],
    ["82", "-4"],
    ["88", "4/m"],
    ["92", "422"],
    ["109", "4mm"],
    ["122", "-42m"],
    ["119", "-42m"],
    ["141", "4/mmm"],
    ["144", "3"],
    ["148", "-3"],
    ["152", "32"],
    ["161", "3m"],
    ["167", "-3m"],
    ["169", "6"],
    ["174", "-6"],
    ["176", "6/m"],
    ["178", "622"],
    ["186", "6mm"],
    ["187", "-62m"],
    ["190", "-62m"],
    ["194", "6/mmm"],
    ["198", "23"],
    ["205", "m-3"],
    ["212", "432"],
    ["220", "-43m"],
    ["227", "m-3m"],
  ])("number %s belongs to %s", (number, symbol) => {
    expect(parseGroup(number).pointGroup).toBe(symbol);
  });

  it("refuses sets that are no class", () => {
    expect(
      problemsOf(() =>
        pointGroupSymbol([
          [1, 0, 0, 0, 1, 0, 0, 0, 1],
          [1, 1, 0, 0, 1, 0, 0, 0, 1],
        ]),
      )[0]?.code,
    ).toBe("not-a-group");
    expect(problemsOf(() => pointGroupSymbol([[0, -1, 0, 1, 0, 0, 0, 0, 1]]))[0]?.code).toBe("not-a-group");
  });
});
