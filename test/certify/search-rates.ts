/**
 * How often the evidence is right: made lists of three sorts, all kinds of k searched, one unmatched peak allowed. Prints
 * the table. `node test/tools/run-typescript.mjs test/certify/search-rates.ts [lists of each sort]`
 */
import { defaultSearchOptions, locate, type PeakList } from "@kvane/core/search";
import { angleList } from "../support/peak-lists.js";
import { seeded } from "../support/random.js";
import { type CaseOptions, ranksFirst, type SearchCase, searchCase } from "../support/search-cases.js";
import { ordinary } from "./search.js";

const count = Number(process.argv[2] ?? 100);

const sorts: readonly { name: string; options: CaseOptions; unmatched: number; chance: boolean }[] = [
  { name: "ordinary", options: { ...ordinary, strays: 1 }, unmatched: 1, chance: false },
  {
    name: "hard: half of the lines, two strays",
    options: { ...ordinary, seen: 0.5, strays: 2 },
    unmatched: 2,
    chance: false,
  },
  {
    name: "zero shift 0.03°, refined",
    options: { ...ordinary, strays: 1, zeroShift: 0.03 },
    unmatched: 1,
    chance: false,
  },
  { name: "chance", options: ordinary, unmatched: 1, chance: true },
];

/** As many peaks as the list has, anywhere in its range. */
function chanceList(made: SearchCase, seed: number): PeakList {
  const random = seeded(9_000_000 + seed);
  const highest = Math.max(...made.list.peaks.map(({ position, q }) => angleOf(q ?? position ?? 1)));
  const angles = made.list.peaks.map(() => 6 + (highest - 6) * random.next());
  return angleList(
    angles.sort((a, b) => a - b),
    ordinary.uncertainty,
    2.41,
  );
}

function angleOf(q: number): number {
  return (360 / Math.PI) * Math.asin(Math.min(1, (q * 2.41) / (4 * Math.PI)));
}

const cell = (right: number, all: number): string => `${right} of ${all}`.padStart(14);
console.log(
  "lists".padEnd(38),
  ["E > 3", "0 to 3", "below 0", "first", "stopped"].map((head) => head.padStart(14)).join(""),
);
for (const [place, { name, options, unmatched, chance }] of sorts.entries()) {
  const right = [0, 0, 0];
  const all = [0, 0, 0];
  let stopped = 0;
  for (let index = 0; index < count; index++) {
    const seed = 5_000_000 + 10_000 * place + index;
    const made = searchCase(seed, options);
    const list = chance ? chanceList(made, seed) : made.list;
    const zeroShift = options.zeroShift === undefined ? 0 : 0.06;
    const result = await locate(made.group, made.cell, list, { ...defaultSearchOptions, unmatched, zeroShift });
    const value = result.candidates[0]?.evidence.value ?? -1;
    const reading = value > 3 ? 0 : value >= 0 ? 1 : 2;
    all[reading] = (all[reading] as number) + 1;
    if (!result.certificate.exhaustive) stopped += 1;
    if (!chance && ranksFirst(made, result)) right[reading] = (right[reading] as number) + 1;
  }
  const sum = right.reduce((total, entry) => total + entry, 0);
  const classes = right.map((entry, index) => cell(entry, all[index] as number)).join("");
  console.log(name.padEnd(38), classes + cell(sum, count) + String(stopped).padStart(14));
}
