import type { WaveVector } from "@kvane/core/kvectors";
import { manifold } from "@kvane/core/kvectors";
import {
  type MomentSizes,
  momentSizes,
  ownWriting,
  projectComponents,
  type SiteModes,
  writtenSite,
} from "@kvane/core/modes";
import { type Cell, directMetric } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { modesOf } from "../support/decomposition.js";
import { componentsOf } from "../support/float-group.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { floatModes } from "../support/validate-modes.js";
import { wave } from "../support/written.js";

const orthorhombic: Cell = { a: 4, b: 5, c: 7, alpha: 90, beta: 90, gamma: 90 };

const cells: Readonly<Record<string, Cell>> = {
  triclinic: { a: 4, b: 5, c: 7, alpha: 82, beta: 95, gamma: 103 },
  orthorhombic,
  "long a": { ...orthorhombic, a: 60 },
  "long b": { ...orthorhombic, b: 300 },
  layer: { a: 4, b: 300, c: 7, alpha: 90, beta: 90, gamma: 90 },
  "endless c": { ...orthorhombic, c: 1e5 },
  tetragonal: { a: 4, b: 4, c: 7, alpha: 90, beta: 90, gamma: 90 },
  hexagonal: { a: 5, b: 5, c: 8, alpha: 90, beta: 90, gamma: 120 },
  cubic: { a: 6, b: 6, c: 6, alpha: 90, beta: 90, gamma: 90 },
};

/** What every irrep that occurs allows, as `dimension×multiplicity` and letters: Equal, Constant, coLlinear. */
function sizesOf(group: string, cell: string, k: string, position: string): string[] {
  const modes = modesOf(group, k, position);
  return modes.irreps
    .filter(({ multiplicity }) => multiplicity > 0)
    .map((part) => {
      const sizes = momentSizes(groupOf(group), cells[cell] as Cell, modes, part) as MomentSizes;
      const letters = `${sizes.equalAmplitude ? "E" : ""}${sizes.constantMoment ? "C" : ""}${sizes.collinear ? "L" : ""}`;
      return `${part.irrep.dimension}×${part.multiplicity} ${letters}`;
    })
    .sort();
}

