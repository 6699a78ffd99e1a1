import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";
import { processTime } from "./clocks.js";
import { median, pairedRatios } from "./paired.js";
import type { Measured, Part, Row } from "./part.js";

const command = join(root, "packages/cli/bin/kvane.js");

/** What a small command may take, over a bare node. */
const smallBound = 1.6;

const small: readonly (readonly string[])[] = [
  ["ops", "62"],
  ["star", "62", "--k", "0,1/2,0"],
  ["irreps", "62", "--k", "0,1/2,0"],
  ["modes", "62", "--k", "0,1/2,0", "--site", "Fe 0 0 0"],
];

const large: readonly (readonly string[])[] = [
  ["configurations", "P 6/m m m", "--k", "0,0,1/2", "--site", "Fe 0.11 0.23 0.31"],
  ["exchange", "--example"],
  ["locate", "--example"],
  ["weigh", "--example"],
  ["run", "--example"],
  ["report", "--example", "--out", "report.html"],
];

/** Small commands as whole processes, over a bare `node -e 0`: what starting costs. */
export const smallCommands: Part = {
  name: "commands-small",
  measure: ({ pairs }) => measured(small, pairs, smallBound),
};

/** The same for commands with work to do. */
export const largeCommands: Part = {
  name: "commands-large",
  measure: ({ few }) => measured(large, few),
};

async function measured(commands: readonly (readonly string[])[], pairs: number, bound?: number): Promise<Measured> {
  const rows: Row[] = [];
  const references: number[] = [];
  for (const words of commands) {
    const time = () => commandTime(words);
    time();
    const { ratios, reference } = await pairedRatios(pairs, time, () => processTime(["-e", "0"]));
    rows.push({ what: `kvane ${words.map(shown).join(" ")}`, over: "bare node", ratios, ...(bound && { bound }) });
    references.push(reference);
  }
  return {
    rows,
    notes: [`bare node took ${median(references).toFixed(0)} ms, beside the ${rows.length} commands above`],
  };
}

/** The time of one command; a file that it writes goes into a folder of its own. */
function commandTime(words: readonly string[]): number {
  if (!words.includes("--out")) return processTime([command, ...words]);
  const folder = mkdtempSync(join(tmpdir(), "kvane-bench-"));
  try {
    return processTime([
      command,
      ...words.map((word, index) => (words[index - 1] === "--out" ? join(folder, word) : word)),
    ]);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function shown(word: string): string {
  return word.includes(" ") ? `"${word}"` : word;
}
