import {
  type BasisChange,
  changeBasis,
  formatBasisChange,
  groupFromSetting,
  invertBasisChange,
  parseBasisChange,
  parseGroup,
  type SpaceGroup,
  standardSetting,
  tabulatedSettings,
  waysToSettings,
} from "@kvane/core/spacegroups";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { determinant, integerDeterminant, toNumber } from "#core/numbers/index.js";
import { axesChoices } from "#core/spacegroups/axes-choices.js";
import { diagonalForm, freeDirections, solveCongruences } from "#core/spacegroups/congruences.js";
import { crystalSystem, fittingAxes } from "#core/spacegroups/conventional-axes.js";
import { seeded } from "../support/random.js";
import { randomBasis } from "../support/random-bases.js";

const seed = 20261204;

type Matrix = readonly (readonly number[])[];

function times(a: Matrix, b: Matrix): number[][] {
  return a.map((row) =>
    (b[0] ?? []).map((_, column) => row.reduce((sum, entry, at) => sum + entry * (b[at]?.[column] ?? 0), 0) + 0),
  );
}

/** By the first row, for matrices of any size. */
function determinantOf(matrix: Matrix): number {
  if (matrix.length === 0) return 1;
  return (matrix[0] ?? []).reduce(
    (sum, entry, column) =>
      sum +
      (column % 2 === 0 ? entry : -entry) *
        (entry === 0 ? 0 : determinantOf(matrix.slice(1).map((row) => row.filter((_, at) => at !== column)))),
    0,
  );
}

describe("integer systems", () => {
  const rows = fc.array(fc.tuple(...[0, 1, 2].map(() => fc.integer({ min: -4, max: 4 }))), {
    minLength: 1,
    maxLength: 5,
  });

  it("become diagonal by unimodular changes of rows and columns", () => {
    fc.assert(
      fc.property(rows, (matrix) => {
        const { left, right, diagonal } = diagonalForm(matrix);
        expect(times(times(left, matrix), right)).toEqual(
          matrix.map((_, row) => [0, 1, 2].map((column) => (row === column ? diagonal[column] : 0))),
        );
        expect(Math.abs(determinantOf(left))).toBe(1);
        expect(Math.abs(determinantOf(right))).toBe(1);
        expect(diagonal.every((entry) => entry >= 0)).toBe(true);
      }),
      { seed },
    );
  });

  it("have all their solutions modulo 1, as many as the product of the diagonal", () => {
    fc.assert(
      fc.property(rows, fc.tuple(...[0, 1, 2].map(() => fc.integer({ min: 0, max: 5 }))), (matrix, start) => {
        // b = A x₀ with x₀ in sixths, so that there is a solution.
        const constants = matrix.map((row) => row.reduce((sum, entry, at) => sum + entry * (start[at] as number), 0));
        const form = diagonalForm(matrix);
        const found = solveCongruences(form, constants, 6);
        expect(found).not.toBeNull();
        if (found === null) return;
        const keys = new Set(found.solutions.map((solution) => solution.join()));
        expect(keys.size).toBe(found.solutions.length);
        expect(keys.size).toBe(form.diagonal.reduce((product, entry) => product * Math.max(1, entry), 1));
        for (const x of found.solutions) {
          expect(x.every((entry) => entry >= 0 && entry < found.denominator)).toBe(true);
          matrix.forEach((row, index) => {
            const value = row.reduce((sum, entry, at) => sum + (entry * (x[at] as number)) / found.denominator, 0);
            const gap = value - (constants[index] as number) / 6;
            expect(Math.abs(gap - Math.round(gap))).toBeLessThan(1e-9);
          });
        }
        const free = freeDirections(form);
        expect(free.length).toBe(form.diagonal.filter((entry) => entry === 0).length);
        for (const direction of free) {
          expect(
            times(
              matrix,
              direction.map((entry) => [entry]),
            )
              .flat()
              .every((entry) => entry === 0),
          ).toBe(true);
          expect(direction.some((entry) => entry !== 0)).toBe(true);
        }
      }),
      { seed },
    );
  });

  it("have none where a combination of rows leaves a fraction", () => {
    // x + y ≡ 1/2 and x + y ≡ 0.
    const form = diagonalForm([
      [1, 1, 0],
      [1, 1, 0],
    ]);
    expect(solveCongruences(form, [1, 0], 2)).toBeNull();
    expect(solveCongruences(form, [1, 1], 2)?.solutions).toHaveLength(1);
    // 2x ≡ 1/2 has x = 1/4 and 3/4.
    const twice = solveCongruences(diagonalForm([[2, 0, 0]]), [1], 2);
    expect(twice?.solutions.map(([x]) => (x as number) / twice.denominator).sort()).toEqual([0.25, 0.75]);
  });
});

const standard = tabulatedSettings().filter((row) => row.standard);
const plainName = "a,b,c;0,0,0";
const sameGroup = (a: SpaceGroup, b: SpaceGroup): boolean =>
  JSON.stringify([a.lattice, a.operators]) === JSON.stringify([b.lattice, b.operators]);

