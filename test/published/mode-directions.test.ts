import { describe, expect, test } from "vitest";
import { irrepsHolding, modesOf, patternVector, realVector } from "../support/decomposition.js";
import { determinantOf, type FloatOperator } from "../support/float-group.js";
import { groupOf } from "../support/parsed-groups.js";
import { floatModes, rankOf } from "../support/validate-modes.js";

/** Characters of the one irrep that holds a vector, with the operators they belong to. */
function holding(group: string, modes: ReturnType<typeof modesOf>, vector: ReturnType<typeof realVector>) {
  const labels = irrepsHolding(group, modes, vector);
  expect(labels).toHaveLength(1);
  const read = floatModes(groupOf(group), modes);
  const at = read.irreps.labels.indexOf(labels[0] as string);
  return {
    label: labels[0] as string,
    dimension: read.irreps.dimensions[at] as number,
    multiplicity: read.multiplicities[at] as number,
    characters: read.irreps.operators.map((index, position) => ({
      rotation: (read.irreps.group.operators[index] as FloatOperator).rotation,
      character: read.irreps.characters[at]?.[position]?.map((value) => Math.round(value) + 0),
    })),
  };
}

function spur(rotation: readonly number[]): number {
  return [0, 4, 8].reduce((sum, at) => sum + Math.round(rotation[at] as number), 0);
}

describe("directions of moments in published structures", () => {
  test("MnO, NiO: the two-dimensional irrep is the (111) sheet [read]; FeO: the other is [111] [memory 88]", () => {
    // Goodwin et al., Phys. Rev. Lett. 96, 047209 (2006); Shull, Strauser & Wollan, Phys. Rev. 83, 333 (1951); Roth (1958).
    const modes = modesOf("F m -3 m", "1/2 1/2 1/2", "0 0 0");
    const sheet = [realVector([[1, 1, -2]]), realVector([[1, -1, 0]])].map((vector) =>
      holding("F m -3 m", modes, vector),
    );
    const axis = holding("F m -3 m", modes, realVector([[1, 1, 1]]));
    expect(sheet.map((entry) => entry.dimension)).toEqual([2, 2]);
    expect(sheet[0]?.label).toBe(sheet[1]?.label);
    expect(axis.dimension).toBe(1);
  });

  test("UO2: an arm along z has its transverse moments in the two-dimensional irrep [read: arXiv 2409.20228]", () => {
    const modes = modesOf("F m -3 m", "0 0 1", "0 0 0");
    expect(holding("F m -3 m", modes, realVector([[1, 0, 0]])).dimension).toBe(2);
    expect(holding("F m -3 m", modes, realVector([[0, 0, 1]])).dimension).toBe(1);
  });

  test("MnF2: + − along c, magnetic group P4_2'/mnm' [memory 93: Erickson, Phys. Rev. 90, 779 (1953)]", () => {
    const modes = modesOf("P 42/m n m", "0 0 0", "0 0 0");
    const vector = patternVector(
      "P 42/m n m",
      modes,
      ["0 0 0", "1/2 1/2 1/2"],
      [
        [0, 0, 1],
        [0, 0, -1],
      ],
    );
    const { characters, dimension } = holding("P 42/m n m", modes, vector);
    expect(dimension).toBe(1);
    // Primed are the operators that exchange x and y: fourfold axes and diagonal twofold axes and mirrors.
    for (const { rotation, character } of characters)
      expect(character).toEqual([Math.abs(Math.round(rotation[1] as number)) === 1 ? -1 : 1, 0]);
  });

  // Atoms on the axis from below: 1/2 − z, z, −z, 1/2 + z.
  const corundum = (z: number) => [0.5 - z, z, 1 - z, 0.5 + z].map((height) => `0 0 ${height.toFixed(4)}`);
  const along = (sequence: readonly number[]) => sequence.map((sign) => [0, 0, sign]);

  test("α-Fe2O3: + − − + along c, magnetic group R-3c, the totally symmetric irrep [read: Chem. Mater. 20, 4891 (2008)]", () => {
    const modes = modesOf("R -3 c:H", "0 0 0", "0 0 0.3553");
    const vector = patternVector("R -3 c:H", modes, corundum(0.3553), along([1, -1, -1, 1]));
    const { label, characters } = holding("R -3 c:H", modes, vector);
    expect(label).toBe("Γ1");
    for (const { character } of characters) expect(character).toEqual([1, 0]);
  });

  test("Cr2O3: + − + − along c, magnetic group R-3'c' [memory 95: Brockhouse, J. Chem. Phys. 21, 961 (1953)]", () => {
    const modes = modesOf("R -3 c:H", "0 0 0", "0 0 0.3475");
    const vector = patternVector("R -3 c:H", modes, corundum(0.3475), along([1, -1, 1, -1]));
    for (const { rotation, character } of holding("R -3 c:H", modes, vector).characters)
      expect(character).toEqual([Math.round(determinantOf(rotation)), 0]);
  });

  test("hexagonal YMnO3 across [100], ScMnO3 along it: irreps of multiplicity 1 and 2 [read: PRB 62, 9498 (2000)]", () => {
    const modes = modesOf("P 63 c m", "0 0 0", "0.333 0 0");
    const read = floatModes(groupOf("P 63 c m"), modes);
    const atom = read.positions.findIndex(
      ([x, y]) => Math.abs((x as number) - 0.333) < 1e-9 && Math.abs(y as number) < 1e-9,
    );
    const onAtom = read.modes.flatMap((list, irrep) =>
      read.irreps.dimensions[irrep] === 1 && list.length > 0
        ? [list.map((mode) => Array.from(mode.real.slice(3 * atom, 3 * atom + 3)))]
        : [],
    );
    expect(onAtom.map((list) => list.length).sort()).toEqual([1, 1, 2, 2]);
    for (const vectors of onAtom) {
      const plane =
        vectors.length === 1
          ? [[1, 2, 0]]
          : [
              [1, 0, 0],
              [0, 0, 1],
            ];
      const all = [...plane, ...vectors].map((vector) => realVector([vector]));
      expect(rankOf(all, 3)).toBe(vectors.length);
    }
  });

  test("Yb2Ti2O7: ferromagnetism belongs to the irrep that occurs twice, which splays it [read: arXiv 1602.02025]", () => {
    const modes = modesOf("F d -3 m:2", "0 0 0", "1/2 1/2 1/2");
    const uniform = realVector(modes.orbit.positions.map(() => [0, 0, 1]));
    expect(holding("F d -3 m:2", modes, uniform)).toMatchObject({ dimension: 3, multiplicity: 2 });
  });

  test("Cr: transverse moments in the two-dimensional irrep, longitudinal in the other [memory 90]", () => {
    const modes = modesOf("I m -3 m", "0.952 0 0", "0 0 0");
    expect(holding("I m -3 m", modes, realVector([[0, 1, 0]])).dimension).toBe(2);
    const longitudinal = holding("I m -3 m", modes, realVector([[1, 0, 0]]));
    expect(longitudinal.dimension).toBe(1);
    // A moment along the axis of 4mm is turned over by the mirrors and by nothing else.
    for (const { rotation, character } of longitudinal.characters)
      expect(character).toEqual([Math.round(determinantOf(rotation)), 0]);
    expect(
      longitudinal.characters.filter(({ rotation }) => spur(rotation) === 1 && determinantOf(rotation) < 0),
    ).toHaveLength(4);
  });
});
