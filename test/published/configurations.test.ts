import type { Configuration } from "@kvane/core/configurations";
import { describe, expect, test } from "vitest";
import { bnsNumber, type Listed, listed, numbersOf } from "../support/configurations-listed.js";

/**
 * Numbers are those of Belov, Neronova and Smirnova. Those marked [computed] were found from explicit moments with a
 * general-purpose symmetry finder; where a published number is known it agrees.
 */
function withNumber(list: Listed, number: string): Configuration[] {
  return list.set.configurations.filter((configuration) => bnsNumber(configuration) === number);
}

describe("commensurate structures", () => {
  test("MnF2: moments along c, P4_2'/mnm' 136.499 [computed]; + − along c [Erickson, Phys. Rev. 90, 779 (1953)]", async () => {
    const list = await listed("P 42/m n m", "0,0,0", ["Mn: 0 0 0"], { cell: "4.873 4.873 3.31 90 90 90" });
    const [found, ...others] = withNumber(list, "136.499");
    expect(others).toEqual([]);
    expect(found?.sites.map(({ momentLattice }) => momentLattice)).toEqual(["(0, 0, u)"]);
    expect(found?.index).toBe(2);
    expect(found?.consequences?.netMoment).toEqual({ form: ["0", "0", "0"], inParent: false, induced: false });
  });

  test("Cr2O3: R-3'c' 167.106, diagonal magnetoelectric tensor [computed; Astrov, Sov. Phys. JETP 11, 708 (1960)]", async () => {
    const list = await listed("R -3 c:H", "0,0,0", ["Cr: 0 0 0.3475"], { cell: "4.958 4.958 13.594 90 90 120" });
    const [found] = withNumber(list, "167.106");
    expect(found?.sites[0]?.symmformLattice).toBe("(0, 0, mz)");
    const form = found?.consequences?.magnetoelectric.form ?? [];
    expect(form[0]).not.toBe("0");
    expect(form[4]).toBe(form[0]);
    expect(form[8]).not.toBe("0");
    expect([1, 2, 3, 5, 6, 7].map((entry) => form[entry])).toEqual(["0", "0", "0", "0", "0", "0"]);
    expect(found?.consequences?.magnetoelectric).toMatchObject({ inParent: false, induced: true });
  });

  test("α-Fe2O3: 167.103 below the spin flip without, 15.89 and 15.85 above; a net moment comes only in the plane", async () => {
    // Numbers [computed]; the weak moment above T_M: Dzyaloshinsky, J. Phys. Chem. Solids 4, 241 (1958).
    const list = await listed("R -3 c:H", "0,0,0", ["Fe: 0 0 0.3553"], { cell: "5.034 5.034 13.75 90 90 120" });
    const [below] = withNumber(list, "167.103");
    expect(below?.sites[0]?.symmformLattice).toBe("(0, 0, mz)");
    expect(below?.consequences?.netMoment.induced).toBe(false);
    for (const number of ["15.89", "15.85"]) {
      const [above] = withNumber(list, number);
      expect(above?.sites[0]?.momentLattice, number).toBe("(u, v, 0)");
      expect(above?.consequences?.netMoment.induced, number).toBe(true);
    }
  });

  test("MnO, one arm: [11-2] 15.90, [1-10] 12.63, [111] 167.108, general in the sheet 2.7 [computed; C_c2/c read: arXiv 2509.11715]", async () => {
    const list = await listed("F m -3 m", "1/2,1/2,1/2", ["Mn: 0 0 0"]);
    expect(numbersOf(list).sort()).toEqual(["12.63", "15.90", "167.108", "2.7"]);
    const [found] = withNumber(list, "15.90");
    // One parameter in the sheet from the irrep, two in the group: the interface page's own example.
    expect(found).toMatchObject({
      index: 24,
      domains: { total: 24, k: 4, orientation: 12 },
      freeParameters: { irreps: 1, group: 2 },
    });
    expect(found?.secondaryIrreps.map(({ sameK }) => sameK)).toEqual([true]);
    expect(found?.subgroupOf).toEqual(withNumber(list, "167.108").map(({ id }) => id));
  });

  test("NiO, MnO, all four arms: a rhombohedral R-3c model among them [read: Acta Cryst. B (2024), arXiv 2509.11715]", async () => {
    const list = await listed("F m -3 m", "1/2,1/2,1/2", ["Mn: 0 0 0"], { arms: "all" });
    expect(list.set.bounded).toEqual([]);
    const fourArms = list.set.configurations.filter(({ arms }) => arms.length === 4);
    const numbers = new Set(fourArms.map(bnsNumber));
    expect([...numbers].some((number) => number.startsWith("167."))).toBe(true);
    // The one-arm list is part of it.
    const oneArm = list.set.configurations.filter(({ arms }) => arms.length === 1).map(bnsNumber);
    expect(oneArm.sort()).toEqual(["12.63", "15.90", "167.108", "2.7"]);
  });

  test("UO2: a transverse arrangement on three arms with cubic symmetry and moments along ⟨111⟩ [read: arXiv 2409.20228]", async () => {
    const list = await listed("F m -3 m", "0,0,1", ["U: 0 0 0"], { arms: "all" });
    const cubic = list.set.configurations.filter(
      ({ arms, magneticGroup }) => arms.length === 3 && magneticGroup.pointGroup.includes("m-3"),
    );
    // Equal components along the three axes, one free size.
    expect(
      cubic.filter(({ sites }) => sites.every(({ momentLattice }) => /^\(-?u, -?u, -?u\)$/.test(momentLattice))).length,
    ).toBeGreaterThanOrEqual(1);
  });

  test("orthoferrites Pbnm, k = 0: the four Bertaut sets; {F_x C_y G_z} 62.446, {G_x A_y F_z} 62.448 [computed]", async () => {
    // Sets: Bertaut, Acta Cryst. A24, 217 (1968); weak ferromagnetism of G_x with F_z: Koehler, Wollan & Wilkinson (1960).
    const list = await listed("P b n m", "0,0,0", ["Fe: 1/2 0 0"], { cell: "5.55 5.57 7.86 90 90 90" });
    expect(numbersOf(list)).toHaveLength(4);
    const byMoment = Object.fromEntries(
      list.set.configurations.map((one) => [one.consequences?.netMoment.form.join(), bnsNumber(one)]),
    );
    expect(byMoment["Mx,0,0"]).toBe("62.446");
    expect(byMoment["0,0,Mz"]).toBe("62.448");
    expect(Object.keys(byMoment).sort()).toEqual(["0,0,0", "0,0,Mz", "0,My,0", "Mx,0,0"]);
    expect(list.set.configurations.every(({ freeParameters }) => freeParameters.irreps === 3)).toBe(true);
  });

  test("LaMnO3 in Pnma: A-type along the long in-plane axis is Pn'ma' 62.448 [computed for {G_x A_y F_z} of Pbnm]", async () => {
    const list = await listed("P n m a", "0,0,0", ["Mn: 0 0 1/2"], { cell: "5.7 7.7 5.54 90 90 90" });
    const [found] = withNumber(list, "62.448");
    expect(found?.consequences?.netMoment.form.filter((entry) => entry !== "0")).toHaveLength(1);
  });

  test("h-YMnO3: the four one-dimensional irreps give 185.197, 185.199, 185.200, 185.201 [International Tables: the 185 family]", async () => {
    const list = await listed("P 63 c m", "0,0,0", ["Mn: 1/3 0 0"], { cell: "6.14 6.14 11.4 90 90 120" });
    const single = list.set.configurations.filter(
      ({ irreps, direction }) => irreps.length === 1 && direction === "(a)",
    );
    expect(single.map(bnsNumber).sort()).toEqual(["185.197", "185.199", "185.200", "185.201"]);
    // P6_3cm: moments in the plane alone, perpendicular to the mirror that holds the site; no net moment.
    const [first] = withNumber(list, "185.197");
    expect(first?.freeParameters).toEqual({ irreps: 1, group: 1 });
    expect(first?.consequences?.netMoment.form).toEqual(["0", "0", "0"]);
    // P6_3c'm' is the one that allows a net moment (h-ScMnO3: weak ferromagnetism, Munoz et al., PRB 62, 9498 (2000)).
    expect(withNumber(list, "185.201")[0]?.consequences?.netMoment.form).toEqual(["0", "0", "Mz"]);
  });

  test("CuO, k = (1/2, 0, −1/2): moments along b are one irrep, in the plane the other [Forsyth, Brown & Wanklyn (1988)]", async () => {
    const list = await listed("C 1 2/c 1", "1/2,0,-1/2", ["Cu: 1/4 1/4 0"], { cell: "4.684 3.423 5.129 90 99.5 90" });
    const names = new Set(list.set.configurations.flatMap(({ irreps }) => irreps));
    expect(names.size).toBe(2);
    // Type IV with a doubled cell and no net moment; 2k is no reciprocal lattice vector of the C cell, 4k is.
    for (const { magneticGroup, consequences } of list.set.configurations) {
      expect(magneticGroup.type).toBe(4);
      expect(consequences?.netMoment.induced).toBe(false);
    }
  });
});

