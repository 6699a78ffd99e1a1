import { describe, expect, it } from "vitest";
import {
  addCyclotomic,
  type Cyclotomic,
  centredTurns,
  compare,
  conjugatePhased,
  coordinateNames,
  cyclotomicFromRational,
  cyclotomicToComplex,
  cyclotomicToRational,
  cyclotomicZero,
  divide,
  equalCyclotomic,
  equalForms,
  evaluateFormNumber,
  exponentialText,
  fixedNumber,
  floor,
  formatCyclotomic,
  formatForm,
  formatPhase,
  formatPhased,
  formatRational,
  formatTurns,
  invertCyclotomic,
  isConstantForm,
  multiplyCyclotomic,
  negateCyclotomic,
  parameterNames,
  parseForm,
  parseRational,
  parseThreeForms,
  phasedToComplex,
  phaseOf,
  phaseTurns,
  type Rational,
  rational,
  reduceOrder,
  reducePhase,
  rootOfUnity,
  rootTurns,
  roundNumber,
  squareRootOf,
  subtractCyclotomic,
  subtractForms,
  unitComplex,
  withUncertainty,
} from "#core/numbers/index.js";

const fraction = (numerator: number, denominator = 1): Cyclotomic =>
  cyclotomicFromRational(rational(numerator, denominator));
const root = (numerator: number, denominator: number): Cyclotomic => rootOfUnity(rational(numerator, denominator));
const product = (...factors: Cyclotomic[]): Cyclotomic => factors.reduce(multiplyCyclotomic);
const sum = (...terms: Cyclotomic[]): Cyclotomic => terms.reduce(addCyclotomic);

describe("fractions as they are written", () => {
  it("are read with signs, with an empty side of the point, and with blanks around", () => {
    const cases: readonly [string, Rational][] = [
      ["+3", [3, 1]],
      [" -7 ", [-7, 1]],
      ["5.", [5, 1]],
      [".5", [1, 2]],
      ["-0.125", [-1, 8]],
      ["+1.50", [3, 2]],
      ["12/8", [3, 2]],
      ["-0", [0, 1]],
    ];
    for (const [text, value] of cases) expect(parseRational(text), text).toEqual(value);
  });

  it("have a positive denominator, an order and a floor", () => {
    expect([rational(1, -2), rational(-3, -6), rational(0, -5)]).toEqual([
      [-1, 2],
      [1, 2],
      [0, 1],
    ]);
    expect(() => rational(1, 0)).toThrowError(expect.objectContaining({ code: "invalid-number" }));
    for (const numerator of [0, 1, 2])
      expect(() => divide([numerator, 1], [0, 1])).toThrowError(expect.objectContaining({ code: "invalid-number" }));
    expect(divide([1, 2], [-3, 4])).toEqual([-2, 3]);
    expect(compare([1, 3], [1, 2])).toBeLessThan(0);
    expect(compare([1, 2], [1, 3])).toBeGreaterThan(0);
    expect(compare([2, 3], [2, 3])).toBe(0);
    expect([floor([-1, 2]), floor([7, 3]), floor([-2, 1])]).toEqual([-1, 2, -2]);
    expect([formatRational([-4, 1]), formatRational([-4, 3])]).toEqual(["-4", "-4/3"]);
  });
});

describe("phases as they are written", () => {
  it("lie in (−1/2, 1/2] turns", () => {
    const cases: readonly [Rational, Rational, string][] = [
      [[0, 1], [0, 1], "1"],
      [[3, 1], [0, 1], "1"],
      [[1, 2], [1, 2], "-1"],
      [[-1, 2], [1, 2], "-1"],
      [[1, 4], [1, 4], "i"],
      [[3, 4], [-1, 4], "-i"],
      [[1, 6], [1, 6], "e^{iπ/3}"],
      [[5, 6], [-1, 6], "e^{-iπ/3}"],
      [[1, 3], [1, 3], "e^{2πi/3}"],
      [[5, 8], [-3, 8], "e^{-3πi/4}"],
      [[-13, 8], [3, 8], "e^{3πi/4}"],
    ];
    for (const [turns, centred, text] of cases) {
      expect(centredTurns(turns)).toEqual(centred);
      expect(formatTurns(turns)).toBe(text);
    }
  });

  it("with letters have brackets where there is more than one term", () => {
    expect(formatPhase(parseForm("u/2", parameterNames))).toBe("e^{2πi·u/2}");
    expect(formatPhase(parseForm("-u/2", parameterNames))).toBe("e^{-2πi·u/2}");
    expect(formatPhase(parseForm("u/2-v", parameterNames))).toBe("e^{2πi·(u/2-v)}");
    expect(formatPhase(parseForm("-u+3/17", parameterNames))).toBe("e^{2πi·(-u+3/17)}");
    expect(formatPhase(phaseOf([0, 1]))).toBe("1");
    expect(formatPhase(phaseOf([1, 97]))).toBe("e^{2πi·1/97}");
    expect(exponentialText("kx")).toBe("e^{2πi·kx}");
  });
});