function filled({ shift }: BasisChange): number {
  return shift.filter(([numerator]) => numerator !== 0).length;
}

describe("the standard setting of a group", () => {
  it.each(standard.filter((_, row) => row % 6 === 0).map((row) => [row.short, row] as const))(
    "of %s is itself, and is found again from random axes and origins",
    (_name, row) => {
      const group = groupFromSetting(row);
      const own = standardSetting(group);
      expect(own.setting).toMatchObject(row);
      expect(formatBasisChange(own.change)).toBe(plainName);
      const random = seeded(seed + row.number);
      const change = randomBasis(random);
      const there = changeBasis(group, change);
      const found = standardSetting(there);
      expect(found.setting.number).toBe(row.number);
      expect(determinant(found.change.matrix)[0]).toBeGreaterThan(0);
      expect(sameGroup(changeBasis(there, found.change), group)).toBe(true);
    },
  );

  it.each(
    tabulatedSettings()
      .filter((_, row) => row % 37 === 5)
      .map((row) => [row.short, row] as const),
  )("of the tabulated %s has its operators", (_name, row) => {
    const group = groupFromSetting(row);
    const { setting, change } = standardSetting(group);
    expect([setting.number, setting.standard]).toEqual([row.number, true]);
    expect(sameGroup(changeBasis(group, change), groupFromSetting(setting))).toBe(true);
  });

  it.each([
    ["P 4", "a,b,c;1/2,1/2,0.3", 0],
    ["P 2", "a,b,c;0.1,0.2,0.3", 2],
    ["P 1", "a,b,c;0.1,0.2,0.3", 0],
    ["P n m a", "a,b,c;0,1/4,0", 1],
    ["P n m a", "a,b,c;1/2,0,1/2", 0],
    ["I 4/m m m", "a,b,c;1/2,1/2,1/2", 0],
    ["P m m 2", "a,b,c;0,1/8,1/3", 1],
    ["F m -3 m", "a,b,c;1/2,1/2,1/2", 0],
    ["R 3:H", "a,b,c;1/3,2/3,0.4", 0],
    ["C 2", "a,b,c;0.1,0.2,0.3", 2],
    ["C c", "a,b,c;0.1,0.2,0.3", 1],
    ["F d d 2", "a,b,c;0.1,0.2,0.3", 2],
    ["I 4", "a,b,c;0.1,0.2,0.3", 2],
    // (1/2,1/2,1/2) may be added: (1/2,0.05,0.05) would be smaller.
    ["P 2 3", "a,b,c;0,0.45,0.45", 2],
  ])("of %s with its axes and the origin at %s needs a shift of %i components", (name, moved, count) => {
    const there = changeBasis(parseGroup(name), parseBasisChange(moved));
    const { change } = standardSetting(there);
    expect(formatBasisChange(change).split(";")[0]).toBe("a,b,c");
    expect(filled(change)).toBe(count);
  });

  /** Σ (P − 1)² over the entries. */
  const distanceOf = ({ matrix }: BasisChange): number =>
    matrix.reduce(
      (sum, row, at) =>
        sum + row.reduce((part, entry, column) => part + (toNumber(entry) - (at === column ? 1 : 0)) ** 2, 0),
      0,
    );

  it.each(["P 1 21/c 1", "C 1 2/c 1", "P 1 c 1", "P 1", "P -1"])(
    "of %s in small other axes is reached by a change no larger than the one back",
    (name) => {
      const group = parseGroup(name);
      for (const axesText of ["a+c,b,c", "a,b,c-a", "a,b,a+c", "-a,b,-c", "c,b,-a", "a-c,b,c", "-a,-b,c", "a,-b,-c"]) {
        const change = parseBasisChange(axesText);
        const found = standardSetting(changeBasis(group, change)).change;
        expect(distanceOf(found), axesText).toBeLessThanOrEqual(distanceOf(invertBasisChange(change)));
      }
    },
  );

  /** First and last number of each crystal class in International Tables A. */
  const bounds = [
    ...[1, 2, 3, 5, 6, 9, 10, 15, 16, 24, 25, 46, 47, 74, 75, 80, 81, 82, 83, 88, 89, 98, 99, 110, 111, 122, 123, 142],
    ...[143, 146, 147, 148, 149, 155, 156, 161, 162, 167, 168, 173, 174, 175, 176, 177, 182, 183, 186, 187, 190],
    ...[191, 194, 195, 199, 200, 206, 207, 214, 215, 220, 221, 230],
  ];

  it.each(bounds)("of number %i, at a bound of its class, is itself", (number) => {
    expect(standardSetting(parseGroup(String(number))).setting.number).toBe(number);
  });

  it("is the one given where the axes are long but serve", () => {
    // A c axis moved by an even number of a leaves the glide plane what it is.
    const there = changeBasis(parseGroup("P 1 21/c 1"), parseBasisChange("a,b,6a+c"));
    expect(formatBasisChange(standardSetting(there).change)).toBe(plainName);
  });

  it("tells enantiomorphic types apart, and a left-handed basis", () => {
    for (const [name, number] of [
      ["P 41", 76],
      ["P 43", 78],
      ["P 61 2 2", 178],
      ["P 65 2 2", 179],
      ["P 43 3 2", 212],
    ] as const) {
      expect(standardSetting(parseGroup(name)).setting.number).toBe(number);
      // Mirrored axes turn a screw the other way.
      const mirrored = changeBasis(parseGroup(name), parseBasisChange("-a,-b,-c"));
      const other = { 76: 78, 78: 76, 178: 179, 179: 178, 212: 213 }[number];
      expect(standardSetting(mirrored).setting.number).toBe(other);
    }
  });

  it("is reached in several ways, each with the operators of its setting, the nearest first", () => {
    const group = parseGroup("P 21/c (a+c,b,c;0,1/3,0)");
    const rows = tabulatedSettings().filter(({ number }) => number === 14);
    let count = 0;
    for (const { setting, change, target } of waysToSettings(group, rows)) {
      expect(sameGroup(changeBasis(group, change), target)).toBe(true);
      expect(sameGroup(target, groupFromSetting(setting))).toBe(true);
      expect(determinant(change.matrix)[0]).toBeGreaterThan(0);
      count += 1;
    }
    expect(count).toBeGreaterThan(9);
    expect([
      ...waysToSettings(
        group,
        tabulatedSettings().filter(({ number }) => number === 13),
      ),
    ]).toEqual([]);
    const back = standardSetting(changeBasis(group, invertBasisChange(parseBasisChange("a+c,b,c;0,1/3,0"))));
    expect(formatBasisChange(back.change)).toBe(plainName);
  });
});

