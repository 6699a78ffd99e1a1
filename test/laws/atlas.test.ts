import { readFileSync } from "node:fs";
import {
  atlas,
  equivalentWaveVectors,
  exactWaveVector,
  type KindOfK,
  kindOf,
  specialPoints,
} from "@kvane/core/kvectors";
import { groupFromOperators, type SpaceGroup } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { symmorphicNumbers, wyckoffPositions } from "../fixtures/make-wyckoff-counts.mjs";
import { typeFinder } from "../support/affine-types.js";
import {
  componentsOf,
  countArms,
  type FloatGroup,
  floatGroup,
  isReciprocalVector,
  minus,
  operatorsTaking,
} from "../support/float-group.js";
import { imagesOf, randomKindProblems } from "../support/kinds-in-floats.js";
import { groupOf } from "../support/parsed-groups.js";
import { seeded } from "../support/random.js";
import { reduced } from "../support/written.js";

/** Dimension and order of the site symmetry of each Wyckoff position; test/fixtures/ORIGIN.md. */
const positions = new Map<number, readonly (readonly [number, number])[]>(
  JSON.parse(readFileSync(new URL("../fixtures/wyckoff-positions.json", import.meta.url), "utf8")).map(
    (group: { number: number; positions: [number, number][] }) => [group.number, group.positions],
  ),
);
const finder = typeFinder();
const groups = Array.from({ length: 230 }, (_, index) => groupOf(index + 1));

const knownClasses = new Map<string, number>();

/** The symmorphic group of the arithmetic class, by its number. */
function classOf(group: SpaceGroup): number {
  // Most groups of a class have the same matrices in their tabulated settings.
  const key = group.primitive.rotations.map(String).sort().join(" ");
  const number = knownClasses.get(key) ?? searchClass(group);
  knownClasses.set(key, number);
  return number;
}

function searchClass(group: SpaceGroup): number {
  const found = symmorphicNumbers.filter((number) => finder.sameArithmeticClass(groupOf(number), group));
  if (found.length !== 1) throw new Error(`${group.name.hall}: ${found.length} arithmetic classes`);
  return found[0] as number;
}

/** The group without translations whose matrices act on columns as those of `group`, and −1 if asked, act on rows k. */
function dualOf(group: SpaceGroup, withInversion: boolean): SpaceGroup {
  const transposed = group.primitive.rotations.map((m) =>
    [0, 3, 6, 1, 4, 7, 2, 5, 8].map((index) => m[index] as number),
  );
  const matrices = withInversion ? [...transposed, ...transposed.map((m) => m.map((entry) => 0 - entry))] : transposed;
  return groupFromOperators(
    [...new Map(matrices.map((rotation) => [rotation.join(), rotation])).values()].map((rotation) => ({
      rotation,
      rotationDenominator: 1,
      translation: [0, 0, 0],
      translationDenominator: 1,
    })),
  );
}

/** docs/methods.md: classes that are not their own dual. F and I; two orientations in hexagonal P and tetragonal I. */
const dualPairs: readonly (readonly [number, number])[] = [
  [22, 23],
  [42, 44],
  [69, 71],
  [119, 121],
  [149, 150],
  [156, 157],
  [162, 164],
  [187, 189],
  [196, 197],
  [202, 204],
  [209, 211],
  [216, 217],
  [225, 229],
];
const dualNumber = new Map(dualPairs.flatMap(([a, b]) => [[a, b] as const, [b, a] as const]));

const pairsOf = (kinds: readonly KindOfK[]): string[] =>
  kinds.map((kind) => `${kind.dimension} ${kind.littleCoGroup.order}`).sort();

