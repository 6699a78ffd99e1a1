import { breathe, type WorkHost } from "../algorithms/index.js";
import { type Problem, problem } from "../errors/index.js";
import { exactComponents, isHalfLattice, isReciprocalLatticeVector, type WaveVector } from "../kvectors/index.js";
import { isInteger } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { type Weigher, weigher } from "./candidate.js";
import { certificateOf, certificateWarnings, defaultMostBoxes, type SearchedKind } from "./certificate.js";
import type { PeakModel } from "./explanation.js";
import { flagsOf } from "./flags.js";
import { starDistance } from "./near-in-k.js";
import { peakModel } from "./peak-model.js";
import { type Entry, mergeSameFinds } from "./same-find.js";
import { type SearchKind, searchKinds, solutionsOf } from "./search-kind.js";
import { separationsOf } from "./separations.js";
import { severalVectors } from "./several-vectors.js";
import { tiesAmong } from "./ties.js";
import type {
  Candidate,
  Certificate,
  PeakList,
  ReferenceVector,
  Region,
  SearchOptions,
  SearchResult,
} from "./types.js";

/** Candidates that are compared with one another and returned, best first, besides the points. */
const mostCandidates = 60;

/**
 * Searches the k whose satellites are the peaks: every kind of k up to `options.maxDimension`, special points one by
 * one, lines, planes and general k by branch and bound. What matches at least `total − options.unmatched` peaks comes
 * back by falling evidence (the points all of them with `options.belowMinimum`), and the certificate says what was
 * gone through. Candidates of higher kinds beside a simpler one that is the same find are listed under it.
 *
 * Throws `too-few-peaks`, `invalid-peak`, `missing-wavelength`, `cell-contradicts-group`, `interrupted`.
 */
export async function locate(
  group: SpaceGroup,
  cell: Cell,
  peaks: PeakList,
  options: SearchOptions,
  host: WorkHost = {},
): Promise<SearchResult> {
  const modelled = peakModel(group, cell, peaks, options);
  const { model, setAside, powder } = modelled;
  const minimumMatched = Math.max(1, model.total - options.unmatched);
  // A kind with as many free components as there are numbers to match fits whatever they are.
  const numbers = minimumMatched * model.numbersPerPeak;
  const kinds = searchKinds(group, options.maxDimension).filter(
    ({ dimension }) => dimension === 0 || dimension < numbers,
  );
  const weigh = weigher(group, model);
  const searched = await searchAll(kinds, model, minimumMatched, options, host);
  const { entries, regions } = await weighAll(searched, weigh, host);
  const kept = entries.filter(
    ({ candidate, mostMatched, dimension }) =>
      (options.belowMinimum === true && dimension === 0) || Math.max(candidate.matched, mostMatched) >= minimumMatched,
  );
  const distance = starDistance(group, model.primitiveMetric);
  const merged = [...(await mergeSameFinds(kept, model, distance, host))]
    // The sort is stable: equal evidence leaves the order of the kinds, fewest arms first.
    .sort((a, b) => b.candidate.evidence.value - a.candidate.evidence.value);
  const shown = merged.filter(({ dimension }, rank) => rank < mostCandidates || dimension === 0);
  const candidates = compared(shown, model, weigh);
  const certificate = certificateOf(searched, options, minimumMatched);
  const enough = (candidates[0]?.matched ?? 0) >= minimumMatched;
  const several = await severalVectors({ group, peaks: modelled, options, distance, candidates: shown, enough }, host);
  const aside = new Set(setAside.map(({ peak }) => peak));
  return {
    candidates,
    certificate,
    setAside,
    unmatched: candidates[0]?.unmatched ?? peaks.peaks.map(({ index }) => index).filter((index) => !aside.has(index)),
    regions,
    flags: flagsOf(group, cell, powder, options.sites ?? [], options.nuclear?.peaks ?? []),
    references: referencesOf(group, entries),
    dropped: entries.length - kept.length + (merged.length - shown.length),
    severalVectors: several,
    warnings: [
      ...certificateWarnings(certificate),
      ...leftOutWarning(options, certificate, numbers),
      ...repeatedWarning(model),
      ...intensityWarnings(peaks, options),
      ...halfWavelengthWarning(group, candidates[0]),
      ...fewPeaksWarning(model, candidates[0]),
    ],
  };
}

/** Where 2k is a vector of L*, every satellite lies at half of one: no position speaks against λ/2. */
function halfWavelengthWarning(group: SpaceGroup, first: Candidate | undefined): readonly Problem[] {
  if (first === undefined || first.onNuclearLines || !isHalfLattice(group, first.k)) return [];
  return [
    problem(
      "half-wavelength",
      "2k is a reciprocal lattice vector: every satellite lies halfway to one, allowed or not",
      {
        expected: "peaks that neutrons of half the wavelength cannot give",
        found: "positions alone, which cannot exclude them",
        remedy: "measure with a filter or another wavelength, or above the ordering temperature",
      },
    ),
  ];
}

