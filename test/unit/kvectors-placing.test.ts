import {
  atlas,
  formatWaveVector,
  type PlacedWaveVector,
  parseWaveVector,
  placeWaveVector,
  plainestRepresentative,
} from "@kvane/core/kvectors";
import { describe, expect, test } from "vitest";
import { descend } from "#core/kvectors/plainest.js";
import { type PlacedFlat, plainestOf } from "#core/kvectors/plainest-flat.js";
import { groupOf } from "../support/parsed-groups.js";
import { wave } from "../support/written.js";

const place = (group: string, text: string): PlacedWaveVector => placeWaveVector(groupOf(group), parseWaveVector(text));

describe("a measured k", () => {
  test("that was moved is told as it was typed, with where it went and why", () => {
    expect(place("P 6/m m m", "0.3333,0.3333,0").assumed).toEqual([
      {
        what: "wave vector (0.3333, 0.3333, 0)",
        value: "(1/3, 1/3, 0)",
        because: "it lies within 0.0001 reciprocal lattice units of that point",
      },
    ]);
    // The planes of 2/m with unique axis b are k₂ = 0 and k₂ = 1/2.
    const [moved] = place("P 1 2/m 1", "0.2146,0.49996,0.3187").assumed;
    expect(moved?.because).toBe("it lies within 0.0001 reciprocal lattice units of that plane");
  });

  test("is put onto a kind that is just as far as the tolerance", () => {
    expect(formatWaveVector(place("P m m m", "0.4999,0.2345,0.3456").k)).toBe("(1/2, u, v)");
  });

  test("keeps a first component that was written exactly", () => {
    expect(formatWaveVector(place("P -1", "1/5,0.2813,0.2029").k)).toBe("(1/5, u, v)");
  });

  test("with no simpler kind nearby is not warned about", () => {
    expect(place("P n m a", "0,0.472,0").warnings).toEqual([]);
  });
});

describe("the plainest k", () => {
  test("is asked of an exact one", () => {
    expect(() => plainestRepresentative(groupOf("P m m m"), place("P m m m", "0,u,0").k)).toThrow(TypeError);
    expect(plainestRepresentative(groupOf("P m m m"), wave("0 1 1/2"))).toEqual(wave("0 0 1/2"));
  });

  test("is reached by adding steps", () => {
    expect(descend([2, 0, 0], [[-1, 0, 0]])).toEqual([0, 0, 0]);
  });

  test("of flats with different denominators is the one with the smaller base, not the smaller numerators", () => {
    const flat = (denominator: number, base: number[]): PlacedFlat =>
      ({ frame: { directions: [[0, 0, 1]], pivots: [2], units: [], denominator, steps: [] }, base }) as never;
    const half = flat(2, [1, 0, 0]);
    const quarter = flat(4, [1, 0, 0]);
    expect(plainestOf([half, quarter])).toBe(quarter);
    expect(plainestOf([quarter, half])).toBe(quarter);
  });
});

test("kinds of k leave the values of letters and their uncertainties open; points have none", () => {
  for (const { k, dimension } of atlas(groupOf("P m m m"), { withInversion: true }))
    expect([k.values, k.uncertainties]).toEqual(dimension === 0 ? [[], []] : [null, null]);
});
