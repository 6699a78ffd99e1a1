import { breathe, type WorkHost } from "../algorithms/index.js";
import { fail } from "../errors/index.js";
import type { WaveVector } from "../kvectors/index.js";
import { clearlySeenUncertainties, roundNumber, tiedCriterion } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { type DataFrame, dataFrame, type FitForms, fitForms } from "./fit-forms.js";
import { leftOutOf } from "./left-out.js";
import { type Separator, separator } from "./separations.js";
import {
  defaultWeighOptions,
  type IntensityData,
  type IntensityDatum,
  type WeighCandidate,
  type WeighedCandidate,
  type Weighing,
  type WeighOptions,
} from "./types.js";
import { isRelative, type OneFit, weighOne } from "./weigh-one.js";

/** Of the strongest form: entries below are zero but for rounding. */
const zeroShare = 1e-12;
/** s.u. Calculated intensities that differ by less everywhere are the same pattern. */
const identicalUncertainties = 1e-3;
/** Members of a family for which a separating measurement is looked for. */
const mostSeparations = 4;

/**
 * Ranks candidates by how well their best fits agree with measured intensities. Each candidate's amplitudes (with the scale
 * and the fractions of domains where these are free) are fitted by bounded least squares from seeded starts; the order is that of
 * the Bayesian information criterion. A ranking says which arrangements are worth a refinement; it is none itself.
 *
 * Throws `invalid-argument` for data without uncertainties or without a line near any of them, `k-needs-values`,
 * `invalid-cell`, `cell-contradicts-group` and `interrupted`.
 */
export async function weigh(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  data: IntensityData,
  candidates: readonly WeighCandidate[],
  options: Partial<WeighOptions> = {},
  host: WorkHost = {},
): Promise<Weighing> {
  const chosen: WeighOptions = { ...defaultWeighOptions, ...options };
  checkData(data);
  const whole = dataFrame(group, cell, k, data);
  const made: { readonly candidate: WeighCandidate; readonly forms: FitForms }[] = [];
  for (const candidate of candidates) {
    await breathe(host);
    made.push({ candidate, forms: fitForms(whole, candidate) });
  }
  const usable = data.data.map((_, index) => made.some(({ forms }) => forms.assigned[index]));
  if (!usable.includes(true)) refuseData(whole);
  const frame = keepData(whole, usable);
  const zero = zeroLimit(made.map(({ forms }) => forms));
  const struckOut: Weighing["struckOut"][number][] = [];
  const fits: OneFit[] = [];
  for (const [index, { candidate, forms }] of made.entries()) {
    host.progress?.(index, made.length, candidate.id);
    const own = keepForms(forms, usable);
    const peaks = impossiblePeaks(frame.data, own, zero);
    if (peaks.length > 0)
      struckOut.push({
        id: candidate.id,
        peaks: peaks.map((datum) => (frame.data.data[datum] as IntensityDatum).label),
        satellites: peaks.map((datum) => frame.names[datum]?.[0] ?? (frame.data.data[datum] as IntensityDatum).label),
      });
    else fits.push(await weighOne(frame, candidate, own, chosen, host));
  }
  // Fits that are equal but for rounding stay in the order of the candidates.
  const rank = (fit: OneFit): number => Math.round(1e6 * fit.result.criterion);
  fits.sort((a, b) => rank(a) - rank(b) || a.result.parameters - b.result.parameters);
  const ranks = ranksOf(fits);
  const ranking: WeighedCandidate[] = [];
  const compare = fits.length > 1 ? separator(frame, chosen.qMax) : null;
  for (const [index, fit] of fits.entries()) {
    await breathe(host);
    ranking.push({ ...compared(frame, fit, fits, compare), rank: ranks[index] as number });
  }
  const relative = fits.some(({ layout }) => isRelative(layout, data));
  const leftOut = leftOutOf(whole, usable);
  const leftOutShare = roundNumber(
    shareOf(data, (index) => !usable[index]),
    1,
  );
  return {
    ranking,
    struckOut,
    lines: frame.names,
    leftOut,
    leftOutShare,
    relative,
    criterion: "Bayesian information criterion: chi-squared + parameters ln(data)",
    remarks: remarksOn(frame, fits, struckOut.length > 0, relative),
  };
}

