import { roundNumber } from "../numbers/index.js";
import type { Evidence, EvidenceCharges } from "./types.js";

/** Share of stray peaks that the evidence allows for. */
export const strayShare = 0.1;

/** Å⁻¹. Lines within this of a peak count for their local density. */
export const densityHalfWindow = 0.6;

/** Lines per Å⁻¹ below which the density is not believed: a window with no line in it says little. */
const leastDensity = 0.5;

/** Beyond so many standard uncertainties the normal density adds nothing beside the stray share. */
const normalReach = 8;

/** Evidence above which a k counts as found, and above 0 as a weak indication (calibrated on made lists, docs/methods). */
const foundAbove = 3;

/**
 * Log-odds of one peak being a line against its standing there by chance, `ln[ε + (1 − ε) r]`, r the ratio of the two
 * densities (`powderRatio`, `crystalRatio`).
 *
 * @param stray ε, the chance that the peak is no satellite at all
 */
export function peakLogOdds(ratio: number, stray: number): number {
  return Math.log(stray + (1 - stray) * ratio);
}

/**
 * How much likelier a powder peak stands where it does if it is a line: `Σ_l N(Q − q_l; s) / n(Q)`, with N the normal
 * density and n the local density of lines.
 *
 * @param positions distinct predicted positions in rising order, Å⁻¹, reaching at least 0.6 Å⁻¹ beyond `q`
 */
export function powderRatio(q: number, uncertainty: number, positions: Float64Array): number {
  const reach = normalReach * uncertainty;
  let density = 0;
  for (let index = lowerBound(positions, q - reach); index < positions.length; index++) {
    const difference = (positions[index] as number) - q;
    if (difference > reach) break;
    density += Math.exp(-0.5 * (difference / uncertainty) ** 2);
  }
  density /= Math.sqrt(2 * Math.PI) * uncertainty;
  return density / localDensity(q, positions);
}

/** Distinct lines per Å⁻¹ within ±0.6 Å⁻¹ of Q, the window clipped at 0; at least 0.5. */
function localDensity(q: number, positions: Float64Array): number {
  const low = Math.max(0, q - densityHalfWindow);
  const high = q + densityHalfWindow;
  const count = upperBound(positions, high) - lowerBound(positions, low);
  return Math.max(leastDensity, count / (high - low));
}

/**
 * The same of a single-crystal peak, in three dimensions: the density of satellite vectors is the same everywhere, so
 * nothing local is needed.
 *
 * @param squares squared distances (r.l.u.²) of the nearest satellites
 * @param density satellite vectors per unit volume of reciprocal lattice units
 */
export function crystalRatio(squares: readonly number[], uncertainty: number, density: number): number {
  const sum = squares.reduce((total, square) => total + Math.exp((-0.5 * square) / uncertainty ** 2), 0);
  const normal = sum / (Math.sqrt(2 * Math.PI) * uncertainty) ** 3;
  return normal / density;
}

/** Matched peaks beyond the free components that a find needs: with fewer, chance fits are common whatever the number. */
const leastSpare = 3;

/**
 * The evidence: summed log-odds minus what the search is charged.
 *
 * @param spare matched peaks less free components; below 3 the reading stays weak at most
 */
export function evidenceOf(logOdds: number, charges: EvidenceCharges, spare: number): Evidence {
  const value = roundNumber(logOdds - charges.dimensions - charges.kinds - charges.tuning);
  return {
    value,
    reading: value > foundAbove && spare >= leastSpare ? "found" : value >= 0 ? "weak" : "not informative",
    charges: {
      dimensions: roundNumber(charges.dimensions),
      kinds: roundNumber(charges.kinds),
      tuning: roundNumber(charges.tuning),
    },
  };
}

/** Index of the first entry ≥ value. */
export function lowerBound(sorted: Float64Array, value: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((sorted[middle] as number) < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Index of the first entry > value. */
function upperBound(sorted: Float64Array, value: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((sorted[middle] as number) <= value) low = middle + 1;
    else high = middle;
  }
  return low;
}
