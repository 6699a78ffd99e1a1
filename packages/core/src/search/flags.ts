import { matchStandardUncertainties, roundNumber, toNumber } from "../numbers/index.js";
import { type NuclearLine, nuclearLines } from "../reflections/index.js";
import type { Cell, SiteOrbit, SpaceGroup } from "../spacegroups/index.js";
import type { ImpurityPhase, NuclearState, Peak, PeakFlag } from "./types.js";
import type { PowderPeak } from "./used-peaks.js";

/** Coincidences of either sort that are named for a peak: far out there is always another. */
const mostOfEach = 2;

/**
 * The peaks that lie on nuclear lines of the cell or on their λ/2 images, within the half-width of a match. Lines that
 * nothing forbids come first.
 */
export function flagsOf(
  group: SpaceGroup,
  cell: Cell,
  peaks: readonly PowderPeak[],
  sites: readonly SiteOrbit[],
  measured: readonly Peak[] = [],
): readonly PeakFlag[] {
  if (peaks.length === 0) return [];
  const reach = Math.max(...peaks.map(({ q, halfWidth }) => q + halfWidth));
  const nuclear = nuclearLines(group, cell, { qMax: 2 * reach });
  const places = { nuclear: 1, "half wavelength": 0.5 } as const;
  return peaks.flatMap(({ index, q, halfWidth }) =>
    (["nuclear", "half wavelength"] as const).flatMap((sort) =>
      nuclear
        .filter((line) => Math.abs(places[sort] * line.q - q) <= halfWidth)
        .map(
          (line): PeakFlag => ({
            peak: index,
            with: sort,
            h: line.h,
            state: stateOf(line, sites),
            separation: roundNumber(places[sort] * line.q - q, q),
            parentIntensity: intensityAt(line.q, measured),
          }),
        )
        .sort(
          (a, b) =>
            Number(a.state !== "allowed") - Number(b.state !== "allowed") ||
            Math.abs(a.separation) - Math.abs(b.separation),
        )
        .slice(0, mostOfEach),
    ),
  );
}

/** Intensity of the measured nuclear peak nearest to a line, within its uncertainty; null where there is none. */
function intensityAt(q: number, measured: readonly Peak[]): number | null {
  let best: { readonly off: number; readonly intensity: number } | null = null;
  for (const peak of measured) {
    if (peak.q === null || peak.intensity === null || peak.uncertainty === null) continue;
    const off = Math.abs(peak.q - q);
    if (off > matchStandardUncertainties * peak.uncertainty || (best !== null && best.off <= off)) continue;
    best = { off, intensity: peak.intensity };
  }
  return best?.intensity ?? null;
}

function stateOf({ extinct, h }: NuclearLine, sites: readonly SiteOrbit[]): NuclearState {
  if (extinct) return "forbidden by a glide plane or screw axis";
  return sites.length > 0 && sites.every((site) => isExtinctFor(site, h)) ? "forbidden by the sites" : "allowed";
}

/** Turns of a phase sum below which it is zero by symmetry and not by accident. */
const zeroSum = 1e-6;

/** Whether `Σ_j exp(2πi h·r_j)` over the atoms of a site vanishes, so that it gives nothing whatever scatters there. */
function isExtinctFor({ positions }: SiteOrbit, h: readonly number[]): boolean {
  let real = 0;
  let imaginary = 0;
  for (const position of positions) {
    const phase = 2 * Math.PI * position.reduce((sum, entry, axis) => sum + toNumber(entry) * (h[axis] as number), 0);
    real += Math.cos(phase);
    imaginary += Math.sin(phase);
  }
  return Math.hypot(real, imaginary) < zeroSum * positions.length;
}

/** For each impurity its allowed lines up to `qMax`. */
export interface ImpurityLines {
  readonly name: string;
  readonly lines: readonly NuclearLine[];
}

export function impurityLines(phases: readonly ImpurityPhase[], qMax: number): readonly ImpurityLines[] {
  return phases.map(({ name, group, cell }) => ({
    name,
    lines: nuclearLines(group, cell, { qMax }).filter(({ extinct }) => !extinct),
  }));
}

/** The phase and line that a peak lies on, in words, or null. */
export function onImpurity(q: number, halfWidth: number, impurities: readonly ImpurityLines[]): string | null {
  for (const { name, lines } of impurities) {
    const line = lines.find((candidate) => Math.abs(candidate.q - q) <= halfWidth);
    if (line !== undefined) return `it lies on the line ${line.h.join(" ")} of ${name}`;
  }
  return null;
}
