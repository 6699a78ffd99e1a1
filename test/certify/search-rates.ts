/**
 * How often the evidence is right: made lists of four sorts, all kinds of k searched. Prints the table.
 * `node test/tools/run-typescript.mjs test/certify/search-rates.ts [lists of each sort] [seed]`
 */
import { rateCells, rateColumns, ratesOf, sorts } from "./rates.js";

const count = Number(process.argv[2] ?? 100);
const seed = Number(process.argv[3] ?? 7_000_000);

console.log("lists".padEnd(38), rateColumns.map((head) => head.padStart(14)).join(""));
for (const [place, sort] of sorts.entries()) {
  const rates = await ratesOf(sort, seed + 10_000 * place, count);
  console.log(
    sort.name.padEnd(38),
    rateCells(sort, rates)
      .map((cell) => cell.padStart(14))
      .join(""),
  );
}
