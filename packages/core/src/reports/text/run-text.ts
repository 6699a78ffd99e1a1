import { physicalSets } from "../physical-sets.js";
import { commensurateOnes, modulatedOnes } from "../records/configurations.js";
import type { BranchRecord, RunRecord } from "../records/run.js";
import type { OverlapRecord } from "../records/satellites.js";
import type { PeaksRecord } from "../records/search.js";
import { configurationsText, configurationTable } from "./configurations-text.js";
import { diagramSection, exchangeSummary, exchangeText } from "./exchange-text.js";
import { peaksText } from "./flag-text.js";
import { irrepsText, irrepTable } from "./irreps-text.js";
import { fields, paragraph, section, table, unbroken } from "./layout.js";
import { decompositionText, modesText, parameterText } from "./modes-text.js";
import { modulatedTable } from "./modulated-text.js";
import { cellText, counted, groupText, kText, positionText } from "./names.js";
import { kSections, onsetText, transitionSection } from "./onset-text.js";
import { satellitesText, satelliteTable } from "./satellites-text.js";
import { assignmentTable, candidateTable, certificateLines, peakFields, separationLines } from "./search-text.js";
import { severalVectorLines } from "./several-vectors-text.js";
import { starFields, starText } from "./star-text.js";
import { weighSummary, weighText } from "./weigh-text.js";

/** Satellites and candidates that the short report shows. */
const shownSatellites = 8;
const shownCandidates = 6;
const shownConfigurations = 12;

/** The page that the whole job prints, in the order in which a user asks. */
export function runShortText(record: RunRecord): string[] {
  return [
    ...headSection(record),
    ...peakSection(record),
    ...searchSection(record),
    ...record.branches.flatMap((branch, index) => branchText(branch, record.branches.length > 1 ? index + 1 : null)),
    ...(record.exchange === null ? [] : section("Exchange model", fields(exchangeSummary(record.exchange)))),
    ...(record.exchange?.diagram ? diagramSection(record.exchange.diagram) : []),
    ...(record.onset === null ? [] : [...transitionSection(record.onset), ...kSections(record.onset.k)]),
    ...section(
      "Next",
      record.next.flatMap((text, index) => paragraph(`${index + 1}. ${text}`, 2, 3)),
    ),
    ...section(
      "Files",
      record.files.flatMap((name) => paragraph(name)),
    ),
  ];
}

/** The short report and behind it everything that was computed, branch by branch. */
export function runFullText(record: RunRecord): string[] {
  const several = record.branches.length > 1;
  return [
    ...runShortText(record),
    ...(record.search ?? { candidates: [] }).candidates.flatMap((candidate, index) =>
      record.peaks && (candidate.evidence.reading !== "not informative" || index === 0)
        ? section(
            `Assignment by candidate ${index + 1}, ${kText(candidate.k)}`,
            assignmentTable(candidate, record.peaks, record.search?.setAside),
          )
        : [],
    ),
    ...record.branches.flatMap((branch, index) => [
      ...(several ? [`Branch ${index + 1}: k = ${kText(branch.k)}`, ""] : []),
      ...starText(branch.star),
      ...irrepsText(branch.irreps),
      ...modesText(branch.modes),
      ...(branch.configurations === null ? [] : configurationsText(branch.configurations)),
      ...(branch.satellites ? satellitesText(branch.satellites) : []),
      ...(branch.weigh ? weighText(branch.weigh) : []),
    ]),
    ...(record.exchange === null ? [] : exchangeText(record.exchange)),
    ...(record.onset === null ? [] : onsetText(record.onset)),
  ];
}

function headSection(record: RunRecord): string[] {
  return section(
    record.title ?? "Study",
    fields([["Group", groupText(record.group)], ...(record.cell ? [["Cell", cellText(record.cell)] as const] : [])]),
  );
}

function peakSection({ peaks, search, coincidences }: RunRecord): string[] {
  if (peaks === null) return [];
  const aside = search?.setAside ?? [];
  return section(
    "Peaks",
    fields([
      ...peakFields(peaks),
      ...(aside.length === 0
        ? []
        : [["Set aside", aside.map(({ peak, because }) => `${peak + 1} (${because})`).join(", ")] as [string, string]]),
      ["Taken as satellites", satelliteCount(peaks, aside.length)],
      ...coincidenceFields(coincidences, peaks.list.length),
    ]),
  );
}

/** Peaks that may hold something else too, by what that is; the JSON says which lines. */
function coincidenceFields(coincidences: RunRecord["coincidences"], count: number): [string, string][] {
  const peaksOn = (kind: OverlapRecord["with"]) =>
    coincidences.filter(({ overlaps }) => overlaps.some((one) => one.with === kind)).map(({ peak }) => peak + 1);
  const fieldFor = (name: string, numbers: readonly number[]): [string, string][] => {
    const named =
      numbers.length === 0
        ? ""
        : peaksText(
            numbers.map((number) => number - 1),
            count,
          );
    return numbers.length > 0 ? [[name, `${named} (flagged, not removed)`]] : [];
  };
  return [
    ...fieldFor("On nuclear lines", peaksOn("nuclear")),
    ...fieldFor("On λ/2 images", peaksOn("half wavelength")),
  ];
}

