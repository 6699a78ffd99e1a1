import {
  identifyMagneticGroup,
  magneticGroupByNumber,
  magneticGroupTable,
  tensorForms,
} from "@kvane/core/magneticgroups";
import { latticeVectorsInCell } from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { groupOfMoments, momentsInSupercell } from "../support/magnetic-field-group.js";
import { groupOf } from "../support/parsed-groups.js";

type Size = readonly [number, number, number];

const one: Size = [1, 1, 1];

/** The group of moments on sites of one parent cell, given site by site. */
function groupOfSites(symbol: string, sites: readonly (readonly number[])[], moments: readonly (readonly number[])[]) {
  const field = (_: readonly number[], site: number): readonly number[] => moments[site] as readonly number[];
  return groupOfMoments(groupOf(symbol), momentsInSupercell(sites, one, field), one);
}

function nameOf(group: ReturnType<typeof groupOfSites>): string {
  const { bns } = identifyMagneticGroup(group).name;
  return `${bns.number} ${bns.symbol}`;
}

// Corundum sites 12c of R-3c in hexagonal axes, z = 0.35 of Cr2O3 and Fe2O3 (the value does not matter here).
const centrings = [
  [0, 0, 0],
  [2 / 3, 1 / 3, 1 / 3],
  [1 / 3, 2 / 3, 2 / 3],
];
const z = 0.35;
const corundum = [z, 0.5 - z, -z, 0.5 + z].flatMap((height) =>
  centrings.map((shift) => [shift[0] as number, shift[1] as number, (shift[2] as number) + height]),
);

/** Moments along a direction with one sign for each of z, 1/2−z, −z, 1/2+z. */
function corundumMoments(signs: readonly number[], direction: readonly number[]): readonly (readonly number[])[] {
  return signs.flatMap((sign) => centrings.map(() => direction.map((entry) => sign * entry)));
}

// Hematite: equal moments on sites related by inversion (C. G. Shull, W. A. Strauser, E. O. Wollan, Phys. Rev. 83 (1951)
// 333); Cr2O3: opposite ones (B. N. Brockhouse, J. Chem. Phys. 21 (1953) 961).
const hematite = (direction: readonly number[]) =>
  groupOfSites("R -3 c", corundum, corundumMoments([1, -1, 1, -1], direction));
const chromia = groupOfSites("R -3 c", corundum, corundumMoments([1, -1, -1, 1], [0, 0, 1]));

/**
 * Groups of named arrangements. The numbers were computed apart, from the moments alone, with a general-purpose symmetry
 * finder; those of MnF2, Cr2O3, hematite and MnO are also what the papers on them say (memory, 90 %).
 */