function leftOutWarning(
  { maxDimension }: SearchOptions,
  { maxDimension: searched }: Certificate,
  numbers: number,
): readonly Problem[] {
  if (searched >= maxDimension || numbers > maxDimension) return [];
  return [
    problem("too-few-peaks", `k with ${numbers} free components or more were not searched: they fit any ${numbers}`, {
      expected: "more positions to match than free components",
      found: `${numbers} to match`,
      remedy: "give more peaks, or allow fewer unmatched ones",
    }),
  ];
}

function repeatedWarning({ repeated }: PeakModel): readonly Problem[] {
  if (repeated.length === 0) return [];
  const shown = repeated.slice(0, 10).map((peak) => peak + 1);
  const more = repeated.length - shown.length;
  return [
    problem(
      "repeated-peaks",
      `${repeated.length === 1 ? "peak" : "peaks"} ${shown.join(", ")}${more > 0 ? ` and ${more} more` : ""} stand where another one stands and count once with it`,
      {
        expected: "each line once",
        found: `${repeated.length} repeated`,
        remedy: "give the mean of repeated measurements, with its smaller uncertainty",
      },
    ),
  ];
}

/** What was asked of intensities that are not there. */
function intensityWarnings({ peaks }: PeakList, { weighByIntensity, nuclear }: SearchOptions): readonly Problem[] {
  const without = (list: PeakList["peaks"]) => list.every(({ intensity }) => intensity === null);
  const warn = (what: string): Problem =>
    problem("no-intensities", `${what} has no intensities, so that they change nothing`, {
      expected: "a column of intensities",
      found: "none",
      remedy: "add the column, or leave the option out",
    });
  return [
    ...(weighByIntensity === true && without(peaks) ? [warn("the list of peaks")] : []),
    ...(nuclear !== undefined && without(nuclear.peaks) ? [warn("the list of nuclear lines")] : []),
  ];
}

/** With so few peaks beyond the free components a chance fit is common. */
const fewSpare = 2;

function fewPeaksWarning(model: PeakModel, first: Candidate | undefined): readonly Problem[] {
  const letters = (first?.k.values ?? []).length;
  if (first === undefined || first.evidence.reading === "not informative") return [];
  if (first.residuals.degreesOfFreedom > fewSpare) return [];
  return [
    problem("too-few-peaks", `${first.matched} matched of ${model.total} peaks hardly say which k it is`, {
      expected: `at least ${letters + fewSpare + 1} matched positions for ${letters} free components`,
      found: String(first.matched),
      remedy: "measure more satellites, above all at small Q; whatever the evidence, this is a guess",
    }),
  ];
}

async function searchAll(
  kinds: readonly SearchKind[],
  model: PeakModel,
  wanted: number,
  options: SearchOptions,
  host: WorkHost,
): Promise<readonly SearchedKind[]> {
  const searched: SearchedKind[] = [];
  let boxes = options.mostBoxes ?? defaultMostBoxes;
  for (const [index, kind] of kinds.entries()) {
    await breathe(host);
    host.progress?.(index, kinds.length, "kinds of k");
    const findings = await solutionsOf(kind, model, { wanted, boxes }, host);
    if (kind.dimension > 0) boxes -= findings.boxes;
    searched.push({ kind, findings });
  }
  host.progress?.(kinds.length, kinds.length, "kinds of k");
  return searched;
}

async function weighAll(
  searched: readonly SearchedKind[],
  weigh: Weigher,
  host: WorkHost,
): Promise<{ readonly entries: readonly Entry[]; readonly regions: readonly Region[] }> {
  const dimensions = Math.log(new Set(searched.map(({ kind }) => kind.dimension)).size);
  const entries: Entry[] = [];
  const regions: Region[] = [];
  for (const { kind, findings } of searched) {
    const charges = { dimensions, kinds: Math.log(kind.kindsOfDimension) };
    for (const { k, matched, region } of findings.solutions) {
      await breathe(host);
      const weighed = weigh(k, charges);
      const index = region < 0 ? -1 : regions.length + region;
      entries.push({
        ...weighed,
        candidate: { ...weighed.candidate, region: index < 0 ? null : index },
        dimension: kind.dimension,
        region: index,
        mostMatched: matched,
      });
    }
    regions.push(...findings.regions);
  }
  return { entries, regions };
}

function compared(shown: readonly Entry[], model: PeakModel, weigh: Weigher): readonly Candidate[] {
  const ties = tiesAmong(model, shown);
  const separations = separationsOf(shown, ties, weigh, model.range);
  return shown.map(({ candidate }, index) => ({
    ...candidate,
    tiedWith: ties[index] ?? [],
    separations: separations[index] ?? [],
  }));
}

/** k = 0 and the points with integer components, which only a centred lattice has besides it. */
function referencesOf(group: SpaceGroup, entries: readonly Entry[]): readonly ReferenceVector[] {
  return entries
    .filter(({ dimension, candidate }) => dimension === 0 && isReference(group, candidate.k))
    .map(({ candidate: { k, evidence, matched, total } }) => ({ k, evidence, matched, total }));
}

function isReference(group: SpaceGroup, k: WaveVector): boolean {
  const components = exactComponents(k);
  return components !== null && (components.every(isInteger) || isReciprocalLatticeVector(group, components));
}
