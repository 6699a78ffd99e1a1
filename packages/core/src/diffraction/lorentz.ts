import { fail } from "../errors/index.js";

/** How intensities were measured; what the Lorentz factor and positions in angle need. */
export type DiffractionGeometry =
  | { readonly kind: "powder"; readonly wavelengthAngstrom: number }
  | { readonly kind: "single crystal"; readonly wavelengthAngstrom: number }
  | {
      readonly kind: "time of flight";
      /** Scattering angle 2θ of the detector bank. */
      readonly twoThetaDeg: number;
    }
  /** |F|² as such. */
  | { readonly kind: "none" };

/**
 * The Lorentz factor of a line at Q (Å⁻¹), 0 where the wavelength does not reach it:
 * - powder, constant wavelength: `1/(sin θ sin 2θ)`, without the factor 1/4 or 1/2 that some texts put before it;
 * - single crystal, constant wavelength: `1/sin 2θ`;
 * - powder, time of flight: `d⁴ sin θ`, d in Å.
 *
 * Source: International Tables C, section 6.2; B. Buras & L. Gerward, Acta Cryst. A31 (1975) 372. Throws
 * `invalid-argument` for an impossible wavelength or angle.
 */
export function lorentzFactor(geometry: DiffractionGeometry, q: number): number {
  if (geometry.kind === "none") return 1;
  if (geometry.kind === "time of flight") {
    checkAbove(geometry.twoThetaDeg, "angle of the detector", 180);
    return ((2 * Math.PI) / q) ** 4 * Math.sin((geometry.twoThetaDeg * Math.PI) / 360);
  }
  checkAbove(geometry.wavelengthAngstrom, "wavelength", Number.POSITIVE_INFINITY);
  const sine = (q * geometry.wavelengthAngstrom) / (4 * Math.PI);
  if (sine >= 1) return 0;
  const sineOfDouble = 2 * sine * Math.sqrt(1 - sine * sine);
  return geometry.kind === "powder" ? 1 / (sine * sineOfDouble) : 1 / sineOfDouble;
}

/**
 * What an overall isotropic displacement B (Å²) takes from an intensity at Q: `e^{−2B s²}`, s = Q/4π = sin θ/λ
 * (International Tables C, section 6.1.1).
 */
export function displacementFactor(b: number, q: number): number {
  return Math.exp(-2 * b * (q / (4 * Math.PI)) ** 2);
}

function checkAbove(value: number, what: string, limit: number): void {
  if (!(value > 0 && value < limit))
    fail("invalid-argument", `the ${what} cannot be ${value}`, {
      expected: limit === 180 ? "a number between 0 and 180 degrees" : "a number above 0 in Å",
      found: String(value),
    });
}
