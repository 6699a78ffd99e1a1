import { smallIrreps } from "@kvane/core/irreps";
import { specialPoints } from "@kvane/core/kvectors";
import { describe, expect, test } from "vitest";
import { groupOf } from "../support/parsed-groups.js";
import { wave } from "../support/written.js";

/**
 * Single-arm irreps at special points: order of the little co-group, dimensions and types (1 real, 2 pseudoreal,
 * 3 complex). Rows with `remembered` agree with what is remembered of the printed tables (confidence 85 % or more):
 * Bradley & Cracknell, The Mathematical Theory of Symmetry in Solids (1972); Cracknell, Davies, Miller & Love, Kronecker
 * Product Tables (1979); Kovalev, Representations of the Crystallographic Space Groups (1993). The others were computed
 * with general-purpose tools apart from kvane, by splitting the projective regular representation numerically.
 */
const rows: readonly {
  readonly group: string;
  readonly k: readonly string[];
  readonly order: number;
  /** Dimension, then the type in brackets, one for each irrep. */
  readonly irreps: string;
  readonly mark: "remembered" | "computed";
}[] = [
  { group: "P 21 3", k: ["0 0 0"], order: 12, irreps: "1(1) 1(3) 1(3) 3(1)", mark: "remembered" },
  { group: "P 21 3", k: ["1/2 0 0"], order: 4, irreps: "2(1)", mark: "computed" },
  { group: "P 21 3", k: ["1/2 1/2 0"], order: 4, irreps: "1(3) 1(3) 1(3) 1(3)", mark: "computed" },
  { group: "P 21 3", k: ["1/2 1/2 1/2"], order: 12, irreps: "2(2) 2(3) 2(3)", mark: "remembered" },
  { group: "P a -3", k: ["1/2 0 0"], order: 8, irreps: "2(1) 2(1)", mark: "computed" },
  { group: "P a -3", k: ["1/2 1/2 0"], order: 8, irreps: "2(3) 2(3)", mark: "computed" },
  { group: "P a -3", k: ["1/2 1/2 1/2"], order: 24, irreps: "2(2) 2(2) 2(3) 2(3) 2(3) 2(3)", mark: "computed" },
  { group: "F m -3 m", k: ["0 0 1"], order: 16, irreps: "1(1)*8 2(1) 2(1)", mark: "remembered" },
  { group: "F m -3 m", k: ["1/2 1/2 1/2"], order: 12, irreps: "1(1)*4 2(1) 2(1)", mark: "remembered" },
  { group: "F m -3 m", k: ["1/2 1 0"], order: 8, irreps: "1(1)*4 2(1)", mark: "computed" },
  { group: "F d -3 m:2", k: ["0 0 1"], order: 16, irreps: "2(1)*4", mark: "remembered" },
  { group: "F d -3 m:2", k: ["1/2 1/2 1/2"], order: 12, irreps: "1(1)*4 2(1) 2(1)", mark: "remembered" },
  { group: "F d -3 m:2", k: ["1/2 1 0"], order: 8, irreps: "2(1) 2(1)", mark: "remembered" },
  { group: "P n -3 n:2", k: ["1/2 1/2 1/2"], order: 48, irreps: "2(1) 2(3) 2(3) 6(1)", mark: "computed" },
  {
    group: "P n m a",
    k: ["1/2 0 0", "0 1/2 0", "0 0 1/2", "0 1/2 1/2"],
    order: 8,
    irreps: "2(1) 2(1)",
    mark: "remembered",
  },
  { group: "P n m a", k: ["1/2 1/2 0", "1/2 1/2 1/2"], order: 8, irreps: "2(3) 2(3)", mark: "remembered" },
  { group: "P n m a", k: ["1/2 0 1/2"], order: 8, irreps: "1(3)*8", mark: "computed" },
  { group: "P 63/m m c", k: ["1/2 0 0"], order: 8, irreps: "1(1)*8", mark: "computed" },
  { group: "P 63/m m c", k: ["1/2 0 1/2"], order: 8, irreps: "2(1) 2(1)", mark: "remembered" },
  { group: "P 63/m m c", k: ["1/3 1/3 0"], order: 12, irreps: "1(1)*4 2(1) 2(1)", mark: "computed" },
  { group: "P 63/m m c", k: ["1/3 1/3 1/2"], order: 12, irreps: "2(1)*3", mark: "remembered" },
  { group: "P 42/m n m", k: ["1/2 1/2 1/2", "0 0 1/2"], order: 16, irreps: "2(1)*4", mark: "computed" },
  { group: "P 42/m n m", k: ["1/2 1/2 0"], order: 16, irreps: "1(3)*8 2(1) 2(1)", mark: "computed" },
  { group: "P 42/m n m", k: ["1/2 0 0", "1/2 0 1/2"], order: 8, irreps: "2(1) 2(1)", mark: "computed" },
  { group: "P 1 21/c 1", k: ["1/2 0 0"], order: 4, irreps: "1(1)*4", mark: "computed" },
  {
    group: "P 1 21/c 1",
    k: ["0 1/2 0", "0 0 1/2", "1/2 1/2 0", "1/2 0 1/2"],
    order: 4,
    irreps: "2(1)",
    mark: "computed",
  },
  { group: "P 1 21/c 1", k: ["0 1/2 1/2", "1/2 1/2 1/2"], order: 4, irreps: "1(3)*4", mark: "computed" },
  { group: "P 21 21 21", k: ["1/2 0 0"], order: 4, irreps: "2(1)", mark: "computed" },
  { group: "P 21 21 21", k: ["1/2 1/2 0"], order: 4, irreps: "1(3)*4", mark: "computed" },
  { group: "P 21 21 21", k: ["1/2 1/2 1/2"], order: 4, irreps: "2(2)", mark: "computed" },
  { group: "P 41", k: ["0 0 1/2"], order: 4, irreps: "1(3)*4", mark: "computed" },
  { group: "P 61", k: ["0 0 1/2"], order: 6, irreps: "1(3)*6", mark: "computed" },
];

const typeNumbers = { real: 1, pseudoreal: 2, complex: 3 } as const;

/** `1(1)*8 2(1)` written out and sorted. */
function written(text: string): string[] {
  return text
    .split(" ")
    .flatMap((entry) => {
      const [irrep = "", times = "1"] = entry.split("*");
      return new Array<string>(Number(times)).fill(irrep);
    })
    .sort();
}

describe("irreps at special points, dimensions and types", () => {
  for (const { group, k, order, irreps, mark } of rows)
    test.for([...k])(`${group} at (%s), ${mark}`, (components) => {
      const found = smallIrreps(groupOf(group), wave(components));
      expect(found.littleGroup.operators).toHaveLength(order);
      expect(found.irreps.map((irrep) => `${irrep.dimension}(${typeNumbers[irrep.reality]})`).sort()).toEqual(
        written(irreps),
      );
    });
});

/** The k with 2k ∈ L* are the eight halves of the reciprocal lattice, shared out over the stars (exact). */
describe("arms of the k with 2k ∈ L* add up to 8", () => {
  test.for([
    ["P m -3 m", [1, 1, 3, 3]],
    ["F m -3 m", [1, 3, 4]],
    ["I m -3 m", [1, 1, 6]],
  ] as const)("%s", ([group, arms]) => {
    const halves = specialPoints(groupOf(group)).filter((point) => point.minusK === "equivalent");
    expect(halves.map((point) => point.arms).sort()).toEqual(arms);
  });
});
