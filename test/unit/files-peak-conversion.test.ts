import { type PeakListOptions, parsePeakList } from "@kvane/core/files";
import fc from "fast-check";
import { describe, expect, it } from "vitest";

function only(text: string, options: Partial<PeakListOptions>) {
  const list = parsePeakList(text, { file: "peaks", ...options });
  const [peak] = list.peaks;
  if (!peak) throw new Error("no peak");
  return { ...peak, source: list.uncertaintySource };
}

const radian = Math.PI / 180;

describe("positions become Q in Å⁻¹", () => {
  it("at round numbers", () => {
    // Q = 2π/d.
    expect(only("2", { kind: "d" }).q).toBeCloseTo(Math.PI, 14);
    // λ = 4π Å and 2θ = 60°: Q = sin 30° = 1/2; at 90°: Q = sin 45°.
    expect(only("60", { kind: "two-theta", wavelengthAngstrom: 4 * Math.PI }).q).toBeCloseTo(0.5, 14);
    expect(only("90", { kind: "two-theta", wavelengthAngstrom: 4 * Math.PI }).q).toBeCloseTo(Math.SQRT1_2, 14);
    expect(only("1.75", { kind: "q" }).q).toBe(1.75);
    // 1 nm⁻¹ is 0.1 Å⁻¹, 1 nm is 10 Å, π/3 rad is 60°.
    expect(only("17.5", { kind: "q", unit: "1/nm" }).q).toBeCloseTo(1.75, 14);
    expect(only("0.2", { kind: "d", unit: "nm" }).q).toBeCloseTo(Math.PI, 13);
    expect(
      only(String(Math.PI / 3), { kind: "two-theta", unit: "rad", wavelengthAngstrom: 4 * Math.PI }).q,
    ).toBeCloseTo(0.5, 13);
  });

  it("agrees with λ = 2 d sin θ for the first lines of MnO in the doubled cell of 1951", () => {
    // C. G. Shull, W. A. Strauser & E. O. Wollan, Phys. Rev. 83 (1951) 333: a = 4.43 Å, λ = 1.057 Å. Positions computed
    // here from cell and wavelength, lines 111 and 311 of the cell of 8.86 Å, through d and not through Q.
    for (const squares of [3, 11]) {
      const d = 8.86 / Math.sqrt(squares);
      const twoTheta = (2 * Math.asin(1.057 / (2 * d))) / radian;
      const peak = only(String(twoTheta), { kind: "two-theta", wavelengthAngstrom: 1.057 });
      expect((2 * Math.PI) / (peak.q as number)).toBeCloseTo(d, 10);
    }
  });
});

describe("uncertainties", () => {
  it("follow the position at round numbers", () => {
    // d = 2π Å: Q = 1 and dQ/dd = −1/2π.
    const spacing = only(`${2 * Math.PI} ${0.02 * Math.PI}`, { kind: "d" });
    expect([spacing.q, spacing.uncertainty]).toEqual([expect.closeTo(1, 14), expect.closeTo(0.01, 14)]);
    // λ = 2π Å, 2θ = 120°: dQ = cos 60° Δ = Δ/2, Δ in radians; 0.18/π degrees are 0.001 rad.
    const angle = only(`120 ${0.18 / Math.PI}`, { kind: "two-theta", wavelengthAngstrom: 2 * Math.PI });
    expect(angle.uncertainty).toBeCloseTo(0.0005, 15);
    expect(only("1 0.01", { kind: "q" }).uncertainty).toBe(0.01);
    expect(only("10 0.1", { kind: "q", unit: "nm^-1" }).uncertainty).toBeCloseTo(0.01, 15);
  });

  it("is the change of Q for a small change of the position", () => {
    const options = [
      { kind: "d", low: 1.3, high: 30 },
      { kind: "q", low: 0.1, high: 5 },
      { kind: "two-theta", low: 2, high: 175 },
    ] as const;
    for (const { kind, low, high } of options) {
      fc.assert(
        fc.property(fc.double({ min: low, max: high, noNaN: true }), (position) => {
          const step = position * 1e-6;
          const at = (one: number) => only(`${one} ${step}`, { kind, wavelengthAngstrom: 2.41 });
          const slope = Math.abs((at(position + step).q as number) - (at(position - step).q as number)) / 2;
          expect(at(position).uncertainty).toBeCloseTo(slope, 11);
        }),
        { seed: 20261201, numRuns: 100 },
      );
    }
  });

  it("come from the tolerance, the file or the default, and it is said", () => {
    const angle = { kind: "two-theta", wavelengthAngstrom: 2 * Math.PI } as const;
    const tolerant = only("120", { ...angle, tolerance: 0.54 / Math.PI });
    expect(tolerant.uncertainty).toBeCloseTo(0.0005, 15);
    expect(tolerant.source).toMatch(/^the tolerance of 0\.17\d+° taken as 3 standard uncertainties$/);
    const both = only("1 0.5", { kind: "q", tolerance: 0.03 });
    expect(both.uncertainty).toBeCloseTo(0.01, 15);
    expect(both.source).toContain("in place of those of the file");
    expect(only("10", { kind: "q", unit: "1/nm", tolerance: 0.3 }).uncertainty).toBeCloseTo(0.01, 15);
    const silent = only("1.5", { kind: "q" });
    expect(silent.uncertainty).toBeCloseTo(0.003, 15);
    expect(silent.source).toBe("0.2 % of Q by default, as the file gives none");
  });

  it("of h k l stay in reciprocal lattice units", () => {
    expect(only("0 0.5 1", { kind: "hkl", tolerance: 0.03 }).hklUncertainty).toBeCloseTo(0.01, 15);
    expect(only("0 0.5(2) 1.00(3)", { kind: "hkl" }).hklUncertainty).toBeCloseTo(0.2, 15);
    const silent = only("0 0.5 1", { kind: "hkl" });
    expect(silent.hklUncertainty).toBe(0.005);
    expect(silent.source).toContain("by default");
  });
});
