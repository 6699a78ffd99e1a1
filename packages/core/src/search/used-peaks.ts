import { fail } from "../errors/index.js";
import { matchStandardUncertainties } from "../numbers/index.js";
import { strayShare } from "./evidence.js";
import { impurityLines, onImpurity } from "./flags.js";
import { strayShares } from "./stray-shares.js";
import type { PeakList, SearchOptions, SetAside } from "./types.js";

/** A powder peak in the form that matching needs, Å⁻¹. */
export interface PowderPeak {
  readonly index: number;
  readonly q: number;
  readonly uncertainty: number;
  readonly halfWidth: number;
  /** ∂Q/∂2θ in Å⁻¹ per degree: what a zero shift moves it by; 0 without a wavelength. */
  readonly slope: number;
  /** Chance of being no satellite. */
  readonly strayShare: number;
  /** It stands where an earlier peak stands: the same observation once more. */
  readonly repeats: boolean;
}

/** A single-crystal peak in the form that matching needs, r.l.u. */
export interface CrystalPeak {
  readonly index: number;
  readonly hkl: readonly [number, number, number];
  readonly uncertainty: number;
  readonly halfWidth: number;
  /** Chance of being no satellite. */
  readonly strayShare: number;
  /** It stands where an earlier peak stands, within its uncertainty: the same observation once more. */
  readonly repeats: boolean;
}

/** The peaks that take part, and those that do not. */
export interface UsedPeaks {
  readonly powder: readonly PowderPeak[];
  readonly crystal: readonly CrystalPeak[];
  readonly setAside: readonly SetAside[];
}

/**
 * The peaks of a list that take part in indexing; one of `powder` and `crystal` is empty. Peaks above `qMax` are set
 * aside (`lengthOf` gives Q of a list of h k l).
 *
 * Throws `invalid-peak` for a position or uncertainty that is no number above 0, `too-few-peaks` when none is left.
 */
export function usedPeaks(
  list: PeakList,
  options: SearchOptions,
  lengthOf: (hkl: readonly number[]) => number,
): UsedPeaks {
  const powder: PowderPeak[] = [];
  const crystal: CrystalPeak[] = [];
  const setAside: SetAside[] = [];
  const shares = options.weighByIntensity === true ? strayShares(list.peaks) : [];
  const impurities = impurityLines(options.impurities ?? [], impurityReach(list, options));
  for (const peak of list.peaks) {
    const uncertainty = list.kind === "hkl" ? peak.hklUncertainty : peak.uncertainty;
    const position = list.kind === "hkl" ? peak.hkl : peak.q === null ? null : [peak.q];
    if (uncertainty === null || !(uncertainty > 0 && Number.isFinite(uncertainty)) || !isPosition(list, position))
      refusePeak(peak.index, peak.line);
    const q = list.kind === "hkl" ? lengthOf(position) : (position[0] as number);
    if (options.qMax !== null && q > options.qMax) {
      setAside.push({ peak: peak.index, because: `it lies above the limit of Q, ${options.qMax} Å⁻¹` });
      continue;
    }
    const excluded = list.kind === "hkl" ? undefined : options.exclude?.find((range) => isInside(peak.position, range));
    if (excluded !== undefined) {
      setAside.push({ peak: peak.index, because: `it lies in the excluded range ${excluded[0]} to ${excluded[1]}` });
      continue;
    }
    const phase =
      list.kind === "hkl"
        ? null
        : onImpurity(q, options.tolerance ?? matchStandardUncertainties * uncertainty, impurities);
    if (phase !== null) {
      setAside.push({ peak: peak.index, because: phase });
      continue;
    }
    const common = {
      index: peak.index,
      uncertainty,
      halfWidth: options.tolerance ?? matchStandardUncertainties * uncertainty,
      strayShare: shares[peak.index] ?? strayShare,
      repeats: false,
    };
    if (list.kind === "hkl") crystal.push({ ...common, hkl: position as unknown as [number, number, number] });
    else powder.push({ ...common, q, slope: slopeAt(q, list.wavelengthAngstrom) });
  }
  if (powder.length + crystal.length === 0)
    fail("too-few-peaks", "there is no peak to index", {
      expected: "at least one peak",
      found: `${list.peaks.length} in the list, ${setAside.length} set aside`,
      remedy: "give a list of satellite positions, or raise the limit of Q",
    });
  return { powder: countedOnce(powder), crystal: countedOnceInSpace(crystal), setAside };
}

/** Certain to be a stray: a repeated peak adds nothing to the evidence. */
const sayingNothing = 1;

/** Standard uncertainties. Peaks nearer than this are one observation: two lines that near are never seen as two. */
const sameObservation = 0.3;

/** Marks peaks that stand where an earlier one stands: the same line measured again. They stay in the list, and count once. */
function countedOnce(peaks: readonly PowderPeak[]): readonly PowderPeak[] {
  const repeated = new Set<number>();
  const sorted = [...peaks].sort((a, b) => a.q - b.q || a.index - b.index);
  let last = sorted[0];
  for (const peak of sorted.slice(1)) {
    if (last !== undefined && peak.q - last.q < sameObservation * Math.max(peak.uncertainty, last.uncertainty))
      repeated.add(peak.index);
    else last = peak;
  }
  return peaks.map((peak) => (repeated.has(peak.index) ? { ...peak, strayShare: sayingNothing, repeats: true } : peak));
}

/** The same of three indices: only equal rows, since domains and arms come near each other. */
function countedOnceInSpace(peaks: readonly CrystalPeak[]): readonly CrystalPeak[] {
  const seen = new Set<string>();
  return peaks.map((peak) => {
    const key = peak.hkl.join();
    const repeats = seen.has(key);
    seen.add(key);
    return repeats ? { ...peak, strayShare: sayingNothing, repeats } : peak;
  });
}

function isInside(position: number | null, [from, to]: readonly [number, number]): boolean {
  return position !== null && position >= from && position <= to;
}

/** Q up to which lines of other phases are wanted. */
function impurityReach(list: PeakList, options: SearchOptions): number {
  const highest = Math.max(0.1, ...list.peaks.map((peak) => (Number.isFinite(peak.q) ? (peak.q as number) : 0)));
  const widest = Math.max(
    ...list.peaks.map((peak) => options.tolerance ?? matchStandardUncertainties * (peak.uncertainty ?? 0)),
    0,
  );
  return Math.min(options.qMax ?? Number.POSITIVE_INFINITY, highest) + (Number.isFinite(widest) ? widest : 0);
}

/** `dQ/d(2θ) = (2π/λ) cos θ`, per degree. */
function slopeAt(q: number, wavelength: number | null): number {
  if (wavelength === null) return 0;
  const sine = Math.min(1, (q * wavelength) / (4 * Math.PI));
  return ((2 * Math.PI) / wavelength) * Math.sqrt(1 - sine * sine) * (Math.PI / 180);
}

function isPosition(list: PeakList, position: readonly number[] | null): position is readonly number[] {
  if (position === null || !position.every(Number.isFinite)) return false;
  return list.kind === "hkl" ? position.length === 3 : (position[0] as number) > 0;
}

function refusePeak(index: number, line: number): never {
  fail("invalid-peak", `peak ${index} has no usable position or uncertainty`, {
    where: { line },
    expected: "a position and a standard uncertainty above 0",
  });
}
