/** A set of satellites H ± k that symmetry makes one powder line of a structure with one k. */
export interface SatelliteLine {
  /** H of the representative in a*, b*, c*: integers wherever all integer vectors belong to the lattice L. */
  readonly h: readonly [number, number, number];
  /** The representative is H + k, H − k, or (0, for 2k ∈ L*) H + k where both signs give the same vectors. */
  readonly sign: 1 | -1 | 0;
  /** Arm of the star, always 0: the other arms give the same lines. */
  readonly arm: number;
  /** |H ± k| in Å⁻¹, with 2π. */
  readonly q: number;
  /** 2π/q in Å. */
  readonly d: number;
  /** Vectors H ± k of one single-k domain that the group of ±k, extended by −1, makes equivalent. */
  readonly multiplicity: number;
  /** The same over all arms: multiplicity × number of ±k pairs in the star. */
  readonly multiplicityAllArms: number;
}

/** A nuclear powder line. */
export interface NuclearLine {
  /** Representative H ∈ L* in a*, b*, c*. */
  readonly h: readonly [number, number, number];
  readonly q: number;
  readonly d: number;
  /** Vectors that the point group extended by −1 makes equivalent. */
  readonly multiplicity: number;
  /** True when a glide plane or screw axis forbids it for atoms at any position. */
  readonly extinct: boolean;
}

/** A nuclear line that falls on a satellite within the resolution. */
export interface Overlap {
  /** A nuclear line at the wavelength in use, or its image through neutrons of half the wavelength. */
  readonly with: "nuclear" | "half wavelength";
  readonly h: readonly [number, number, number];
  /** Where it appears, in Å⁻¹ as if measured at the full wavelength: |H|, or |H|/2 for the image. */
  readonly q: number;
  /** Its position minus the satellite's, in Å⁻¹. */
  readonly separation: number;
  /** False when a glide plane or screw axis forbids the nuclear line. */
  readonly allowed: boolean;
}

/** A satellite line as a list shows it. */
export interface SatelliteReflection extends SatelliteLine {
  /** Scattering angle in degrees; null without a wavelength or beyond 180°. */
  readonly twoThetaDeg: number | null;
  /** Those that are not extinct and the nearest first, a few of either kind. */
  readonly overlaps: readonly Overlap[];
  /** Further nuclear lines and images that fall on it, not extinct. */
  readonly moreOverlaps: number;
}

/** Which part of reciprocal space a list covers, in Å⁻¹. */
export interface PositionLimits {
  readonly qMax: number;
  readonly qMin?: number;
}
