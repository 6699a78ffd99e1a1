import { type PeakListOptions, parsePeakList } from "@kvane/core/files";
import { describe, expect, it } from "vitest";
import { places, problemsOf } from "../support/problems-of.js";

function problems(text: string, options: Partial<PeakListOptions> = {}) {
  return problemsOf(() => parsePeakList(text, { file: "peaks", ...options }));
}

describe("what is wrong in a peak list", () => {
  it.each<[string, string, Partial<PeakListOptions>, string[]]>([
    ["an empty file", "", {}, ["file-empty 1:1"]],
    ["blank lines", "\n \n", { kind: "d" }, ["file-empty 1:1"]],
    ["comments alone", "# 1\n! 2\n", { kind: "d" }, ["file-empty 1:1"]],
    ["a header alone", "# peaks\nd, su\n", {}, ["file-empty 2:1"]],
    ["a zero byte", "1.5\n2.\u00005\n", { kind: "d" }, ["file-unreadable 2:3"]],
    ["no kind", "1.5\n", {}, ["peak-kind-unknown 1:1"]],
    ["a header without a kind", "position su\n1.5 0.1\n", {}, ["peak-kind-unknown 1:1"]],
    ["a header against the option", "su d\n0.1 1.5\n", { kind: "q" }, ["conflicting-arguments 1:4"]],
    ["h k l against the option", "h k l\n0 1 1\n", { kind: "d" }, ["conflicting-arguments 1:1"]],
    ["a position for hkl", "position\n1\n", { kind: "hkl" }, ["conflicting-arguments 1:1"]],
    ["two kinds", "d 2theta\n3 30\n", {}, ["invalid-peak 1:3"]],
    ["a second header", "d\n3\n2theta\n30\n", {}, ["invalid-peak 3:1"]],
    ["an unknown column", "d, fwhm\n3, 0.1\n", {}, ["invalid-peak 1:4"]],
    ["a column twice", "d, I, intensity\n3, 1, 1\n", {}, ["invalid-peak 1:7"]],
    ["h k without l", "h k I\n0 1 5\n", {}, ["invalid-peak 1:1"]],
    ["a unit of another kind", "d (deg)\n3\n", {}, ["invalid-peak 1:1"]],
    ["no wavelength", "2theta\n30\n", {}, ["missing-wavelength 1:1"]],
    ["a word", "d su\n3.1 0.1\n2.9 abc\n", {}, ["invalid-peak 3:5"]],
    ["a word for a position", "d\nabc\n", {}, ["invalid-peak 2:1"]],
    ["a slip in the first row", "12.5x 0.1\n11.5 0.1\n", { kind: "d" }, ["invalid-peak 1:1"]],
    ["NaN and infinity", "d\nNaN\n-inf\n1e999\n", {}, ["invalid-peak 2:1", "invalid-peak 3:1", "invalid-peak 4:1"]],
    ["a missing position", "d,su\n,0.1\n", {}, ["invalid-peak 2:1"]],
    ["a missing index", "0 1/2\n", { kind: "hkl" }, ["invalid-peak 1:6"]],
    ["a fraction with a zero", "0 1/0 2\n", { kind: "hkl" }, ["invalid-peak 1:3"]],
    ["a fraction for d", "5/2\n2\n", { kind: "d" }, ["invalid-peak 1:1"]],
    ["too many values", "1 0.1 5 2 7 8\n", { kind: "d" }, ["invalid-peak 1:11"]],
    ["more values than names", "d su\n1 0.1 5\n", {}, ["invalid-peak 2:7"]],
    ["unnamed columns beside h k l", "0 1 1 300\n", { kind: "hkl" }, ["invalid-peak 1:7"]],
    ["decimal commas between semicolons", "d;su\n3,1;0,02\n", {}, ["invalid-peak 2:1"]],
    ["decimal commas between blanks", "d\n 3,1  0,02\n", {}, ["invalid-peak 2:2"]],
    ["decimal commas alone", "3,14\n2,72\n", { kind: "d" }, ["invalid-peak 1:1", "invalid-peak 2:1"]],
    ["an empty cell between tabs", "3.1\t\t500\n", { kind: "d" }, ["invalid-peak 1:5"]],
    ["an intensity for an uncertainty", "30.5 1200\n", { kind: "d" }, ["invalid-peak 1:6"]],
    ["an uncertainty of 0", "3.5 0\n", { kind: "d" }, ["invalid-peak 1:5"]],
    ["a negative uncertainty", "d, I, error\n3.5, 7, -2\n", {}, ["invalid-peak 2:9"]],
    ["an uncertainty twice", "d su\n3.5(2) 0.1\n", {}, ["invalid-peak 2:8"]],
    ["2θ of 180°", "180\n", { kind: "two-theta", wavelengthAngstrom: 2 }, ["peak-out-of-range 1:1"]],
    ["2θ of 0", "0\n", { kind: "two-theta", wavelengthAngstrom: 2 }, ["peak-out-of-range 1:1"]],
    ["a negative d", " -3\n", { kind: "d" }, ["peak-out-of-range 1:2"]],
    ["the direct beam", "0 0 0\n", { kind: "hkl" }, ["peak-out-of-range 1:1"]],
    // 4π/λ = 2π Å⁻¹ = 6.2832 and λ/2 = 1 Å for λ = 2 Å.
    ["Q beyond the wavelength", "6.2831\n6.2833\n", { kind: "q", wavelengthAngstrom: 2 }, ["peak-out-of-range 2:1"]],
    ["d beyond the wavelength", "1.001\n0.999\n", { kind: "d", wavelengthAngstrom: 2 }, ["peak-out-of-range 2:1"]],
    ["a wavelength of 0", "d\n3\n", { wavelengthAngstrom: 0 }, ["invalid-number -:- --wavelength"]],
    [
      "a wavelength that is no number",
      "q\n3\n",
      { wavelengthAngstrom: Number.NaN },
      ["invalid-number -:- --wavelength"],
    ],
    ["a tolerance that is no number", "d\n3\n", { tolerance: Number.NaN }, ["invalid-number -:- --tolerance"]],
    ["an unknown unit", "3\n", { kind: "d", unit: "inch" }, ["invalid-argument 1:1"]],
  ])("%s", async (_what, text, options, expected) => {
    expect(places(await problems(text, options))).toEqual(expected);
  });

  it("tells all problems at once, each with file, expectation, finding and remedy", async () => {
    const found = await problems("2theta, su\nabc, 0.1\n190, 0.1\n30, -1\n31, 0.1\n");
    expect(places(found)).toEqual([
      "missing-wavelength 1:1",
      "invalid-peak 2:1",
      "peak-out-of-range 3:1",
      "invalid-peak 4:5",
    ]);
    for (const one of found) {
      expect(one.where.file).toBe("peaks");
      expect([one.message, one.expected, one.found, one.remedy].every((text) => text)).toBe(true);
    }
  });

  it("names decimal commas as what they are", async () => {
    for (const text of ["3,14\n", "d;su\n3,1;0,02\n", "3,14 0,02\n"]) {
      const [first] = await problems(text, { kind: "d" });
      expect(first?.message).toContain("decimal comma");
    }
  });

  it("does not take whole numbers with a decimal elsewhere for decimal commas", async () => {
    expect(await problems("30,1\n31.5,1\n", { kind: "d" })).toEqual([]);
    expect(await problems("30, 1\n31, 1\n", { kind: "d" })).toEqual([]);
    expect(await problems("0,1,0\n1,1,0\n", { kind: "hkl" })).toEqual([]);
  });

  it("lists twenty and counts the rest", async () => {
    const found = await problems(`d\n${"x\n".repeat(50)}`);
    expect(found).toHaveLength(21);
    expect(found.at(-1)?.message).toContain("30 more problems");
  });
});