/** Places shared by those whose criterions are not clearly above that of the first of them. */
function ranksOf(fits: readonly OneFit[]): number[] {
  let leader = 0;
  return fits.map(({ result }, index) => {
    if (result.criterion - (fits[leader] as OneFit).result.criterion >= tiedCriterion) leader = index;
    return leader + 1;
  });
}

/** Share of the data, by absolute intensity, that are chosen. */
function shareOf({ data }: IntensityData, isChosen: (index: number) => boolean): number {
  let [part, total] = [0, 0];
  data.forEach(({ observed }, index) => {
    total += Math.abs(observed);
    if (isChosen(index)) part += Math.abs(observed);
  });
  return total > 0 ? part / total : 0;
}

function checkData({ data }: IntensityData): void {
  const wrong = data.find(
    ({ observed, uncertainty }) => !(Number.isFinite(observed) && uncertainty > 0 && Number.isFinite(uncertainty)),
  );
  if (data.length === 0 || wrong)
    fail(
      "invalid-argument",
      wrong ? `the intensity of ${wrong.label} has no usable uncertainty` : "there are no intensities",
      {
        expected: "intensities with standard uncertainties above 0",
        found: wrong ? `${wrong.observed} ± ${wrong.uncertainty}` : "none",
        remedy: "give an uncertainty for every intensity",
      },
    );
}

/** Peaks that a message names. */
const mostNamed = 4;

function refuseData(frame: DataFrame): never {
  const { data, resolution, sample } = frame.data;
  const named = leftOutOf(
    frame,
    data.map(() => false),
  ).slice(0, mostNamed);
  fail("invalid-argument", "no peak of the list lies on a satellite of this k", {
    expected: sample === "powder" ? `peaks within ${resolution} Å⁻¹ of satellites` : "h k l of vectors H ± k",
    found: named
      .map(({ label, nearest }, index) => {
        const q = data[index]?.q ?? null;
        const at = q === null ? "" : ` at ${q.toFixed(4)} Å⁻¹`;
        return `${label}${at}${nearest === null ? "" : ` (nearest ${nearest.line} at ${nearest.q.toFixed(4)})`}`;
      })
      .join("; "),
    remedy: "check k, the cell and the positions of the peaks; `kvane satellites` lists where they should be",
  });
}

function keepData(frame: DataFrame, usable: readonly boolean[]): DataFrame {
  const kept = <T>(list: readonly T[]): T[] => list.filter((_, index) => usable[index]);
  return {
    ...frame,
    data: { ...frame.data, data: kept(frame.data.data) },
    lines: kept(frame.lines),
    names: kept(frame.names),
    constants: frame.constants.filter((_, index) => usable[index]),
  };
}

function keepForms(forms: FitForms, usable: readonly boolean[]): FitForms {
  return {
    ...forms,
    forms: forms.forms.map((domain) => domain.filter((_, index) => usable[index])),
    constants: forms.constants.filter((_, index) => usable[index]),
    assigned: forms.assigned.filter((_, index) => usable[index]),
  };
}

function zeroLimit(all: readonly FitForms[]): number {
  let largest = 0;
  for (const { forms } of all)
    for (const domain of forms)
      for (const form of domain) for (const entry of form) largest = Math.max(largest, Math.abs(entry));
  return zeroShare * largest;
}

/** Clearly observed data on which every amplitude of the candidate gives nothing. */
function impossiblePeaks({ data }: IntensityData, { forms, constants, size }: FitForms, zero: number): number[] {
  return data.flatMap(({ observed, uncertainty }, index) =>
    observed > clearlySeenUncertainties * uncertainty &&
    constants[index] === 0 &&
    forms.every((domain) =>
      Array.from({ length: size }, (_, at) => domain[index]?.[at * size + at] as number).every(
        (entry) => entry <= zero,
      ),
    )
      ? [index]
      : [],
  );
}

function compared(
  frame: DataFrame,
  fit: OneFit,
  fits: readonly OneFit[],
  compare: Separator | null,
): Omit<WeighedCandidate, "rank"> {
  const others = fits.filter((other) => other !== fit);
  const tied = others.filter((other) => Math.abs(other.result.criterion - fit.result.criterion) < tiedCriterion);
  const arrangement = (one: OneFit) => ({ id: one.space.id, space: one.space, amplitudes: one.minima.best.parameters });
  const sameData = others.filter((other) =>
    frame.data.data.every(
      ({ uncertainty }, index) =>
        Math.abs((other.result.calculated[index] as number) - (fit.result.calculated[index] as number)) <
        identicalUncertainties * uncertainty,
    ),
  );
  const identical = sameData.filter((other) => compare?.samePowder(arrangement(fit), arrangement(other)) ?? true);
  const isFirst = (fits[0]?.result.criterion ?? 0) + tiedCriterion > fit.result.criterion;
  return {
    ...fit.result,
    amplitudes: fit.amplitudes(isFirst),
    sameAs: tied.map(({ space }) => space.id),
    identicalTo: identical.map(({ space }) => space.id),
    separations:
      isFirst && compare
        ? tied.slice(0, mostSeparations).map((other) => compare.separate(arrangement(fit), arrangement(other)))
        : [],
  };
}

