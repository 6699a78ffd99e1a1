import { breathe, type WorkHost } from "../algorithms/index.js";
import { fail } from "../errors/index.js";
import type { WaveVector } from "../kvectors/index.js";
import { clearlySeenUncertainties, tiedCriterion } from "../numbers/index.js";
import { type SatelliteLine, satelliteLines } from "../reflections/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { type DataFrame, dataFrame, type FitForms, fitForms } from "./fit-forms.js";
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
        satellites: peaks.map((datum) => satelliteName(frame, datum)),
      });
    else fits.push(await weighOne(frame, candidate, own, chosen, host));
  }
  // Fits that are equal but for rounding stay in the order of the candidates.
  const rank = (fit: OneFit): number => Math.round(1e6 * fit.result.criterion);
  fits.sort((a, b) => rank(a) - rank(b) || a.result.parameters - b.result.parameters);
  const ranking: WeighedCandidate[] = [];
  const separate = fits.length > 1 ? separator(frame, chosen.qMax) : null;
  for (const fit of fits) {
    await breathe(host);
    ranking.push(compared(frame, fit, fits, separate));
  }
  const relative = fits.some(({ layout }) => isRelative(layout, data));
  const unassigned = data.data.filter((_, index) => !usable[index]).map(({ label }) => label);
  return {
    ranking,
    struckOut,
    unassigned,
    relative,
    criterion: "Bayesian information criterion: chi-squared + parameters ln(data)",
    remarks: remarksOn(frame, fits, relative, unassigned),
  };
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
  fail("invalid-argument", "no peak of the list lies on a satellite of this k", {
    expected: sample === "powder" ? `peaks within ${resolution} Å⁻¹ of satellites` : "h k l of vectors H ± k",
    found: data.slice(0, mostNamed).map(nearestText(frame)).join("; "),
    remedy: "check k, the cell and the positions of the peaks; `kvane satellites` lists where they should be",
  });
}

/** Writes a peak with the satellite that comes nearest to it. */
function nearestText({ group, cell, k, data }: DataFrame): (datum: IntensityDatum) => string {
  const furthest = data.data.reduce((most, { q }) => Math.max(most, q ?? 0), 0);
  const lines = furthest > 0 ? satelliteLines(group, cell, k, { qMax: 1.2 * furthest }) : [];
  return ({ label, q }) => {
    if (q === null) return label;
    const [first, ...others] = lines;
    if (!first) return `${label} at ${q.toFixed(4)} Å⁻¹`;
    const nearest = others.reduce((best, one) => (Math.abs(one.q - q) < Math.abs(best.q - q) ? one : best), first);
    return `${label} at ${q.toFixed(4)} Å⁻¹ (nearest ${lineName(nearest)} at ${nearest.q.toFixed(4)})`;
  };
}

/** The first satellite of a powder peak; of a crystal the label has the indices. */
function satelliteName({ lines, data }: DataFrame, datum: number): string {
  const line = lines[datum]?.[0];
  return line === undefined ? (data.data[datum]?.label ?? "") : lineName(line);
}

function lineName({ h, sign }: SatelliteLine): string {
  return `(${h.join(" ")})${sign === -1 ? "-k" : "+k"}`;
}

function keepData(frame: DataFrame, usable: readonly boolean[]): DataFrame {
  const kept = <T>(list: readonly T[]): T[] => list.filter((_, index) => usable[index]);
  return {
    ...frame,
    data: { ...frame.data, data: kept(frame.data.data) },
    lines: kept(frame.lines),
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
  separate: Separator | null,
): WeighedCandidate {
  const others = fits.filter((other) => other !== fit);
  const tied = others.filter((other) => Math.abs(other.result.criterion - fit.result.criterion) < tiedCriterion);
  const identical = others.filter((other) =>
    frame.data.data.every(
      ({ uncertainty }, index) =>
        Math.abs((other.result.calculated[index] as number) - (fit.result.calculated[index] as number)) <
        identicalUncertainties * uncertainty,
    ),
  );
  const arrangement = (one: OneFit) => ({ id: one.space.id, space: one.space, amplitudes: one.minima.best.parameters });
  const isFirst = (fits[0]?.result.criterion ?? 0) + tiedCriterion > fit.result.criterion;
  return {
    ...fit.result,
    amplitudes: fit.amplitudes(isFirst),
    sameAs: tied.map(({ space }) => space.id),
    identicalTo: identical.map(({ space }) => space.id),
    separations:
      isFirst && separate
        ? tied.slice(0, mostSeparations).map((other) => separate(arrangement(fit), arrangement(other)))
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

function remarksOn(
  frame: DataFrame,
  fits: readonly OneFit[],
  relative: boolean,
  unassigned: readonly string[],
): string[] {
  const remarks = ["A ranking says which arrangements are worth a refinement; it is not a refinement."];
  const [best] = fits;
  if (!best) remarks.push("No candidate can give all the peaks that are clearly observed.");
  if (relative)
    remarks.push("No nuclear scale is known: sizes of moments are relative, and scale and size cannot both be told.");
  if (best && best.result.parameters >= frame.data.data.length)
    remarks.push(
      `There are ${frame.data.data.length} intensities for ${best.result.parameters} parameters: a good fit means nothing.`,
    );
  if (best?.result.reducedChiSquared != null && best.result.reducedChiSquared > poorFit)
    remarks.push(
      nuclearShare(frame, best) > 0.5
        ? "The nuclear lines fit poorly: look at the structure, its occupancies and displacements, before trusting the scale."
        : "Even the best fit is poor: uncertainties are understated, or the right arrangement is not in the list.",
    );
  if (unassigned.length > 0) remarks.push(`Left out, near no line that they may be: ${unassigned.join(", ")}.`);
  return remarks;
}