describe("sizes of moments that one irrep allows", () => {
  test.each<[string, string, string, string, string, string[]]>([
    // One atom, no symmetry: a helix has constant moments, in oblique axes too.
    ["a helix", "P 1", "triclinic", "1/5 0 0", "0 0 0", ["1×3 EC"]],
    // 2k ∈ L*: the moments of one atom a cell change sign only.
    ["one atom, antiferromagnetic", "P 1", "triclinic", "1/2 0 0", "0 0 0", ["1×3 ECL"]],
    // mm2 along k: each irrep has one direction, and a wave of one direction has no constant size.
    ["a wave of one direction", "P m m m", "orthorhombic", "0 0 1/5", "0 0 0", ["1×1 EL", "1×1 EL", "1×1 EL"]],
    // Up up down down: cos(πn/2 − π/4) has one size.
    ["a quarter", "P m m m", "orthorhombic", "0 0 1/4", "0 0 0", ["1×1 ECL", "1×1 ECL", "1×1 ECL"]],
    ["a half", "P m m m", "orthorhombic", "0 0 1/2", "0 0 0", ["1×1 ECL", "1×1 ECL", "1×1 ECL"]],
    // 4mm: along k one direction, across it two that are equally long.
    ["a fourfold axis", "P 4/m m m", "tetragonal", "0 0 1/5", "0 0 0", ["1×1 EL", "2×1 EC"]],
    // 4 about k: two complex irreps across the axis, each a helix of one hand.
    ["one hand each", "P 4", "tetragonal", "0 0 1/5", "0 0 0", ["1×1 EC", "1×1 EC", "1×1 EL"]],
    // A plane of two unequal axes: still a circle, in the metric and not in the components.
    ["a monoclinic plane", "P 1 1 2", "orthorhombic", "0 0 1/5", "0 0 0", ["1×1 EL", "1×2 EC"]],
    ["a threefold axis", "P 3", "hexagonal", "0 0 1/5", "0 0 0", ["1×1 EC", "1×1 EC", "1×1 EL"]],
    // K point of one atom on a threefold axis: 120° order is constant, along the axis it is not.
    ["120 degrees", "P 6/m m m", "hexagonal", "1/3 1/3 0", "0 0 0", ["1×1 EL", "2×1 EC"]],
    // A screw axis along k: the second atom a fifth of half a turn behind, three components free.
    ["helices on a screw axis", "P 21", "orthorhombic", "0 1/5 0", "0.1 0.2 0.3", ["1×3 EC", "1×3 EC"]],
    // 2 fixes an atom: along the axis both atoms are parallel or antiparallel, across it the two are free.
    ["both hands at Γ", "P 4", "tetragonal", "0 0 0", "0 1/2 0", ["1×1 ECL", "1×1 ECL", "1×2 EC", "1×2 EC"]],
    ["all three directions", "P m -3 m", "cubic", "1/2 1/2 1/2", "0 0 0", ["3×1 ECL"]],
    // Whatever the lengths of the axes: a circle in a plane, up up down down and a wave along a direction.
    ["a helix", "P 1", "long a", "0 0 1/5", "0 0 0", ["1×3 EC"]],
    ["a quarter", "P 1", "long b", "0 0 1/4", "0 0 0", ["1×3 EC"]],
    // Up up down down along any free direction, on both atoms, however thick the layer.
    ["a quarter in a thick layer", "P 21", "layer", "0 0 1/4", "0.1 0.2 0.3", ["1×6 EC"]],
    // From some starting points the equations become singular before they are solved.
    ["a wave of one direction", "P m m m", "endless c", "0 0 1/5", "0 0 0", ["1×1 EL", "1×1 EL", "1×1 EL"]],
  ])("%s: %s in %s axes at (%s), site %s", (_what, group, cell, k, position, expected) => {
    const found = sizesOf(group, cell, k, position);
    expect(found).toEqual([...expected].sort());
  });

  test("are unknown while k has open letters, and none where the irrep does not occur", () => {
    // A screw axis along k: the phases of its atoms hold the letter.
    const screw = groupOf("P n m a");
    const { form } = manifold(screw, wave("0 1/5 0"), { withInversion: false });
    const open = modesOf("P n m a", { ...form, values: null, uncertainties: null }, "0 0 0");
    const part = open.irreps.find(({ multiplicity }) => multiplicity > 0);
    expect(part && momentSizes(screw, cells["orthorhombic"] as Cell, open, part)).toBeNull();
    const group = groupOf("P 4/m m m");
    const modes = modesOf("P 4/m m m", "0 0 1/5", "0 0 0");
    const absent = modes.irreps.find(({ multiplicity }) => multiplicity === 0);
    expect(absent && momentSizes(group, cells["tetragonal"] as Cell, modes, absent)).toEqual({
      equalAmplitude: false,
      constantMoment: false,
      collinear: false,
    });
  });

  test("are not equal where some atoms have no moment", () => {
    // Each irrep is at home on one of the two atoms: the inversion centres at x = 0 and x = 1/2 have opposite parity.
    expect(sizesOf("P 4/m", "tetragonal", "1/2 0 0", "0 1/2 0")).toEqual(["1×1 L", "1×1 L", "1×2 L", "1×2 L"]);
  });
});

type Complex = readonly [number, number];

/** Docs/conventions.md, Moments and phases: a component of one's own as another convention writes it. */
function writtenAs(
  s: readonly Complex[],
  turns: number,
  half: boolean,
  { exponent, phase, factor }: typeof ownWriting,
): Complex[] {
  const angle = phase === "position" ? 2 * Math.PI * turns : 0;
  const size = factor === "half" && !half ? 2 : 1;
  return s.map(([re, im]) => {
    const [x, y] = [re * Math.cos(angle) - im * Math.sin(angle), re * Math.sin(angle) + im * Math.cos(angle)];
    return [size * x, (exponent === "plus" ? -size : size) * y];
  });
}

