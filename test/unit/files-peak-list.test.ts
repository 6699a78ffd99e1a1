import { readFileSync } from "node:fs";
import { type PeakListOptions, parsePeakList, readPeakKind } from "@kvane/core/files";
import { describe, expect, it } from "vitest";

function fixture(name: string): string {
  return readFileSync(new URL(`../fixtures/peaks/${name}`, import.meta.url), "utf8");
}

function read(text: string, options: Partial<PeakListOptions> = {}) {
  return parsePeakList(text, { file: "peaks", ...options });
}

describe("the shapes of peak lists", () => {
  it("reads commas with a header, comments and an empty cell", () => {
    const list = read(fixture("commas.csv"));
    expect(list.kind).toBe("d");
    expect(
      list.peaks.map(({ position, intensity, intensityUncertainty, line }) => [
        position,
        intensity,
        intensityUncertainty,
        line,
      ]),
    ).toEqual([
      [6.2832, 120, 8, 3],
      [3.1401, null, null, 4],
      [2.0944, 45.5, 3, 5],
    ]);
    expect(list.uncertaintySource).toBe("given in the file");
  });

  it("reads semicolons, quoted names with units, and leaves rows of separators out", () => {
    const list = read(fixture("semicolons.csv"), { wavelengthAngstrom: 2.41 });
    expect(list.kind).toBe("two-theta");
    expect(list.wavelengthAngstrom).toBe(2.41);
    expect(
      list.peaks.map(({ position, intensity, intensityUncertainty }) => [position, intensity, intensityUncertainty]),
    ).toEqual([
      [12.34, 1200, 35],
      [23.45, -12, 20],
      [34.56, null, null],
    ]);
  });

  it("reads tabs; with a header an empty cell is a missing value", () => {
    const list = read(fixture("tabs.tsv"));
    expect(list.peaks.map(({ q, intensity }) => [q, intensity])).toEqual([
      [0.75, 33],
      [1.25, 18],
      [1.5, null],
    ]);
    expect(list.peaks.map(({ uncertainty }) => uncertainty)).toEqual([0.002, 1.25 * 0.002, 0.004]);
    expect(list.uncertaintySource).toContain("1 of 3");
  });

  it("reads h k l of a single crystal, columns in any order, fractions among the indices", () => {
    const list = read(fixture("crystal.txt"));
    expect(list.kind).toBe("hkl");
    expect(list.peaks.map(({ hkl }) => hkl)).toEqual([
      [0, 0.5, 1],
      [-1, 0.498, 0],
      [1, -0.5, 2],
    ]);
    expect(list.peaks.map((peak) => [peak.intensity, peak.intensityUncertainty, peak.hklUncertainty])).toEqual([
      [210, 12, 0.002],
      [35, 5, 0.004],
      [400, 20, 0.003],
    ]);
    expect(
      list.peaks.every(({ q, uncertainty, position }) => q === null && uncertainty === null && position === null),
    ).toBe(true);
  });

  it("reads uncertainties in brackets as units of the last digit", () => {
    const { peaks } = read(fixture("brackets.txt"));
    // Δq/q = Δd/d.
    expect(
      peaks.map(({ q, uncertainty, position }) => ((uncertainty as number) / (q as number)) * (position as number)),
    ).toEqual([expect.closeTo(0.012, 12), expect.closeTo(0.0008, 12), expect.closeTo(2.256 * 0.002, 12)]);
  });

  it("reads a list without a header by the kind of the option: position, uncertainty, intensity, its uncertainty", () => {
    const list = read("1.5 0.01 300 17\n2.5\n", { kind: "q" });
    expect(list.peaks[0]).toEqual({
      index: 0,
      q: 1.5,
      uncertainty: 0.01,
      hkl: null,
      hklUncertainty: null,
      intensity: 300,
      intensityUncertainty: 17,
      position: 1.5,
      line: 1,
    });
    expect(list.peaks[1]?.index).toBe(1);
  });

  const same = "d,su\n4.5,0.01\n3.5,0.02\n";
  it.each([
    ["CRLF", same.replaceAll("\n", "\r\n")],
    ["CR", same.replaceAll("\n", "\r")],
    ["a byte-order mark", `\uFEFF${same}`],
    ["no last line end", same.trimEnd()],
    ["blank lines", `\n\n${same.replaceAll("\n", "\n\n")}`],
    ["semicolons", same.replaceAll(",", ";")],
    ["tabs", same.replaceAll(",", "\t")],
    ["blanks", same.replaceAll(",", "   ")],
    ["blanks in front", same.replace(/^/gm, "  ")],
    ["comments", same.replaceAll("\n", " # said, not; read\n! and more\n")],
    ["capitals and a unit", same.replace("d,su", "D (Å) , S.U.")],
    ["another order", "su,d\n0.01,4.5\n0.02,3.5\n"],
    ["nanometres", "d/nm,su\n0.45,0.001\n0.35,0.002\n"],
    ["a plus sign", same.replace("4.5", "+4.5")],
    ["exponents", same.replace("4.5", "45e-1")],
  ])("does not mind %s", (_what, text) => {
    const peaks = (one: string) =>
      read(one).peaks.map(({ q, uncertainty }) => [q?.toPrecision(12), uncertainty?.toPrecision(12)]);
    expect(peaks(text)).toEqual(peaks(same));
  });

  it.each([
    ["d", "d"],
    ["Q", "q"],
    ["two-theta", "two-theta"],
    ["2theta", "two-theta"],
    ["2Theta", "two-theta"],
    ["two_theta", "two-theta"],
    ["2θ", "two-theta"],
    ["position", "q"],
  ] as const)("knows the header %s", (name, kind) => {
    const option = name === "position" ? { kind } : {};
    expect(read(`${name}\n1.25\n`, { ...option, wavelengthAngstrom: 1.5 }).kind).toBe(kind);
    expect(readPeakKind(name)).toBe(name === "position" ? null : kind);
  });

  it("knows no kind by the name of something that every object has", () => {
    expect(readPeakKind("constructor")).toBeNull();
    expect(readPeakKind("__proto__")).toBeNull();
  });

  it("gives plain data", () => {
    const list = read(fixture("commas.csv"));
    expect(structuredClone(list)).toEqual(list);
    expect(JSON.parse(JSON.stringify(list))).toEqual(list);
  });

  it("keeps every row of a long list", () => {
    const rows = Array.from({ length: 20_000 }, (_, index) => `${(1 + index / 20_000).toFixed(5)}, 0.001, ${index}`);
    const { peaks } = read(`q, su, intensity\n${rows.join("\n")}`);
    expect(peaks).toHaveLength(20_000);
    expect(peaks.at(-1)).toMatchObject({ q: 1.99995, intensity: 19_999, line: 20_001 });
  });
});
