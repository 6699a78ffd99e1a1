import { describe, expect, test } from "vitest";
import { lostK, missedByTwin, ordinaryCase, search } from "../certify/search.ts";
import { ranksFirst, searchCase } from "../support/search-cases.ts";

/*
 * A sample of the sweeps of test/certify/search.ts: made lists of a random k of a random kind in random groups and cells,
 * and a dense grid that must not know of a k which the search missed.
 */
describe("the certified search on made lists (seeds 0 to 7)", () => {
  test("the k behind each list lies in a returned region, and ranks first or tied first in all but one", {
    timeout: 60_000,
  }, async () => {
    const failures: string[] = [];
    const outranked: string[] = [];
    for (let seed = 0; seed < 8; seed++) {
      const made = ordinaryCase(seed);
      const result = await search(made);
      failures.push(...lostK(made, result));
      if (made.list.peaks.length >= 8 && !ranksFirst(made, result)) outranked.push(made.name);
    }
    expect(failures).toEqual([]);
    expect(outranked.length, outranked.join("; ")).toBeLessThanOrEqual(1);
  });

  test("no k of a dense grid is missed (seed 1)", { timeout: 60_000 }, async () => {
    expect(await missedByTwin(1)).toEqual([]);
  });

  test("a list with a wrong zero shift: found within its limit, the shift refined", async () => {
    const made = searchCase(77, {
      least: 10,
      most: 10,
      strays: 0,
      seen: 0.8,
      volumes: [100, 200],
      uncertainty: 0.02,
      zeroShift: 0.1,
    });
    const { locate, defaultSearchOptions } = await import("@kvane/core/search");
    const free = await locate(made.group, made.cell, made.list, { ...defaultSearchOptions, zeroShift: 0.15 });
    expect(ranksFirst(made, free)).toBe(true);
    expect(lostK(made, free)).toEqual([]);
    const [shift] = free.candidates[0]?.corrections ?? [];
    expect(shift?.name).toBe("zeroShift");
    expect(Math.abs((shift?.value ?? 0) - 0.1)).toBeLessThan(4 * (shift?.uncertainty ?? 0));
    expect(free.candidates[0]?.matched).toBeGreaterThanOrEqual(9);
  });
});
