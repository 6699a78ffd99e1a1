import {
  composeSuperspace,
  formatSuperspace,
  invertSuperspace,
  parseSuperspace,
  type SuperspaceOperator,
  sameSuperspaceOperator,
} from "@kvane/core/magneticgroups";
import { describe, expect, it } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { type Random, seeded } from "../support/random.js";

/** Operators that keep k = (1/2, 0, u) up to sign: H is 0 or (±1, 0, 0) and the like, by `k R = ε k + H`. */
function randomOperator(random: Random): SuperspaceOperator {
  const group = groupOf("P n m a");
  const operator = random.pick(group.operators);
  const k: readonly number[] = [0.5, 0, 0.31];
  const image = [0, 1, 2].map((column) =>
    k.reduce((sum, entry, row) => sum + entry * (operator.rotation[3 * row + column] as number), 0),
  );
  const epsilon = (image[2] as number) > 0 ? 1 : -1;
  const shift = image.map((entry, axis) => [Math.round(entry - epsilon * (k[axis] as number)), 1]);
  const quarters = random.below(4);
  return {
    operator,
    timeReversal: random.pick([1, -1]),
    epsilon,
    shift: shift as unknown as SuperspaceOperator["shift"],
    delta: quarters === 0 ? [0, 1] : quarters === 2 ? [1, 2] : [quarters, 4],
  };
}

/** `x' = R x + t`, `x₄' = ε x₄ + H·x + δ`. */
function act(one: SuperspaceOperator, point: readonly number[]): readonly number[] {
  const { rotation, translation, translationDenominator } = one.operator;
  const space = [0, 1, 2].map((row) =>
    [0, 1, 2].reduce(
      (sum, axis) => sum + (rotation[3 * row + axis] as number) * (point[axis] as number),
      (translation[row] as number) / translationDenominator,
    ),
  );
  const phase = one.shift.reduce(
    (sum, [top, bottom], axis) => sum + (top / bottom) * (point[axis] as number),
    one.epsilon * (point[3] as number) + one.delta[0] / one.delta[1],
  );
  return [...space, phase];
}

describe("superspace operators", () => {
  it("multiply as they act on points one after the other", () => {
    const random = seeded(621);
    const { lattice } = groupOf("P n m a");
    for (let times = 0; times < 60; times++) {
      const [a, b, c] = [randomOperator(random), randomOperator(random), randomOperator(random)] as const;
      const point = [random.next(), random.next(), random.next(), random.next()];
      const ab = composeSuperspace(a, b);
      act(ab, point).forEach((entry, index) => {
        expect(entry).toBeCloseTo(act(a, act(b, point))[index] as number, 10);
      });
      expect(ab.timeReversal).toBe(a.timeReversal * b.timeReversal);
      const back = act(invertSuperspace(a), act(a, point));
      back.forEach((entry, index) => {
        expect(entry).toBeCloseTo(point[index] as number, 10);
      });
      expect(
        sameSuperspaceOperator(lattice, composeSuperspace(ab, c), composeSuperspace(a, composeSuperspace(b, c))),
      ).toBe(true);
      expect(sameSuperspaceOperator(lattice, parseSuperspace(formatSuperspace(ab)), ab)).toBe(true);
      expect(sameSuperspaceOperator(lattice, { ...ab, delta: [1, 3] }, ab)).toBe(false);
    }
  });
});
