import fc from "fast-check";
import Fraction from "fraction.js";
import { describe, expect, it } from "vitest";
import {
  add,
  addCyclotomic,
  conjugateCyclotomic,
  cyclotomicFromRational,
  cyclotomicToComplex,
  determinant,
  divide,
  divideCyclotomic,
  equalCyclotomic,
  formatCyclotomic,
  formatRational,
  fractionalPart,
  hermiteNormalForm,
  invert,
  multiply,
  multiplyCyclotomic,
  multiplyMatrices,
  nullSpace,
  parseRational,
  type Rational,
  type RationalMatrix,
  rational,
  rationalField,
  reducedEchelon,
  reduceModulo,
  reduceOrder,
  rootOfUnity,
  rootTurns,
  roundNumber,
  squareRootOf,
  subtract,
  withUncertainty,
} from "#core/numbers/index.js";
import { evaluateText } from "../support/evaluate-text.js";

const seed = 20261201;
const fractions = fc
  .tuple(fc.integer({ min: -999, max: 999 }), fc.integer({ min: 1, max: 120 }))
  .map(([numerator, denominator]) => rational(numerator, denominator));
const asFraction = ([numerator, denominator]: Rational): Fraction => new Fraction(numerator, denominator);

describe("fractions against fraction.js", () => {
  it("adds, subtracts, multiplies and divides alike", () => {
    fc.assert(
      fc.property(fractions, fractions, (a, b) => {
        expect(formatRational(add(a, b))).toBe(asFraction(a).add(asFraction(b)).toFraction());
        expect(formatRational(subtract(a, b))).toBe(asFraction(a).sub(asFraction(b)).toFraction());
        expect(formatRational(multiply(a, b))).toBe(asFraction(a).mul(asFraction(b)).toFraction());
        if (b[0] !== 0) expect(formatRational(divide(a, b))).toBe(asFraction(a).div(asFraction(b)).toFraction());
      }),
      { seed },
    );
  });

  it("reads what is written and nothing else", () => {
    expect(parseRational("0.25")).toEqual([1, 4]);
    expect(parseRational("-.5")).toEqual([-1, 2]);
    expect(parseRational("0.3333")).toEqual([3333, 10000]);
    expect(parseRational("-2/6")).toEqual([-1, 3]);
    for (const text of ["", ".", "1/0", "1e3", "NaN", "1,5", "0x1", "1/2/3"])
      expect(parseRational(text), text).toBeNull();
  });

  it("throws instead of rounding when a number grows too large", () => {
    const large: Rational = [Number.MAX_SAFE_INTEGER, 1];
    expect(() => add(large, large)).toThrowError(expect.objectContaining({ code: "number-overflow" }));
    expect(() => multiply(large, [3, 2])).toThrowError(expect.objectContaining({ code: "number-overflow" }));
    expect(() => rational(3, 2 ** 53)).toThrowError(expect.objectContaining({ code: "number-overflow" }));
  });

  it("has no negative zero", () => {
    expect(Object.is(fractionalPart([-2, 1])[0], 0)).toBe(true);
    expect(Object.is(multiply([0, 1], [-1, 2])[0], 0)).toBe(true);
  });
});

describe("matrices and echelon forms", () => {
  const matrices = fc.array(fc.integer({ min: -4, max: 4 }), { minLength: 9, maxLength: 9 }).map(
    (e) =>
      [
        [rational(e[0] as number), rational(e[1] as number), rational(e[2] as number)],
        [rational(e[3] as number), rational(e[4] as number), rational(e[5] as number)],
        [rational(e[6] as number), rational(e[7] as number), rational(e[8] as number)],
      ] as RationalMatrix,
  );

  it("inverts every regular matrix exactly", () => {
    fc.assert(
      fc.property(matrices, (m) => {
        if (determinant(m)[0] === 0) expect(() => invert(m)).toThrow();
        else expect(multiplyMatrices(m, invert(m)).flat().map(formatRational).join()).toBe("1,0,0,0,1,0,0,0,1");
      }),
      { seed },
    );
  });

  it("gives null vectors that the rows annihilate, as many as the rank leaves", () => {
    fc.assert(
      fc.property(matrices, (m) => {
        const basis = nullSpace(m, 3, rationalField, [0, 1], [1, 1]);
        expect(basis.length).toBe(3 - reducedEchelon(m, rationalField).pivots.length);
        for (const vector of basis)
          for (const row of m)
            expect(
              row.reduce<Rational>((sum, entry, index) => add(sum, multiply(entry, vector[index] as Rational)), [0, 1]),
            ).toEqual([0, 1]);
      }),
      { seed },
    );
  });

  it("has one Hermite form per lattice: unimodular mixing of the rows changes nothing", () => {
    const rows = fc.array(fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 3, maxLength: 3 }), {
      minLength: 3,
      maxLength: 3,
    });
    fc.assert(
      fc.property(rows, fc.integer({ min: -3, max: 3 }), fc.integer({ min: -3, max: 3 }), (m, f, g) => {
        const [a, b, c] = m as [number[], number[], number[]];
        const mixed = [
          b,
          a.map((entry, index) => -entry + f * (c[index] as number)),
          c.map((entry, index) => entry + g * (b[index] as number)),
        ];
        const form = hermiteNormalForm(m, 3);
        expect(hermiteNormalForm(mixed, 3)).toEqual(form);
        for (const row of m) expect(reduceModulo(row, form)).toEqual([0, 0, 0]);
      }),
      { seed },
    );
  });
});

