import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root, type State } from "./state.js";
import { type SweepName, sweeps, type Unit } from "./units.js";

const begin = "<!-- certify: begin (written by `npm run certify`) -->";
const end = "<!-- certify: end -->";
const shownFailures = 40;

/** Writes the table between the markers of docs/validation.md; the rest of the page is left as it is. */
export function writeReport(units: readonly Unit[], state: State): string {
  const file = join(root, "docs/validation.md");
  const page = existsSync(file) ? readFileSync(file, "utf8") : "# Validation\n";
  const text = `${begin}\n${report(units, state)}\n${end}`;
  const from = page.indexOf(begin);
  const to = page.indexOf(end);
  const written =
    from >= 0 && to > from
      ? page.slice(0, from) + text + page.slice(to + end.length)
      : `${page.trimEnd()}\n\n${text}\n`;
  writeFileSync(file, written);
  return file;
}

function report(units: readonly Unit[], state: State): string {
  const names = Object.keys(sweeps) as SweepName[];
  const rows = names.map((name) => {
    const counts = units.flatMap((unit) => (unit.sweep === name ? [state.done.get(unitName(unit))] : []));
    const sum = (of: (entry: NonNullable<(typeof counts)[number]>) => number): number =>
      counts.reduce((value, entry) => value + (entry === undefined ? 0 : of(entry)), 0);
    const cases = sum((entry) => entry.cases);
    const failures = sum((entry) => entry.problems.length);
    const { what, seed } = sweeps[name];
    const cell = (value: number): string => (value === 0 ? "–" : String(value));
    return [
      what,
      seed === null ? "–" : String(seed),
      String(cases),
      cell(sum((entry) => entry.irreps)),
      cell(sum((entry) => entry.modes)),
      cell(sum((entry) => entry.fields)),
      String(failures),
    ];
  });
  const head = ["sweep", "seed", "cases (group, k)", "irreps", "mode vectors", "fields in a supercell", "failures"];
  const table = [head, head.map((_, column) => (column === 0 ? "---" : "---:")), ...rows];
  const problems = units.flatMap((unit) => state.done.get(unitName(unit))?.problems ?? []);
  const failures = problems.slice(0, shownFailures).map((problem) => `- ${problem}`);
  const more = problems.length > shownFailures ? [`- and ${problems.length - shownFailures} more`] : [];
  return [
    ...table.map((row) => `| ${row.join(" | ")} |`),
    "",
    ...(problems.length === 0 ? ["No failures."] : ["Failures:", "", ...failures, ...more]),
  ].join("\n");
}

export function unitName(unit: Unit): string {
  return `${unit.sweep} ${unit.number}`;
}
