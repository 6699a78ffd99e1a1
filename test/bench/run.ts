/**
 * `npm run bench` measures all parts and prints one table, each figure a ratio to something measured in the same run.
 * `npm run bench -- WORDS` does only the parts whose name has one of the words; a number among them is that of the pairs.
 */
import { largeCommands, smallCommands } from "./commands.js";
import { configurations } from "./configurations.js";
import { irreps } from "./irreps.js";
import { irrepsGap } from "./irreps-gap.js";
import type { Measured, Part } from "./part.js";
import { profile } from "./profile.js";
import { searchGrid } from "./search-grid.js";
import { searchGrowth } from "./search-growth.js";
import { tableText } from "./table.js";
import { weighing } from "./weighing.js";

/** In the order of the table. */
const parts: readonly Part[] = [
  smallCommands,
  largeCommands,
  profile,
  irreps,
  irrepsGap,
  configurations,
  searchGrid,
  searchGrowth,
  weighing,
];

const usualPairs = 15;

/** Pairs of what takes seconds; its ratios are far from each other and need no more. */
const mostOfSlow = 5;

const given = process.argv.slice(2);
const words = given.filter((word) => Number.isNaN(Number(word)));
const pairs = given.map(Number).find((number) => number >= 1) ?? usualPairs;
const wanted = parts.filter(({ name }) => words.length === 0 || words.some((word) => name.includes(word)));

if (wanted.length === 0) {
  process.stderr.write(`no part has ${words.join(" or ")} in its name: ${parts.map(({ name }) => name).join(", ")}\n`);
  process.exitCode = 1;
} else {
  const found: Measured[] = [];
  const counts = { pairs, few: Math.min(pairs, mostOfSlow) };
  for (const [index, { name, measure }] of wanted.entries()) {
    process.stderr.write(`${index + 1} of ${wanted.length}: ${name}\n`);
    try {
      found.push(await measure(counts));
    } catch (error) {
      found.push({ rows: [], notes: [`${name} failed: ${String(error).split("\n")[0]}`] });
      process.exitCode = 1;
    }
  }
  const said = `ratio: the median of ${counts.pairs} pairs measured in turn, ${counts.few} of what is slow; least and most of them`;
  process.stdout.write(tableText([...found, { rows: [], notes: [said] }]));
}