describe("cyclotomic numbers against floating-point complex numbers", () => {
  const orders = [1, 2, 3, 4, 5, 6, 8, 9, 12, 16, 24];
  const numbersOf = (...allowed: readonly number[]) =>
    fc
      .array(fc.tuple(fc.integer({ min: -3, max: 3 }), fc.constantFrom(...allowed), fc.integer({ min: 0, max: 23 })), {
        minLength: 1,
        maxLength: 3,
      })
      .map((terms) =>
        terms
          .map(([size, order, exponent]) =>
            multiplyCyclotomic(cyclotomicFromRational([size, 2]), rootOfUnity(rational(exponent, order))),
          )
          .reduce(addCyclotomic),
      );
  const numbers = numbersOf(...orders);
  // The norm of a number of a large field may leave the safe range, which is an error by design; point groups need 24.
  const divisors = numbersOf(1, 2, 3, 4, 6, 8, 12, 24);
  const close = (a: readonly number[], b: readonly number[]): void => {
    expect(a[0]).toBeCloseTo(b[0] as number, 10);
    expect(a[1]).toBeCloseTo(b[1] as number, 10);
  };

  it("adds, multiplies and conjugates as complex numbers do", () => {
    fc.assert(
      fc.property(numbers, numbers, (a, b) => {
        const [p, q] = cyclotomicToComplex(a);
        const [r, s] = cyclotomicToComplex(b);
        close(cyclotomicToComplex(addCyclotomic(a, b)), [p + r, q + s]);
        close(cyclotomicToComplex(multiplyCyclotomic(a, b)), [p * r - q * s, p * s + q * r]);
        close(cyclotomicToComplex(conjugateCyclotomic(a)), [p, -q]);
      }),
      { seed },
    );
  });

  it("divides exactly", () => {
    fc.assert(
      fc.property(divisors, divisors, (a, b) => {
        if (Math.hypot(...cyclotomicToComplex(b)) < 1e-9) return;
        expect(equalCyclotomic(multiplyCyclotomic(divideCyclotomic(a, b), b), a)).toBe(true);
      }),
      { seed },
    );
  });

  it("keeps the value when the field is made as small as possible, and the smallest is unique", () => {
    fc.assert(
      fc.property(numbers, fc.constantFrom(2, 3, 4, 5), (a, factor) => {
        const small = reduceOrder(a);
        expect(equalCyclotomic(small, a)).toBe(true);
        const lifted = multiplyCyclotomic(a, multiplyCyclotomic(rootOfUnity([1, factor]), rootOfUnity([-1, factor])));
        expect(reduceOrder(lifted)).toEqual(small);
      }),
      { seed },
    );
  });

  it("has the square roots of 2, 3, 5, 6, 12 and 45", () => {
    for (const n of [1, 2, 3, 4, 5, 6, 7, 12, 45]) close(cyclotomicToComplex(squareRootOf(n)), [Math.sqrt(n), 0]);
  });

  it("knows roots of unity from other numbers", () => {
    expect(rootTurns(rootOfUnity([5, 24]))).toEqual([5, 24]);
    expect(rootTurns(rootOfUnity([2, 3]))).toEqual([-1, 3]);
    expect(rootTurns(addCyclotomic(rootOfUnity([1, 8]), rootOfUnity([0, 1])))).toBeNull();
  });

  it("prints texts that evaluate to the number (independent evaluator)", () => {
    fc.assert(
      fc.property(numbers, (a) => {
        close(evaluateText(formatCyclotomic(a)), cyclotomicToComplex(a));
      }),
      { seed },
    );
  });

  it("writes the usual numbers as people do", () => {
    const i = rootOfUnity([1, 4]);
    expect(formatCyclotomic(cyclotomicFromRational([-1, 2]))).toBe("-1/2");
    expect(formatCyclotomic(i)).toBe("i");
    expect(
      formatCyclotomic(multiplyCyclotomic(cyclotomicFromRational([1, 2]), addCyclotomic(rootOfUnity([0, 1]), i))),
    ).toBe("(1+i)/2");
    expect(formatCyclotomic(rootOfUnity([1, 6]))).toBe("e^{iπ/3}");
    expect(formatCyclotomic(rootOfUnity([1, 3]))).toBe("e^{2πi/3}");
    expect(formatCyclotomic(squareRootOf(3))).toBe("√3");
  });
});

describe("numbers that leave", () => {
  it("are rounded to 12 digits, lose noise against their scale, and are never −0", () => {
    expect(roundNumber(1 / 3)).toBe(0.333333333333);
    expect(roundNumber(1e-13)).toBe(0);
    expect(Object.is(roundNumber(-1e-14), 0)).toBe(true);
    expect(roundNumber(5e-11, 100)).toBe(0);
  });

  it("carry their uncertainty in the short form (rule of 19)", () => {
    expect(withUncertainty(0.47203, 0.0004)).toBe("0.4720(4)");
    expect(withUncertainty(0.47203, 0.00014)).toBe("0.47203(14)");
    expect(withUncertainty(12.3, 2)).toBe("12(2)");
    expect(withUncertainty(0.1, null, 3)).toBe("0.100");
  });
});
