import { describe, expect, test } from "vitest";
import { readCifNumber, readCifRational } from "#core/files/cif/numbers.js";

describe("numbers of CIF", () => {
  // International Tables G, 2.2.7.3.2: digits in brackets are the s.u. in units of the last digit.
  test.each([
    ["1.234(12)", 1.234, 0.012],
    ["12(3)", 12, 3],
    ["1.2e2(3)", 120, 30],
    ["-.5", -0.5, null],
    ["+5.", 5, null],
    ["0.25E-1", 0.025, null],
    ["1e3", 1000, null],
    ["5.4310(2)", 5.431, 0.0002],
    ["90.", 90, null],
    ["-0", 0, null],
  ])("%s", (text, value, uncertainty) => {
    expect(readCifNumber(text)?.value).toBeCloseTo(value, 12);
    if (uncertainty === null) expect(readCifNumber(text)?.uncertainty).toBeNull();
    else expect(readCifNumber(text)?.uncertainty).toBeCloseTo(uncertainty, 12);
  });

  test.each(["1.2(3)e2", "(3)", "1,5", "0x1F", "1d3", "3/4", "..", "-", "1.()", "", "1e", "e3", ".", "NaN", "1e999"])(
    "`%s` is none",
    (text) => expect(readCifNumber(text)).toBeNull(),
  );

  test("coordinates are exact as written", () => {
    expect(readCifRational("0.3333(2)")).toEqual([3333, 10000]);
    expect(readCifRational("-.25")).toEqual([-1, 4]);
    expect(readCifRational("1.5e-1")).toEqual([3, 20]);
    expect(readCifRational("0.333333333333333333")).toEqual([3333333, 10000000]);
    expect(readCifRational("1e9")).toBeNull();
    expect(readCifRational("1/3")).toBeNull();
  });
});
