import { pairedRatios } from "./paired.js";
import type { Part, Row } from "./part.js";
import { problemOf, searchTime, usual, type Wish } from "./search-problem.js";

const one: Wish = { ...usual, unmatched: 1 };

/** Cases beside the usual one, with the reference that each is held against. */
const cases: readonly { readonly what: string; readonly wish: Wish; readonly reference: Wish }[] = [
  ...[100, 300, 1000, 2000, 5000, 10_000].map((volume) => beside(`${volume} Å³`, { ...one, volume })),
  ...[5, 10, 30, 100].map((peaks) => beside(`${peaks} peaks`, { ...one, peaks })),
  ...[0.001, 0.006, 0.012].map((tolerance) => beside(`tolerance ${tolerance} Å⁻¹`, { ...one, tolerance })),
  ...[0, 2].map((unmatched) => beside(`${unmatched} unmatched`, { ...one, unmatched })),
  ...["P 1 2/m 1", "P m m m", "P 4/m", "P 6/m m m", "P m -3 m"].map((symbol) => beside(symbol, { ...one, symbol })),
  beside("P n m a, 300 Å³, 12 peaks, 0.004 Å⁻¹", {
    symbol: "P n m a",
    volume: 300,
    peaks: 12,
    unmatched: 1,
    tolerance: 0.004,
  }),
];

/** How the cost of a search over all kinds of k grows. */
export const searchGrowth: Part = {
  name: "search-growth",
  measure: async ({ few }) => {
    await searchTime(problemOf(one, 9), 5);
    const rows: Row[] = [];
    for (const { what, wish, reference } of cases) {
      const ratios: number[] = [];
      for (let seed = 1; seed <= few; seed++) {
        const found = await pairedRatios(
          1,
          () => searchTime(problemOf(wish, seed), 3),
          () => searchTime(problemOf(reference, seed), 3),
        );
        ratios.push(...found.ratios);
      }
      rows.push({ what: `search, ${what}`, over: "usual search", ratios });
    }
    return { rows, notes: ["usual search: P -1, 500 Å³, 15 peaks, 0.003 Å⁻¹, 1 unmatched, all kinds of k"] };
  },
};

function beside(what: string, wish: Wish) {
  return { what, wish, reference: one };
}
