import type { SearchRecord } from "../records/search.js";
import { paragraph } from "./layout.js";
import { decimals } from "./names.js";

/** Peaks on nuclear lines or on λ/2 images of allowed ones, one line for each kind of coincidence. */
export function flagLines(record: SearchRecord): string[] {
  const { flags } = record;
  const total = record.peaks.list.length;
  const on = (sort: string, states: (state: string) => boolean) => [
    ...new Set(flags.filter((flag) => flag.with === sort && states(flag.state)).map(({ peak }) => peak)),
  ];
  const allowed = on("nuclear", (state) => state === "allowed");
  const forbidden = on("nuclear", (state) => state !== "allowed").filter((peak) => !allowed.includes(peak));
  const images = on("half wavelength", (state) => state === "allowed");
  const line = (peaks: readonly number[], where: string): string[] =>
    peaks.length === 0 ? [] : paragraph(`Flagged, not removed: ${peaksText(peaks, total)} on ${where}.`);
  return [
    ...line(allowed, "nuclear lines of the cell"),
    ...line(forbidden, "nuclear positions that symmetry forbids (magnetic intensity, or double scattering)"),
    ...line(images, "λ/2 images of allowed nuclear lines"),
    ...parentLines(record),
  ];
}

/** Numbers and ranges beyond which peaks are only counted; the JSON names them all. */
const mostRuns = 10;

/** `peak 3`, `peaks 1–4 and 7`, `all 13 peaks`: numbers as the text counts, from 1. */
export function peaksText(peaks: readonly number[], total: number): string {
  if (peaks.length === total && total > 1) return `all ${total} peaks`;
  const sorted = [...peaks].sort((a, b) => a - b).map((peak) => peak + 1);
  const runs: string[] = [];
  for (let start = 0; start < sorted.length; ) {
    let end = start;
    while (sorted[end + 1] === (sorted[end] as number) + 1) end += 1;
    if (end - start >= 2) runs.push(`${sorted[start]}–${sorted[end]}`);
    else runs.push(...sorted.slice(start, end + 1).map(String));
    start = end + 1;
  }
  if (runs.length > mostRuns) return `${sorted.length} peaks`;
  const last = runs.pop();
  return `${sorted.length === 1 ? "peak" : "peaks"} ${runs.length === 0 ? last : `${runs.join(", ")} and ${last}`}`;
}

/** Peaks whose parents of λ/2 were measured, that are listed one by one. */
const shownParents = 8;

/** Shares of the parents that differ by less than this factor are one share. */
const oneShare = 1.3;

/** How strong the parents of λ/2 images are, against the peak, where both were measured. */
function parentLines({ flags, peaks }: SearchRecord): string[] {
  const shares = flags.flatMap(({ peak, h, with: sort, state, parentIntensity }) => {
    const intensity = peaks.list.find(({ index }) => index === peak)?.intensity ?? null;
    if (sort !== "half wavelength" || state !== "allowed" || parentIntensity === null) return [];
    return intensity === null || parentIntensity <= 0 ? [] : [{ peak, h, share: intensity / parentIntensity }];
  });
  if (shares.length === 0) return [];
  const sizes = shares.map(({ share }) => share);
  const [least, most] = [Math.min(...sizes), Math.max(...sizes)];
  const percent = (share: number) => `${decimals(100 * share, 2)} %`;
  return [
    ...shares
      .slice(0, shownParents)
      .flatMap(({ peak, h, share }) => paragraph(`peak ${peak + 1} has ${percent(share)} of ${h.join(" ")}`, 4)),
    ...(shares.length > shownParents
      ? paragraph(`and ${shares.length - shownParents} more, from ${percent(least)} to ${percent(most)}`, 4)
      : []),
    ...(shares.length > 2 && most < oneShare * least
      ? paragraph(`One share for all of them: that is what half the wavelength in the beam would give.`)
      : []),
  ];
}
