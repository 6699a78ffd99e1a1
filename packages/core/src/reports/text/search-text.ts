import { withUncertainty } from "../../numbers/index.js";
import type { AssignmentRecord, CandidateRecord, PeaksRecord, SearchRecord } from "../records/search.js";
import { flagLines, peaksText } from "./flag-text.js";
import { fields, paragraph, section, table } from "./layout.js";
import { cellText, counted, decimals, dimensionText, groupText, kForm, kShort, kText, plain } from "./names.js";
import { lineText } from "./satellites-text.js";
import { severalVectorLines } from "./several-vectors-text.js";
import { reducedFields } from "./star-text.js";

/** Candidates that the report of `locate` lists; the JSON has all. */
const shownCandidates = 12;

/** Other k that a candidate is held against, one line each. */
const shownSeparations = 4;

export function indexText(record: SearchRecord): string[] {
  return [
    ...inputSection(record),
    ...record.candidates.flatMap((candidate) => [
      ...section(`Wave vector ${kText(candidate.k)}`, fields(candidateFields(candidate))),
      ...section("Assignment", assignmentTable(candidate, record.peaks, record.setAside)),
    ]),
  ];
}

export function locateText(record: SearchRecord): string[] {
  const best = record.candidates[0];
  return [
    ...section("Result", paragraph(verdictText(record))),
    ...inputSection(record),
    ...section(
      `Candidates (${shownText(record)})`,
      candidateTable(record.candidates.slice(0, shownCandidates)),
      [""],
      certificateLines(record),
      separationLines(record),
      severalVectorLines(record),
      referenceLines(record),
      flagLines(record),
      setAsideLines(record),
    ),
    ...(best
      ? section(`Assignment by candidate 1, ${kText(best.k)}`, assignmentTable(best, record.peaks, record.setAside))
      : []),
  ];
}

/** The answer in one sentence. */
export function verdictText(record: SearchRecord): string {
  const [best] = record.candidates;
  const set = record.severalVectors?.found[0];
  const several = set !== undefined && set.evidence.reading === "found" && set.gain > clearGain ? set : undefined;
  const named = several?.members.map(({ name, k }) => `${name} = ${kShort(k)}`).join(", ");
  if (best !== undefined && best.evidence.reading === "found" && several === undefined) {
    const tied =
      best.tiedWith.length === 0 ? "" : `; ${counted(best.tiedWith.length, "other k", "other k")} fit as well`;
    return `k = ${kShort(best.k)} found, ${best.matched} of ${best.total} peaks${tied}.`;
  }
  if (several !== undefined)
    return `No single k explains enough; ${named} together explain ${several.matched} of ${several.total} peaks.`;
  const single = record.severalVectors?.single;
  if (single !== undefined && single.evidence > foundAbove)
    return (
      `No k leaves as few peaks over as asked. The best, ${kShort(single.k)}, explains ${single.matched} of ${single.total} ` +
      `(evidence ${decimals(single.evidence, 1)}): --unmatched ${single.total - single.matched} allows it.`
    );
  const weak = best !== undefined && best.evidence.reading === "weak" ? ` The best, ${kShort(best.k)}, is weak.` : "";
  return (
    `No k is found.${weak} Check what the positions are, the wavelength, the cell and the uncertainties; ` +
    "--zero-shift 0.1 and --cell-scale 0.002 let the zero and the cell move, --unmatched allows for more impurities."
  );
}

/** In natural log-odds: a clear difference, and what reads as found. */
const clearGain = 3;
const foundAbove = 3;

function shownText(record: SearchRecord): string {
  const total = record.candidates.length;
  return total > shownCandidates ? `the best ${shownCandidates} of ${total}` : String(total);
}

function inputSection(record: SearchRecord): string[] {
  return section(
    "Peaks and cell",
    fields([["Group", groupText(record.group)], ["Cell", cellText(record.cell)], ...peakFields(record.peaks)]),
  );
}

export const peakKindNames = { d: "d in Å", q: "Q in Å⁻¹", "two-theta": "2θ in degrees", hkl: "single-crystal h k l" };

