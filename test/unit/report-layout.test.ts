import { describe, expect, test } from "vitest";
import { layeredLayout } from "#core/reports/svg/layered-layout.js";
import { seeded } from "../support/random.js";

describe("the layout of a layered graph", () => {
  test("boxes of a layer stay apart, and whatever the graph, all of it is inside", () => {
    const random = seeded(611);
    for (let round = 0; round < 40; round++) {
      const nodes = Array.from({ length: 2 + random.below(29) }, () => ({
        layer: random.below(6),
        size: 20 + random.below(40),
      }));
      const lines = Array.from(
        { length: random.below(40) },
        () => [random.below(nodes.length), random.below(nodes.length)] as const,
      ).filter(([from, to]) => (nodes[from]?.layer ?? 0) < (nodes[to]?.layer ?? 0));
      const { places: at, passes, extent } = layeredLayout(nodes, lines);
      nodes.forEach((node, index) => {
        expect((at[index] as number) - node.size / 2).toBeGreaterThan(-1e-6);
        expect((at[index] as number) + node.size / 2).toBeLessThan(extent + 1e-6);
        nodes.forEach((other, second) => {
          if (second <= index || other.layer !== node.layer) return;
          expect(Math.abs((at[index] as number) - (at[second] as number))).toBeGreaterThan(
            (node.size + other.size) / 2 - 1e-6,
          );
        });
      });
      lines.forEach(([from, to], index) => {
        const between = (passes[index] ?? []).map(({ layer }) => layer);
        const [first, last] = [nodes[from]?.layer ?? 0, nodes[to]?.layer ?? 0];
        expect(between).toEqual(Array.from({ length: last - first - 1 }, (_, step) => first + step + 1));
      });
    }
  });

  test("a tree is drawn without a crossing", () => {
    // 0 above 1 and 2; 1 above 5 and 6, 2 above 3 and 4: in the order of the numbers lines would cross.
    const layers = [0, 1, 1, 2, 2, 2, 2].map((layer) => ({ layer, size: 10 }));
    const { places: at } = layeredLayout(layers, [
      [0, 1],
      [0, 2],
      [2, 3],
      [2, 4],
      [1, 5],
      [1, 6],
    ]);
    const below = (node: number) => at[node] as number;
    expect(Math.sign(below(1) - below(2))).toBe(Math.sign(below(5) - below(3)));
    expect(Math.sign(below(1) - below(2))).toBe(Math.sign(below(6) - below(4)));
  });
});
