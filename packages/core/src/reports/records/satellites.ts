import type { CellRecord, GroupRecord, KRecord } from "./common.js";

/** A line of another kind that lies on a satellite within the stated resolution. */
export interface OverlapRecord {
  /** `nuclear`, or `half wavelength`: the image of a nuclear line at twice its Q. */
  readonly with: "nuclear" | "half wavelength";
  readonly h: readonly number[];
  readonly q: number;
  /** Q of the other line less Q of the satellite, Å⁻¹. */
  readonly separation: number;
  /** False when a glide plane or screw axis forbids the nuclear line. */
  readonly allowed: boolean;
}

/** One line: the vector `H + sign·k` (sign 0 where k ≡ −k) stands for all that symmetry makes equal. */
export interface SatelliteRecord {
  readonly h: readonly number[];
  readonly sign: 1 | -1 | 0;
  /** Index in the star; the lines of a powder are those of arm 0, the others give the same ones. */
  readonly arm: number;
  /** Å⁻¹, 2π/d. */
  readonly q: number;
  /** Å. */
  readonly d: number;
  readonly twoThetaDeg: number | null;
  /** Vectors of one single-k domain that its symmetry relates, and those over the whole star. */
  readonly multiplicity: number;
  readonly multiplicityAllArms: number;
  /** Those that are not extinct and the nearest first, at most eight nuclear lines and eight images. */
  readonly overlaps: readonly OverlapRecord[];
  /** Further ones that are not extinct. */
  readonly moreOverlaps: number;
  /** Labels of the irreps for which the line is zero; null where it was not computed. */
  readonly extinctFor: readonly string[] | null;
  readonly intensity: number | null;
}

/** Result of `kvane satellites`. */
export interface SatellitesRecord {
  readonly group: GroupRecord;
  readonly cell: CellRecord;
  readonly k: KRecord;
  readonly wavelengthAngstrom: number | null;
  readonly qMax: number;
  /** Half-width in Å⁻¹ within which an overlap is noted. */
  readonly overlapWithin: number;
  readonly reflections: readonly SatelliteRecord[];
}