describe("TbMnO3, Pbnm, k = (0, u, 0): Kenzelmann et al., Phys. Rev. Lett. 95, 087206 (2005)", () => {
  const sites = ["Mn: 1/2 0 0"];
  const cell = "5.3 5.86 7.4 90 90 90";

  test("one irrep, phases locked: no polarization", async () => {
    const { set } = await listed("P b n m", "0,u,0", sites, { cell });
    const locked = set.modulated.filter(({ needsSecondOrderParameter }) => !needsSecondOrderParameter);
    expect(locked).toHaveLength(4);
    for (const { consequences, freeParameters, freePhases, sites: own } of locked) {
      expect(consequences?.polarization).toEqual({ form: ["0", "0", "0"], inParent: false, induced: false });
      expect(freeParameters).toEqual({ irreps: 3, group: 3 });
      expect(freePhases).toBe(0);
      // The inversion centre on Mn makes its wave a cosine.
      expect(own.every(({ sine }) => sine === "(0, 0, 0)")).toBe(true);
    }
  });

  test("free phases between copies need a second order parameter and are marked", async () => {
    const { set } = await listed("P b n m", "0,u,0", sites, { cell });
    const free = set.modulated.filter(({ needsSecondOrderParameter }) => needsSecondOrderParameter);
    expect(free).toHaveLength(4);
    expect(free.every(({ freePhases }) => freePhases === 2)).toBe(true);
  });

  test("two irreps at once in quadrature: polarization along c for one pair of irreps at least", async () => {
    const { set } = await listed("P b n m", "0,u,0", sites, { cell });
    const labels = [...new Set(set.modulated.flatMap(({ irreps }) => irreps))];
    const pairs = labels.flatMap((a, index) => labels.slice(index + 1).map((b) => [a, b]));
    const both = await listed("P b n m", "0,u,0", sites, { cell, together: pairs });
    const polar = both.set.modulated.filter(
      ({ consequences, superspace }) =>
        consequences?.polarization.induced === true && superspace.operators.length === 4,
    );
    // The A-type b wave is in the irrep that holds (0, b, 0) with A signs, the c wave in that with (0, 0, c): together
    // m m 2 about c.
    expect(polar.map(({ consequences }) => consequences?.polarization.form.join())).toContain("0,0,Pz");
    expect(polar.every(({ severalIrreps }) => severalIrreps)).toBe(true);
  });
});
