import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { readResults } from "../mutation/results.js";
import { scoreTable } from "../mutation/write-page.js";
import { root, type State } from "./state.js";
import { type Counts, type Subject, unitName } from "./subject.js";

const begin = "<!-- certify: begin (written by `npm run certify`) -->";
const end = "<!-- certify: end -->";
const shownFailures = 40;

/** Writes the table between the markers of docs/validation.md; the rest of the page is left as it is. */
export function writeReport(states: ReadonlyMap<Subject, State>): string {
  const file = join(root, "docs/validation.md");
  const page = existsSync(file) ? readFileSync(file, "utf8") : "# Validation\n";
  const text = `${begin}\n${report(states)}\n${end}`;
  const from = page.indexOf(begin);
  const to = page.indexOf(end);
  const written =
    from >= 0 && to > from
      ? page.slice(0, from) + text + page.slice(to + end.length)
      : `${page.trimEnd()}\n\n${text}\n`;
  writeFileSync(file, written);
  return file;
}

function report(states: ReadonlyMap<Subject, State>): string {
  const rows: string[][] = [];
  const problems: string[] = [];
  const notes: string[] = [];
  for (const [subject, state] of states) {
    const units = subject.units();
    for (const [sweep, { what, seed }] of Object.entries(subject.sweeps)) {
      const counts = units.flatMap((unit) => (unit.sweep === sweep ? (state.done.get(unitName(unit)) ?? []) : []));
      problems.push(...counts.flatMap((entry) => entry.problems));
      notes.push(...sumNotes(counts.flatMap(({ note }) => note ?? [])).map((note) => `- ${note}`));
      rows.push(rowOf(what, seed, counts));
    }
  }
  const head = ["sweep", "seed", "cases", "irreps", "mode vectors", "fields in a supercell", "failures"];
  const table = [head, head.map((_, column) => (column === 0 ? "---" : "---:")), ...rows];
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

/** Notes of one wording become one with the sums of their numbers. */
function sumNotes(notes: readonly string[]): string[] {
  const numbers = /\d+/g;
  const wordings = new Set(notes.map((note) => note.replace(numbers, "#")));
  if (notes.length < 20 || wordings.size > 1) return [...notes];
  const sums = notes.reduce<number[]>(
    (total, note) => [...note.matchAll(numbers)].map(([text], index) => (total[index] ?? 0) + Number(text)),
    [],
  );
  let place = 0;
  return [...wordings].map((wording) => wording.replaceAll("#", () => String(sums[place++])));
}

function rowOf(what: string, seed: number | null, counts: readonly Counts[]): string[] {
  const sum = (of: (entry: Counts) => number | undefined): number =>
    counts.reduce((value, entry) => value + (of(entry) ?? 0), 0);
  const cell = (value: number): string => (value === 0 ? "–" : String(value));
  return [
    what,
    seed === null ? "–" : String(seed),
    String(sum((entry) => entry.cases)),
    cell(sum((entry) => entry.irreps)),
    cell(sum((entry) => entry.modes)),
    cell(sum((entry) => entry.fields)),
    String(sum((entry) => entry.problems.length)),
  ];
}