/** What was read, in two lines. */
export function peakFields(peaks: PeaksRecord): [string, string][] {
  const wavelength = peaks.wavelengthAngstrom === null ? "" : `, wavelength ${plain(peaks.wavelengthAngstrom)} Å`;
  return [
    ["Peaks", `${peaks.list.length} as ${peakKindNames[peaks.kind]}${wavelength}`],
    ["Uncertainties", peaks.uncertaintySource],
  ];
}

/** Ranked by evidence; ties by the numbers of the candidates. */
export function candidateTable(candidates: readonly CandidateRecord[]): string[] {
  if (candidates.length === 0) return ["  none"];
  return table(
    [
      { title: "", align: "right" },
      { title: "k" },
      { title: "kind" },
      { title: "arms", align: "right" },
      { title: "matched", align: "right" },
      { title: "misfit / s.u.", align: "right" },
      { title: "evidence", align: "right" },
      { title: "reading" },
      { title: "tied with" },
    ],
    candidates.map((candidate, index) => [
      String(index + 1),
      kShort(candidate.k),
      candidate.dimension === 3 ? "general" : dimensionText(candidate.dimension),
      String(candidate.arms),
      `${candidate.matched} of ${candidate.total}`,
      decimals(misfitOf(candidate), 2),
      decimals(candidate.evidence.value, 1),
      candidate.evidence.reading,
      tiesText(candidate.tiedWith),
    ]),
  );
}

/** Numbers of the tied candidates, the first few of many. */
export function tiesText(ties: readonly number[]): string {
  const shown = ties.slice(0, 3).map((other) => other + 1);
  return ties.length > 3 ? `${shown.join(", ")} and ${ties.length - 3} more` : shown.join(", ");
}

/** What the search covered, and what it says of what is not listed. */
export function certificateLines(record: SearchRecord): string[] {
  const sentences = certificateSentences(record);
  return sentences === null ? [] : paragraph(sentences);
}

/** The same as one text; null where nothing was searched. */
export function certificateSentences(record: SearchRecord): string | null {
  const certificate = record.certificate;
  if (certificate === null) return null;
  const kinds = ["all special points", "points and lines", "points, lines and planes", "every kind of k"];
  const within = allowances(certificate.zeroShift, certificate.cellScale);
  const scope =
    `Searched, with k and −k as one: ${kinds[certificate.maxDimension]}, ` +
    `${counted(certificate.boxes, "box", "boxes")}` +
    `${certificate.smallestBox > 0 ? ` down to ${plain(Number(certificate.smallestBox.toPrecision(2)))} Å⁻¹` : ""}${within}.`;
  const undecided = certificate.kinds.reduce((sum, kind) => sum + kind.undecided, 0);
  const regions = certificate.kinds.reduce((sum, kind) => sum + (kind.dimension > 0 ? kind.regions : 0), 0);
  const zone = certificate.maxDimension === 3 ? "whole zone" : "kinds searched";
  const outside = regions > 0 ? `Outside the ${counted(regions, "region")} found, nothing` : "Nothing else";
  const complete = certificate.exhaustive
    ? `${outside} in the ${zone} matches ${certificate.minimumMatched} or more peaks` +
      `${undecided > 0 ? `, but ${counted(undecided, "region")} could not be decided (see --json)` : ""}.`
    : `The search was stopped before its end (${certificate.stopped ?? "no reason given"}): other k may match.`;
  const fewer = record.candidates.some(({ matched }) => matched < certificate.minimumMatched)
    ? " Candidates with fewer were refined away from a k beside them that matches that many."
    : "";
  return `${scope} ${complete}${fewer}`;
}

function allowances(zeroShift: number, cellScale: number): string {
  const parts = [
    ...(zeroShift > 0 ? [`a zero shift up to ${plain(zeroShift)}°`] : []),
    ...(cellScale > 0 ? [`a change of the cell up to ${plain(100 * cellScale)} %`] : []),
  ];
  return parts.length === 0 ? "" : `, allowing ${parts.join(" and ")}`;
}

