import { usedParameters, type WaveVector } from "../kvectors/index.js";
import {
  gcd,
  nearFractionStandardUncertainties,
  parameterNames,
  rational,
  roundNumber,
  toNumber,
} from "../numbers/index.js";
import type { NearFraction } from "./types.js";

/** Largest denominator of a fraction that a lock-in is expected at. */
const largestDenominator = 8;

/**
 * The fractions n/m, m ≤ 8 in lowest terms, within 2 standard uncertainties of a refined letter of k: smallest
 * denominator first. Empty for an exact k and where no uncertainty is known.
 */
export function nearFractions(k: WaveVector): readonly NearFraction[] {
  const found: NearFraction[] = [];
  usedParameters(k).forEach((letter, position) => {
    const value = k.values?.[position];
    const uncertainty = k.uncertainties?.[position];
    if (value === undefined || uncertainty === undefined || uncertainty === null || !(uncertainty > 0)) return;
    for (let denominator = 1; denominator <= largestDenominator; denominator++) {
      const reach = nearFractionStandardUncertainties * uncertainty * denominator;
      for (let n = Math.ceil(value * denominator - reach); n <= value * denominator + reach; n++) {
        if (gcd(n, denominator) !== 1) continue;
        const fraction = rational(n, denominator);
        found.push({
          parameter: parameterNames[letter as 0 | 1 | 2] as NearFraction["parameter"],
          fraction,
          deviation: roundNumber((value - toNumber(fraction)) / uncertainty),
        });
      }
    }
  });
  return found;
}