describe("exact numbers as they are written", () => {
  const cases: readonly [string, Cyclotomic][] = [
    ["0", cyclotomicZero],
    ["-3/4", fraction(-3, 4)],
    ["-i", root(3, 4)],
    ["3i", product(fraction(3), root(1, 4))],
    ["-5i/2", product(fraction(-5, 2), root(1, 4))],
    ["1+2i", sum(fraction(1), product(fraction(2), root(1, 4)))],
    ["(1-2i)/3", product(fraction(1, 3), sum(fraction(1), product(fraction(-2), root(1, 4))))],
    ["e^{iπ/4}", root(1, 8)],
    ["e^{-3πi/4}", root(5, 8)],
    ["2·e^{iπ/3}", product(fraction(2), root(1, 6))],
    ["e^{iπ/3}/2", product(fraction(1, 2), root(1, 6))],
    ["-√3", negateCyclotomic(squareRootOf(3))],
    ["√3/2", product(fraction(1, 2), squareRootOf(3))],
    ["2√2", product(fraction(2), squareRootOf(2))],
    ["2√2/3", product(fraction(2, 3), squareRootOf(2))],
    ["√2·i", product(squareRootOf(2), root(1, 4))],
    ["-√2·i/2", product(fraction(-1, 2), squareRootOf(2), root(1, 4))],
    ["√3·e^{iπ/6}/2", product(fraction(1, 2), squareRootOf(3), root(1, 12))],
    ["√5", squareRootOf(5)],
    ["√15·e^{iπ/30}/7", product(fraction(1, 7), squareRootOf(15), root(1, 60))],
    ["6√10·i/35", product(fraction(6, 35), squareRootOf(10), root(1, 4))],
    ["49√6·e^{2πi/5}", product(fraction(49), squareRootOf(6), root(1, 5))],
    // |1000 + ζ₃|² = 1000² − 1000 + 1 = 999001, whose root lies in no field that would be made in a reasonable time.
    ["1000+e^{2πi/3}", sum(fraction(1000), root(1, 3))],
    // |·|² = 3 · 333667/10007², and 333667 is no square (577² = 332929, 578² = 334084): nothing comes in front of the sum.
    ["(1001+e^{2πi/3})/10007", product(fraction(1, 10007), sum(fraction(1001), root(1, 3)))],
    // |·|² = 9/2^52: the root of 9 · 2^52 would be asked for, an integer beyond 2^53, and the sum is written instead.
    ["(3·e^{iπ/4})/67108864", product(fraction(3, 2 ** 26), root(1, 8))],
    // ζ₈ − ζ₈³ = √2, written in powers of ζ₈ because 1 + √2 has no root as its modulus.
    ["1+e^{iπ/4}-e^{3πi/4}", sum(fraction(1), squareRootOf(2))],
    ["(1+e^{iπ/4}-e^{3πi/4})/2", product(fraction(1, 2), sum(fraction(1), squareRootOf(2)))],
    ["-1+2·e^{iπ/4}-2·e^{3πi/4}", sum(fraction(-1), product(fraction(2), squareRootOf(2)))],
  ];

  it("are so in the way people write them", () => {
    for (const [text, value] of cases) expect(formatCyclotomic(value), text).toBe(text);
  });

  it("have a factor and a phase with letters beside each other", () => {
    const wave = parseForm("u", parameterNames);
    const factors: readonly [Cyclotomic, string][] = [
      [cyclotomicZero, "0"],
      [fraction(1), "e^{2πi·u}"],
      [fraction(-1), "-e^{2πi·u}"],
      [fraction(1, 2), "1/2·e^{2πi·u}"],
      [root(3, 4), "-i·e^{2πi·u}"],
      [root(5, 6), "e^{-iπ/3}·e^{2πi·u}"],
      [sum(fraction(1), root(1, 4)), "(1+i)·e^{2πi·u}"],
      [product(fraction(1, 2), sum(fraction(1), root(1, 4))), "(1+i)/2·e^{2πi·u}"],
    ];
    for (const [factor, text] of factors) expect(formatPhased({ phase: wave, factor }), text).toBe(text);
  });

  it("take constant phases of up to 48ths of a turn into the factor", () => {
    expect(formatPhased({ phase: phaseOf([5, 4]), factor: fraction(2) })).toBe("2i");
    expect(formatPhased({ phase: phaseOf([1, 48]), factor: fraction(1) })).toBe("e^{iπ/24}");
    expect(formatPhased({ phase: phaseOf([1, 49]), factor: fraction(1) })).toBe("e^{2πi·1/49}");
    expect(formatPhased({ phase: phaseOf([50, 49]), factor: fraction(-1) })).toBe("-e^{2πi·1/49}");
    expect(formatPhased({ phase: phaseOf([1, 49]), factor: fraction(3) })).toBe("3·e^{2πi·1/49}");
    expect(formatPhased({ phase: parseForm("u+1/2", parameterNames), factor: fraction(1) })).toBe("-e^{2πi·u}");
    expect(formatPhased({ phase: parseForm("u+3/97", parameterNames), factor: fraction(1) })).toBe("e^{2πi·(u+3/97)}");
  });
});

