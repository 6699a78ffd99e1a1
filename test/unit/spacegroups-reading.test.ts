import { KvaneError } from "@kvane/core/errors";
import {
  checkCellAgainstGroup,
  composeOperators,
  groupFromSetting,
  parseCell,
  parseGroup,
  parseGroupWithNotes,
  reciprocalMetric,
  siteOrbit,
  tabulatedSettings,
  waysToSettings,
} from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { identityOperator, invertOperator } from "#core/spacegroups/operators.js";
import { rotationType } from "#core/spacegroups/point-groups.js";
import { groupOf } from "../support/parsed-groups.js";
import { site } from "../support/written.js";

/** The first problem that something is refused with. */
function refusal(action: () => unknown) {
  try {
    action();
  } catch (error) {
    if (error instanceof KvaneError && error.problems[0]) return error.problems[0];
    throw error;
  }
  throw new Error("nothing was refused");
}

describe("brackets behind a group", () => {
  test("do not mix letters of axes and of coordinates; the later one is pointed at", () => {
    // Columns count from 1: the x of the first text is the tenth character, the b of the second the eighth.
    for (const [text, column] of [
      ["P 2 (a,b,x)", 10],
      ["P 2 (x,b,c)", 8],
    ] as const) {
      const { code, where, expected } = refusal(() => parseGroup(text));
      expect([code, where.column]).toEqual(["syntax", column]);
      expect(expected).toContain("not both");
    }
  });

  test("need a group before them", () => {
    expect(refusal(() => parseGroup("(a,b,c)")).message).toContain("empty");
    expect(refusal(() => parseGroup("P 2 a)")).where.column).toBe(6);
  });

  test("with three integers make a symbol that can be Hall's one of Hall's, and no reading is left open", () => {
    // A shift by (0 0 6)/12 along the axis changes no operator of P 2, unique axis c as Hall's symbols have it.
    const { group, assumed } = parseGroupWithNotes("P 2 (0 0 6)");
    expect(group.operators).toEqual(parseGroup("hall:P 2").operators);
    expect(assumed).toEqual([]);
    // P 3 2 is Hall's symbol of P 3 1 2, and P32 a Hermann–Mauguin symbol.
    expect(parseGroupWithNotes("P 3 2").assumed).toHaveLength(1);
    expect(parseGroupWithNotes("P 3 2 (0 0 6)").assumed).toEqual([]);
  });

  test("with left-handed axes are told, with right-handed ones not", () => {
    const told = (text: string) => parseGroupWithNotes(text).assumed.filter(({ what }) => what.includes("handedness"));
    expect(told("P m m m (a,b,a+c)")).toEqual([]);
    expect(told("P m m m (b,c,a)")).toEqual([]);
    expect(told("P m m m (b,a,c)")).toHaveLength(1);
    expect(told("P m m m (a,b,-c)")).toHaveLength(1);
  });
});

describe("symbols", () => {
  test("may carry their bars as overlines", () => {
    expect(parseGroup("P 1\u0305").pointGroup).toBe("-1");
    expect(parseGroup("P 4\u0304").pointGroup).toBe("-4");
  });

  test("of monoclinic settings are printed in full", () => {
    expect(parseGroup("14").name.hermannMauguin).toBe("P 1 2_1/c 1");
    expect(parseGroup("3").name.hermannMauguin).toBe("P 1 2 1");
    expect(parseGroup("15").name.hermannMauguin).toBe("C 1 2/c 1");
    expect(parseGroup("16").name.hermannMauguin).toBe("P 2 2 2");
  });

  test("that stand for several settings say which is taken", () => {
    const taken = (text: string) =>
      parseGroupWithNotes(text)
        .assumed.map(({ because }) => because)
        .join();
    expect(taken("P 21/c")).toContain("unique axis b");
    expect(taken("F d -3 m")).toContain("origin choice 2");
    expect(taken("R -3 m")).toContain("hexagonal axes");
    // The two settings of number 67 with this symbol differ by a shift along an axis, not by a choice of origin.
    expect(taken("C m m e")).toContain("the standard setting");
    expect(taken("P n m a")).toBe("");
  });

  test("of all tabulated settings with lattices A and B stand for groups that are found in their own setting", () => {
    for (const setting of tabulatedSettings().filter(({ hall }) => /^-?[AB]/.test(hall)))
      expect(waysToSettings(groupFromSetting(setting), [setting]).next().value?.setting).toBe(setting);
  });

  test("of Hall give a twofold axis behind order 1 no default", () => {
    // International Tables B, section 1.4, appendix: defaults are for a second order 2 behind 2, 4, 3 or 6.
    const { code, where } = refusal(() => parseGroup("hall:P 1 2"));
    // Behind the 2, where the axis is missing.
    expect([code, where.column]).toEqual(["syntax", 11]);
  });

  test("of Hall that make no group are refused at the operator, with and without a centre before it", () => {
    expect(refusal(() => parseGroup("hall:-P 2c 2 3*")).where.column).toBe(9);
    expect(refusal(() => parseGroup("hall:P 2c 2n 3*")).where.column).toBe(8);
  });
});

