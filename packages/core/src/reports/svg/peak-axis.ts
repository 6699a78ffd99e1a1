import { qToTwoThetaDeg } from "../../reflections/index.js";
import type { PeaksRecord } from "../records/search.js";

/** The axis that a peak list is drawn on: that of its own positions; Q for a list of h k l. */
export interface PeakAxis {
  readonly label: string;
  /** Position of a Q in Å⁻¹; null where it cannot be reached. */
  readonly fromQ: (q: number) => number | null;
  /** |dx/dQ| there, for uncertainties. */
  readonly slope: (q: number) => number;
  /** Decimals for reading a position off. */
  readonly decimals: number;
}

export function peakAxis({ kind, wavelengthAngstrom: wavelength }: PeaksRecord): PeakAxis {
  if (kind === "two-theta" && wavelength !== null)
    return {
      label: `2θ / ° (λ = ${wavelength} Å)`,
      fromQ: (q) => qToTwoThetaDeg(q, wavelength),
      // Q = 4π sin θ / λ, so that d(2θ)/dQ = λ / (2π cos θ) in radians.
      slope: (q) => {
        const sine = Math.min(1, (q * wavelength) / (4 * Math.PI));
        return ((180 / Math.PI) * wavelength) / (2 * Math.PI * Math.sqrt(Math.max(1e-6, 1 - sine * sine)));
      },
      decimals: 3,
    };
  if (kind === "d")
    return {
      label: "d / Å",
      fromQ: (q) => (q > 0 ? (2 * Math.PI) / q : null),
      slope: (q) => (2 * Math.PI) / (q * q),
      decimals: 4,
    };
  return { label: "Q / Å⁻¹", fromQ: (q) => q, slope: () => 1, decimals: 4 };
}