function satelliteCount(peaks: PeaksRecord, aside: number): string {
  return `${peaks.list.length - aside} of ${peaks.list.length}`;
}

function searchSection(record: RunRecord): string[] {
  const { search } = record;
  if (search === null) return [];
  const followed = record.branches.flatMap(({ candidate }) => (candidate === null ? [] : [candidate + 1]));
  return section(
    "Wave vector",
    candidateTable(search.candidates.slice(0, shownCandidates)),
    moreLine(search.candidates.length - shownCandidates, "candidate"),
    search.certificate
      ? ["", ...certificateLines(search), ...separationLines(search), ...severalVectorLines(search)]
      : [],
    search.certificate && followed.length > 0
      ? paragraph(`Followed below: ${followed.length === 1 ? "candidate" : "candidates"} ${followed.join(", ")}.`)
      : [],
    record.notFollowed.length > 0
      ? paragraph(`Tied but not followed: candidate ${record.notFollowed.map((index) => index + 1).join(", ")}.`)
      : [],
  );
}

function moreLine(count: number, what: string): string[] {
  return count > 0 ? paragraph(`and ${counted(count, `more ${what}`)}`) : [];
}

function branchText(branch: BranchRecord, number: number | null): string[] {
  const name = number === null ? "" : `Branch ${number}: `;
  return [
    ...section(
      `${name}Symmetry of k = ${kText(branch.k)}`,
      starFields(branch.star).slice(2),
      [""],
      irrepTable(branch.irreps.irreps),
    ),
    ...section(`${name}Modes`, modeSummary(branch), [""], paragraph(letterText(branch))),
    ...configurationSummary(branch, name),
    ...satelliteSummary(branch, name),
    ...weightSummary(branch, name),
  ];
}

/** What the letters of the table mean; `kx` in its exponents is a component of k. */
function letterText({ star }: BranchRecord): string {
  if (star.minusK === "equivalent") return "Letters are free real amplitudes.";
  return "Letters u, v, w, p, … are free complex amplitudes; kx, ky, kz are the components of k.";
}

/** For each site the decomposition, and for each irrep the arrangement in symbols. */
function modeSummary({ irreps, modes }: BranchRecord): string[] {
  const sets = physicalSets(irreps);
  return modes.sites.flatMap((site, index) => [
    ...(index > 0 ? [""] : []),
    ...fields([
      [
        site.label,
        `${decompositionText(site)}; atoms ${site.orbit.map((one, atom) => unbroken(`${atom + 1} ${positionText(one)}`)).join("  ")}`,
      ],
    ]),
    ...table(
      [{ title: "irrep" }, { title: "free", align: "right" }, { title: "allowed S on atoms 1, 2, … along a, b, c" }],
      sets
        .flatMap((set) => {
          const irrep = site.irreps.find(({ label, multiplicity }) => set.includes(label) && multiplicity > 0);
          return irrep === undefined ? [] : [{ irrep, name: set.join(" ⊕ ") }];
        })
        .map(({ irrep, name }) => [
          name,
          parameterText(irrep).split(";")[0] ?? "",
          irrep.constraint.map(unbroken).join("  "),
        ]),
      4,
    ),
  ]);
}

/** One line each; the full report and `kvane configurations` have the rest. */
function configurationSummary({ configurations }: BranchRecord, name: string): string[] {
  if (configurations === null || configurations.configurations.length === 0) return [];
  const [all, modulated] = [commensurateOnes(configurations), modulatedOnes(configurations)];
  return section(
    `${name}Configurations`,
    all.length > 0 ? configurationTable(all.slice(0, shownConfigurations)) : [],
    modulated.length > 0 ? modulatedTable(modulated.slice(0, shownConfigurations)) : [],
    moreLine(configurations.configurations.length - shownConfigurations, "configuration"),
    configurations.bounded.flatMap((what) => paragraph(`Left out because of the limit: ${what}.`)),
  );
}

/** The ranking alone; the full report and `kvane weigh` have moments and intensities. */
function weightSummary({ weigh }: BranchRecord, name: string): string[] {
  return weigh === null ? [] : section(`${name}Fits to intensities`, weighSummary(weigh, shownConfigurations));
}

function satelliteSummary({ satellites }: BranchRecord, name: string): string[] {
  if (satellites === null) return [];
  const shown = satellites.reflections.slice(0, shownSatellites);
  return section(
    `${name}Satellites`,
    satelliteTable(shown, satellites),
    moreLine(satellites.reflections.length - shown.length, "line"),
  );
}
