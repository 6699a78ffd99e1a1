import type { PeakKind } from "../search/index.js";

/** Every kind of position that a powder gives. */
export type PowderKind = Exclude<PeakKind, "hkl">;

const radian = Math.PI / 180;

/**
 * Q in Å⁻¹ of a position: 2π/d for d in Å, Q itself, (4π/λ) sin θ for 2θ in degrees (Bragg's law; International Tables
 * B, 1.1.2).
 *
 * @param wavelengthAngstrom is used for 2θ only
 */
export function positionToQ(kind: PowderKind, position: number, wavelengthAngstrom: number | null): number {
  if (kind === "q") return position;
  if (kind === "d") return (2 * Math.PI) / position;
  return ((4 * Math.PI) / (wavelengthAngstrom ?? Number.NaN)) * Math.sin((position * radian) / 2);
}

/**
 * The standard uncertainty of Q in Å⁻¹ that follows from that of the position, to first order: Q Δd/d for d,
 * (2π/λ) cos θ Δ(2θ) for 2θ with Δ(2θ) in radians.
 */
export function uncertaintyToQ(
  kind: PowderKind,
  position: number,
  uncertainty: number,
  wavelengthAngstrom: number | null,
): number {
  if (kind === "q") return uncertainty;
  if (kind === "d") return ((2 * Math.PI) / position) * (uncertainty / position);
  const cosine = Math.cos((position * radian) / 2);
  return ((2 * Math.PI) / (wavelengthAngstrom ?? Number.NaN)) * cosine * uncertainty * radian;
}

/** The largest Q that a wavelength reaches, at 2θ = 180°, in Å⁻¹. */
export function largestQ(wavelengthAngstrom: number): number {
  return (4 * Math.PI) / wavelengthAngstrom;
}
