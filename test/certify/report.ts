import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { readResults } from "../mutation/results.js";
import { scoreTable } from "../mutation/write-page.js";
import type { SubjectResult } from "./results.js";
import { root } from "./state.js";

const begin = "<!-- certify: begin (written by `npm run certify`) -->";
const end = "<!-- certify: end -->";
const shownFailures = 40;

/** Writes the table between the markers of docs/validation.md; the rest of the page is left as it is. */
export function writeReport(results: readonly SubjectResult[]): string {
  const file = join(root, "docs/validation.md");
  const page = existsSync(file) ? readFileSync(file, "utf8") : "# Validation\n";
  const text = `${begin}\n${report(results)}\n${end}`;
  const from = page.indexOf(begin);
  const to = page.indexOf(end);
  const written =
    from >= 0 && to > from
      ? page.slice(0, from) + text + page.slice(to + end.length)
      : `${page.trimEnd()}\n\n${text}\n`;
  writeFileSync(file, written);
  return file;
}

function report(results: readonly SubjectResult[]): string {
  const head = ["sweep", "seed", "cases", "irreps", "mode vectors", "fields in a supercell", "failures", "code of"];
  const rows = results.flatMap(({ rows: own, commit }) => own.map((row) => [...row, commit]));
  const problems = results.flatMap((result) => result.problems);
  const notes = results.flatMap((result) => result.notes).map((note) => `- ${note}`);
  const table = [head, head.map((_, column) => (column === 0 || column === 7 ? "---" : "---:")), ...rows];
  const failures = problems.slice(0, shownFailures).map((problem) => `- ${problem}`);
  const more = problems.length > shownFailures ? [`- and ${problems.length - shownFailures} more`] : [];
  return [
    ...table.map((row) => `| ${row.join(" | ")} |`),
    "",
    ...(notes.length === 0 ? [] : [...notes, ""]),
    ...(problems.length === 0 ? ["No failures."] : ["Failures:", "", ...failures, ...more]),
    ...mutationSection(),
  ].join("\n");
}

/** What small changes of the exact rooms the unit and law tests notice, from the committed results. */
function mutationSection(): string[] {
  const results = readResults();
  if (results.length === 0) return [];
  return [
    "",
    "Small changes made on purpose in the exact rooms, and how many of them the unit and law tests notice; rules and",
    "survivors: [mutation testing](mutation.md).",
    "",
    ...scoreTable(results),
  ];
}