describe("operators", () => {
  test("times the identity or their inverse are themselves or the identity", () => {
    for (const operator of groupOf("P 41").operators) {
      expect(composeOperators(identityOperator, operator)).toEqual(operator);
      expect(composeOperators(operator, identityOperator)).toEqual(operator);
      expect(composeOperators(operator, invertOperator(operator))).toEqual(identityOperator);
    }
  });

  test("of no crystal have no type", () => {
    // Determinant 1 and trace 4: no rotation of finite order, whose trace is at most 3.
    expect(rotationType([2, 1, 0, 1, 1, 0, 0, 0, 1])).toBeNull();
    expect(rotationType([1, 0, 0, 0, 1, 0, 0, 0, 2])).toBeNull();
  });

  test("in axes too oblique for exact integers are refused, whichever way they lean", () => {
    for (const lean of ["", "-"])
      expect(refusal(() => parseGroup(`P m 1 1 (a,b,${lean}100000a+c)`)).code).toBe("number-overflow");
  });

  test("of a site leave moments as a mirror and a twofold axis do", () => {
    const moment = (group: string, position: string) =>
      siteOrbit(groupOf(group), site("M", position), null).allowedMoment.join(" ");
    // An axial vector keeps its component along the normal of a mirror, or along the axis.
    expect(moment("P n m a", "0.1 1/4 0.3")).toBe("0 my 0");
    expect(moment("P 1 2 1", "0 0.1 0")).toBe("0 my 0");
    expect(moment("P 1 1 2", "0 0 0.1")).toBe("0 0 mz");
    expect(moment("P 1", "0.1 0.2 0.3")).toBe("mx my mz");
    expect(moment("P m m m", "0 0 0")).toBe("0 0 0");
  });
});

describe("cells", () => {
  test("without volume have no reciprocal axes", () => {
    // Three angles of 120 degrees lie in one plane.
    const flat = { a: 4, b: 5, c: 6, alpha: 120, beta: 120, gamma: 120 };
    expect(refusal(() => reciprocalMetric(flat)).code).toBe("invalid-cell");
  });

  test("with one impossible angle are refused for it", () => {
    expect(refusal(() => parseCell("4 5 6 190 20 90")).message).toContain("alpha = 190");
  });

  test("that contradict their group are told the conditions, in oblique axes with sums", () => {
    const wanted = (cell: string, group: string) =>
      refusal(() => checkCellAgainstGroup(parseCell(cell), parseGroup(group))).expected;
    // a' = a + b, b' = a − b, c' = a + c of an orthogonal lattice with a² = 16, b² = 25, c² = 49.
    const products: Readonly<Record<string, number>> = {
      "a²": 41,
      "b²": 41,
      "c²": 65,
      "bc·cos(alpha)": 16,
      "ac·cos(beta)": 16,
      "ab·cos(gamma)": -9,
    };
    const sums = (wanted("4 5 6 90 91 92", "P m m m (a+b,a-b,a+c)") ?? "")
      .split(", ")
      .filter((one) => one.includes("·cos"));
    expect(sums.length).toBe(1);
    for (const sum of sums) {
      const [left = "", right = ""] = sum.split(" = ");
      const terms = right.split(" + ").map((term) => {
        const [, top, bottom, name = ""] = /^(-?\d+)\/(\d+)·(.*)$/.exec(term) ?? [];
        return (Number(top) / Number(bottom)) * (products[name] ?? Number.NaN);
      });
      expect(terms.length).toBe(2);
      expect((terms[0] ?? 0) + (terms[1] ?? 0)).toBe(products[left]);
    }
    expect(wanted("5 4 4 90 90 90", "P 6 (c,a,b)")).toBe("alpha = 120");
    expect(wanted("4 4 5 90 90 90", "P 6")).toBe("gamma = 120");
  });
});