describe("choices of axes", () => {
  it("are the rotations of the system's lattice, or all small ones", () => {
    for (const [system, count] of [
      ["tetragonal", 8],
      ["hexagonal", 12],
      ["orthorhombic", 24],
      ["cubic", 24],
    ] as const) {
      const choices = axesChoices(system);
      expect(new Set(choices.map(String)).size).toBe(count);
      expect(choices.every((choice) => integerDeterminant(choice) === 1)).toBe(true);
    }
    // b both ways; a and c any pair of vectors with entries 0, 1, −1 that span the plane's lattice.
    const small = [-1, 0, 1];
    const plane = small.flatMap((p) => small.flatMap((q) => small.flatMap((r) => small.map((s) => [p, q, r, s]))));
    const spanning = plane.filter(([p = 0, q = 0, r = 0, s = 0]) => Math.abs(p * s - q * r) === 1);
    const monoclinic = axesChoices("monoclinic");
    expect(new Set(monoclinic.map(String)).size).toBe(spanning.length);
    for (const choice of monoclinic) {
      expect([choice[1], choice[3], choice[5], choice[7]]).toEqual([0, 0, 0, 0]);
      expect(integerDeterminant(choice)).toBe(1);
    }
    // Any half of a lattice vector can be that of c.
    const triclinic = axesChoices("triclinic");
    expect(triclinic.every((choice) => integerDeterminant(choice) === 1)).toBe(true);
    expect(new Set(triclinic.map((m) => [m[2], m[5], m[8]].map((one) => Math.abs(one ?? 0) % 2).join())).size).toBe(7);
  });

  it("start from axes that are as short as their kind allows", () => {
    const random = seeded(seed);
    for (let count = 0; count < 40; count++) {
      const axes = [0, 1, 2].map(() => [0, 1, 2].map(() => random.below(9) - 4));
      const metric = axes.flatMap((left) =>
        axes.map((right) => left.reduce((sum, one, at) => sum + one * (right[at] ?? 0), 0)),
      );
      if (integerDeterminant(metric) === 0) continue;
      const fitting = fittingAxes(parseGroup("P -1"), metric);
      expect(integerDeterminant(fitting)).toBe(1);
      const columns = [0, 1, 2].map((column) => [0, 3, 6].map((row) => fitting[row + column] as number));
      const product = (a: readonly number[], b: readonly number[]): number =>
        a.reduce(
          (sum, x, row) => sum + b.reduce((part, y, at) => part + x * (metric[3 * row + at] as number) * y, 0),
          0,
        );
      for (const a of columns)
        for (const b of columns) if (a !== b) expect(2 * Math.abs(product(a, b))).toBeLessThanOrEqual(product(b, b));
    }
  });
});

describe("crystal systems", () => {
  it("are those of the numbers of International Tables A", () => {
    // Last number of each system; trigonal (143 to 167) and hexagonal groups have hexagonal axes.
    const last = [
      [2, "triclinic"],
      [15, "monoclinic"],
      [74, "orthorhombic"],
      [142, "tetragonal"],
      [194, "hexagonal"],
      [230, "cubic"],
    ] as const;
    for (const row of standard) {
      const system = last.find(([number]) => row.number <= number)?.[1];
      expect(crystalSystem(groupFromSetting(row).pointGroup), row.short).toBe(system);
    }
  });
});
