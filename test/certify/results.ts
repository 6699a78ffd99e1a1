import { execFileSync } from "node:child_process";
import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root, type State } from "./state.js";
import { type Counts, type Subject, unitName } from "./subject.js";

/** The committed figures of a subject: they outlive the folder in which the units of a broken run are kept. */
export interface SubjectResult {
  readonly subject: string;
  /** The commit whose code was swept. */
  readonly commit: string;
  readonly rows: readonly (readonly string[])[];
  readonly notes: readonly string[];
  readonly problems: readonly string[];
}

const file = join(root, "test/certify/results.json");

/** Puts the subjects that are done in the place of what was known about them; all that are known, in order. */
export function keepResults(done: readonly SubjectResult[], order: readonly Subject[]): readonly SubjectResult[] {
  const before = existsSync(file) ? (JSON.parse(readFileSync(file, "utf8")) as SubjectResult[]) : [];
  const known = new Map([...before, ...done].map((result) => [result.subject, result]));
  const results = order.flatMap(({ name }) => known.get(name) ?? []);
  writeFileSync(file, `${JSON.stringify(results, null, 2)}\n`);
  return results;
}

/** The figures of a subject all of whose units are done. */
export function subjectResult(subject: Subject, state: State): SubjectResult {
  const units = subject.units();
  const rows: string[][] = [];
  const problems: string[] = [];
  const notes: string[] = [];
  for (const [sweep, { what, seed }] of Object.entries(subject.sweeps)) {
    const counts = units.flatMap((unit) => (unit.sweep === sweep ? (state.done.get(unitName(unit)) ?? []) : []));
    problems.push(...counts.flatMap((entry) => entry.problems));
    notes.push(...sumNotes(counts.flatMap(({ note }) => note ?? [])));
    rows.push(rowOf(what, seed, counts));
  }
  return { subject: subject.name, commit: presentCommit(), rows, notes, problems };
}

function presentCommit(): string {
  return execFileSync("git", ["rev-parse", "--short", "HEAD"], { cwd: root, encoding: "utf8" }).trim();
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

/** A row of the table without its last column. */
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
