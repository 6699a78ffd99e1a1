import { readdirSync, readFileSync } from "node:fs";
import { parseStudy, type Study, studyKeys } from "@kvane/core/files";
import { parseWaveVector } from "@kvane/core/kvectors";
import { describe, expect, it } from "vitest";
import { root } from "../tools/paths.mjs";
import { readImports } from "../tools/read-imports.mjs";

function fixture(name: string): string {
  return readFileSync(new URL(`../fixtures/studies/${name}`, import.meta.url), "utf8");
}

/** The text that stands at the place of a value. */
function textAt(source: string, study: Study, path: string, length: number): string {
  const place = study.places[path];
  const line = source.split("\n")[(place?.line ?? 0) - 1] ?? "";
  return line.slice((place?.column ?? 0) - 1, (place?.column ?? 0) - 1 + length);
}

describe("a study file", () => {
  it("gives every key of the format", async () => {
    const study = await parseStudy(fixture("every-key.yaml"), "every-key.yaml");
    const { places: _places, warnings: _warnings, ...values } = study;
    expect(values).toEqual({
      file: "every-key.yaml",
      title: "Every key of the format (invented), 1.5 K",
      structure: null,
      structureBlock: null,
      group: "P n m a",
      cell: { a: 8.37, b: 11.62, c: 5.91, alpha: 90, beta: 90, gamma: 90 },
      sites: [
        {
          label: "Fe1",
          ion: "Fe3+",
          position: [
            [0, 1],
            [0, 1],
            [0, 1],
          ],
          spin: [5, 2],
          g: 2.05,
          formFactor: {
            j0: [0.3972, 13.2442, 0.6295, 4.9034, -0.0314, 0.3496, 0.0044],
            j2: [1.6, 14, 1.9, 5, 0.5, 2, 0.001],
            j2Factor: 0.03,
          },
          occupancy: null,
        },
        {
          label: "Co1",
          ion: "Co2+",
          position: [
            [137, 1000],
            [1, 4],
            [-3, 10],
          ],
          spin: [3, 2],
          g: null,
          formFactor: { constant: 0.8 },
          occupancy: null,
        },
      ],
      k: ["0, 1/2, 0", "u, 0, 1/2"],
      peaks: {
        file: "satellites.csv",
        kind: "two-theta",
        wavelengthAngstrom: 2.41,
        tolerance: 0.08,
        unit: "deg",
        nuclear: "nuclear.csv",
      },
      search: {
        unmatched: 1,
        maxDimension: 3,
        tolerance: 0.01,
        zeroShift: 0.05,
        cellScale: 0.002,
        qMax: 3.5,
        weighIntensities: true,
      },
      intensities: {
        file: "integrated.csv",
        kind: "d",
        wavelengthAngstrom: 1.54,
        lorentz: false,
        scale: 12.5,
        resolution: 0.02,
        nuclear: "lines.csv",
        includesNuclear: true,
        displacement: 0.4,
        scatteringAngleDeg: 90,
        domains: "equal",
        patternWidthDeg: 0.3,
      },
      exchange: [
        { bond: "1", between: null, j: -1, vary: null },
        { bond: "2b", between: null, j: 0.4, vary: null },
        { bond: "3", between: ["Fe1", "Co1"], j: 0.1, vary: null },
        { bond: "4", between: null, j: null, vary: { from: 0, to: 0.5, count: 11 } },
      ],
      onset: { file: "scan.csv" },
      exclude: [
        [38.1, 38.5],
        [51, 52],
      ],
      atoms: [
        {
          label: "O1",
          ion: "O2-",
          position: [
            [103, 250],
            [1, 4],
            [59, 500],
          ],
          occupancy: 0.5,
        },
      ],
      impurities: [
        {
          name: "MnO",
          group: "F m -3 m",
          cell: { a: 4.445, b: 4.445, c: 4.445, alpha: 90, beta: 90, gamma: 90 },
        },
      ],
    });
  });

  it("has no section that does nothing, and keeps the name and block of a CIF", async () => {
    expect((await parseStudy(fixture("every-key.yaml"), "every-key.yaml")).warnings).toEqual([]);
    const other = await parseStudy(fixture("with-structure.yaml"), "with-structure.yaml");
    expect(other).toMatchObject({ structure: "nuclear.cif", structureBlock: "at_2K", warnings: [] });
  });

  it("reads block style, quotes and comments", async () => {
    const study = await parseStudy(fixture("block-style.yaml"), "block-style.yaml");
    expect(study.title).toBe("Blocks: one key a line");
    expect(study.group).toBe("R -3 m:H");
    expect(study.cell?.gamma).toBe(120);
    expect(study.sites).toEqual([
      {
        label: "Ni1",
        ion: null,
        position: [
          [0, 1],
          [0, 1],
          [1, 2],
        ],
        spin: null,
        g: null,
        formFactor: null,
        occupancy: null,
      },
      {
        label: "2",
        ion: null,
        position: [
          [0, 1],
          [0, 1],
          [469, 2000],
        ],
        spin: null,
        g: null,
        formFactor: null,
        occupancy: null,
      },
    ]);
    expect(study.k?.map((text) => parseWaveVector(text).components.map(({ constant }) => constant))).toEqual([
      [
        [1, 3],
        [1, 3],
        [0, 1],
      ],
      [
        [0, 1],
        [0, 1],
        [3, 2],
      ],
    ]);
    expect(study.peaks?.file).toBe("list of peaks.txt");
    expect(study.warnings).toEqual([]);
  });

  it.each(["every-key.yaml", "block-style.yaml"])("knows where every value of %s stands", async (name) => {
    const source = fixture(name);
    const study = await parseStudy(source, name);
    const at = (path: string, length: number) => textAt(source, study, path, length);
    expect(at("group", (study.group ?? "").length)).toBe(study.group);
    expect(at("sites[0].label", 3)).toBe(study.sites[0]?.label);
    expect(at("peaks.file", 8)).toBe(study.peaks?.file.slice(0, 8));
    expect(at("cell.b", String(study.cell?.b).length)).toBe(String(study.cell?.b));
    expect(at("k[0]", (study.k?.[0] ?? "").length)).toBe(study.k?.[0]);
    expect(
      Object.values(study.places).every(({ file, line, column }) => file === name && line !== null && column !== null),
    ).toBe(true);
    for (const path of ["sites[1].at[2]", "cell", "search.unmatched", "title"])
      expect(study.places).toHaveProperty([path]);
  });

  it.each([
    ["k: [[0, 1/2, 0]]", ["0, 1/2, 0"]],
    ["k: [0, 1/2, 0]", ["0, 1/2, 0"]],
    ["k: 0,1/2,0", ["0,1/2,0"]],
    ['k: ["0,1/2,0", [u, 0, 0]]', ["0,1/2,0", "u, 0, 0"]],
    ["k: [[ '0',   1/2, 0]]", ["0,    1/2, 0"]],
    ["k:\n  - 0\n  - 1/2\n  - 0", ["0, 1/2, 0"]],
  ])("reads %s", async (text, expected) => {
    expect((await parseStudy(text, "study")).k).toEqual(expected);
  });

  it.each([
    ["CRLF", "\r\n"],
    ["CR", "\r"],
  ])("does not mind line ends by %s, nor a byte-order mark", async (_name, end) => {
    const source = fixture("every-key.yaml");
    const plain = await parseStudy(source, "study");
    expect(await parseStudy(`\uFEFF${source.replaceAll("\n", end)}`, "study")).toEqual(plain);
  });

  it("takes numbers from the text, not from floats", async () => {
    const at = "[0.1, 0.30000000000004, 0.3333]";
    const study = await parseStudy(`sites: [{label: A, at: ${at}}]`, "study");
    expect(study.sites[0]?.position).toEqual([
      [1, 10],
      [7500000000001, 25000000000000],
      [3333, 10000],
    ]);
  });

  it("gives plain data", async () => {
    const study = await parseStudy(fixture("every-key.yaml"), "study");
    expect(structuredClone(study)).toEqual(study);
    expect(JSON.parse(JSON.stringify(study))).toEqual(study);
  });

  it("refuses form factors and settings of intensities that mean nothing, with their places", async () => {
    const study = `group: P n m a
cell: {a: 8, b: 11, c: 5, alpha: 90, beta: 90, gamma: 90}
sites:
  - {label: Fe1, ion: Fe3+, at: [0, 0, 0], g: 0, form-factor: {j0: [1, 2, 3]}}
  - {label: Fe2, ion: Fe3+, at: [0, 0, 1/2], form-factor: {j0: [1, 2, 3, 4, 5, 6, 7], j2: [1, 2, 3, 4, 5, 6, 7]}}
intensities: {file: a.csv, domains: many, scattering-angle: 180, displacement: -1, pattern-width: 0}
`;
    const error = await parseStudy(study, "s.yaml").then(
      () => null,
      (reason) => reason as { problems: { where: { path: string; line: number } }[] },
    );
    expect(error?.problems.map(({ where: { path, line } }) => `${line} ${path}`)).toEqual([
      "4 sites[0].g",
      "4 sites[0].form-factor.j0",
      "5 sites[1].form-factor.j2-factor",
      "6 intensities.domains",
      "6 intensities.scattering-angle",
      "6 intensities.displacement",
      "6 intensities.pattern-width",
    ]);
  });

  it("has a fixture that names every key, so that none goes untested", () => {
    const text = fixture("every-key.yaml") + fixture("with-structure.yaml");
    for (const key of Object.values(studyKeys).flat()) expect(text).toMatch(new RegExp(`(^|[{ ,])${key}:`, "m"));
  });

  it("loads yaml only when a study is read", () => {
    const folder = `${root}/packages/core/src/files`;
    const files = readdirSync(folder, { recursive: true, encoding: "utf8" }).filter((file) => file.endsWith(".ts"));
    const imports = files.flatMap((file) => readImports(file, readFileSync(`${folder}/${file}`, "utf8")));
    const ofYaml = imports.filter(({ specifier }) => specifier === "yaml");
    expect(ofYaml.some(({ lazy }) => lazy)).toBe(true);
    expect(ofYaml.filter(({ lazy, typeOnly }) => !lazy && !typeOnly)).toEqual([]);
  });
});
