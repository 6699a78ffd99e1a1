import type { PeakList } from "@kvane/core/search";
import type { Random } from "./random.ts";

/** A powder list of Q in Å⁻¹; `s` the standard uncertainty of all or of each. */
export function powderList(
  positions: readonly number[],
  s: number | readonly number[],
  wavelengthAngstrom: number | null = null,
): PeakList {
  return {
    kind: "q",
    wavelengthAngstrom,
    uncertaintySource: "made for a test",
    peaks: positions.map((q, index) => ({
      index,
      q,
      uncertainty: typeof s === "number" ? s : (s[index] as number),
      hkl: null,
      hklUncertainty: null,
      intensity: null,
      intensityUncertainty: null,
      position: q,
      line: index + 1,
    })),
  };
}

/** A list of fractional h k l. */
export function crystalList(positions: readonly (readonly number[])[], s: number): PeakList {
  return {
    kind: "hkl",
    wavelengthAngstrom: null,
    uncertaintySource: "made for a test",
    peaks: positions.map((hkl, index) => ({
      index,
      q: null,
      uncertainty: null,
      hkl,
      hklUncertainty: s,
      intensity: null,
      intensityUncertainty: null,
      position: null,
      line: index + 1,
    })),
  };
}

/** A list of 2θ in degrees with standard uncertainty `s` in degrees, turned into Q: Q = 4π sin θ/λ, dQ = 2π cos θ/λ d2θ. */
export function angleList(angles: readonly number[], s: number, wavelengthAngstrom: number): PeakList {
  const theta = angles.map((angle) => (angle * Math.PI) / 360);
  return powderList(
    theta.map((angle) => (4 * Math.PI * Math.sin(angle)) / wavelengthAngstrom),
    theta.map((angle) => ((2 * Math.PI * Math.cos(angle)) / wavelengthAngstrom) * ((s * Math.PI) / 180)),
    wavelengthAngstrom,
  );
}

/** A number from the normal distribution of standard deviation 1 (Box and Muller's method). */
export function normal(random: Random): number {
  return Math.sqrt(-2 * Math.log(1 - random.next())) * Math.cos(2 * Math.PI * random.next());
}
