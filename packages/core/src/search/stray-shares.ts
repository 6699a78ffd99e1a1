import { strayShare } from "./evidence.js";
import type { Peak } from "./types.js";

/** Limits of the chance that a peak is no satellite, however strong or weak it is. */
const leastShare = 0.02;
const mostShare = 0.3;

/**
 * For each peak the chance that it is no satellite, from its intensity: that of the median peak is the usual one, and it
 * falls as intensity rises, since what strays into a list (impurities, images through half the wavelength, noise taken
 * for a peak) is mostly weak. Common practice of the trade, no law: it is done only where it is asked for. Peaks without
 * an intensity keep the usual chance.
 */
export function strayShares(peaks: readonly Peak[]): readonly number[] {
  const known = peaks.flatMap(({ intensity }) => (intensity !== null && intensity > 0 ? [intensity] : []));
  const median = [...known].sort((a, b) => a - b)[known.length >> 1];
  const shares: number[] = [];
  for (const { index, intensity } of peaks) {
    const share =
      intensity === null || median === undefined ? strayShare : (strayShare * median) / Math.max(intensity, 0);
    shares[index] = Math.min(mostShare, Math.max(leastShare, share));
  }
  return shares;
}