describe("numbers with phases", () => {
  const a = { phase: parseForm("u/2+1/4", parameterNames), factor: root(1, 8) };
  const b = { phase: parseForm("3/4-v", parameterNames), factor: fraction(2) };

  it("are conjugated", () => {
    expect(conjugatePhased(a).phase).toEqual(parseForm("-u/2-1/4", parameterNames));
    expect(equalCyclotomic(conjugatePhased(a).factor, root(-1, 8))).toBe(true);
    expect(reducePhase(parseForm("u-5/4", parameterNames))).toEqual(parseForm("u+3/4", parameterNames));
  });

  it("have values as soon as their letters do", () => {
    // e^{2πi·(1/4 + 1/4)} e^{2πi/8} = −(1+i)/√2.
    const [re, im] = phasedToComplex(a, [0.5, 0, 0]) ?? [];
    expect(re).toBeCloseTo(-Math.SQRT1_2, 12);
    expect(im).toBeCloseTo(-Math.SQRT1_2, 12);
    expect(phasedToComplex(a, null)).toBeNull();
    expect(phasedToComplex({ ...a, factor: cyclotomicZero }, null)).toEqual([0, 0]);
    expect(phasedToComplex({ phase: phaseOf([1, 4]), factor: fraction(3) }, null)).toEqual([0, 3]);
    expect(phasedToComplex({ phase: phaseOf([2, 1]), factor: fraction(3) }, null)).toEqual([3, 0]);
    expect(phaseTurns(a.phase, null)).toBeNull();
    expect(phaseTurns(b.phase, [9, 0.5])).toBeCloseTo(0.25, 12);
    expect(phaseTurns(b.phase, [9])).toBeNull();
    expect(phaseTurns(phaseOf([-1, 4]), null)).toBe(0.75);
  });
});

