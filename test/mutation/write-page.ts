import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";
import { type RoomResult, type Survivor, scores } from "./results.js";

const page = join(root, "docs/mutation.md");
const begin = "<!-- mutate: begin (written by `npm run mutate`) -->";
const end = "<!-- mutate: end -->";

/** Writes the counts and the survivors between the markers of docs/mutation.md. */
export function writePage(results: readonly RoomResult[]): void {
  const text = readFileSync(page, "utf8");
  const from = text.indexOf(begin);
  const to = text.indexOf(end);
  if (from < 0 || to < from) throw new Error("docs/mutation.md has lost its markers");
  const written = [...scoreTable(results), "", ...results.flatMap(survivorsOf)].join("\n").trimEnd();
  writeFileSync(page, `${text.slice(0, from)}${begin}\n${written}\n${text.slice(to)}`);
}

/** One row a room, as lines of Markdown. */
export function scoreTable(results: readonly RoomResult[]): string[] {
  const head =
    "| room | seed | mutants | tried | a test failed | never ended | survived | of these equivalent | score | score without equivalents |";
  return [
    head,
    head.replaceAll(/[^|]+/g, " ---: ").replace(" ---: ", " --- "),
    ...results.map((result) => {
      const { room, seed, mutants, sampled, killed, stopped, survivors } = result;
      const { raw, real } = scores(result);
      const equivalent = survivors.filter((survivor) => survivor.equivalent).length;
      const cells = [
        room,
        seed,
        mutants,
        sampled,
        killed,
        stopped,
        survivors.length,
        equivalent,
        share(raw),
        share(real),
      ];
      return `| ${cells.join(" | ")} |`;
    }),
  ];
}

/** Rounded down, so that 85 % means at least that. */
function share(percent: number): string {
  return `${(Math.floor(10 * percent) / 10).toFixed(1)} %`;
}

function survivorsOf({ room, survivors }: RoomResult): string[] {
  const list = (title: string, chosen: readonly Survivor[]): string[] =>
    chosen.length === 0 ? [] : [title, "", ...chosen.map(lineOf), ""];
  return [
    `### ${room}`,
    "",
    ...list(
      "Equivalent:",
      survivors.filter(({ equivalent }) => equivalent),
    ),
    ...list(
      "Not equivalent:",
      survivors.filter(({ equivalent }) => !equivalent),
    ),
  ];
}

function lineOf({ place, change, reason }: Survivor): string {
  return `- \`${place.replace("packages/core/src/", "")}\` ${quoted(change)}: ${reason || "not explained yet"}`;
}

/** Code with backticks in it needs longer ones around it. */
function quoted(code: string): string {
  return code.includes("`") ? `\`\` ${code} \`\`` : `\`${code}\``;
}
