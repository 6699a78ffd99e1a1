import { smallIrreps } from "@kvane/core/irreps";
import { parseWaveVector, placeWaveVector } from "@kvane/core/kvectors";
import {
  constraintTexts,
  type FourierConvention,
  momentSizes,
  orderParameterTexts,
  ownConvention,
  ownWriting,
  type SiteModes,
  siteModes,
  starModes,
  writtenSite,
} from "@kvane/core/modes";
import { type Cell, siteOrbit } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import type { Complex } from "../support/complex.js";
import { modesOf } from "../support/decomposition.js";
import { componentsOf } from "../support/float-group.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { skewedCell, withDiagonalC } from "../support/skewed-cell.js";
import { kLetters, lettersIn, type Vector, vectorOf } from "../support/validate-constraints.js";
import { floatReversal, reversedField } from "../support/validate-minus-k.js";
import { floatModes, rankOf } from "../support/validate-modes.js";
import { orderParameterProblems } from "../support/validate-order-parameter.js";
import { site as writtenSiteOf } from "../support/written.js";

type Case = readonly [group: string, k: string, site: string];

const plainCell: Cell = { a: 4, b: 5, c: 7, alpha: 90, beta: 90, gamma: 90 };
const edges = ({ a, b, c }: Cell): readonly number[] => [a, b, c];

/** What the texts say with one letter at 1, the first component of the order parameter at 1 and all else at 0. */
function unitOf(modes: SiteModes, texts: readonly string[], letter: string): Vector {
  const names = lettersIn(texts);
  const value = (name: string): Complex => [name === letter || name === "ξ1" ? 1 : 0, 0];
  return vectorOf(texts, { ...kLetters(modes), ...Object.fromEntries(names.map((name) => [name, value(name)])) });
}

function entriesOf({ real, imaginary }: Vector): Complex[] {
  return [...real].map((re, at) => [re, imaginary[at] as number]);
}

const size = ([re, im]: Complex): number => Math.hypot(re, im);

/** 2k in L*, complex irreps among them, and not; dimensions 1 to 3; irreps that do not occur; orbits that split. */
const cases: readonly Case[] = [
  ["P 4", "0 0 1/2", "0 0 0"],
  ["P 2", "0 1/5 1/2", "0.1 0.2 0.3"],
  ["P 4/m m m", "0 0 1/5", "0 0 0"],
  ["P n m a", "1/2 1/5 0", "0.1 0.2 0.3"],
  ["P 63", "1/3 1/3 0", "0.1 0.2 0.3"],
  ["P b n m", "0 2/7 0", "-0.017 0.07 1/4"],
  ["P 21 3", "1/2 1/2 1/2", "0.138 0.138 0.138"],
];

