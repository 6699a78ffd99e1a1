import { compatibility, fullIrreps, littleGroupElement, type SmallIrreps, smallIrreps } from "@kvane/core/irreps";
import { canonicalPlacement, manifold, type WaveVector } from "@kvane/core/kvectors";
import type { SymmetryOperator } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { type FloatOperator, inner } from "../support/float-group.js";
import { floatIrreps, phasedValue } from "../support/float-irreps.js";
import { groupOf } from "../support/parsed-groups.js";
import { type CharacterCase, characterCaseProblems, readCases } from "../support/reference-cases.js";
import { irrepProblems } from "../support/validate-irreps.js";
import { relationProblems } from "../support/validate-minus-k.js";
import { wave } from "../support/written.js";

/** The whole line or plane of a k, its letters left open. */
function opened(group: string, k: string): WaveVector {
  return { ...manifold(groupOf(group), wave(k), { withInversion: false }).form, values: null, uncertainties: null };
}

/** Steps of index 2 and 3, factors that cannot be gauged away, dimensions 1 to 6, −k in the star and not, odd axes. */
const cases: readonly (readonly [string, string])[] = [
  ["P 1", "1/3 1/5 1/7"],
  ["P -1", "1/2 0 1/2"],
  ["P 21", "0 1/2 0"],
  ["P 3", "1/3 1/3 1/2"],
  ["P 41", "0 0 1/2"],
  ["P 61", "0 0 1/2"],
  ["P 63", "1/3 1/3 1/4"],
  ["P 63/m m c", "0 0 1/2"],
  ["P 63/m m c", "1/3 1/3 1/2"],
  ["P n n n:2", "1/2 1/2 1/2"],
  ["I 41/a m d:2", "1/2 1/2 1/2"],
  ["R 3 c:H", "0 0 3/2"],
  ["R -3 c:R", "1/2 1/2 1/2"],
  ["P 21 3", "1/2 1/2 1/2"],
  ["I 41 3 2", "0 0 0"],
  ["I 21 3", "1/2 1/2 1/2"],
  ["P n -3 n:2", "1/2 1/2 1/2"],
  ["F d -3 m:2", "0 1 0"],
  ["I a -3 d", "1/2 1/2 1/2"],
  ["P m -3 m", "1/2 1/2 0"],
  ["I 41/a m d:2 (a-b,a+b,c;0,0,1/7)", "1/4 1/4 0"],
];

