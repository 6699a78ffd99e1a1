import type { WaveVector } from "@kvane/core/kvectors";
import {
  constraintTexts,
  convertComponents,
  type FourierConvention,
  fromConvention,
  type ModeMoment,
  type MomentComponents,
  orderParameterTexts,
  ownWriting,
  type SiteModes,
  toConvention,
  type WritingConvention,
  writtenSite,
} from "@kvane/core/modes";
import { type Cell, parseCell } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import type { Complex } from "../support/complex.js";
import { modesOf } from "../support/decomposition.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { skewedCell } from "../support/skewed-cell.js";
import { kLetters, lettersIn, vectorOf } from "../support/validate-constraints.js";
import { floatModes } from "../support/validate-modes.js";

const seed = 31;

interface Case {
  readonly group: string;
  readonly k: string;
  readonly position: string;
  /** 2k ∈ L*: no conjugate term. */
  readonly half?: boolean;
}

const cases: readonly Case[] = [
  { group: "P b n m", k: "0 2/7 0", position: "-0.017 0.07 1/4" },
  { group: "P 2/c", k: "-1/4 1/2 1/2", position: "1/2 0.685 1/4" },
  { group: "P 63/m m c", k: "1/3 1/3 0", position: "0.17 0.34 1/4" },
  { group: "P 21 3", k: "1/5 1/5 1/5", position: "0.138 0.138 0.138" },
  { group: "I 41/a m d:2", k: "0 0 1", position: "0 1/4 3/8", half: true },
  { group: "P n m a", k: "0 1/2 0", position: "0.1 0.2 0.3", half: true },
];

const conventions: readonly FourierConvention[] = (["minus", "plus"] as const).flatMap((exponent) =>
  (["lattice", "position"] as const).flatMap((phase) =>
    (["one", "half"] as const).map((factor) => ({ exponent, phase, factor })),
  ),
);

const named = cases.flatMap((one) =>
  conventions.map(
    (convention) => [`${one.group} ${one.k}: ${Object.values(convention).join(" ")}`, one, convention] as const,
  ),
);

function exp(turns: number): Complex {
  return [Math.cos(2 * Math.PI * turns), Math.sin(2 * Math.PI * turns)];
}

function times([a, b]: Complex, [c, d]: Complex): Complex {
  return [a * c - b * d, a * d + b * c];
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, value, index) => sum + value * (b[index] as number), 0);
}

/** Components of k and of a position as floats. */
function numbers(k: WaveVector): number[] {
  return k.components.map(({ constant: [top, bottom] }) => top / bottom);
}

/**
 * M_j(T) from a Fourier component, straight from the definition of the convention: the wave alone where 2k ∈ L* (a
 * complex number that should come out real), else wave + c.c., halved for `half`.
 */
function field(
  components: readonly Complex[],
  k: readonly number[],
  r: readonly number[],
  t: readonly number[],
  convention: FourierConvention,
  half: boolean,
): Complex[] {
  const place = convention.phase === "position" ? t.map((value, axis) => value + (r[axis] as number)) : t;
  const wave = exp((convention.exponent === "minus" ? -1 : 1) * dot(k, place));
  return components.map((component) => {
    const value = times(component, wave);
    if (half) return value;
    return [(convention.factor === "half" ? 1 : 2) * value[0], 0];
  });
}

const own: FourierConvention = { exponent: "minus", phase: "lattice", factor: "one" };

function triple(vector: { readonly real: Float64Array; readonly imaginary: Float64Array }, atom: number): Complex[] {
  return [0, 1, 2].map((axis) => [vector.real[3 * atom + axis] as number, vector.imaginary[3 * atom + axis] as number]);
}

function expectSame(left: readonly Complex[], right: readonly Complex[]): void {
  left.forEach(([re, im], index) => {
    expect(re).toBeCloseTo(right[index]?.[0] as number, 9);
    expect(im).toBeCloseTo(right[index]?.[1] as number, 9);
  });
}