describe("roots of unity and fractions among exact numbers", () => {
  it("are recognized", () => {
    const roots: readonly [Cyclotomic, Rational | null][] = [
      [fraction(1), [0, 1]],
      [fraction(-1), [1, 2]],
      [negateCyclotomic(root(1, 3)), [-1, 6]],
      [root(4, 5), [-1, 5]],
      [fraction(1, 2), null],
      [squareRootOf(2), null],
      [product(fraction(1, 2), root(1, 3)), null],
      [cyclotomicZero, null],
    ];
    for (const [value, turns] of roots) expect(rootTurns(value), formatCyclotomic(value)).toEqual(turns);
    expect(cyclotomicToRational(sum(root(1, 3), root(2, 3)))).toEqual([-1, 1]);
    expect(cyclotomicToRational(root(1, 3))).toBeNull();
  });

  it("are equal in whatever field they are written", () => {
    expect(equalCyclotomic(root(2, 6), root(1, 3))).toBe(true);
    expect(equalCyclotomic(product(root(1, 8), root(1, 8)), root(1, 4))).toBe(true);
    expect(equalCyclotomic(root(1, 4), root(1, 3))).toBe(false);
    expect(equalCyclotomic(root(1, 4), product(fraction(1, 2), root(1, 4)))).toBe(false);
    expect(equalCyclotomic(root(1, 4), root(3, 4))).toBe(false);
    expect(equalCyclotomic(subtractCyclotomic(cyclotomicZero, root(1, 4)), root(3, 4))).toBe(true);
    // Compared as they stand: a common denominator would leave the safe range.
    expect(equalCyclotomic(fraction(2 ** 52, 3), fraction(2 ** 52, 5))).toBe(false);
    expect(subtractCyclotomic(root(1, 5), root(1, 5)).coefficients.every((entry) => entry === 0)).toBe(true);
  });

  it("are written in the smallest field that holds them", () => {
    const cases: readonly [Cyclotomic, Cyclotomic][] = [
      [product(root(1, 8), root(1, 8)), root(1, 4)],
      [product(root(1, 16), root(3, 16)), root(1, 4)],
      [product(root(1, 9), root(2, 9)), root(1, 3)],
      [product(root(1, 5), root(1, 3), root(2, 3)), root(1, 5)],
      [product(squareRootOf(2), squareRootOf(2)), fraction(2)],
      [product(squareRootOf(12), squareRootOf(3)), fraction(6)],
      [sum(root(1, 5), root(2, 5), root(3, 5), root(4, 5)), fraction(-1)],
      // −ζ₆ = ζ₃², an even order with an odd half holds no more than that half.
      [root(1, 6), sum(fraction(1), root(1, 3))],
      [root(1, 10), negateCyclotomic(root(3, 5))],
    ];
    for (const [value, small] of cases) expect(reduceOrder(value), formatCyclotomic(small)).toEqual(small);
  });

  it("near 2^53 are looked for in smaller fields without leaving the safe range", () => {
    // ζ₁₅² − ζ₁₅⁷ = ζ₁₅² (1 − ζ₃) is in neither smaller field: ζ₁₅ → ζ₁₅¹¹, which leaves ζ₅ alone, exchanges both terms,
    // and ζ₁₅ → ζ₁₅⁴, which leaves ζ₃ alone, multiplies the value by ζ₁₅⁶.
    const value: Cyclotomic = { order: 15, denominator: 1, coefficients: [0, 0, 1, 0, 0, 0, 0, -1] };
    expect(equalCyclotomic(value, product(root(2, 15), sum(fraction(1), negateCyclotomic(root(1, 3)))))).toBe(true);
    const large = { ...value, coefficients: value.coefficients.map((entry) => entry * 2 ** 52 + 0) };
    expect(reduceOrder(large)).toEqual(large);
  });

  it("stay in their own field when a 0 of another field is added or taken away", () => {
    const nothing = subtractCyclotomic(root(1, 5), root(1, 5));
    for (const value of [fraction(2, 3), root(1, 3), product(fraction(1, 2), root(1, 8))]) {
      expect(addCyclotomic(value, nothing)).toEqual(value);
      expect(addCyclotomic(nothing, value)).toEqual(value);
      expect(subtractCyclotomic(value, nothing)).toEqual(value);
    }
  });

  it("have floats that are exact at the quarters of a turn", () => {
    const quarters: readonly [number, number, number][] = [
      [0, 1, 0],
      [0.25, 0, 1],
      [0.5, -1, 0],
      [0.75, 0, -1],
      [-0.25, 0, -1],
      [7.25, 0, 1],
      [-3.5, -1, 0],
    ];
    for (const [turns, re, im] of quarters) expect(unitComplex(turns), String(turns)).toEqual([re, im]);
    expect(cyclotomicToComplex(root(3, 4))).toEqual([0, -1]);
    const [re, im] = unitComplex(0.7);
    expect(re).toBeCloseTo(Math.cos(1.4 * Math.PI), 15);
    expect(im).toBeCloseTo(Math.sin(1.4 * Math.PI), 15);
  });

  it("have inverses, 0 excepted", () => {
    expect(() => invertCyclotomic(cyclotomicZero)).toThrowError(expect.objectContaining({ code: "invalid-number" }));
    expect(invertCyclotomic(fraction(-2, 3))).toEqual(fraction(-3, 2));
    expect(invertCyclotomic(fraction(2 ** 40))).toEqual(fraction(1, 2 ** 40));
    // 1/(1 + √2) = √2 − 1, whose norm is not the square of its modulus.
    const inverse = invertCyclotomic(sum(fraction(1), squareRootOf(2)));
    expect(equalCyclotomic(inverse, sum(squareRootOf(2), fraction(-1)))).toBe(true);
    expect(cyclotomicToComplex(inverse)[0]).toBeCloseTo(Math.SQRT2 - 1, 12);
  });
});

