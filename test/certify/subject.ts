/** What came of one unit. */
export interface Counts {
  readonly cases: number;
  readonly irreps?: number;
  readonly modes?: number;
  readonly fields?: number;
  readonly problems: readonly string[];
  /** A line of figures for the report. */
  readonly note?: string;
}

/** One piece of a sweep: small enough to be lost when the run is broken off, big enough to be worth a line. */
export interface Unit {
  readonly sweep: string;
  /** Group number, seed, row of a table: whatever the sweep counts by. */
  readonly number: number;
  readonly run: () => Counts | Promise<Counts>;
}

/** Sweeps over one part of the library. They begin anew when the code that they reach changes, and only then. */
export interface Subject {
  /** Name of its file in this folder. */
  readonly name: string;
  /** What each sweep goes over, and its seed. */
  readonly sweeps: { readonly [sweep: string]: { readonly what: string; readonly seed: number | null } };
  readonly units: () => readonly Unit[];
}

export function unitName(unit: Unit): string {
  return `${unit.sweep} ${unit.number}`;
}
