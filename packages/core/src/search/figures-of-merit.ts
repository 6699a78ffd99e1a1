import { roundNumber, sameLineInverseAngstrom } from "../numbers/index.js";
import { qToTwoThetaDeg } from "../reflections/index.js";
import { lowerBound } from "./evidence.js";

/** A matched powder peak: observed and calculated Q in Å⁻¹. */
export interface MatchedPosition {
  readonly observed: number;
  readonly calculated: number;
}

/**
 * De Wolff's figure of merit over the N matched peaks: `M_N = Q_N / (2 ⟨|ΔQ|⟩ N_calc)` with the trade's Q = 1/d² there,
 * Q_N that of the last peak and N_calc the distinct lines up to it (P. M. de Wolff, J. Appl. Cryst. 1 (1968) 108). Null
 * when the discrepancies are mere rounding, where it would mean nothing.
 */
export function deWolff(matches: readonly MatchedPosition[], positions: Float64Array): number | null {
  const last = lastOf(matches);
  if (last === null || isRounding(matches)) return null;
  const inverseSquare = (q: number): number => (q / (2 * Math.PI)) ** 2;
  const discrepancy = mean(
    matches.map(({ observed, calculated }) => Math.abs(inverseSquare(observed) - inverseSquare(calculated))),
  );
  return roundNumber(inverseSquare(last.observed) / (2 * discrepancy * linesUpTo(positions, last)));
}

/**
 * The figure of merit of Smith and Snyder: `F_N = (1/⟨|Δ2θ|⟩) · N / N_poss`, in 1/° (G. S. Smith & R. L. Snyder,
 * J. Appl. Cryst. 12 (1979) 60). Null without a wavelength, or as for M_N.
 */
export function smithSnyder(
  matches: readonly MatchedPosition[],
  positions: Float64Array,
  wavelengthAngstrom: number | null,
): number | null {
  const last = lastOf(matches);
  if (last === null || wavelengthAngstrom === null || isRounding(matches)) return null;
  const differences: number[] = [];
  for (const { observed, calculated } of matches) {
    const angles = [qToTwoThetaDeg(observed, wavelengthAngstrom), qToTwoThetaDeg(calculated, wavelengthAngstrom)];
    if (angles[0] === null || angles[1] === null) return null;
    differences.push(Math.abs((angles[0] as number) - (angles[1] as number)));
  }
  return roundNumber(matches.length / (mean(differences) * linesUpTo(positions, last)));
}

function lastOf(matches: readonly MatchedPosition[]): MatchedPosition | null {
  return matches.reduce<MatchedPosition | null>(
    (last, match) => (last === null || match.calculated > last.calculated ? match : last),
    null,
  );
}

/** Distinct lines up to that of the last peak, it included. */
function linesUpTo(positions: Float64Array, last: MatchedPosition): number {
  return Math.max(1, lowerBound(positions, last.calculated + 2 * sameLineInverseAngstrom));
}

function isRounding(matches: readonly MatchedPosition[]): boolean {
  return mean(matches.map(({ observed, calculated }) => Math.abs(observed - calculated))) < sameLineInverseAngstrom;
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