describe("conventions of Fourier components", () => {
  test.each(named)("%s: basis vectors make the same field", (_name, one, convention) => {
    const modes = modesOf(one.group, one.k, one.position);
    const group = groupOf(one.group);
    const plain = floatModes(group, modes);
    const written = writtenSite(group, modes, {
      convention: { ...convention, components: "lattice" },
      cell: null,
      star: false,
    });
    const k = numbers(modes.representations.k);
    const random = seeded(seed);
    let compared = 0;
    written.irreps.forEach((irrep, index) => {
      irrep.modes.forEach((mode, number) => {
        modes.orbit.positions.forEach((position, atom) => {
          const r = position.map(([top, bottom]) => top / bottom);
          const t = [0, 1, 2].map(() => random.below(7) - 3);
          const vector = plain.modes[index]?.[number];
          if (vector === undefined || mode.numbers === null) throw new Error("a mode without numbers");
          // Basis vectors of complex irreps are complex at 2k ∈ L* too; there only products with a wave are compared.
          const here = field(mode.numbers[atom] as readonly Complex[], k, r, t, convention, one.half === true);
          const there = field(triple(vector, atom), k, r, t, own, one.half === true);
          const conjugated = one.half === true && convention.exponent === "plus";
          expectSame(here, conjugated ? there.map(([re, im]): Complex => [re, -im]) : there);
          compared += 1;
        });
      });
    });
    expect(compared).toBeGreaterThan(3);
  });

  test.each(named)("%s: there and back is exact", (_name, one, convention) => {
    const modes = modesOf(one.group, one.k, one.position);
    const group = groupOf(one.group);
    const { k } = modes.representations;
    for (const { modes: list } of modes.irreps)
      for (const mode of list)
        mode.moments.forEach((moment, atom) => {
          const position = modes.orbit.positions[atom] as SiteModes["orbit"]["position"];
          const there = toConvention(group, k, position, moment, convention);
          const back = fromConvention(group, k, position, there, convention);
          expect(complexOf(back)).toEqual(complexOf(moment));
        });
  });

  // Letters absorb the factor.
  test.each(named.filter(([, , { factor }]) => factor === "one"))(
    "%s: tables of what is allowed span the same fields",
    (_name, one, convention) => {
      const modes = modesOf(one.group, one.k, one.position);
      const group = groupOf(one.group);
      const random = seeded(seed);
      const k = numbers(modes.representations.k);
      for (const part of modes.irreps) {
        if (part.multiplicity === 0) continue;
        const { lattice } = constraintTexts(group, modes, part, { convention });
        const names = lettersIn(lattice);
        // As many letters, and what they make is again an arrangement of the irrep: own letters that give it exist.
        expect(names.length).toBe(lettersIn(part.constraint).length);
        const values = names.map((): Complex => [random.next() - 0.5, one.half ? 0 : random.next() - 0.5]);
        const letters = Object.fromEntries(names.map((name, index) => [name, values[index] as Complex]));
        const there = vectorOf(lattice, { ...kLetters(modes), ...letters });
        const back = ownComponents(there, modes, k, { ...convention, factor: "one" });
        const units = lettersIn(part.constraint).map((name) =>
          vectorOf(part.constraint, {
            ...kLetters(modes),
            ...Object.fromEntries(lettersIn(part.constraint).map((other) => [other, [other === name ? 1 : 0, 0]])),
          }),
        );
        expect(distanceToSpan(back, units)).toBeLessThan(1e-9);
      }
    },
  );

  test("one order parameter at a Tb site of Pbnm at (0,q,0): with position phases the suborbits are conjugate", () => {
    const modes = modesOf("P b n m", "0 2/7 0", "-0.017 0.07 1/4");
    const group = groupOf("P b n m");
    const k = numbers(modes.representations.k);
    for (const part of modes.irreps) {
      const own = part.minusK?.constraint;
      if (!own) throw new Error("expected a table of one order parameter");
      const names = lettersIn(own);
      const letters = Object.fromEntries(names.map((name, index) => [name, [0.3 + index, 0.7 - index] as Complex]));
      const plain = vectorOf(own, { ...kLetters(modes), ...letters });
      const positions = modes.orbit.positions.map((position) => position.map(([top, bottom]) => top / bottom));
      const shifted = positions.map((r, atom) => triple(plain, atom).map((entry) => times(entry, exp(dot(k, r)))));
      // Atom 2 is the inverse of atom 1: M(−r) = ±M(r) makes S(2) = ±S(1)*, the sign one for all components.
      const ratio = (shifted[1] ?? []).map(([re, im], axis) => {
        const [a, b] = shifted[0]?.[axis] ?? [0, 0];
        return [re, im, a, -b];
      });
      const signs = ratio
        .filter(([, , a = 0, b = 0]) => Math.hypot(a, b) > 1e-9)
        .map(([re = 0, , a = 0]) => Math.sign(re * a));
      expect(new Set(signs).size).toBe(1);
      for (const [re = 0, im = 0, a = 0, b = 0] of ratio) {
        expect(re).toBeCloseTo((signs[0] as number) * a, 9);
        expect(im).toBeCloseTo((signs[0] as number) * b, 9);
      }
      const convention: FourierConvention = { exponent: "minus", phase: "position", factor: "one" };
      const texts = orderParameterTexts(group, modes, part, { convention });
      for (const text of texts?.lattice ?? []) expect(text).not.toContain("e^");
    }
  });
});

