import { readFileSync } from "node:fs";
import { parsePeakList, parseStudy } from "@kvane/core/files";
import { describe, expect, it } from "vitest";
import { root } from "../tools/paths.mjs";

const source = (name: string) => readFileSync(`${root}/packages/cli/example/${name}`, "utf8");

async function example() {
  const study = await parseStudy(source("study.yaml"), "study.yaml");
  const { cell, peaks } = study;
  if (!cell || !peaks?.kind || !peaks.wavelengthAngstrom) throw new Error("the example lacks its peaks");
  const { kind, wavelengthAngstrom } = peaks;
  return {
    study,
    cell,
    wavelengthAngstrom,
    list: parsePeakList(source(peaks.file), { file: peaks.file, kind, wavelengthAngstrom }),
  };
}

/** 2θ of every (h + k₁, k + k₂, l + k₃) of an orthorhombic cell, from 1/d² and λ = 2 d sin θ. */
function positions(lengths: readonly number[], k: readonly number[], wavelength: number): number[] {
  const range = Array.from({ length: 17 }, (_, index) => index - 8);
  const squares = (axis: number) => range.map((n) => ((n + (k[axis] ?? 0)) / (lengths[axis] ?? 1)) ** 2);
  const [x, y, z] = [squares(0), squares(1), squares(2)];
  return x.flatMap((h) =>
    y.flatMap((one) => z.map((l) => (360 / Math.PI) * Math.asin((wavelength / 2) * Math.sqrt(h + one + l)))),
  );
}

describe("the bundled example", () => {
  it("says that it is invented, in both files and in its title", async () => {
    const { study } = await example();
    expect(study.title).toContain("invented");
    expect(source("study.yaml")).toContain("invented");
    expect(source("satellites.csv")).toContain("Invented");
    expect(study.warnings).toEqual([]);
  });

  it("has two magnetic sites and peaks to search by", async () => {
    const { study, list } = await example();
    expect(study.sites).toHaveLength(2);
    expect(study.k).toBeNull();
    expect(list.peaks).toHaveLength(13);
    expect(list.uncertaintySource).toBe("given in the file");
  });

  it("holds what its comments say: twelve satellites and one line of something else", async () => {
    const { cell, list, wavelengthAngstrom } = await example();
    const lengths = [cell.a, cell.b, cell.c];
    const strays = (k: readonly number[]) => {
      const lines = positions(lengths, k, wavelengthAngstrom);
      // All uncertainties of the file are 0.05° or less; three of them are 0.15°.
      return list.peaks.filter(
        ({ position }) =>
          Math.min(...lines.filter(Number.isFinite).map((line) => Math.abs(line - (position ?? 0)))) > 0.15,
      );
    };
    expect(strays([0.5, 0, 0]).map(({ position }) => position)).toEqual([38.29]);
    expect(strays([0, 0, 0.5]).map(({ position }) => position)).toEqual([38.29]);
    expect(strays([0, 0.5, 0]).length).toBeGreaterThan(6);
    expect(strays([0, 0, 0]).map(({ position }) => position)).toContain(38.29);
  });
});