describe("tables of what is allowed", () => {
  // A plane of k is one set of vectors however its letters are chosen; the exponents are in kx, ky, kz.
  test.each([
    ["P 1 1 a", "u,v,0", "u+v,u,0"],
    ["P 1 1 a", "u,v,0", "u-v,v,0"],
    ["P 1 1 a", "u,v,0", "u-1/5,v,0"],
    ["P 2a -2a", "u,v,0", "u+v,u,0"],
    ["R -3:H", "u,v,w", "-u-v,u,w"],
  ])("of %s are the same at %s and at %s", (name, plain, mixed) => {
    const texts = (k: string) =>
      siteModesAt(name, k)
        .irreps.flatMap(({ constraint }) => constraint.join())
        .sort();
    expect(texts(mixed)).toEqual(texts(plain));
  });

  test("of one atom on a fourfold axis are a wave along the axis and a helix of each hand", () => {
    // (x, y, z) → (−y, x, z) has the eigenvectors (0, 0, 1), (1, i, 0) and (1, −i, 0).
    const texts = (k: string) => modesOf("P 4", k, "0 0 0").irreps.map(({ constraint }) => constraint.join());
    expect(texts("0 0 1/5").sort()).toEqual(["", "(0, 0, u)", "(u, -i·u, 0)", "(u, i·u, 0)"]);
    // At k = 0 both hands together are any moment across the axis.
    expect(texts("0 0 0").sort()).toEqual(["", "(0, 0, u)", "(u, v, 0)", "(u, v, 0)"]);
  });

  test.each(cases)("in kvane's own convention are those of the modes: %s at %s, site %s", (name, k, site) => {
    const [group, modes] = [groupOf(name), modesOf(name, k, site)];
    for (const part of modes.irreps) {
      expect(constraintTexts(group, modes, part)).toEqual({ lattice: part.constraint, crystal: null });
      expect(constraintTexts(group, modes, part, { cell: plainCell }).lattice).toEqual(part.constraint);
      if (part.multiplicity === 0) expect(part.constraint).toEqual([]);
      const own = part.minusK?.constraint ?? null;
      expect(orderParameterTexts(group, modes, part)?.lattice ?? null).toEqual(own);
      expect(orderParameterTexts(group, modes, part, { cell: plainCell })?.lattice ?? null).toEqual(own);
    }
  });

  test.each(cases)("have phases of less than half a turn behind the bracket: %s at %s, site %s", (name, k, site) => {
    const modes = modesOf(name, k, site);
    const texts = modes.irreps.flatMap(({ constraint, minusK }) => [...constraint, ...(minusK?.constraint ?? [])]);
    for (const text of texts) {
      expect(text).not.toContain("·-1");
      const [, , top = "0", bottom = "1"] = /\)·e\^\{(-?)(\d*)i?π?i?(?:\/(\d+))?\}$/.exec(text) ?? [];
      expect(Number(top === "" ? 1 : top) / Number(bottom)).toBeLessThan(1);
      expect(text).not.toMatch(/\)·e\^\{-/);
    }
  });

  const orthohexagonal: Cell = { a: 5, b: 5 * Math.sqrt(3), c: 8, alpha: 90, beta: 90, gamma: 90 };
  const doubled: Cell = { ...plainCell, a: 4, b: 8 };

  test.each<readonly [...Case, Cell]>([
    ["P 3 (a,a+2b,c)", "0 0 1/5", "0 0 0", orthohexagonal],
    ["P 3 (a,a+2b,c)", "0 0 1/2", "0.1 0.2 0.3", orthohexagonal],
    ["P n m a (a,b,a+c)", "0 2/7 0", "0.1 0.2 0.3", skewedCell],
    ["P 4 (a,2b,c)", "0 0 1/5", "0.1 0.1 0.3", doubled],
    // The partners of a copy begin along a and along 2b.
    ["P 42/m n m (a,2b,c)", "0 0 1/5", "0 0 0", doubled],
  ])("in μB are those in lattice components times the axes: %s at %s, site %s", (name, k, site, cell) => {
    const [group, modes] = [groupOf(name), modesOf(name, k, site)];
    let compared = 0;
    for (const part of modes.irreps)
      for (const written of [
        constraintTexts(group, modes, part, { cell }),
        orderParameterTexts(group, modes, part, { cell }),
      ]) {
        if (written === null || written.crystal === null) continue;
        const { lattice, crystal } = written;
        for (const text of crystal) expect(text).not.toContain("·-");
        const leading = new Map<string, number>();
        // The first partner of a copy first, wherever it stands in the text.
        for (const letter of lettersIn(lattice)
          .filter((one) => !one.startsWith("ξ"))
          .sort()) {
          const here = entriesOf(unitOf(modes, lattice, letter));
          const there = entriesOf(unitOf(modes, crystal, letter));
          // Partners of one copy share the axis of its first letter.
          const stem = letter.replace(/\d+$/, "");
          const first = here.findIndex((entry) => size(entry) > 1e-9);
          if (!leading.has(stem)) leading.set(stem, edges(cell)[first % 3] as number);
          here.forEach(([re, im], at) => {
            const ratio = (edges(cell)[at % 3] as number) / (leading.get(stem) as number);
            const [x, y] = there[at] as Complex;
            expect(Math.hypot(x - ratio * re, y - ratio * im)).toBeLessThan(1e-5);
            compared += size([re, im]) > 1e-9 ? 1 : 0;
          });
        }
      }
    expect(compared).toBeGreaterThan(0);
  });

  test("in μB are left out where symmetry alone makes the axes equally long, whatever their rounding", () => {
    const random = seeded(72);
    const nearly = (): number => 1 + 1e-5 * random.next();
    for (const [name, gamma] of [
      ["P 3", 120],
      ["P 2 3", 90],
    ] as const) {
      const modes = modesOf(name, "0 0 0", "0.1 0.2 0.3");
      for (let round = 0; round < 20; round++) {
        const a = 3 + 4 * random.next();
        const cell = { a, b: a * nearly(), c: a * nearly(), alpha: 90, beta: 90, gamma };
        for (const part of modes.irreps)
          expect(constraintTexts(groupOf(name), modes, part, { cell }).crystal).toBeNull();
      }
    }
  });

  test("with phases by position have plain letters on the first atom of each suborbit", () => {
    const [group, modes] = [groupOf("P b n m"), modesOf("P b n m", "0 2/7 0", "-0.017 0.07 1/4")];
    expect(modes.suborbits.length).toBeGreaterThan(1);
    for (const exponent of ["minus", "plus"] as const)
      for (const part of modes.irreps) {
        const convention: FourierConvention = { exponent, phase: "position", factor: "one" };
        const { lattice } = constraintTexts(group, modes, part, { convention });
        for (const [first] of modes.suborbits) expect(lattice[first as number]).not.toContain("e^");
      }
  });
});