describe("small irreps", () => {
  test.each(cases)("of %s at %s obey the laws, and their relation to −k does", (name, k) => {
    const group = groupOf(name);
    const irreps = smallIrreps(group, wave(k));
    expect(irrepProblems(group, irreps)).toEqual([]);
    expect(relationProblems(group, irreps)).toEqual([]);
    expect(irreps.irreps.map(({ dimension }) => dimension)).toEqual(
      irreps.irreps.map(({ dimension }) => dimension).sort((a, b) => a - b),
    );
    expect(irreps.irreps.map(({ label }) => label)).toEqual(irreps.irreps.map((_, position) => `Γ${position + 1}`));
  });

  test.each([
    ["P 63 c m", "1/3 1/3 1/5"],
    ["P 21 3", "1/5 1/5 1/5"],
    ["P n m a", "0 1/5 0"],
    ["I 41/a", "0 0 1/5"],
    ["F d d d:2", "1/5 0 0"],
  ])("of %s on the line or plane through %s obey them with open letters", (name, k) => {
    const group = groupOf(name);
    const irreps = smallIrreps(group, opened(name, k));
    expect(irrepProblems(group, irreps)).toEqual([]);
    expect(relationProblems(group, irreps)).toEqual([]);
  });

  // One in fifteen of the table of test/laws/reference-cases.test.ts, each for itself.
  const references = readCases<CharacterCase>("characters.jsonl").filter((_, line) => line % 15 === 0);
  test.each(references.map((entry) => [entry.number, entry.k.join(" "), entry] as const))(
    "of group %i at %s have the characters, realities and stars of the reference",
    (_number, _k, entry) => {
      expect(characterCaseProblems(entry)).toEqual([]);
    },
  );

  /** Characters without e^{2πi k·t}, by operator: what depends on the irrep and not on where k is on its line. */
  const plainCharacters = (name: string, irreps: SmallIrreps): [number, number][][] => {
    const read = floatIrreps(groupOf(name), irreps);
    return read.characters.map((characters) =>
      characters.map(([re, im], place) => {
        const { translation } = read.group.operators[read.operators[place] as number] as FloatOperator;
        const angle = -2 * Math.PI * inner(read.k, translation);
        return [re * Math.cos(angle) - im * Math.sin(angle), re * Math.sin(angle) + im * Math.cos(angle)];
      }),
    );
  };

  test.each(cases)(
    "of %s at the canonical place of %s come by dimension, then with the larger characters first",
    (name, k) => {
      const { canonical } = canonicalPlacement(groupOf(name), wave(k));
      const irreps = smallIrreps(groupOf(name), canonical);
      const keys = plainCharacters(name, irreps).map((characters, at) => [
        -(irreps.irreps[at]?.dimension ?? 0),
        ...characters.flat(),
      ]);
      keys.slice(1).forEach((key, at) => {
        const before = keys[at] as number[];
        const differing = key.findIndex((entry, place) => Math.abs(entry - (before[place] as number)) > 1e-6);
        expect(differing).toBeGreaterThanOrEqual(0);
        expect(key[differing]).toBeLessThan(before[differing] as number);
      });
    },
  );

  test.each([
    ["P 63 c m", "1/3 1/3 1/5", "1/3 1/3 2/7"],
    ["P 21 3", "1/5 1/5 1/5", "2/7 2/7 2/7"],
    ["P n m a", "0 1/5 0", "0 3/7 0"],
    ["I 41/a", "0 0 1/5", "0 0 2/7"],
    ["F d d d:2", "1/5 0 0", "2/7 0 0"],
  ])("of %s keep their numbers and matrices along a line, from %s to %s", (name, here, there) => {
    const [first, second] = [here, there].map((k) => smallIrreps(groupOf(name), wave(k))) as [SmallIrreps, SmallIrreps];
    const [a, b] = [plainCharacters(name, first), plainCharacters(name, second)];
    a.forEach((characters, irrep) => {
      characters.forEach(([re, im], place) => {
        const [x, y] = b[irrep]?.[place] ?? [Number.NaN, Number.NaN];
        expect(Math.hypot(re - x, im - y)).toBeLessThan(1e-9);
      });
    });
    expect(second.irreps.map(({ matrices }) => matrices)).toEqual(first.irreps.map(({ matrices }) => matrices));
  });

  test.each([
    ["P n m a", "1/2 1/2 1/2"],
    ["P 21 3", "1/2 1/2 1/2"],
    ["I 41/a m d:2", "1/2 1/2 1/2"],
    ["P 63/m m c", "0 0 1/2"],
    ["R -3 c:H", "0 0 3/2"],
  ])("of %s at %s have short roots of unity in their matrices about any origin", (name, k) => {
    const { irreps } = smallIrreps(groupOf(`${name} (a,b,c;1/7,2/11,-3/13)`), wave(k));
    const orders = new Set(irreps.flatMap(({ matrices }) => matrices.flat(2).map(({ order }) => order)));
    // The sevenths, elevenths and thirteenths of the origin stay in the phases.
    expect([...orders].filter((order) => [7, 11, 13].some((prime) => order % prime === 0))).toEqual([]);
  });

  test("begin with the unit representation at k = 0, and label the conjugate of a complex one", () => {
    const { irreps } = smallIrreps(groupOf("P 4"), wave("0 0 0"));
    expect(irreps.map(({ reality }) => reality).sort()).toEqual(["complex", "complex", "real", "real"]);
    for (const { label, conjugateOf, reality, physicalDimension } of irreps) {
      if (reality === "real") expect([conjugateOf, physicalDimension]).toEqual([null, 1]);
      else {
        const partner = irreps.find((other) => other.label === conjugateOf);
        expect(partner?.conjugateOf).toBe(label);
        expect(partner?.label).not.toBe(label);
        expect(physicalDimension).toBe(2);
      }
    }
    expect(irreps[0]?.characters.every(({ factor }) => factor.order === 1 && factor.coefficients[0] === 1)).toBe(true);
  });

  test("know any operator of the little group, and no other", () => {
    const group = groupOf("P 4");
    const irreps = smallIrreps(group, wave("0 1/2 0"));
    const moved = (operator: SymmetryOperator, by: number): SymmetryOperator => ({
      ...operator,
      translation: [operator.translation[0], operator.translation[1] + by * operator.translationDenominator, 0],
    });
    const quarterTurn = group.operators.find(({ rotation }) => rotation[0] === 0) as SymmetryOperator;
    expect(() => littleGroupElement(group, irreps, quarterTurn)).toThrow("not in the little group");
    const identity = group.operators[0] as SymmetryOperator;
    // e^{+2πi k·T} with k·T = 1/2.
    expect(littleGroupElement(group, irreps, moved(identity, 1))).toMatchObject({
      element: 0,
      phase: { constant: [1, 2] },
    });
  });
});