/** Phase and factor as one comparable number, to 12 digits. */
function complexOf({ phase, vector }: ModeMoment): unknown {
  const turns = phase.constant[0] / phase.constant[1];
  return vector.map((entry) => {
    const sum = entry.coefficients.reduce<Complex>(
      ([re, im], coefficient, power) => {
        const [a, b] = exp(power / entry.order);
        return [re + (coefficient * a) / entry.denominator, im + (coefficient * b) / entry.denominator];
      },
      [0, 0],
    );
    return times(sum, exp(turns)).map((value) => Number(value.toFixed(12)) + 0);
  });
}

/** Components in the own convention from those of another one, by the definition of both. */
function ownComponents(
  vector: { readonly real: Float64Array; readonly imaginary: Float64Array },
  modes: SiteModes,
  k: readonly number[],
  { exponent, phase }: FourierConvention,
) {
  const atoms = modes.orbit.positions.map((position, atom) => {
    const turns =
      phase === "position"
        ? dot(
            k,
            position.map(([top, bottom]) => top / bottom),
          )
        : 0;
    return triple(vector, atom).map(([re, im]) => times([re, exponent === "plus" ? -im : im], exp(-turns)));
  });
  const flat = atoms.flat();
  return { real: Float64Array.from(flat, ([re]) => re), imaginary: Float64Array.from(flat, ([, im]) => im) };
}

type Flat = { readonly real: Float64Array; readonly imaginary: Float64Array };

/** Distance of a complex vector from the span of others, by Gram–Schmidt. */
function distanceToSpan(vector: Flat, span: readonly Flat[]): number {
  const basis: Complex[][] = [];
  const complex = (flat: Flat): Complex[] => [...flat.real].map((re, index) => [re, flat.imaginary[index] as number]);
  const rest = (from: Complex[]): Complex[] =>
    basis.reduce((left, unit) => {
      const overlap = unit.reduce<Complex>(
        ([re, im], [a, b], index) => {
          const [c, d] = left[index] as Complex;
          return [re + a * c + b * d, im + a * d - b * c];
        },
        [0, 0],
      );
      return left.map(([re, im], index): Complex => {
        const [a, b] = times(overlap, unit[index] as Complex);
        return [re - a, im - b];
      });
    }, from);
  const length = (list: readonly Complex[]) => Math.sqrt(list.reduce((sum, [a, b]) => sum + a * a + b * b, 0));
  for (const one of span) {
    const left = rest(rest(complex(one)));
    const size = length(left);
    if (size > 1e-9) basis.push(left.map(([a, b]): Complex => [a / size, b / size]));
  }
  return length(rest(rest(complex(vector))));
}

const oblique: Cell = parseCell("5.1 6.3 7.7 84 97 112");

/** m·m from components along the unit vectors of the axes. */
function squaredInCrystal(cell: Cell, m: readonly number[]): number {
  const cosines = [cell.alpha, cell.beta, cell.gamma].map((angle) => Math.cos((angle * Math.PI) / 180));
  const [x = 0, y = 0, z = 0] = m;
  const [ca = 0, cb = 0, cg = 0] = cosines;
  return x * x + y * y + z * z + 2 * (y * z * ca + x * z * cb + x * y * cg);
}