describe("tables of one order parameter", () => {
  /** Suborbits that g₀ keeps and suborbits that it exchanges; couplings with roots; several components. */
  const hard: readonly Case[] = [
    ["P 4 2 2", "1/5 1/5 0", "11/16 -5/16 0"],
    ["P 42/n b c:2", "1/2 1/5 0", "0.137 1/4 -1/2"],
    ["P 31 1 2", "0 0 1/5", "1/8 -7/16 1/2"],
    ["P b n m", "0 2/7 0", "-0.017 0.07 1/4"],
    ["I 41/a m d:2", "1/2 1/5 1/2", "0.1 1/4 0.3"],
  ];

  test.each(hard)("obey the relation between k and −k: %s at %s, site %s", (name, k, site) => {
    expect(orderParameterProblems(groupOf(name), modesOf(name, k, site))).toEqual([]);
  });

  test.each(hard)("have each letter without a factor where it comes first: %s at %s, site %s", (name, k, site) => {
    const modes = modesOf(name, k, site);
    let found = 0;
    for (const { minusK } of modes.irreps) {
      const texts = minusK?.constraint ?? null;
      if (texts === null) continue;
      const letters = lettersIn(texts).filter((one) => !one.startsWith("ξ"));
      // Letters are given out in this order.
      expect([...letters].sort()).toEqual(
        ["u", "v", "w", "p", "q", "r", "s", "t", "f", "g", "h", "l"].slice(0, letters.length).sort(),
      );
      for (const letter of letters) {
        const first = entriesOf(unitOf(modes, texts, letter)).find((entry) => size(entry) > 1e-9) as Complex;
        expect(size(first)).toBeCloseTo(1, 9);
        found += 1;
        // The common phase is free unless a letter meets its conjugate.
        if (letter === "u" && !texts.some((text) => text.includes("u*"))) expect(first[0]).toBeCloseTo(1, 9);
      }
    }
    expect(found).toBeGreaterThan(0);
  });

  const oneDimensional: readonly Case[] = [
    ["P b n m", "0 2/7 0", "-0.017 0.07 1/4"],
    ["P 4 2 2", "1/5 1/5 0", "11/16 -5/16 0"],
    ["P 2/c", "-1/4 1/2 1/2", "1/2 0.685 1/4"],
  ];
  const conventions: readonly FourierConvention[] = (["minus", "plus"] as const).flatMap((exponent) =>
    (["lattice", "position"] as const).map((phase) => ({ exponent, phase, factor: "one" as const })),
  );

  test.each(oneDimensional)("obey it in every convention, in μB too: %s at %s, site %s", (name, k, site) => {
    const [group, modes] = [groupOf(name), modesOf(name, k, site)];
    const read = floatModes(group, modes);
    const reversal = floatReversal(group, modes);
    const random = seeded(71);
    const length = 3 * modes.orbit.positions.length;
    let tried = 0;
    modes.irreps.forEach((part, irrep) => {
      if (part.minusK?.constraint == null || part.irrep.dimension !== 1 || reversal === null) return;
      for (const convention of conventions) {
        const written = orderParameterTexts(group, modes, part, { convention, cell: plainCell });
        for (const texts of [written?.lattice, written?.crystal]) {
          if (!texts) continue;
          const letters = lettersIn(texts);
          const isComplex = (name: string): boolean => texts.some((text) => text.includes(`${name}*`));
          expect(letters.length + letters.filter(isComplex).length).toBe(part.multiplicity);
          const values = letters.map((one): [string, Complex] => [
            one,
            [random.next() - 0.5, isComplex(one) ? random.next() - 0.5 : 0],
          ]);
          const there = vectorOf(texts, { ...kLetters(modes), ...Object.fromEntries(values) });
          // Scales of letters are free, so along unit vectors the lengths of the axes may be divided out.
          const field = ownField(there, modes, convention, texts === written?.crystal ? edges(plainCell) : [1, 1, 1]);
          const own = read.modes[irrep] ?? [];
          expect(rankOf([...own, field], length)).toBe(own.length);
          expect(rankOf([field, reversedField(read, reversal.operator, field)], length)).toBe(1);
          tried += 1;
        }
      }
    });
    expect(tried).toBeGreaterThan(3);
  });

  test("with phases by position has plain letters on the first atoms of each pair of suborbits", () => {
    // The little group is that of the mirror across c; −1 exchanges its four suborbits in pairs.
    const [group, modes] = [groupOf("P n m a"), modesOf("P n m a", "1/5 1/7 0", "0.1 0.2 0.3")];
    for (const exponent of ["minus", "plus"] as const)
      for (const part of modes.irreps) {
        const convention: FourierConvention = { exponent, phase: "position", factor: "one" };
        const { lattice } = orderParameterTexts(group, modes, part, { convention }) ?? { lattice: [] };
        const images = part.minusK?.suborbitImages ?? [];
        expect(images.filter((image, suborbit) => image > suborbit).length).toBe(2);
        modes.suborbits.forEach(([first], suborbit) => {
          if ((images[suborbit] as number) > suborbit) expect(lattice[first as number]).not.toContain("e^");
        });
      }
  });

  test("of irreps that are not real have as many parameters as order parameter and couplings, less a common factor", () => {
    const parametersOf = (group: string, k: string, site: string, wanted: string): number[] =>
      modesOf(group, k, site)
        .irreps.filter(
          ({ irrep, multiplicity }) => irrep.reality === wanted && irrep.dimension === 2 && multiplicity === 2,
        )
        .map(({ freeParametersWithMinusK }) => freeParametersWithMinusK);
    // λ ⊗ ξ with λ and ξ in C²: 4 + 4 real numbers, less the complex factor that may go from one to the other.
    expect(new Set(parametersOf("P 6/m c c", "1/3 1/3 1/2", "1/3 2/3 1/2", "complex"))).toEqual(new Set([6]));
    // Two copies of a pseudoreal irrep are one physically irreducible representation, of 2 · 2 · 2 real dimensions.
    expect(new Set(parametersOf("P -3 c 1", "1/3 1/3 1/2", "0 0 1/2", "pseudoreal"))).toEqual(new Set([8]));
  });
});

