import { exactWaveVector, numericWaveVector, usedParameters, type WaveVector } from "../kvectors/index.js";
import { add, multiply, type Rational, type RationalVector, rational, roundNumber } from "../numbers/index.js";
import type { Weighed, Weigher } from "./candidate.js";
import { lowerBound } from "./evidence.js";
import { betterFit, toldApartBy } from "./same-find.js";
import type { Candidate, Separation } from "./types.js";

/** Candidates for which separations are worked out. */
const mostCandidates = 12;

/** Largest denominator of a simple k, and how far (r.l.u. of a letter) it may be from a candidate. */
const largestDenominator = 6;
const nearbyLetter = 0.03;

/** Å⁻¹. Positions closer than that cannot be told apart by any instrument. */
const sameForAll = 1e-6;

/**
 * What would tell each of the first candidates from those that it is tied with, and from the simple k nearby: the
 * satellite, within the range of the peaks, whose distance to the nearest line of the other is largest in units of its Q.
 */
export function separationsOf(
  weighed: readonly Weighed[],
  ties: readonly (readonly number[])[],
  weigh: Weigher,
  range: { readonly lowest: number; readonly highest: number },
): readonly (readonly Separation[])[] {
  return weighed.map((one, index) => {
    if (index >= mostCandidates) return [];
    const tied = (ties[index] ?? []).map((other) => separation(one, weighed[other] as Weighed, other, range));
    const simple = simpleNeighbour(one.candidate);
    if (simple === null) return tied;
    const neighbour = weigh(simple, null);
    return [...tied, separation(one, neighbour, null, range)];
  });
}

function separation(
  one: Weighed,
  other: Weighed,
  candidate: number | null,
  { lowest, highest }: { readonly lowest: number; readonly highest: number },
): Separation {
  const there = other.explanation.predicted;
  let best = { q: 0, distance: 0 };
  for (const q of one.explanation.predicted) {
    if (q < lowest || q > highest) continue;
    const at = lowerBound(there, q);
    const distance = Math.min(
      Math.abs(q - (there[at] ?? Number.POSITIVE_INFINITY)),
      Math.abs(q - (there[at - 1] ?? Number.NEGATIVE_INFINITY)),
    );
    if (best.q === 0 || distance / q > best.distance / best.q) best = { q, distance };
  }
  return {
    candidate,
    k: other.candidate.k,
    q: roundNumber(best.q),
    distance: roundNumber(best.distance),
    resolution: best.distance > sameForAll ? roundNumber(best.distance / best.q) : null,
    toldApart: Math.abs(betterFit(one.explanation, other.explanation)) > toldApartBy,
  };
}

/** The k of the same form with every letter a simple fraction, where all are near enough; null for a k without letters. */
function simpleNeighbour({ k }: Candidate): WaveVector | null {
  const letters = usedParameters(k);
  if (letters.length === 0 || numericWaveVector(k) === null) return null;
  const fractions = letters.map((_, position) => simplest(k.values?.[position] as number));
  if (fractions.some((fraction) => fraction === null)) return null;
  return exactWaveVector(
    k.components.map((form) =>
      letters.reduce<Rational>(
        (sum, letter, position) =>
          add(sum, multiply(form.coefficients[letter as 0 | 1 | 2], fractions[position] as Rational)),
        form.constant,
      ),
    ) as unknown as RationalVector,
  );
}

/** The fraction of smallest denominator within reach. */
function simplest(value: number): Rational | null {
  for (let denominator = 1; denominator <= largestDenominator; denominator++) {
    const numerator = Math.round(value * denominator);
    if (Math.abs(value - numerator / denominator) <= nearbyLetter / denominator)
      return rational(numerator + 0, denominator);
  }
  return null;
}
