import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";
import { type Mutant, mutantName } from "./mutant.js";
import type { Outcome } from "./state.js";

/** The committed numbers of a room. */
export interface RoomResult {
  readonly room: string;
  readonly seed: number;
  /** All mutants that the room has, and those that were tried. */
  readonly mutants: number;
  readonly sampled: number;
  /** A test failed. */
  readonly killed: number;
  /** A test took far too long or all the memory, which counts as noticed. */
  readonly stopped: number;
  readonly survivors: readonly Survivor[];
}

/** A mutant that every test passed. */
export interface Survivor {
  readonly place: string;
  readonly code: string;
  readonly change: string;
  /** Whether no input can tell it from the original. */
  readonly equivalent: boolean;
  /** Why; empty as long as nobody explained it. */
  readonly reason: string;
}

const resultsFile = join(root, "test/mutation/results.json");
const explainedFile = join(root, "test/mutation/explained.json");

/** What people found out about survivors, by the name of the mutant. */
type Explained = Readonly<Record<string, { readonly equivalent: boolean; readonly reason: string }>>;

export function readResults(): readonly RoomResult[] {
  return existsSync(resultsFile) ? (JSON.parse(readFileSync(resultsFile, "utf8")) as RoomResult[]) : [];
}

/** Puts the rooms that were done in the place of what was known about them. */
export function writeResults(done: readonly RoomResult[], order: readonly string[]): void {
  const rooms = new Map([...readResults(), ...done].map((result) => [result.room, result]));
  const results = order.flatMap((room) => rooms.get(room) ?? []);
  writeFileSync(resultsFile, `${JSON.stringify(results, null, 2)}\n`);
}

export function roomResult(
  of: { readonly room: string; readonly seed: number; readonly mutants: number },
  tried: readonly (readonly [Mutant, Outcome])[],
  texts: ReadonlyMap<string, string>,
): RoomResult {
  const explained = JSON.parse(readFileSync(explainedFile, "utf8")) as Explained;
  const count = (status: Outcome["status"]): number => tried.filter(([, outcome]) => outcome.status === status).length;
  const survivors = tried
    .filter(([, { status }]) => status === "survived")
    .map(([mutant]) => survivorOf(mutant, texts.get(mutant.file) as string, explained))
    .sort((a, b) => a.place.localeCompare(b.place, "en", { numeric: true }));
  return { ...of, sampled: tried.length, killed: count("killed"), stopped: count("stopped"), survivors };
}

function survivorOf(mutant: Mutant, text: string, explained: Explained): Survivor {
  const { equivalent, reason } = explained[mutantName(text, mutant)] ?? { equivalent: false, reason: "" };
  const code = (text.split("\n")[mutant.line - 1] as string).trim();
  return {
    place: `${mutant.file}:${mutant.line}:${mutant.column}`,
    code,
    change: mutant.change,
    equivalent,
    reason,
  };
}

/** Noticed mutants in per cent: of all, and of those that something can tell from the original. */
export function scores({ sampled, killed, stopped, survivors }: RoomResult): { raw: number; real: number } {
  const noticed = killed + stopped;
  const equivalent = survivors.filter((survivor) => survivor.equivalent).length;
  return { raw: (100 * noticed) / sampled, real: (100 * noticed) / (sampled - equivalent) };
}
