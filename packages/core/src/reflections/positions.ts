import { sameLineInverseAngstrom } from "../numbers/index.js";

/** Scattering angle 2θ in degrees of a line at Q (Å⁻¹) for wavelength λ (Å): Q = 4π sin θ / λ. Null beyond 180°. */
export function qToTwoThetaDeg(q: number, wavelengthAngstrom: number): number | null {
  const sine = (q * wavelengthAngstrom) / (4 * Math.PI);
  return sine > 1 ? null : (360 / Math.PI) * Math.asin(sine);
}

/** Q in Å⁻¹ of a line at 2θ (degrees) for wavelength λ (Å). */
export function twoThetaDegToQ(twoThetaDeg: number, wavelengthAngstrom: number): number {
  return ((4 * Math.PI) / wavelengthAngstrom) * Math.sin((twoThetaDeg * Math.PI) / 360);
}

/** Q = 2π/d, Å⁻¹ from Å; its own inverse. */
export function dToQ(d: number): number {
  return (2 * Math.PI) / d;
}

/**
 * The different positions of lines, in rising order: those within the rounding of a computed position
 * (`sameLineInverseAngstrom`) of their predecessor are one, be it by symmetry or by accident of the metric.
 */
export function distinctPositions(lines: readonly { readonly q: number }[]): Float64Array {
  const sorted = Float64Array.from(lines, (line) => line.q).sort();
  let count = 0;
  for (const q of sorted) {
    if (count > 0 && q - (sorted[count - 1] as number) <= sameLineInverseAngstrom) continue;
    sorted[count] = q;
    count += 1;
  }
  return sorted.slice(0, count);
}
