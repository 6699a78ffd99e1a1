import type { ModuleGraph, ModuleText } from "./module-graph.js";

/** What the thread that runs tests is given when it starts. */
export interface Start {
  readonly graph: ModuleGraph;
  /** How many reach points the graph has notes for. */
  readonly points: number;
}

/** Which test, by its file and its position in the file. */
export interface TestPlace {
  readonly file: string;
  readonly index: number;
}

/** Either run every test of a file and tell what it reached, or tests against a changed file until one fails. */
export type Request =
  | { readonly kind: "record"; readonly file: string }
  | {
      readonly kind: "challenge";
      readonly file: string;
      readonly changed: ModuleText;
      readonly tests: readonly TestPlace[];
    };

export type Answer =
  | { readonly kind: "begin"; readonly position: number }
  | { readonly kind: "recorded"; readonly test: RecordedTest }
  | { readonly kind: "end"; readonly killer: Killer | null };

export interface RecordedTest {
  readonly name: string;
  /** Of processor time, loading included. */
  readonly milliseconds: number;
  /** Why it fails without any mutant when it runs alone; such a test is left out. */
  readonly error: string | null;
  readonly reached: readonly number[];
}

/** The test that failed, by its position in the request. */
export interface Killer {
  readonly position: number;
  readonly error: string;
}
