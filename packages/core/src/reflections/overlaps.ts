import { roundNumber } from "../numbers/index.js";
import type { NuclearLine, Overlap } from "./types.js";

/**
 * The nuclear lines that fall on a satellite: those within `resolution` of it, and those whose image through neutrons of
 * half the wavelength is. A line at Q diffracts λ/2 at the angle where λ is diffracted by Q/2, so the nuclear lines must
 * reach up to 2 (q + resolution) for the second.
 *
 * @param q position of the satellite, Å⁻¹
 * @param nuclear in order of Q, as `nuclearLines` gives them
 * @param resolution half-width in Å⁻¹ within which two lines cannot be told apart
 */
export function overlapsOf(q: number, nuclear: readonly NuclearLine[], resolution: number): readonly Overlap[] {
  return [
    ...coincidences(q, nuclear, resolution, "nuclear"),
    ...coincidences(q, nuclear, resolution, "half wavelength"),
  ];
}

function coincidences(
  q: number,
  nuclear: readonly NuclearLine[],
  resolution: number,
  kind: Overlap["with"],
): readonly Overlap[] {
  const share = kind === "nuclear" ? 1 : 1 / 2;
  const overlaps: Overlap[] = [];
  for (let index = firstAtLeast(nuclear, (q - resolution) / share); index < nuclear.length; index++) {
    const line = nuclear[index] as NuclearLine;
    const seenAt = line.q * share;
    if (seenAt > q + resolution) break;
    overlaps.push({
      with: kind,
      h: line.h,
      q: roundNumber(seenAt),
      separation: roundNumber(seenAt - q, q),
      allowed: !line.extinct,
    });
  }
  return overlaps;
}

/** Index of the first line at or above `q`, by bisection. */
function firstAtLeast(lines: readonly NuclearLine[], q: number): number {
  let low = 0;
  let high = lines.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((lines[middle] as NuclearLine).q < q) low = middle + 1;
    else high = middle;
  }
  return low;
}
