import type { Weighed } from "./candidate.js";
import type { PeakModel } from "./explanation.js";
import { betterFit, toldApartBy } from "./same-find.js";

/**
 * For each candidate the others that predict the same positions within the tolerance, over the range of the peaks, and
 * which the peaks fit as well: by the symmetry of the metric, by accident, or because the peaks are too
 * blunt to tell.
 */
export function tiesAmong(model: PeakModel, weighed: readonly Weighed[]): readonly (readonly number[])[] {
  const ties: number[][] = weighed.map(() => []);
  weighed.forEach((a, i) => {
    weighed.slice(i + 1).forEach((b, step) => {
      if (Math.abs(betterFit(a.explanation, b.explanation)) > toldApartBy) return;
      if (!model.samePositions(a.explanation, b.explanation)) return;
      const j = i + 1 + step;
      ties[i]?.push(j);
      ties[j]?.push(i);
    });
  });
  return ties;
}