test.each([
  // Arms times dimension, whose squares for one arm add up to the order of the little co-group (24, 24, 12, 8, 2): one
  // arm at Γ and at A, where the screw axis and the planes leave A1, A2 of dimension 2 and A3 of dimension 4; two at K,
  // three at M, twelve of a general k with l = 0.
  ["0 0 0", [1, 1, 1, 1, 1, 1, 1, 1, 2, 2, 2, 2]],
  ["0 0 1/2", [2, 2, 4]],
  ["1/3 1/3 0", [2, 2, 2, 2, 4, 4]],
  ["1/2 0 0", [3, 3, 3, 3, 3, 3, 3, 3]],
  ["1/5 1/7 0", [12, 12]],
])("full irreps of P 63/m m c at %s have the dimensions of their matrices", (k, dimensions) => {
  const group = groupOf("P 63/m m c");
  const full = fullIrreps(group, smallIrreps(group, wave(k)));
  expect(full.map(({ dimension }) => dimension).sort((a, b) => a - b)).toEqual(dimensions);
  for (const { dimension, matrices } of full)
    for (const matrix of matrices)
      expect([matrix.length, ...matrix.map((row) => row.length)]).toEqual(new Array(dimension + 1).fill(dimension));
});

type Character = SmallIrreps["irreps"][number]["characters"][number];

function valueAt(character: Character | undefined, letters: readonly number[]): [number, number] {
  return character ? phasedValue(character.phase, character.factor, letters) : [Number.NaN, Number.NaN];
}

describe("compatibility", () => {
  test.each([
    ["P m -3 m", "0 0 0", "0 0 1/5"],
    ["P m -3 m", "1/2 1/2 1/2", "1/5 1/5 1/5"],
    ["P n m a", "0 1/2 0", "0 1/5 0"],
    ["P 63/m m c", "1/3 1/3 0", "1/3 1/3 1/5"],
    ["F d -3 m:2", "0 1 0", "0 1/5 0"],
    ["I 41", "0 0 0", "0 0 1/5"],
    // Screws and glides give phases that the letters of the line take up.
    ["P 21", "0 1/2 0", "0 1/5 0"],
    ["P 61", "0 0 1/2", "0 0 1/5"],
    ["P 1 c 1", "1/2 0 1/2", "1/5 0 1/7"],
    ["P m c 21", "0 1/2 3/2", "0 1/2 1/5"],
  ])("of %s from %s to the line through %s: restricted characters are the sums that it says", (name, from, to) => {
    const group = groupOf(name);
    const { from: point, to: line, parameters, rows } = compatibility(group, wave(from), opened(name, to));
    const letters = parameters.map(([top, bottom]) => top / bottom);
    expect(line.k.values).toBeNull();
    expect(rows.map(({ label }) => label)).toEqual(point.irreps.map(({ label }) => label));
    rows.forEach(({ multiplicities }, row) => {
      line.littleGroup.operators.forEach((operator, place) => {
        const at = point.littleGroup.operators.indexOf(operator);
        const whole = valueAt(point.irreps[row]?.characters[at], letters);
        const parts = line.irreps.map(({ characters }) => valueAt(characters[place], letters));
        const sum = (axis: 0 | 1) =>
          parts.reduce((total, part, at) => total + (multiplicities[at] ?? 0) * part[axis], 0);
        expect(Math.hypot(sum(0) - whole[0], sum(1) - whole[1])).toBeLessThan(1e-9);
      });
    });
  });

  test("of a point with itself is one to one", () => {
    const group = groupOf("P m -3 m");
    const { rows, to } = compatibility(group, wave("1/2 1/2 1/2"), wave("1/2 1/2 1/2"));
    expect(to.k.values).toEqual([]);
    expect(rows.map(({ multiplicities }) => multiplicities)).toEqual(
      rows.map((_, row) => rows.map((_other, column) => (row === column ? 1 : 0))),
    );
  });

  test("takes the whole line of a k that is special only together with −k", () => {
    // In a polar group the fourfold axis through Γ is one line (0,0,w), Γ and Z being like all its points.
    const { to, parameters, rows } = compatibility(groupOf("P 4"), wave("0 0 1/2"), wave("0 0 0"));
    expect(to.k.values).toBeNull();
    expect(parameters).toEqual([[1, 2]]);
    expect(rows.map(({ multiplicities }) => [...multiplicities].sort())).toEqual(rows.map(() => [0, 0, 0, 1]));
  });

  test("needs a line or plane through the k", () => {
    const group = groupOf("P m -3 m");
    expect(() => compatibility(group, wave("1/2 1/2 1/2"), opened("P m -3 m", "0 0 1/5"))).toThrowError(
      expect.objectContaining({ code: "k-not-on-manifold" }),
    );
  });
});
