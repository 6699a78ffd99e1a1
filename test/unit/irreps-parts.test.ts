import { constantRoot, smallIrreps } from "@kvane/core/irreps";
import { describe, expect, test } from "vitest";
import { littleGroupPlaces } from "#core/irreps/evaluate.js";
import { unitaryIntertwiner } from "#core/irreps/intertwiner.js";
import { primitiveOperator } from "#core/irreps/primitive-operators.js";
import { herringReality, indexOfCharacter } from "#core/irreps/reality.js";
import {
  addCyclotomic,
  adjointCyclotomicMatrix,
  type Cyclotomic,
  type CyclotomicMatrix,
  cyclotomicFromRational,
  equalCyclotomic,
  multiplyCyclotomic,
  multiplyCyclotomicMatrices,
  negateCyclotomic,
  rational,
  rootOfUnity,
} from "#core/numbers/index.js";
import { groupOf } from "../support/parsed-groups.js";
import { wave } from "../support/written.js";

const number = (top: number, bottom = 1): Cyclotomic => cyclotomicFromRational(rational(top, bottom));

/** cos and sin of a fraction of a turn: half the sum of a root of unity and its inverse, and that a quarter turn back. */
function cosine(top: number, bottom: number): Cyclotomic {
  const sum = addCyclotomic(rootOfUnity(rational(top, bottom)), rootOfUnity(rational(-top, bottom)));
  return multiplyCyclotomic(number(1, 2), sum);
}

function sine(top: number, bottom: number): Cyclotomic {
  return cosine(4 * top - bottom, 4 * bottom);
}

/** The four rotations and mirrors of a rectangle's projective group: 1, σz, σx and their product, all turned by θ. */
function turnedPauli(top: number, bottom: number): CyclotomicMatrix[] {
  const [c, s] = [cosine(2 * top, bottom), sine(2 * top, bottom)];
  const one = [
    [number(1), number(0)],
    [number(0), number(1)],
  ];
  const z = [
    [c, s],
    [s, negateCyclotomic(c)],
  ];
  const x = [
    [negateCyclotomic(s), c],
    [c, s],
  ];
  return [one, z, x, multiplyCyclotomicMatrices(z, x)];
}

function pairsOf(left: readonly CyclotomicMatrix[], right: readonly CyclotomicMatrix[]) {
  return left.map((matrix, at) => [matrix, right[at] as CyclotomicMatrix] as const);
}

function expectEqual(a: CyclotomicMatrix, b: CyclotomicMatrix): void {
  a.forEach((row, i) => {
    row.forEach((entry, j) => {
      expect(equalCyclotomic(entry, b[i]?.[j] as Cyclotomic)).toBe(true);
    });
  });
}

describe("the intertwiner of two equivalent irreps", () => {
  // Turned by θ = 1/12 of a turn: X is that rotation, rows of length 1 with entries √3/2 and 1/2.
  test.each([
    [1, 12],
    [1, 8],
    [1, 4],
    [1, 6],
    [1, 3],
  ])("turned by %i/%i of a turn is unitary and takes one to the other", (top, bottom) => {
    const [left, right] = [turnedPauli(top, bottom), turnedPauli(0, 1)];
    const x = unitaryIntertwiner(pairsOf(left, right));
    expectEqual(multiplyCyclotomicMatrices(x, adjointCyclotomicMatrix(x)), right[0] as CyclotomicMatrix);
    left.forEach((matrix, at) => {
      expectEqual(multiplyCyclotomicMatrices(matrix, x), multiplyCyclotomicMatrices(x, right[at] as CyclotomicMatrix));
    });
  });

  test("is missing where they are not equivalent, and where its size is no root of a fraction", () => {
    const sign = pairsOf([[[number(1)]], [[number(1)]]], [[[number(1)]], [[number(-1)]]]);
    expect(() => unitaryIntertwiner(sign)).toThrow("no intertwiner");
    // 1 + tan² of 1/16 of a turn is 4 − 2√2.
    expect(() => unitaryIntertwiner(pairsOf(turnedPauli(1, 16), turnedPauli(0, 1)))).toThrow("no unitary form");
  });
});

test("operators that are not in the group, or not in the little group, are refused", () => {
  const group = groupOf("P 4");
  expect(() => primitiveOperator(group, 4)).toThrow("no operator 4");
  const irreps = smallIrreps(group, wave("0 1/2 0"));
  const outside = group.operators.findIndex((_, at) => !irreps.littleGroup.operators.includes(at));
  const place = littleGroupPlaces(group, irreps);
  expect(() => place(primitiveOperator(group, outside))).toThrow("not in the little group");
});

test("what is no irrep of the group is refused", () => {
  // Characters of a group of two elements.
  const irreps = [
    [number(1), number(1)],
    [number(1), number(-1)],
  ];
  expect(irreps.map((character) => indexOfCharacter(irreps, character))).toEqual([0, 1]);
  expect(() => indexOfCharacter(irreps, [number(2), number(0)])).toThrow("not among the irreps");
  // Herring's sum over both squares, the identity; of the sum of the two irreps it is twice that of each.
  const square = { element: 0, phase: number(1) };
  const context = { squares: [square, square], images: null };
  expect(irreps.map((character) => herringReality(context, character))).toEqual(["real", "real"]);
  expect(() => herringReality(context, [number(2), number(0)])).toThrow("none of 1, -1 and 0");
});

test("phases that must be numbers hold no letter", () => {
  const turns = { constant: rational(1, 3), coefficients: [rational(0), rational(0), rational(0)] } as const;
  expect(constantRoot(turns)).toEqual(rootOfUnity(rational(1, 3)));
  expect(() => constantRoot({ ...turns, coefficients: [rational(0), rational(1), rational(0)] })).toThrow(
    "free parameter",
  );
});