/** What the first candidate cannot be told from, and what would tell. */
export function separationLines(record: SearchRecord): string[] {
  return [...separationSentences(record), ...mergedSentences(record), ...correctionSentences(record)].flatMap((line) =>
    paragraph(line),
  );
}

/** What the first candidate cannot be told from, a text each. */
export function separationSentences(record: SearchRecord): string[] {
  const best = record.candidates[0];
  if (best === undefined) return [];
  const lines = best.separations
    .filter((one) => !one.toldApart && one.q > 0)
    .map((one) =>
      one.resolution === null
        ? `${kShort(best.k)} cannot be told from ${kShort(one.k)} by positions: all lines coincide.`
        : `${kShort(best.k)} cannot be told from ${kShort(one.k)} unless ΔQ/Q < ${decimals(100 * one.resolution, 2)} % at ${decimals(one.q, 2)} Å⁻¹.`,
    );
  const more = lines.length - shownSeparations;
  const excluded = best.separations.filter(({ candidate, toldApart, q }) => candidate === null && toldApart && q > 0);
  return [
    ...excluded.map((one) => `The peaks tell ${kShort(best.k)} from ${kShort(one.k)}.`),
    ...lines.slice(0, shownSeparations),
    ...(more > 0 ? [`The same holds for ${counted(more, "more k", "more k")}.`] : []),
  ];
}

/** Candidates of higher kinds that are the same find as the first, a text each. */
export function mergedSentences({ candidates }: SearchRecord): string[] {
  return (candidates[0]?.merged ?? []).map(
    (one) => `${kShort(one.k)} beside it is the same find (evidence ${decimals(one.evidence, 1)}).`,
  );
}

/** What was refined with the first candidate, a text each. */
export function correctionSentences({ candidates }: SearchRecord): string[] {
  return (candidates[0]?.corrections ?? []).map(
    ({ name, value, su }) =>
      `Refined with it: ${name === "zeroShift" ? "zero shift of 2θ" : "relative change of the cell"} ${su === null ? `${plain(Number(value.toPrecision(3)))} (at its limit)` : withUncertainty(value, su)}.`,
  );
}

/** k = 0 and its like, where no candidate stands for them. */
function referenceLines(record: SearchRecord): string[] {
  return referenceSentences(record).flatMap((line) => paragraph(line));
}

/** The same, a text each. */
export function referenceSentences({ references }: SearchRecord): string[] {
  return references.map(
    ({ k, evidence, matched, total }) =>
      `For comparison ${kShort(k)}: ${matched} of ${total} peaks, evidence ${decimals(evidence, 1)}.`,
  );
}

function setAsideLines(record: SearchRecord): string[] {
  return [
    ...record.setAside.flatMap(({ peak, because }) => paragraph(`Peak ${peak + 1} set aside: ${because}.`)),
    ...(record.unmatched.length > 0 && record.candidates.length > 0
      ? paragraph(`Candidate 1 leaves ${peaksText(record.unmatched, record.peaks.list.length)} over.`)
      : []),
  ];
}

function candidateFields(candidate: CandidateRecord): [string, string][] {
  const { evidence } = candidate;
  return [
    ...reducedFields(candidate),
    ["Kind", `${dimensionText(candidate.dimension)} ${kForm(candidate.manifold)}, ${counted(candidate.arms, "arm")}`],
    ["Matched", `${candidate.matched} of ${candidate.total}`],
    ["Misfit", `${decimals(misfitOf(candidate), 2)} standard uncertainties (root mean square)`],
    ["Evidence", `${decimals(evidence.value, 1)} (natural log-odds against chance): ${evidence.reading}`],
    ...(candidate.onNuclearLines
      ? [["k = 0", "its lines are the nuclear ones: peaks that are not magnetic fit it too"] as [string, string]]
      : []),
    ...refinementFields(candidate),
    [
      "Figures of merit",
      `de Wolff ${decimals(candidate.deWolff, 1)}, Smith & Snyder ${decimals(candidate.smithSnyder, 1)}`,
    ],
    ...(candidate.nearFractions.length === 0
      ? []
      : [["Near fractions", candidate.nearFractions.map(nearText).join(", ")] as [string, string]]),
  ];
}

