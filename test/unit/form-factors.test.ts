import {
  formFactorAt,
  formFactorIons,
  ionState,
  magneticFormFactor,
  radialIntegral,
  scatteringLength,
  tabulatedIon,
} from "@kvane/core/diffraction";
import { describe, expect, test } from "vitest";

describe("magnetic form factors", () => {
  test("every <j0> is 1 at Q = 0 within what the tables round, and every <jn> is 0", () => {
    // International Tables C, section 4.4.5: the fits are normalized to within half a percent.
    for (const ion of formFactorIons()) {
      const row = tabulatedIon(ion);
      if (row === null) throw new Error(ion);
      expect(Math.abs(radialIntegral(0, row.j0, 0) - 1), ion).toBeLessThan(0.01);
      for (const order of [2, 4, 6] as const) {
        const coefficients = row[`j${order}`];
        if (coefficients !== null) expect(radialIntegral(order, coefficients, 0), ion).toBe(0);
      }
    }
  });

  test("a fall of <j0> with Q for every ion, steeper for fewer protons in the d series", () => {
    for (const ion of formFactorIons()) {
      const factor = magneticFormFactor({ ion });
      const values = [0, 0.5, 1, 1.5].map((q) => radialIntegral(0, factor.j0 as never, q));
      for (let index = 1; index < values.length; index++)
        expect(values[index] as number, `${ion} ${index}`).toBeLessThan(values[index - 1] as number);
    }
    const at3 = ["Mn2+", "Fe2+", "Co2+", "Ni2+", "Cu2+"].map((ion) => formFactorAt(magneticFormFactor({ ion }), 3));
    expect([...at3].sort((a, b) => a - b)).toEqual(at3);
  });

  test("the dipole approximation says which form was used", () => {
    expect(magneticFormFactor({ ion: "Ni2+" }).text).toBe("<j0> (Ni2+, orbital moment quenched, g = 2)");
    expect(magneticFormFactor({ ion: "Tb3+" }).text).toBe("<j0> + 0.3333 <j2> (Tb3+, g_J = 1.5, Hund's)");
    expect(magneticFormFactor({ ion: "Gd3+" }).text).toContain("g_J = 2");
    expect(magneticFormFactor({ ion: "Gd3+" }).j2Factor).toBe(0);
    // (g − 2)/g with g = 2.2.
    expect(magneticFormFactor({ ion: "Co2+", g: 2.2 }).j2Factor).toBeCloseTo(0.2 / 2.2, 12);
    expect(magneticFormFactor({ ion: "Eu3+" }).text).toContain("J = 0");
    expect(formFactorAt(magneticFormFactor({ constant: 0.7 }), 3)).toBe(0.7);
    const own = magneticFormFactor({ j0: [1, 0, 0, 0, 0, 0, 0], j2: [1, 0, 0, 0, 0, 0, 0], j2Factor: 2 });
    // s² = (Q/4π)².
    expect(formFactorAt(own, 4 * Math.PI)).toBeCloseTo(3, 12);
  });

  test("an ion that is not tabulated is refused with those that are", () => {
    expect(() => magneticFormFactor({ ion: "Fe5+" })).toThrowError(/Fe5\+/);
    try {
      magneticFormFactor({ ion: "Fe5+" });
    } catch (error) {
      expect((error as { problems: { expected: string }[] }).problems[0]?.expected).toContain("Fe3+");
    }
    expect(() => magneticFormFactor({ ion: "Ni2+", g: -1 })).toThrowError();
    expect(() => magneticFormFactor({ constant: Number.NaN })).toThrowError();
  });
});

describe("Hund's ground states", () => {
  // g_J J and gS: N. W. Ashcroft & N. D. Mermin, Solid State Physics (1976), tables 31.3 and 31.4.
  test.each([
    ["Cu2+", 1],
    ["Ni2+", 2],
    ["Co2+", 3],
    ["Fe2+", 4],
    ["Fe3+", 5],
    ["Mn2+", 5],
    ["Mn3+", 4],
    ["Cr3+", 3],
    ["Mn4+", 3],
    ["Ru3+", 5],
    ["Gd3+", 7],
    ["Tb3+", 9],
    ["Dy3+", 10],
    ["Ho3+", 10],
    ["Er3+", 9],
    ["Tm3+", 7],
    ["Yb3+", 4],
    ["Eu2+", 7],
    ["Nd3+", 36 / 11],
    ["Ce3+", 15 / 7],
  ])("%s: at most %f", (ion, moment) => {
    expect(ionState(ion)?.largestMoment).toBeCloseTo(moment, 10);
  });

  test("ions without open shell have none", () => {
    expect(ionState("La3+")).toBeNull();
    expect(ionState("Zn2+")).toBeNull();
    expect(ionState("O2-")).toBeNull();
  });
});

describe("nuclear scattering lengths", () => {
  // V. F. Sears, Neutron News 3 (1992) 26: an older compilation; values that were measured anew differ by up to 0.07 fm.
  test.each([
    ["H", -3.739],
    ["D", 6.671],
    ["O2-", 5.803],
    ["F", 5.654],
    ["V", -0.3824],
    ["Cr", 3.635],
    ["Mn2+", -3.73],
    ["Fe", 9.45],
    ["Co", 2.49],
    ["Ni", 10.3],
    ["Cu", 7.718],
    ["La", 8.24],
    ["Tb", 7.38],
    ["Ti", -3.438],
    ["Li", -1.9],
    ["11B", 6.65],
  ])("%s is %f fm", (nucleus, expected) => {
    expect(Math.abs(scatteringLength(nucleus).real - expected)).toBeLessThan(0.08);
  });

  test("absorbing nuclei have an imaginary part and say that they depend on the energy", () => {
    expect(scatteringLength("Gd").imaginary).toBeLessThan(-10);
    expect(scatteringLength("Gd").dependsOnEnergy).toBe(true);
    expect(() => scatteringLength("Xx")).toThrowError(/Xx/);
  });
});