describe("linear forms", () => {
  const form = (text: string) => parseForm(text, coordinateNames);

  it("are read with blanks, any minus sign, and divisors in front of or behind the letter", () => {
    for (const [text, same] of [
      ["\u2212x", "-x"],
      [" - x + 1 / 2 ", "-x+1/2"],
      ["1 / 2 x", "x/2"],
      ["1/2*x", "x/2"],
      ["3 * Y / 4", "3y/4"],
      [".5z", "z/2"],
      ["x+x", "2x"],
      ["x-x", "0"],
      ["+1/3", "1/3"],
      ["x-1/2+1/2", "x"],
      ["1.5x", "3x/2"],
    ] as const)
      expect(formatForm(form(text), coordinateNames), text).toBe(same);
  });

  it("of a triplet are placed by the column of their own text", () => {
    const columnOf = (text: string): unknown => {
      try {
        parseThreeForms(text, coordinateNames, 5);
      } catch (error) {
        return (error as { problems: { where: { column: number } }[] }).problems[0]?.where.column;
      }
      return null;
    };
    expect(columnOf("x,y,z")).toBeNull();
    expect(columnOf("q,y,z")).toBe(5);
    expect(columnOf("x,y,z+")).toBe(11);
    expect(columnOf("x,y/,z")).toBe(9);
    expect(columnOf("x,y")).toBe(5);
    expect(columnOf("x,y,z,x")).toBe(5);
    expect(columnOf("x,y,1/0")).toBe(11);
  });

  it("are compared, subtracted and evaluated", () => {
    expect(equalForms(form("x+1/2"), form("1/2+x"))).toBe(true);
    expect(equalForms(form("x+1/2"), form("x"))).toBe(false);
    expect(equalForms(form("x"), form("y"))).toBe(false);
    expect(formatForm(subtractForms(form("2x-y"), form("x+y+1/3")), coordinateNames)).toBe("x-2y-1/3");
    expect([isConstantForm(form("1/2")), isConstantForm(form("x")), isConstantForm(form("x+y"))]).toEqual([
      true,
      false,
      false,
    ]);
    expect(evaluateFormNumber(form("3x/2-y+1/4"), [2, 0.5])).toBeCloseTo(2.75, 12);
    expect(evaluateFormNumber(form("z"), [2, 0.5])).toBeNaN();
    expect(evaluateFormNumber(form("1/3"), [])).toBeCloseTo(1 / 3, 15);
  });
});

describe("floats as they leave", () => {
  it("have no negative zero in tables", () => {
    expect([fixedNumber(-0.0001, 2), fixedNumber(-0.4, 0), fixedNumber(-10, 0), fixedNumber(-1.25, 2)]).toEqual([
      "0.00",
      "0",
      "-10",
      "-1.25",
    ]);
    expect([roundNumber(Number.POSITIVE_INFINITY), roundNumber(Number.NaN)]).toEqual([
      Number.POSITIVE_INFINITY,
      Number.NaN,
    ]);
    expect(roundNumber(0.123456789, 1, 3)).toBe(0.123);
    expect(roundNumber(-5e-13, -1)).toBe(0);
  });

  it("have two digits of uncertainty up to 19, one from 20", () => {
    expect(withUncertainty(0.4721, 0.0194)).toBe("0.472(19)");
    expect(withUncertainty(0.4721, 0.0196)).toBe("0.47(2)");
    expect(withUncertainty(12.34, 1.5)).toBe("12.3(15)");
    expect(withUncertainty(123.4, 25)).toBe("123(25)");
    expect(withUncertainty(123.4, 10)).toBe("123(10)");
    expect(withUncertainty(-0.001, 0.05)).toBe("0.00(5)");
    expect(withUncertainty(0.1, null)).toBe("0.1000");
    for (const none of [0, -1, Number.NaN, Number.POSITIVE_INFINITY])
      expect(withUncertainty(1.5, none, 1), String(none)).toBe("1.5");
  });
});