export function nearText({ letter, fraction, deviation }: CandidateRecord["nearFractions"][number]): string {
  return `${letter} = ${fraction} (${decimals(Math.abs(deviation), 1)} s.u. away)`;
}

function refinementFields({ refinement, k }: CandidateRecord): [string, string][] {
  if (refinement === null) return [];
  if (!refinement.determined) return [["Refined", "no: the matched peaks do not fix every parameter"]];
  const enlarged = refinement.rescaledSu
    ? `; s.u. enlarged to the scatter of the peaks: ${Object.keys(k.values)
        .map(
          (letter, index) =>
            `${letter} = ${withUncertainty(k.values[letter] ?? 0, refinement.rescaledSu?.[index] ?? 0)}`,
        )
        .join(", ")}`
    : "";
  return [["Refined", `from ${kText(refinement.from)}${refinement.converged ? "" : ", not converged"}${enlarged}`]];
}

/** Root mean square of the matched peaks' residuals in standard uncertainties. */
export function misfitOf({ residuals, matched }: CandidateRecord): number | null {
  return matched > 0 ? Math.sqrt(residuals.chiSquared / matched) : null;
}

/** One row a peak, matched or not. */
export function assignmentTable(
  candidate: CandidateRecord,
  peaks: PeaksRecord,
  setAside: SearchRecord["setAside"] = [],
): string[] {
  const vectors = peaks.kind === "hkl";
  const several = vectors && candidate.arms > 1;
  const byPeak = new Map(candidate.assignments.map((one) => [one.peak, one]));
  const aside = new Set(setAside.map(({ peak }) => peak));
  const places = Math.max(0, ...peaks.list.map(({ position }) => (plain(position ?? 0).split(".")[1] ?? "").length));
  const corrected = candidate.corrections.length > 0;
  return table(
    [
      { title: "peak", align: "right" },
      { title: vectors ? "h k l" : "position", align: "right" },
      ...(vectors || peaks.kind === "q" ? [] : [{ title: "computed", align: "right" as const }]),
      ...(vectors
        ? []
        : [
            { title: corrected ? "Q corrected" : "Q / Å⁻¹", align: "right" as const },
            { title: "Q computed", align: "right" as const },
          ]),
      { title: "H ± k" },
      ...(several ? [{ title: "arm", align: "right" as const }] : []),
      { title: "off / s.u.", align: "right" },
      { title: "others near", align: "right" },
    ],
    peaks.list.map((peak) => {
      const found = byPeak.get(peak.index);
      const q = found && corrected ? found.q + found.residual : peak.q;
      return [
        String(peak.index + 1),
        vectors ? (peak.hkl ?? []).map((entry) => decimals(entry, 4)).join(" ") : decimals(peak.position, places),
        ...(vectors || peaks.kind === "q" ? [] : [found ? decimals(inListUnit(found.q, peaks), places) : ""]),
        ...(vectors ? [] : [decimals(q, 5), decimals(found?.q ?? null, 5)]),
        found ? lineText(found) : aside.has(peak.index) ? "set aside" : "not matched",
        ...(several ? [found ? String(found.arm + 1) : ""] : []),
        found ? decimals(offsetOf(found, peak.uncertainty), 2) : "",
        found && found.alternatives.length > 0 ? String(found.alternatives.length) : "",
      ];
    }),
  );
}

/** A computed Q as d or 2θ (Bragg's law), whichever the list has. */
function inListUnit(q: number, { kind, wavelengthAngstrom }: PeaksRecord): number | null {
  if (kind === "d") return (2 * Math.PI) / q;
  if (wavelengthAngstrom === null) return null;
  const sine = (q * wavelengthAngstrom) / (4 * Math.PI);
  return sine > 1 ? null : (360 / Math.PI) * Math.asin(sine);
}

/** Observed less computed in standard uncertainties; of three indices the one that is off most. */
export function offsetOf({ residual, residualHkl }: AssignmentRecord, uncertainty: number): number | null {
  if (!(uncertainty > 0)) return null;
  if (residualHkl === null) return residual / uncertainty;
  return Math.max(...residualHkl.map(Math.abs)) / uncertainty;
}
