import { compatibility, littleGroupElement, type SmallIrreps, smallIrreps } from "@kvane/core/irreps";
import { manifold, type WaveVector } from "@kvane/core/kvectors";
import type { SymmetryOperator } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { phasedValue } from "../support/float-irreps.js";
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
  ])("of %s from %s to the line through %s: restricted characters are the sums that it says", (name, from, to) => {
    const group = groupOf(name);
    const { from: point, to: line, parameters, rows } = compatibility(group, wave(from), opened(name, to));
    const letters = parameters.map(([top, bottom]) => top / bottom);
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

  test("needs a line or plane through the k", () => {
    const group = groupOf("P m -3 m");
    expect(() => compatibility(group, wave("1/2 1/2 1/2"), opened("P m -3 m", "0 0 1/5"))).toThrowError(
      expect.objectContaining({ code: "k-not-on-manifold" }),
    );
  });
});