describe("components of moments", () => {
  test("lattice, crystal and Cartesian components are one vector: lengths, and axes where they must lie", () => {
    const random = seeded(seed);
    for (let sample = 0; sample < 50; sample++) {
      const crystal = [random.next() - 0.5, random.next() - 0.5, random.next() - 0.5] as const;
      const lattice = convertComponents(oblique, crystal, "crystal", "lattice");
      for (const [axis, edge] of [oblique.a, oblique.b, oblique.c].entries())
        expect((lattice[axis] as number) * edge).toBeCloseTo(crystal[axis] as number, 12);
      const cartesian = convertComponents(oblique, lattice, "lattice", "cartesian");
      expect(dot(cartesian, cartesian)).toBeCloseTo(squaredInCrystal(oblique, crystal), 12);
      const back = convertComponents(oblique, cartesian, "cartesian", "crystal");
      for (const [axis, value] of back.entries()) expect(value).toBeCloseTo(crystal[axis] as number, 12);
    }
    const along = (components: readonly [number, number, number]) =>
      convertComponents(oblique, components, "crystal", "cartesian");
    expect(along([1, 0, 0])).toEqual([1, 0, 0]);
    // b in the plane of x and y, c* along z: a and b have no z.
    expect(along([0, 1, 0])[2]).toBe(0);
    expect(dot(along([1, 0, 0]), along([0, 1, 0]))).toBeCloseTo(Math.cos((112 * Math.PI) / 180), 12);
    expect(dot(along([0, 1, 0]), along([0, 0, 1]))).toBeCloseTo(Math.cos((84 * Math.PI) / 180), 12);
    expect(dot(along([1, 0, 0]), along([0, 0, 1]))).toBeCloseTo(Math.cos((97 * Math.PI) / 180), 12);
  });

  test("basis vectors in crystal and Cartesian components are the lattice ones converted, one scale a copy", () => {
    const modes = modesOf("P n m a (a,b,a+c)", "0 1/2 0", "0 0 1/2");
    const group = groupOf("P n m a (a,b,a+c)");
    const written = (components: MomentComponents) => {
      const convention: WritingConvention = { ...ownWriting, components };
      return writtenSite(group, modes, { convention, cell: skewedCell, star: false }).irreps.flatMap(
        (irrep) => irrep.modes,
      );
    };
    const [lattice, crystal, cartesian] = [written("lattice"), written("crystal"), written("cartesian")];
    lattice.forEach((mode, index) => {
      const scales = new Set<string>();
      mode.numbers?.forEach((atom, number) => {
        const edges = [skewedCell.a, skewedCell.b, skewedCell.c];
        const there = crystal[index]?.numbers?.[number] ?? [];
        atom.forEach(([re, im], axis) => {
          const [x, y] = there[axis] as Complex;
          if (Math.hypot(re, im) > 1e-9)
            scales.add((Math.hypot(x, y) / (Math.hypot(re, im) * (edges[axis] as number))).toFixed(9));
        });
        for (const part of [0, 1] as const) {
          const real = there.map((entry) => entry[part]);
          const orthogonal = (cartesian[index]?.numbers?.[number] ?? []).map((entry) => entry[part]);
          expect(dot(orthogonal, orthogonal)).toBeCloseTo(squaredInCrystal(skewedCell, real), 9);
        }
      });
      expect(scales.size).toBe(1);
    });
  });
});

describe("tables in μB along the crystal axes", () => {
  test("are left out where no relation mixes axes of unequal length", () => {
    for (const [name, cell, position] of [
      ["P n m a", "10.21 6.05 4.71 90 90 90", "0.1 0.2 0.3"],
      ["P 63/m m c", "7.14 7.14 5.9 90 90 120", "0.1 0.2 0.3"],
      // A cell given to three digits: symmetry makes a and b one length.
      ["P 4/m m m", "4.001 4.002 7 90 90 90", "0.1 0.2 0.3"],
    ] as const) {
      const modes = modesOf(name, "0 0 1/2", position);
      for (const part of modes.irreps)
        expect(constraintTexts(groupOf(name), modes, part, { cell: parseCell(cell) }).crystal).toBeNull();
    }
  });

  test("have the ratio of the axes in front of mixed letters, and moments of one size on atoms of one orbit", () => {
    const name = "P n m a (a,b,a+c)";
    const modes = modesOf(name, "0 0 0", "0 0 1/2");
    let mixed = 0;
    for (const part of modes.irreps) {
      if (part.multiplicity === 0) continue;
      const { lattice, crystal } = constraintTexts(groupOf(name), modes, part, { cell: skewedCell });
      if (crystal === null) throw new Error("expected a table in μB");
      const random = seeded(seed);
      const names = lettersIn(crystal);
      const inCrystal = names.map(() => random.next() - 0.5);
      const vector = vectorOf(
        crystal,
        Object.fromEntries(names.map((one, index) => [one, [inCrystal[index] as number, 0]])),
      );
      const sizes = lattice.map((_, atom) =>
        squaredInCrystal(
          skewedCell,
          triple(vector, atom).map(([re]) => re),
        ),
      );
      // The operators are isometries that permute the four atoms, so a one-dimensional irrep gives equal sizes.
      // Ratios are printed to six digits.
      for (const size of sizes) expect(size / (sizes[0] as number)).toBeCloseTo(1, 4);
      if (crystal.some((text) => text.includes("1.81607"))) mixed += 1;
    }
    // 2a/|a+c| = 2 · 10.21 / √(10.21² + 4.71²) = 1.81607…
    expect((2 * skewedCell.a) / skewedCell.c).toBeCloseTo(1.81607, 5);
    expect(mixed).toBeGreaterThan(0);
  });
});
