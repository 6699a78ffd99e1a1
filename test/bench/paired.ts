/** A measurement, in any unit. */
export type Measurement = () => number | Promise<number>;

/** The ratios of every pair, and the median of the reference. */
export interface PairedRatios {
  readonly ratios: readonly number[];
  readonly reference: number;
}

/**
 * Measures the two in turn, and which comes first in turn as well: whatever slows the machine down for a while slows down
 * both, and neither has always the other's caches.
 */
export async function pairedRatios(
  pairs: number,
  measured: Measurement,
  reference: Measurement,
): Promise<PairedRatios> {
  const ratios: number[] = [];
  const references: number[] = [];
  for (let pair = 0; pair < pairs; pair += 1) {
    const early = pair % 2 === 0 ? await reference() : null;
    const own = await measured();
    const other = early ?? (await reference());
    ratios.push(own / other);
    references.push(other);
  }
  return { ratios, reference: median(references) };
}

/** The middle value, or the mean of the two in the middle. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? Number.NaN;
  return sorted.length % 2 ? upper : ((sorted[middle - 1] ?? Number.NaN) + upper) / 2;
}
