import fc from "fast-check";
import { evaluate } from "mathjs";
import { describe, expect, it } from "vitest";
import {
  coordinateNames,
  evaluateForm,
  formatForm,
  parameterNames,
  parseForm,
  parseThreeForms,
  type RationalVector,
  rational,
  toNumber,
} from "#core/numbers/index.js";

const seed = 20261202;

describe("the grammar of linear forms", () => {
  const term = fc
    .tuple(
      fc.constantFrom("+", "-", " + ", "- "),
      fc.constantFrom("", "2", "1/2", "0.5", "3*", "2/3*"),
      fc.constantFrom("x", "y", "z", "X"),
      fc.constantFrom("", "/2", " / 3"),
    )
    .map((parts) => parts.join(""));
  const constant = fc
    .tuple(fc.constantFrom("+", "-"), fc.constantFrom("1", "1/4", "0.125", "7/3"))
    .map((parts) => parts.join(""));

  it("agrees with mathjs's expression parser", () => {
    const values: RationalVector = [rational(3, 7), rational(-2, 5), rational(11, 13)];
    const scope = Object.fromEntries(
      ["x", "y", "z"].map((name, index) => [name, toNumber(values[index as 0 | 1 | 2])]),
    );
    fc.assert(
      fc.property(fc.array(fc.oneof(term, constant), { minLength: 1, maxLength: 5 }), (terms) => {
        const text = terms.join("");
        const form = parseForm(text, coordinateNames);
        expect(toNumber(evaluateForm(form, values))).toBeCloseTo(evaluate(text.toLowerCase(), scope) as number, 9);
      }),
      { seed },
    );
  });

  it("reads back what it prints", () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(term, constant), { minLength: 1, maxLength: 5 }), (terms) => {
        const form = parseForm(terms.join(""), coordinateNames);
        expect(parseForm(formatForm(form, coordinateNames), coordinateNames)).toEqual(form);
      }),
      { seed },
    );
  });

  it("prints as the trade writes", () => {
    expect(formatForm(parseForm("1/2 - X", coordinateNames), coordinateNames)).toBe("-x+1/2");
    expect(formatForm(parseForm("0", coordinateNames), coordinateNames)).toBe("0");
    expect(formatForm(parseForm("2*u/3", parameterNames), parameterNames)).toBe("2u/3");
  });

  it("refuses the rest with the column and what was expected", () => {
    const cases: readonly [string, number][] = [
      ["", 1],
      ["x+", 3],
      ["x y", 3],
      ["1/0", 3],
      ["q", 1],
      ["x,y", 2],
      ["2..5", 3],
      ["x^2", 2],
    ];
    for (const [text, column] of cases)
      expect(() => parseForm(text, coordinateNames), text).toThrowError(
        expect.objectContaining({
          code: "syntax",
          problems: [
            expect.objectContaining({ where: expect.objectContaining({ column }), expected: expect.any(String) }),
          ],
        }),
      );
    expect(() => parseThreeForms("x,y", coordinateNames)).toThrowError(expect.objectContaining({ code: "syntax" }));
    expect(() => parseThreeForms("x, y+, z", coordinateNames)).toThrowError(
      expect.objectContaining({
        problems: [expect.objectContaining({ where: expect.objectContaining({ column: 6 }) })],
      }),
    );
  });
});
