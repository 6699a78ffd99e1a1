import { parseIntensityList } from "@kvane/core/files";
import { describe, expect, test } from "vitest";
import { problemsOf } from "../support/problems-of.js";

describe("lists of integrated intensities", () => {
  test("a powder by 2theta, an intensity of 0 for a line that was not seen", () => {
    const list = parseIntensityList("2theta su intensity intensity-su\n11.86 0.02 1072 20\n22.82 0.03 0 15\n", {
      file: "a.csv",
      wavelengthAngstrom: 1.057,
    });
    expect(list.kind).toBe("two-theta");
    expect(
      list.intensities.map(({ label, observed, uncertainty, line }) => [label, observed, uncertainty, line]),
    ).toEqual([
      ["peak 1", 1072, 20, 2],
      ["peak 2", 0, 15, 3],
    ]);
    // Q = 4π sin θ/λ.
    expect(list.intensities[0]?.q).toBeCloseTo(((4 * Math.PI) / 1.057) * Math.sin((5.93 * Math.PI) / 180), 10);
    expect(list.uncertaintySource).toBe("given in the file");
  });

  test("a crystal by h k l with brackets", () => {
    const list = parseIntensityList("h k l I\n1/2 0 1 12.5(4)\n0 1/2 3 7.0(3)\n", { file: "b.csv" });
    expect(list.intensities[0]).toEqual({
      label: "(0.5 0 1)",
      q: null,
      hkl: [0.5, 0, 1],
      observed: 12.5,
      uncertainty: 0.4,
      polarization: null,
      line: 2,
    });
  });

  test("uncertainties by default are told", () => {
    const list = parseIntensityList("q intensity\n1.2 100\n1.9 0\n", { file: "c.csv" });
    expect(list.intensities[0]?.uncertainty).toBeCloseTo(Math.hypot(10, 1), 12);
    expect(list.intensities[1]?.uncertainty).toBeCloseTo(1, 12);
    expect(list.uncertaintySource).toContain("by default");
  });

  test("every row without an intensity is a problem with its line", async () => {
    const problems = await problemsOf(() =>
      parseIntensityList("d su intensity\n4.1 0.01 5\n3.2 0.01\n2.9 0.01\n", { file: "d.csv" }),
    );
    expect(problems.map(({ code, where }) => [code, where.line])).toEqual([
      ["invalid-peak", 3],
      ["invalid-peak", 4],
    ]);
  });

  test("the polarization of the beam is a column of its own, for crystals, between -1 and 1", async () => {
    const list = parseIntensityList("h k l intensity intensity-su polarization\n0 0 1/5 9 1 -0.9\n0 0 1/5 4 1\n", {
      file: "e.csv",
    });
    expect(list.intensities.map(({ polarization }) => polarization)).toEqual([-0.9, null]);
    const powder = await problemsOf(() =>
      parseIntensityList("q intensity polarization\n1.2 9 0.5\n", { file: "f.csv" }),
    );
    expect(powder.map(({ code, where }) => [code, where.line, where.column])).toEqual([["invalid-peak", 2, 7]]);
    const beyond = await problemsOf(() =>
      parseIntensityList("h k l intensity polarization\n1 0 0 9 1.5\n", { file: "g.csv" }),
    );
    expect(beyond.map(({ code, where }) => [code, where.line, where.column])).toEqual([["invalid-peak", 2, 9]]);
  });
});