describe("Fourier components that are given", () => {
  const conventions = (["minus", "plus"] as const).flatMap((exponent) =>
    (["lattice", "position"] as const).flatMap((phase) =>
      (["one", "half"] as const).map((factor) => ({ ...ownWriting, exponent, phase, factor })),
    ),
  );
  const cases = [
    ["P n m a", "0 1/5 0", "0.1 0.2 0.3", "orthorhombic"],
    ["P n m a", "0 1/2 0", "0.1 1/4 0.3", "orthorhombic"],
    ["P 63/m m c", "1/3 1/3 0", "1/3 2/3 1/4", "hexagonal"],
    ["P -1", "1/5 1/7 0", "0.1 0.2 0.3", "triclinic"],
  ] as const;

  test.each(cases)("of %s at %s, site %s are taken apart as they were put together", (name, k, position, cellName) => {
    const group = groupOf(name);
    const cell = cells[cellName] as Cell;
    const modes = modesOf(name, k, position);
    const random = seeded(17);
    const read = floatModes(group, modes);
    const amplitudes = read.modes.map((list) => list.map((): Complex => [random.next() - 0.5, random.next() - 0.5]));
    const parts = read.modes.map((list, irrep) => fieldOf(list, amplitudes[irrep] ?? [], modes));
    const whole = (parts[0] ?? []).map((vector, atom) =>
      vector.map((_, axis) => sumOf(parts.map((part) => part[atom]?.[axis] ?? [0, 0]))),
    );
    const metric = directMetric(cell);
    const total = squareOf(whole, metric);
    const half = modes.representations.minusK === "equivalent";
    for (const convention of conventions) {
      const given = whole.map((vector, atom) =>
        writtenAs(vector, turnsOf(modes.representations.k, modes, atom), half, convention),
      );
      const found = projectComponents(group, modes, given, { convention, cell });
      close(found?.components.flat(), whole.flat());
      found?.shares.forEach(({ label, share, amplitudes: own }, irrep) => {
        expect(label).toBe(modes.irreps[irrep]?.irrep.label);
        close(own, amplitudes[irrep]);
        expect(share).toBeCloseTo(squareOf(parts[irrep] ?? [], metric) / total, 9);
      });
      expect(found?.shares.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 9);
    }
    // Without a cell any metric serves that the group leaves alone.
    const without = projectComponents(group, modes, whole, { convention: ownWriting, cell: null });
    close(
      without?.shares.flatMap((share) => share.amplitudes),
      amplitudes.flat(),
    );
  });

  test("in crystal and Cartesian components of an orthogonal cell are multiples of the axes", () => {
    const group = groupOf("P n m a");
    const cell = cells["orthorhombic"] as Cell;
    const modes = modesOf("P n m a", "0 1/2 0", "0 0 0");
    const given = modes.orbit.positions.map((): Complex[] => [
      [4, 0],
      [10, 5],
      [0, -7],
    ]);
    for (const components of ["crystal", "cartesian"] as const) {
      const found = projectComponents(group, modes, given, { convention: { ...ownWriting, components }, cell });
      close(found?.components[0], [
        [1, 0],
        [2, 1],
        [0, -1],
      ]);
    }
    const lattice = projectComponents(group, modes, given, { convention: ownWriting, cell });
    expect(lattice?.components).toEqual(given);
  });

  test.each(["crystal", "cartesian"] as const)(
    "and are not read or written in %s ones without a cell",
    (components) => {
      const group = groupOf("P n m a");
      const modes = modesOf("P n m a", "0 1/2 0", "0 0 0");
      const options = { convention: { ...ownWriting, components }, cell: null };
      for (const work of [
        () => projectComponents(group, modes, [], options),
        () => writtenSite(group, modes, { ...options, star: false }),
      ])
        expect(work).toThrow(expect.objectContaining({ code: "missing-argument" }));
    },
  );

  test.each([0, 1, 2])("without a cell have axes at right angles and of one length: axis %i and the next", (axis) => {
    // −1 exchanges the two atoms; the even and the odd part of S₁ ⊥ S₂ of one size are equally large.
    const unit = (at: number) => [0, 1, 2].map((other): Complex => [other === at % 3 ? 1 : 0, 0]);
    const modes = modesOf("P -1", "0 0 0", "0.1 0.2 0.3");
    const read = projectComponents(groupOf("P -1"), modes, [unit(axis), unit(axis + 1)], {
      convention: ownWriting,
      cell: null,
    });
    expect(read?.shares.map(({ share }) => share)).toEqual([expect.closeTo(1 / 2, 12), expect.closeTo(1 / 2, 12)]);
  });

  test.each([1e-3, 1, 1e3])("have the same shares whatever their size: %d", (size) => {
    // −1 exchanges the two atoms; a moment on one of them is half even and half odd.
    const modes = modesOf("P -1", "0 0 0", "0.1 0.2 0.3");
    const along = (x: number) => [x, 0, 0].map((re): Complex => [re, 0]);
    const read = projectComponents(groupOf("P -1"), modes, [along(size), along(0)], {
      convention: ownWriting,
      cell: null,
    });
    expect(read?.shares.map(({ share }) => share)).toEqual([expect.closeTo(1 / 2, 12), expect.closeTo(1 / 2, 12)]);
  });

  test("without moments have no shares, and with open letters of k no answer", () => {
    const group = groupOf("P n m a");
    const modes = modesOf("P n m a", "0 1/2 0", "0 0 0");
    const nothing = modes.orbit.positions.map((): Complex[] => [
      [0, 0],
      [0, 0],
      [0, 0],
    ]);
    const found = projectComponents(group, modes, nothing, { convention: ownWriting, cell: null });
    expect(found?.shares.map(({ share }) => share)).toEqual(modes.irreps.map(() => 0));
    const { form } = manifold(group, wave("0 1/5 0"), { withInversion: false });
    const open = modesOf("P n m a", { ...form, values: null, uncertainties: null }, "0 0 0");
    expect(projectComponents(group, open, nothing, { convention: ownWriting, cell: null })).toBeNull();
  });
});