/** Components in kvane's own convention, from the definition of both: S(own) = S* or S, times e^{−2πi k·r}. */
function ownField(
  there: Vector,
  modes: SiteModes,
  { exponent, phase }: FourierConvention,
  lengths: readonly number[],
): Vector {
  const k = componentsOf(modes.representations.k);
  const entries = entriesOf(there).map(([re, written], at): Complex => {
    const position = (modes.orbit.positions[Math.floor(at / 3)] ?? []).map(([top, bottom]) => top / bottom);
    const turns = phase === "position" ? position.reduce((sum, x, axis) => sum + x * (k[axis] as number), 0) : 0;
    const [cosine, sine] = [Math.cos(2 * Math.PI * turns), -Math.sin(2 * Math.PI * turns)];
    const im = exponent === "plus" ? -written : written;
    const length = lengths[at % 3] as number;
    return [(re * cosine - im * sine) / length, (re * sine + im * cosine) / length];
  });
  return { real: Float64Array.from(entries, ([re]) => re), imaginary: Float64Array.from(entries, ([, im]) => im) };
}

describe("basis vectors", () => {
  test.each<Case>([
    ["P n n n:2", "0 1/5 1/2", "-1/4 0 3/4"],
    ["P b a n:2", "1/5 1/2 0", "0 1/4 0"],
    ["P n m a", "1/2 1/2 1/2", "0.1 1/4 0.3"],
    ["P 63/m m c", "1/3 1/3 1/2", "0.17 0.34 1/4"],
  ])("of first partners are in reduced echelon form: %s at %s, site %s", (name, k, site) => {
    const read = floatModes(groupOf(name), modesOf(name, k, site));
    for (const list of read.modes) {
      const rows = list.filter(({ partner }) => partner === 1).map(entriesOf);
      const leading = rows.map((row) => row.findIndex((entry) => size(entry) > 1e-9));
      expect(leading).toEqual([...leading].sort((a, b) => a - b));
      leading.forEach((place, at) => {
        rows.forEach((row, other) => {
          const [re, im] = row[place] as Complex;
          expect(Math.hypot(re - (other === at ? 1 : 0), im)).toBeLessThan(1e-9);
        });
      });
    }
  });

  test("of displacements and of moments on the first arm are those of k itself", () => {
    for (const axial of [true, false]) {
      const group = groupOf("P n m a");
      const { representations, orbit } = modesOf("P n m a", "1/5 1/7 1/2", "0.1 1/4 0.3");
      const modes = siteModes(group, representations, orbit, { axial });
      const [first, ...others] = starModes(group, modes);
      expect(first?.irreps.map((irrep) => irrep.modes)).toEqual(modes.irreps.map((irrep) => irrep.modes));
      expect(others.length).toBe(3);
      // Every arm has them all, and in the same order.
      for (const { irreps } of others)
        expect(
          irreps.map((irrep) => irrep.modes.map(({ copy, partner, suborbit }) => [copy, partner, suborbit])),
        ).toEqual(
          modes.irreps.map((irrep) => irrep.modes.map(({ copy, partner, suborbit }) => [copy, partner, suborbit])),
        );
    }
  });

  test("along the crystal axes begin with 1, the first partner of each copy", () => {
    // Partners of the plane across the axis begin along a and along 2b.
    const name = "P 4 2 2 (a,2b,c)";
    const cell: Cell = { a: 4, b: 8, c: 7, alpha: 90, beta: 90, gamma: 90 };
    const convention = { ...ownWriting, components: "crystal" as const };
    const written = writtenSite(groupOf(name), modesOf(name, "0 0 0", "0 0 0"), { convention, cell, star: false });
    const firsts = written.irreps.flatMap(({ modes }) => modes.filter(({ partner }) => partner === 1));
    expect(firsts.length).toBe(2);
    for (const { numbers } of firsts) {
      const leading = numbers?.flat().find((entry) => size(entry) > 1e-9);
      expect(leading?.[0]).toBeCloseTo(1, 9);
      expect(leading?.[1]).toBeCloseTo(0, 9);
    }
  });

  test("are written in kvane's own convention unless another one is asked for", () => {
    // docs/conventions.md, Moments and phases: M = S e^{−2πi k·T} + c.c.
    expect(ownConvention).toEqual({ exponent: "minus", phase: "lattice", factor: "one" });
    expect(ownWriting).toEqual({ ...ownConvention, components: "lattice" });
  });

  test("without a moment on an atom have no phase there", () => {
    for (const { modes } of modesOf("P n m a", "1/2 1/5 0", "0.1 1/4 0.3").irreps)
      for (const { moments } of modes)
        for (const { phase, vector } of moments)
          if (vector.every(({ coefficients }) => coefficients.every((entry) => entry === 0)))
            expect(phase.constant).toEqual([0, 1]);
  });
});

