import { nuclearLines, satelliteLines } from "../reflections/index.js";
import { type DataFrame, nuclearName, satelliteName } from "./fit-forms.js";
import type { LeftOutDatum } from "./types.js";

/** The data that are not usable, with the line that comes nearest to each and why it does not take it. */
export function leftOutOf(frame: DataFrame, usable: readonly boolean[]): LeftOutDatum[] {
  const { data, resolution } = frame.data;
  if (usable.every(Boolean)) return [];
  const nearest = nearestLines(frame);
  return data.flatMap(({ label, q, holds }, index): LeftOutDatum[] => {
    if (usable[index]) return [];
    const line = q === null ? null : nearest(q, holds === "nuclear");
    const near = line !== null && q !== null && Math.abs(line.q - q) <= resolution;
    return [{ label, reason: near ? "another datum is nearer" : "no line near", nearest: line }];
  });
}

interface NamedLine {
  readonly line: string;
  readonly q: number;
}

/** The line nearest to a Q, satellites or nuclear ones. */
function nearestLines({ group, cell, k, data }: DataFrame): (q: number, nuclear: boolean) => NamedLine | null {
  const furthest = data.data.reduce((most, { q }) => Math.max(most, q ?? 0), 0);
  if (furthest === 0) return () => null;
  // Far enough that the last peak has a line on either side, mostly.
  const limits = { qMax: 1.2 * furthest };
  const satellites = satelliteLines(group, cell, k, limits).map((line) => ({ line: satelliteName(line), q: line.q }));
  let nuclei: readonly NamedLine[] | null = null;
  return (q, nuclear) => {
    if (nuclear) nuclei ??= nuclearLines(group, cell, limits).map((line) => ({ line: nuclearName(line), q: line.q }));
    const [first, ...others] = nuclear ? (nuclei ?? []) : satellites;
    if (!first) return null;
    return others.reduce((best, one) => (Math.abs(one.q - q) < Math.abs(best.q - q) ? one : best), first);
  };
}