/** χ² per degree of freedom above which a fit is called poor: misfits of two s.u. on average. */
const poorFit = 4;

/** Share of χ² that comes from nuclear lines alone. */
function nuclearShare({ data }: DataFrame, { result }: OneFit): number {
  let [nuclear, total] = [0, 0];
  data.data.forEach(({ observed, uncertainty, holds }, index) => {
    const own = ((observed - (result.calculated[index] as number)) / uncertainty) ** 2;
    total += own;
    if (holds === "nuclear") nuclear += own;
  });
  return total > 0 ? nuclear / total : 0;
}

function remarksOn(frame: DataFrame, fits: readonly OneFit[], struckOut: boolean, relative: boolean): string[] {
  const remarks = ["A ranking says which arrangements are worth a refinement; it is not a refinement."];
  const { data } = frame.data;
  const [best] = fits;
  if (!best)
    remarks.push(
      struckOut
        ? "No candidate can give all the peaks that are clearly observed: the wavelength, the cell or k is wrong, a peak is not magnetic, or several irreps order together."
        : "There was nothing to weigh.",
    );
  if (
    !data.some(({ observed, uncertainty, holds }) => holds !== "nuclear" && observed > seenUncertainties * uncertainty)
  )
    remarks.push("No satellite is seen: all intensities are within 3 standard uncertainties of zero.");
  const negative = data.filter(({ observed, uncertainty }) => observed < -clearlySeenUncertainties * uncertainty);
  if (negative.length > 0)
    remarks.push(`Far below zero: ${negative.map(({ label }) => label).join(", ")}; the background is wrong.`);
  if (relative)
    remarks.push("No nuclear scale is known: sizes of moments are relative, and scale and size cannot both be told.");
  if (best && best.result.parameters >= data.length)
    remarks.push(
      `Intensities: ${data.length}, parameters of ${best.result.id}: ${best.result.parameters}. A good fit means nothing.`,
    );
  if (best?.result.reducedChiSquared != null && best.result.reducedChiSquared > poorFit)
    remarks.push(
      nuclearShare(frame, best) > 0.5
        ? `The nuclear lines fit poorly (R = ${percentOf(nuclearMisfit(frame, best))}): look at the structure, its occupancies and displacements, before trusting the scale.`
        : "Even the best fit is poor: the Lorentz factor, the form factor or the scale may be wrong, uncertainties understated, or the right arrangement not in the list.",
      `Largest misfits of ${best.result.id}: ${largestMisfits(frame, best)}.`,
    );
  return remarks;
}

/** S.u. above which an intensity is seen at all. */
const seenUncertainties = 3;
const mostMisfits = 3;

/** The data furthest from their calculated values, in s.u. */
function largestMisfits({ data }: DataFrame, { result }: OneFit): string {
  const off = data.data.map(({ label, observed, uncertainty }, index) => ({
    label,
    off: (observed - (result.calculated[index] as number)) / uncertainty,
  }));
  off.sort((a, b) => Math.abs(b.off) - Math.abs(a.off));
  return off
    .slice(0, mostMisfits)
    .map((one) => `${one.label} (${one.off > 0 ? "+" : ""}${one.off.toFixed(1)} s.u.)`)
    .join(", ");
}

/** R factor of the nuclear lines alone. */
function nuclearMisfit({ data }: DataFrame, { result }: OneFit): number {
  let [observed, residue] = [0, 0];
  data.data.forEach((one, index) => {
    if (one.holds !== "nuclear") return;
    observed += Math.abs(one.observed);
    residue += Math.abs(one.observed - (result.calculated[index] as number));
  });
  return observed > 0 ? residue / observed : 0;
}

function percentOf(share: number): string {
  return `${(100 * share).toFixed(1)} %`;
}