test("moments in a plane across any axis are not forced to be parallel, moments along a skew axis are", () => {
  const found = (group: string, k: string, cell: Cell): string[] => {
    const modes = modesOf(group, k, "0 0 0");
    return modes.irreps
      .filter(({ multiplicity }) => multiplicity > 0)
      .map((part) => {
        const sizes = momentSizes(groupOf(group), cell, modes, part);
        const letters = `${sizes?.equalAmplitude ? "E" : ""}${sizes?.constantMoment ? "C" : ""}${sizes?.collinear ? "L" : ""}`;
        return `${part.multiplicity} ${letters}`;
      })
      .sort();
  };
  // Twofold axis along k: one irrep along it, a wave; one across it, where the end of the moment may go in a circle.
  expect(found("P 2 1 1", "1/5 0 0", plainCell)).toEqual(["1 EL", "2 EC"]);
  expect(found("P 1 2 1", "0 1/5 0", plainCell)).toEqual(["1 EL", "2 EC"]);
  expect(found("P 1 1 2", "0 0 1/5", plainCell)).toEqual(["1 EL", "2 EC"]);
  // The old c axis is the new one less a: a wave with two components, along one line.
  expect(found("P m m m (a,b,a+c)", "0 0 1/5", withDiagonalC(plainCell))).toEqual(["1 EL", "1 EL", "1 EL"]);
});

function siteModesAt(name: string, k: string): SiteModes {
  const group = groupOf(name);
  const { k: placed } = placeWaveVector(group, parseWaveVector(k));
  return siteModes(group, smallIrreps(group, placed), siteOrbit(group, writtenSiteOf("A", "0.1 0.2 0.3"), null));
}