function turnsOf(k: WaveVector, modes: SiteModes, atom: number): number {
  const place = (modes.orbit.positions[atom] ?? []).map(([top, bottom]) => top / bottom);
  return componentsOf(k).reduce((sum, entry, axis) => sum + entry * (place[axis] as number), 0);
}

function fieldOf(
  list: ReturnType<typeof floatModes>["modes"][number],
  amplitudes: readonly Complex[],
  modes: SiteModes,
): Complex[][] {
  return modes.orbit.positions.map((_, atom) =>
    [0, 1, 2].map((axis) =>
      sumOf(
        list.map(({ real, imaginary }, mode): Complex => {
          const [a, b] = amplitudes[mode] as Complex;
          const [re, im] = [real[3 * atom + axis] as number, imaginary[3 * atom + axis] as number];
          return [a * re - b * im, a * im + b * re];
        }),
      ),
    ),
  );
}

function sumOf(values: readonly Complex[]): Complex {
  return values.reduce<Complex>(([re, im], [x, y]) => [re + x, im + y], [0, 0]);
}

/** Σ S† G S over the atoms. */
function squareOf(field: readonly (readonly Complex[])[], metric: readonly number[]): number {
  let sum = 0;
  for (const vector of field)
    vector.forEach(([a, b], row) => {
      vector.forEach(([c, d], column) => {
        sum += (metric[3 * row + column] as number) * (a * c + b * d);
      });
    });
  return sum;
}

function close(found: readonly Complex[] | undefined, expected: readonly Complex[] | undefined): void {
  expect(found?.length).toBe(expected?.length);
  found?.forEach(([re, im], index) => {
    expect(re).toBeCloseTo(expected?.[index]?.[0] ?? Number.NaN, 9);
    expect(im).toBeCloseTo(expected?.[index]?.[1] ?? Number.NaN, 9);
  });
}
