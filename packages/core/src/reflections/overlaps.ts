import { roundNumber } from "../numbers/index.js";
import type { NuclearLine, Overlap } from "./types.js";

/**
 * The nuclear lines that fall on a satellite: those within `resolution` of it, and those whose image through neutrons of
 * half the wavelength is. A line at Q diffracts λ/2 at the angle where λ is diffracted by Q/2, so the nuclear lines must
 * reach up to 2 (q + resolution) for the second.
 *
 * At most `most` of either kind are listed, those that are not extinct and the nearest first: far out in Q nuclear lines
 * lie closer than any resolution.
 *
 * @param q position of the satellite, Å⁻¹
 * @param nuclear in order of Q, as `nuclearLines` gives them
 * @param resolution half-width in Å⁻¹ within which two lines cannot be told apart
 */
export function overlapsOf(
  q: number,
  nuclear: readonly NuclearLine[],
  resolution: number,
  most = Number.POSITIVE_INFINITY,
): Overlaps {
  const atNuclear = chosen(coincidences(q, nuclear, resolution, "nuclear"), most);
  const atHalf = chosen(coincidences(q, nuclear, resolution, "half wavelength"), most);
  return { list: [...atNuclear.list, ...atHalf.list], more: atNuclear.more + atHalf.more };
}

/** The lines that fall on a satellite, and how many more that are not extinct were left out. */
export interface Overlaps {
  readonly list: readonly Overlap[];
  readonly more: number;
}

/** The `most` that matter most, in order of Q. */
function chosen(all: readonly Overlap[], most: number): Overlaps {
  if (all.length <= most) return { list: all, more: 0 };
  const ranked = [...all].sort(
    (a, b) => Number(b.allowed) - Number(a.allowed) || Math.abs(a.separation) - Math.abs(b.separation),
  );
  const kept = new Set(ranked.slice(0, most));
  return {
    list: all.filter((one) => kept.has(one)),
    more: ranked.slice(most).filter(({ allowed }) => allowed).length,
  };
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