describe("kinds of k are the Wyckoff positions of the symmorphic group of the dual class", () => {
  test("transposed matrices give the dual classes of the table", () => {
    const wrong = symmorphicNumbers.filter(
      (number) => classOf(dualOf(groupOf(number), false)) !== (dualNumber.get(number) ?? number),
    );
    expect(wrong).toEqual([]);
  });

  test("for all 230 groups: their number, dimensions and orders", () => {
    const wrong = groups.flatMap((group) => {
      const number = classOf(group);
      const expected = (positions.get(dualNumber.get(number) ?? number) ?? []).map((pair) => pair.join(" ")).sort();
      const found = pairsOf(atlas(group, { withInversion: false }));
      return found.join() === expected.join() ? [] : [`${group.name.number}: ${found} instead of ${expected}`];
    });
    expect(wrong).toEqual([]);
  });

  test("and with −1 those of the group with −1 added", () => {
    const wrong = symmorphicNumbers.flatMap((number) => {
      const expected = (positions.get(classOf(dualOf(groupOf(number), true))) ?? [])
        .map(([dimension]) => dimension)
        .sort();
      const found = atlas(groupOf(number), { withInversion: true }).map((kind) => kind.dimensionPM);
      return found.sort().join() === expected.join() ? [] : [`${number}: ${found} instead of ${expected}`];
    });
    expect(wrong).toEqual([]);
  });

  // Last Wyckoff letters as remembered from International Tables A; 27 positions of Pmmm end with the letter alpha.
  test("the fixture has the remembered last letters of International Tables A", () => {
    const letters =
      "2i 3e 5c 6c 8b 10o 12j 16u 21l 22k 23k 25i 35f 38f 42e 44e 65r 69p 71o 75d 79c 81h 82g 83l 87i 89p 97k 99g 107e " +
      "111o 115l 119j 121j 123u 139o 143d 146b 147g 148f 149l 150g 155f 156e 157d 160c 162l 164j 166i 168d 174l 175l " +
      "177n 183f 187o 189l 191r 195j 196h 197f 200l 202i 204h 207k 209j 211j 215j 216i 217h 221n 225l 229l";
    const wrong = letters.split(" ").filter((text) => {
      const [, number, letter = ""] = /^(\d+)([a-z])$/.exec(text) ?? [];
      return positions.get(Number(number))?.length !== letter.charCodeAt(0) - 96;
    });
    expect(wrong).toEqual([]);
    expect(positions.get(47)).toHaveLength(27);
  });

  test("GAP finds the fixture's positions again", { timeout: 120_000 }, ({ skip }) => {
    const found = wyckoffPositions([3, 82, 119, 157, 166, 197, 216]);
    if ("missing" in found) return skip(found.missing);
    for (const group of found) expect(group.positions, `${group.number}`).toEqual(positions.get(group.number));
  });
});

describe("every k belongs to exactly one kind", () => {
  // npm run certify takes 200 in each class.
  const rounds = Number(process.env["KVANE_KINDS_PER_CLASS"] ?? "16");
  const tens = Array.from({ length: 8 }, (_, ten) => symmorphicNumbers.slice(10 * ten, 10 * ten + 10));

  test.for(tens.map((numbers) => ({ from: numbers[0], numbers })))("classes from $from", ({ numbers }) => {
    const problems = numbers.flatMap((number) => randomKindProblems(groupOf(number), seeded(300 + number), rounds));
    expect(problems).toEqual([]);
  });

  /**
   * Burnside's lemma on the k with nk ∈ L*: the number of their stars is the mean of the number that an operator fixes.
   * With the arms that the atlas gives, each kind holds (points on it) / (arms) of these stars.
   */
  test.for([2, 3, 4, 6])("and stars of the k with %ik in L* are as many as Burnside's lemma says", (n) => {
    const wrong = [10, 22, 44, 82, 119, 139, 155, 160, 187, 197, 216].flatMap((number) => {
      const group = groupOf(number);
      const float = floatGroup(group);
      const kinds = atlas(group, { withInversion: false });
      const points = Array.from({ length: n ** 3 }, (_, code) => {
        const place = [code % n, Math.floor(code / n) % n, Math.floor(code / n ** 2)];
        return [0, 1, 2].map((axis) =>
          place.reduce((sum, entry, i) => sum + (entry / n) * (float.dual[i]?.[axis] as number), 0),
        );
      });
      let fixed = 0;
      for (const point of points)
        for (const image of imagesOf(float, point, false))
          if (isReciprocalVector(float, minus(image, point))) fixed += 1;
      const stars = points.reduce((sum, point) => {
        const [a, b, c] = point.map((entry) => reduced(Math.round(12 * entry), 12)) as [Pair, Pair, Pair];
        const index = kindOf(group, kinds, exactWaveVector([a, b, c]), { withInversion: false });
        return sum + 1 / (kinds[index]?.arms as number);
      }, 0);
      return Math.abs(stars - fixed / float.operators.length) < 1e-9 ? [] : [`${number}: ${stars}`];
    });
    expect(wrong).toEqual([]);
  });
});

