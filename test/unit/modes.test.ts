import { smallIrreps } from "@kvane/core/irreps";
import { manifold, parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import {
  constraintTexts,
  type Mode,
  ownWriting,
  type Phase,
  type SiteModes,
  siteModes,
  starModes,
  writtenSite,
} from "@kvane/core/modes";
import { type Cell, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { letterOf } from "#core/modes/constraint-table.js";
import { phaseText } from "#core/modes/phase-text.js";
import { modesOf } from "../support/decomposition.js";
import { groupOf } from "../support/parsed-groups.js";
import { constraintProblems } from "../support/validate-constraints.js";
import { fieldProblems } from "../support/validate-field.js";
import { reversalProblems } from "../support/validate-minus-k.js";
import { modeProblems } from "../support/validate-modes.js";
import { orderParameterProblems } from "../support/validate-order-parameter.js";
import { site, wave } from "../support/written.js";

/** Orbits that split, several copies, dimensions above 1, complex and pseudoreal irreps, k ≡ −k, in the star and not. */
const cases: readonly (readonly [string, string, string])[] = [
  ["P 1", "1/5 0 0", "0.1 0.2 0.3"],
  ["P n m a", "0 0 0", "0 0 1/2"],
  ["P n m a", "0 1/5 0", "0.1 0.2 0.3"],
  ["P n m a", "1/2 1/2 1/2", "0.1 1/4 0.3"],
  ["P b n m", "0 2/7 0", "-0.017 0.07 1/4"],
  ["P 2/c", "-1/4 1/2 1/2", "1/2 0.685 1/4"],
  ["P 41", "0 0 1/2", "0.1 0.2 0.3"],
  ["P 61", "0 0 1/4", "0.1 0.2 0.3"],
  ["P 63/m m c", "1/3 1/3 0", "1/3 2/3 1/4"],
  ["P 63/m m c", "1/3 1/3 1/2", "0.17 0.34 1/4"],
  ["P 21 3", "1/5 1/5 1/5", "0.138 0.138 0.138"],
  ["P 21 3", "1/2 1/2 1/2", "0.138 0.138 0.138"],
  ["I 41/a m d:2", "1/2 1/2 1/2", "0 1/4 3/8"],
  ["R -3 m:H", "1/3 1/3 0", "0 0 1/2"],
  ["F d -3 m:2", "0 1/2 1", "1/2 1/2 1/2"],
  ["F m -3 m", "1/2 1/2 1/2", "0 0 0"],
  ["P 4/n:1", "1/2 1/2 1/2", "0 0 0.2"],
];

function problemsOf(group: string, modes: SiteModes): string[] {
  const parsed = groupOf(group);
  return [
    ...modeProblems(parsed, modes),
    ...reversalProblems(parsed, modes),
    ...constraintProblems(parsed, modes),
    ...orderParameterProblems(parsed, modes),
  ];
}

describe("modes", () => {
  test.each(cases)("of %s at %s, site %s obey the laws", (group, k, position) => {
    const modes = modesOf(group, k, position);
    expect(problemsOf(group, modes)).toEqual([]);
    expect(fieldProblems(groupOf(group), modes)).toEqual([]);
  });

  test.each(cases.slice(0, 6))("of %s at %s, site %s obey them for displacements", (group, k, position) => {
    const parsed = groupOf(group);
    const irreps = smallIrreps(parsed, wave(k));
    const modes = siteModes(parsed, irreps, siteOrbit(parsed, site("M", position), null), { axial: false });
    expect(modeProblems(parsed, modes)).toEqual([]);
    expect(fieldProblems(parsed, modes)).toEqual([]);
  });

  test.each([
    ["P n m a", "0 1/5 0", "0.1 1/4 0.3"],
    ["P 63 c m", "1/3 1/3 1/5", "1/3 2/3 0"],
    ["I 41/a", "0 0 1/5", "0 1/4 1/8"],
    ["P b n m", "0 2/7 0", "-0.017 0.07 1/4"],
    ["P 21 1 1", "1/5 0 0", "0.1 0.2 0.3"],
    ["P 1 1 n", "1/5 1/7 0", "0.1 0.2 0.3"],
    ["P 42/m n m", "0 0 1/5", "0 1/2 0"],
    ["I 4/m m m", "0 0 1/5", "0.1 0.2 0.3"],
  ])("of %s on the line through %s, site %s obey them with open letters", (group, k, position) => {
    const { form } = manifold(groupOf(group), wave(k), { withInversion: false });
    expect(problemsOf(group, modesOf(group, { ...form, values: null, uncertainties: null }, position))).toEqual([]);
  });

  test("say which atoms have no moment for any amplitude", () => {
    const modes = modesOf("P n m a", "1/2 0 0", "0 0 0");
    for (const part of modes.irreps) {
      const empty = modes.orbit.positions.flatMap((_, atom) =>
        part.modes.every((mode) =>
          mode.moments[atom]?.vector.every(({ coefficients }) => coefficients.every((c) => c === 0)),
        )
          ? [atom]
          : [],
      );
      expect(part.vanishingAtoms).toEqual(part.multiplicity === 0 ? [] : empty);
    }
  });

  test("even at one atom and odd at the other leave one of them without a moment", () => {
    // 4/m, two atoms on inversion centres; −1 moves that at x = 1/2 by −a, and e^{2πi k·a} = −1.
    const modes = modesOf("P 4/m", "1/2 0 0", "0 1/2 0");
    const { operators } = groupOf("P 4/m");
    const inversion = modes.representations.littleGroup.operators.findIndex(
      (index) => operators[index]?.rotation.join() === "-1,0,0,0,-1,0,0,0,-1",
    );
    const [first] = modes.orbit.positions;
    const atHalf = first?.[0][0] === 0 ? 1 : 0;
    const found = modes.irreps.map(({ irrep, vanishingAtoms }) => [
      irrep.characters[inversion]?.factor.coefficients[0],
      vanishingAtoms,
    ]);
    expect(found.length).toBe(4);
    for (const [parity, vanishing] of found) expect(vanishing).toEqual([parity === 1 ? atHalf : 1 - atHalf]);
  });

  test.each(cases)("of %s at %s, site %s have their suborbits in rising order", (group, k, position) => {
    const { suborbits, orbit } = modesOf(group, k, position);
    const rising = (list: readonly number[]) => [...list].sort((a, b) => a - b);
    for (const atoms of suborbits) expect(atoms).toEqual(rising(atoms));
    expect(rising(suborbits.flat())).toEqual(orbit.positions.map((_, atom) => atom));
  });

  test("tell atoms apart whose coordinates have the same digits in a row", () => {
    // 1, 12, 0 and 11, 2, 0 twentieths: the glide plane across c takes one to the other, where it turns (u, v, w) into
    // (−u, −v, w), at k = 0 with either sign.
    const { irreps } = modesOf("P 1 1 n", "0 0 0", "1/20 12/20 0");
    expect(irreps.map(({ constraint }) => constraint.join(" ")).sort()).toEqual([
      "(u, v, w) (-u, -v, w)",
      "(u, v, w) (u, v, -w)",
    ]);
  });

  test("are not made for the orbit of another group", () => {
    // Without an inversion the orbit has one atom, with it two.
    const group = groupOf("P -1");
    const orbit = siteOrbit(groupOf("P 1"), site("M", "0.1 0.2 0.3"), null);
    expect(() => siteModes(group, smallIrreps(group, wave("0 0 0")), orbit)).toThrow("off its orbit");
  });

  test("in lattice components are the same with a cell and without", () => {
    const group = groupOf("P n m a");
    const modes = modesOf("P n m a", "0 1/5 0", "0.1 0.2 0.3");
    const cell: Cell = { a: 4, b: 5, c: 7, alpha: 90, beta: 90, gamma: 90 };
    const numbers = (given: Cell | null) =>
      writtenSite(group, modes, { convention: ownWriting, cell: given, star: false }).irreps.map((part) =>
        part.modes.map((mode) => mode.numbers),
      );
    expect(numbers(cell)).toEqual(numbers(null));
    // The first entry of a basis vector is 1, whatever the length of its axis.
    expect(numbers(cell)[0]?.[0]?.[0]?.[0]).toEqual([1, 0]);
  });

  test("of an irrep that does not occur have no parameters", () => {
    // mm2 about k: moments along x, y and z belong to three of the four irreps.
    const parts = modesOf("P m m m", "0 0 1/5", "0 0 0").irreps;
    const counts = parts.map(({ multiplicity, freeParameters, freeParametersWithMinusK, minusK }) => [
      multiplicity,
      freeParameters,
      freeParametersWithMinusK,
      minusK === null,
    ]);
    // One complex amplitude each; one order parameter has no more.
    expect(counts.sort()).toEqual([
      [0, 0, 0, true],
      [1, 2, 2, false],
      [1, 2, 2, false],
      [1, 2, 2, false],
    ]);
  });
});

describe("modes on the other arms", () => {
  const group = groupOf("P m 1 1");
  const irreps = smallIrreps(group, wave("1/5 0 0"));
  const orbit = siteOrbit(group, site("M", "0.1 0.2 0.3"), null);

  // The plane across a takes k to −k: it turns displacements along a over, of moments those along b and c.
  test.each([
    ["displacements", false, [-1, 1, 1]],
    ["moments", true, [1, -1, -1]],
  ] as const)("are %s that the operator has turned", (_what, axial, signs) => {
    const modes = siteModes(group, irreps, orbit, { axial });
    expect(modes.axial).toBe(axial);
    const vectors = (list: readonly Mode[]) =>
      list.flatMap(({ moments }) =>
        moments.map(({ vector }) => vector.map(({ coefficients }) => coefficients[0] as number)),
      );
    const [first, second] = starModes(group, modes).map((arm) => arm.irreps.flatMap((part) => vectors(part.modes)));
    const turned = (first as number[][]).map((vector) =>
      vector.map((entry, at) => entry * (signs[at] as number) + 0).join(),
    );
    // Both atoms change places.
    expect((second as number[][]).map((vector) => vector.join()).sort()).toEqual(turned.sort());
  });

  test("are made when they are asked for", () => {
    const arms = (star: boolean) =>
      writtenSite(group, siteModes(group, irreps, orbit), { convention: ownWriting, cell: null, star }).arms;
    expect(arms(false)).toBeNull();
    expect(arms(true)?.length).toBe(2);
  });
});

describe("tables", () => {
  // A glide plane across c by half of a = b' or b = c'. In the axes with a' = a+b+c it takes (1,0,0) to (−1,2,2), and the
  // components of k in the plane are (u+v,u,v).
  test.each([
    ["P 1 1 a", "u,v,0", "kx", "(-u, -v, w)", "(u, v, -w)"],
    ["P 1 1 a (a+b+c,a,b)", "u+v,u,v", "ky", "(u, -2u-v, -2u-w)", "(-u, 2u+v, 2u+w)"],
    ["P 1 1 b (a+b+c,a,b)", "u+v,u,v", "kz", "(u, -2u-v, -2u-w)", "(-u, 2u+v, 2u+w)"],
  ])("of %s at %s have one phase behind the bracket, in %s", (name, k, component, ...turned) => {
    // S₂ = D(g)⁻¹ det(R) R S₁ with D(g) = ± e^{2πi k·t}, as D(g)² = e^{+2πi k·2t}; no atom leaves the cell.
    const modes = modesOf(name, placeWaveVector(groupOf(name), parseWaveVector(k)).k, "0 0.1 0.2");
    expect(modes.irreps.map(({ constraint }) => constraint.join(" ")).sort()).toEqual(
      turned.map((vector) => `(u, v, w) ${vector}·e^{-2πi·${component}/2}`).sort(),
    );
  });

  test("have phases that the components of k make, and no others", () => {
    // Of (u+v, u+v, 0) half of u+v is half of kx; half of u is no multiple of a component.
    const k = { components: parseWaveVector("u+v,u+v,0").components, values: null, uncertainties: null };
    const text = (...coefficients: Phase["coefficients"]) => phaseText(k, { constant: [0, 1], coefficients });
    expect(text([1, 2], [1, 2], [0, 1])).toBe("e^{2πi·kx/2}");
    expect(() => text([1, 2], [0, 1], [0, 1])).toThrow("more than the components");
  });

  test("name amplitudes u v w first, with primes where the alphabet runs out", () => {
    const names = Array.from({ length: 200 }, (_, index) => letterOf(index));
    expect(names.slice(0, 3)).toEqual(["u", "v", "w"]);
    expect(new Set(names).size).toBe(200);
    const again = names.indexOf("u'");
    expect(names.slice(again, 2 * again)).toEqual(names.slice(0, again).map((name) => `${name}'`));
  });

  test("in μB have a ratio of axes in front of a letter, to six digits", () => {
    // The plane across a takes a + c to c − a, that is c' to c' − 2a: beside u stands 2w, in μB 2a/|a+c| = √2 times w.
    const group = groupOf("P m 1 1 (a,b,a+c)");
    const modes = modesOf("P m 1 1 (a,b,a+c)", "0 0 0", "0.1 0.2 0.3");
    const cell: Cell = { a: 3, b: 4, c: 3 * Math.SQRT2, alpha: 90, beta: 45, gamma: 90 };
    const tables = modes.irreps.map((part) => constraintTexts(group, modes, part, { cell }));
    expect(tables.map(({ lattice }) => lattice.join(" ")).sort()).toEqual([
      "(u, v, w) (-u-2w, v, w)",
      "(u, v, w) (u+2w, -v, -w)",
    ]);
    expect(tables.map(({ crystal }) => crystal?.join(" ")).sort()).toEqual([
      "(u, v, w) (-u-1.41421w, v, w)",
      "(u, v, w) (u+1.41421w, -v, -w)",
    ]);
  });
});