describe("magnetic groups of published arrangements", () => {
  it("MnF2: moments along c, corner against centre (R. A. Erickson, Phys. Rev. 90 (1953) 779)", () => {
    const sites = [
      [0, 0, 0],
      [0.5, 0.5, 0.5],
    ];
    const group = groupOfSites("P 42/m n m", sites, [
      [0, 0, 1],
      [0, 0, -1],
    ]);
    expect(nameOf(group)).toBe("136.499 P4_2'/mnm'");
    // Piezomagnetism of CoF2 and MnF2: Λ14 = Λ25, Λ36 (A. S. Borovik-Romanov, Sov. Phys. JETP 11 (1960) 786; memory, 90 %).
    const cell = { a: 4.87, b: 4.87, c: 3.31, alpha: 90, beta: 90, gamma: 90 };
    const { piezomagnetic, netMoment, magnetoelectric } = tensorForms(group, cell);
    expect(rowsOf(piezomagnetic, 6)).toEqual(["0 0 0 Λ14 0 0", "0 0 0 0 Λ14 0", "0 0 0 0 0 Λ36"]);
    expect([...netMoment, ...magnetoelectric].join("")).toBe("0".repeat(12));
  });

  it("Cr2O3 and its diagonal magnetoelectric tensor (I. E. Dzyaloshinskii, Sov. Phys. JETP 10 (1960) 628)", () => {
    expect(nameOf(chromia)).toBe("167.106 R-3'c'");
    expect(chromia.pointGroup).toBe("-3'm'");
    const { magnetoelectric, netMoment, piezomagnetic } = tensorForms(chromia, corundumCell);
    expect(rowsOf(magnetoelectric, 3)).toEqual(["αxx 0 0", "0 αxx 0", "0 0 αzz"]);
    expect([...netMoment, ...piezomagnetic].join("")).toBe("0".repeat(21));
  });

  // I. Dzyaloshinskii, J. Phys. Chem. Solids 4 (1958) 241: no moment below the spin flip, one across the axis above it.
  it("hematite below and above the spin flip, and where a net moment is allowed", () => {
    const below = hematite([0, 0, 1]);
    expect(nameOf(below)).toBe("167.103 R-3c");
    expect(tensorForms(below, corundumCell).netMoment).toEqual(["0", "0", "0"]);
    const alongA = hematite([1, 0, 0]);
    expect(nameOf(alongA)).toBe("15.89 C2'/c'");
    expect(tensorForms(alongA, corundumCell).netMoment).toEqual(["0", "My", "Mz"]);
    const across = hematite([1, 2, 0]);
    expect(nameOf(across)).toBe("15.85 C2/c");
    expect(tensorForms(across, corundumCell).netMoment).toEqual(["Mx", "0", "0"]);
  });

  // x along the twofold axis, as in International Tables D, table 1.5.7.1 (memory, 85 %).
  it("hematite below the flip is piezomagnetic with two constants", () => {
    expect(rowsOf(tensorForms(hematite([0, 0, 1]), corundumCell).piezomagnetic, 6)).toEqual([
      "Λ11 -Λ11 0 Λ14 0 0",
      "0 0 0 0 -Λ14 -2Λ11",
      "0 0 0 0 0 0",
    ]);
  });

  // V. Pomjakushin, Acta Cryst. B (2024), arXiv 2509.11715, gives 15.90 for the best one-arm model; the others as computed apart.
  it.each([
    [[1, 1, -2], "15.90 C_c2/c"],
    [[1, -1, 0], "12.63 C_c2/m"],
    [[1, 1, 1], "167.108 R_I-3c"],
    [[3, 1, -4], "2.7 P_S-1"],
  ])("MnO with moments along %j", (direction, wanted) => {
    const size: Size = [2, 2, 2];
    const parent = groupOf("F m -3 m");
    const sites = latticeVectorsInCell(parent).map((vector) => vector.map(([top, bottom]) => top / bottom));
    const moments = momentsInSupercell(sites, size, (at) => {
      const sign = Math.round(at.reduce((sum, entry) => sum + entry, 0)) % 2 === 0 ? 1 : -1;
      return direction.map((entry) => sign * entry);
    });
    expect(nameOf(groupOfMoments(parent, moments, size))).toBe(wanted);
  });

  // Bertaut's modes of 4b in Pbnm, sites 1/2 0 0, 1/2 0 1/2, 0 1/2 1/2, 0 1/2 0: F ++++, G +-+-, C ++--, A +--+.
  it.each([
    ["Fx Cy Gz", [1, 1, 1, 1], [1, 1, -1, -1], [1, -1, 1, -1], "62.446"],
    ["Gx Ay Fz", [1, -1, 1, -1], [1, -1, -1, 1], [1, 1, 1, 1], "62.448"],
  ])("orthoferrites %s", (_, x, y, zSigns, wanted) => {
    const sites = [
      [0.5, 0, 0],
      [0.5, 0, 0.5],
      [0, 0.5, 0.5],
      [0, 0.5, 0],
    ];
    const moments = sites.map((_site, index) => [
      0.3 * (x[index] as number),
      0.5 * (y[index] as number),
      zSigns[index] as number,
    ]);
    const group = groupOfSites("P b n m", sites, moments);
    expect(nameOf(group).split(" ")[0]).toBe(wanted);
    const form = tensorForms(group, { a: 5.3, b: 5.6, c: 7.6, alpha: 90, beta: 90, gamma: 90 }).netMoment;
    expect(form).toEqual(wanted === "62.446" ? ["Mx", "0", "0"] : ["0", "0", "Mz"]);
  });
});

const corundumCell = { a: 4.96, b: 4.96, c: 13.59, alpha: 90, beta: 90, gamma: 120 };

function rowsOf(form: readonly string[], width: number): readonly string[] {
  return Array.from({ length: form.length / width }, (_, row) => form.slice(row * width, (row + 1) * width).join(" "));
}

// LiCoPO4 (αxy, αyx) and LiNiPO4 (αxz, αzx): M. Mercier, J. Gareyte, E. F. Bertaut, C. R. Acad. Sci. B 264 (1967) 979, in
// axes of Pnma (memory, 85 %).
describe("magnetoelectric phosphates", () => {
  it.each([
    ["62.445", ["0 αxy 0", "αyx 0 0", "0 0 0"]],
    ["62.444", ["0 0 αxz", "0 0 0", "αzx 0 0"]],
  ])("%s", (number, form) => {
    const cell = { a: 10.1, b: 5.9, c: 4.7, alpha: 90, beta: 90, gamma: 90 };
    expect(rowsOf(tensorForms(magneticGroupByNumber(number), cell).magnetoelectric, 3)).toEqual(form);
  });
});

/** Numbers and symbols as papers print them together. From memory, 85 to 95 % each. */
describe("BNS symbols", () => {
  const symbols = new Map(magneticGroupTable().map((row) => [row.name.bns.number, row.name.bns.symbol]));
  it.each([
    ["2.7", "P_S-1"],
    ["12.62", "C2'/m'"],
    ["14.79", "P2_1'/c'"],
    ["14.80", "P_a2_1/c"],
    ["14.84", "P_C2_1/c"],
    ["15.88", "C2/c'"],
    ["31.129", "P_bmn2_1"],
    ["54.352", "P_Icca"],
    ["58.398", "Pnn'm'"],
    ["62.444", "Pnm'a"],
    ["62.445", "Pnma'"],
    ["62.448", "Pn'ma'"],
    ["62.450", "P_anma"],
    ["63.463", "Cmc'm'"],
    ["63.464", "Cm'cm'"],
    ["64.480", "C_Amca"],
    ["114.282", "P_I-42_1c"],
    ["127.395", "P4/m'b'm'"],
    ["161.69", "R3c"],
    ["165.94", "P-3'c'1"],
    ["166.101", "R-3m'"],
    ["185.197", "P6_3cm"],
    ["224.113", "Pn-3m'"],
    ["227.131", "Fd-3m'"],
  ])("%s is %s", (number, symbol) => {
    expect(symbols.get(number)).toBe(symbol);
  });
});