type Pair = [number, number];

describe("what is said of each kind", () => {
  test("is what plain floats give: order, arms, −k, both dimensions", () => {
    const wrong = symmorphicNumbers.map(groupOf).flatMap((group) =>
      [false, true].flatMap((withInversion) =>
        atlas(group, { withInversion }).flatMap((kind) => {
          const float = floatGroup(group);
          const k = componentsOf(kind.k);
          const [fixing, reversing] = [operatorsTaking(float, k, 1), operatorsTaking(float, k, -1)];
          const equivalent = isReciprocalVector(
            float,
            k.map((entry) => 2 * entry),
          );
          const expected = {
            order: fixing.length,
            arms: countArms(float, k),
            minusK: equivalent ? "equivalent" : reversing.length > 0 ? "in star" : "not in star",
            dimension: meanTrace(float, fixing, []),
            dimensionPM: meanTrace(float, fixing, reversing),
          };
          const { littleCoGroup, arms, minusK, dimension, dimensionPM } = kind;
          const found = { order: littleCoGroup.order, arms, minusK, dimension, dimensionPM };
          return JSON.stringify(found) === JSON.stringify(expected)
            ? []
            : [`${group.name.number} (${k}): ${JSON.stringify(found)} instead of ${JSON.stringify(expected)}`];
        }),
      ),
    );
    expect(wrong).toEqual([]);
  });
});

/** Dimension of what R of the first list and −R of the second leave fixed: a mean of traces (orthogonality). */
function meanTrace(float: FloatGroup, fixing: readonly number[], reversing: readonly number[]): number {
  const trace = (index: number): number => {
    const r = float.operators[index]?.rotation as readonly number[];
    return (r[0] as number) + (r[4] as number) + (r[8] as number);
  };
  const sum = (list: readonly number[]): number => list.reduce((total, index) => total + trace(index), 0);
  return Math.round((sum(fixing) - sum(reversing)) / (fixing.length + reversing.length)) + 0;
}

describe("points and halves", () => {
  test("the points under P with −1 are the special points", () => {
    for (const group of symmorphicNumbers.map(groupOf)) {
      const points = atlas(group, { withInversion: true }).filter((kind) => kind.dimensionPM === 0);
      const special = specialPoints(group);
      expect(points.length, `${group.name.number}`).toBe(special.length);
      for (const { k } of special)
        expect(
          points.filter((point) => equivalentWaveVectors(group, point.k, k)),
          `${group.name.number}`,
        ).toHaveLength(1);
    }
  });

  test("the k with 2k in L* are all listed, each on one kind: their arms add up to 8", () => {
    const wrong = symmorphicNumbers.map(groupOf).flatMap((group) =>
      [false, true].flatMap((withInversion) => {
        const float = floatGroup(group);
        const arms: number[][] = [];
        for (const kind of atlas(group, { withInversion }))
          for (const k of kind.halfLattice) {
            const row = k.components.map((form) => form.constant[0] / form.constant[1]);
            if (
              !isReciprocalVector(
                float,
                row.map((entry) => 2 * entry),
              )
            )
              return [`${group.name.number}: 2k not in L*`];
            const own: number[][] = [];
            for (const image of imagesOf(float, row, false))
              if (!own.some((arm) => isReciprocalVector(float, minus(arm, image)))) own.push(image);
            arms.push(...own);
          }
        const twice = arms.some((arm, index) =>
          arms.some((other, at) => at < index && isReciprocalVector(float, minus(arm, other))),
        );
        return arms.length === 8 && !twice ? [] : [`${group.name.number}: ${arms.length} arms`];
      }),
    );
    expect(wrong).toEqual([]);
  });
});
