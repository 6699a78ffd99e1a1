import { withUncertainty } from "../../numbers/index.js";
import type {
  WeighDataRecord,
  WeighedRecord,
  WeighIonRecord,
  WeighMomentRecord,
  WeighRecord,
} from "../records/weigh.js";
import { fields, paragraph, section, table, unbroken } from "./layout.js";
import { cellText, counted, decimals, groupText, kText, plain } from "./names.js";
import { familyOf, leftOutTexts, notesOn, tieTexts } from "./weigh-notes.js";
import { namesOf, percent, short } from "./weigh-words.js";

/** Candidates whose moments, and whose calculated intensities, are printed; the JSON has all. */
const shownMoments = 3;
const shownColumns = 4;
/** Domains of one candidate. */
const shownDomains = 8;
/** Rows of the ranking. */
const shownRanks = 20;
/** Atoms of one candidate. */
const shownAtoms = 24;

export function weighText(record: WeighRecord): string[] {
  const best = record.ranking[0];
  const family = best === undefined ? [] : familyOf(record, best);
  return [
    ...headSection(record),
    ...section(
      "Left out",
      leftOutTexts(record).flatMap((text) => paragraph(text)),
    ),
    ...section(
      `Ranking (${counted(record.ranking.length, "configuration")})`,
      rankingTable(record, shownRanks),
      [""],
      paragraph(
        "BIC, the Bayesian information criterion: χ² + parameters · ln(intensities); of two that lie less than 6 apart the data prefer neither. Parameters: those that the data see.",
      ),
    ),
    ...struckSection(record),
    ...family.slice(0, shownMoments).flatMap((one) => momentSection(record, one)),
    ...tieSection(record),
    ...comparisonSection(record),
    ...section(
      "What this says",
      remarksOn(record).flatMap((text) => paragraph(text)),
    ),
  ];
}

/** The page of `kvane run` has the ranking alone. */
export function weighSummary(record: WeighRecord, rows: number): string[] {
  return [
    ...rankingTable(record, rows),
    ...struckLines(record),
    ...leftOutTexts(record).flatMap((text) => paragraph(text)),
    ...remarksOn(record).flatMap((text) => paragraph(text)),
  ];
}

function headSection(record: WeighRecord): string[] {
  const { data } = record;
  return section(
    "Intensities",
    fields([
      ["Group", groupText(record.group)],
      ["Cell", cellText(record.cell)],
      ["k", kText(record.k)],
      ["File", usedText(record)],
      ["Sample", data.sample],
      ["Numbers", numbersText(data)],
      ["Scale", scaleText(record)],
      ...(data.sample === "powder" ? [["Resolution", `${plain(data.resolution)} Å⁻¹`] as const] : []),
      ...settingsOf(data),
      ["Uncertainties", data.uncertaintySource],
      ...record.ions.map(
        (one) => [one.label, `${ionText(one)}${one.limit === null ? "" : `, at most ${plain(one.limit)} μB`}`] as const,
      ),
    ]),
  );
}

/** How many intensities were read and used. */
export function usedText({ data, leftOut }: WeighRecord): string {
  const used = data.list.length;
  const total = used + leftOut.length;
  const all = counted(total, "intensity", "intensities");
  return `${data.file}: ${all}${used === total ? "" : `, ${used} used`}`;
}

/** What was said beside the list, where it is not the usual. */
export function settingsOf(data: WeighDataRecord): (readonly [string, string])[] {
  const polarized = data.list.filter(({ polarization }) => (polarization ?? 0) !== 0).length;
  return [
    ...(data.nuclearFile === null ? [] : [["Nuclear lines", data.nuclearFile] as const]),
    ...(data.includesNuclear ? [["Nuclear part", "in the intensities"] as const] : []),
    ...(data.displacement > 0 ? [["Displacement", `B = ${plain(data.displacement)} Å² for all atoms`] as const] : []),
    ...(data.sample === "single crystal"
      ? [["Domains", data.domains === "free" ? "fractions fitted" : "equal fractions"] as const]
      : []),
    ...(polarized > 0 ? [["Polarized beam", `in ${counted(polarized, "intensity", "intensities")}`] as const] : []),
  ];
}

export function ionText({ ion, formFactor }: WeighIonRecord): string {
  return ion === "" ? `form factor ${formFactor}` : `${ion}, form factor ${formFactor}`;
}

/** The peaks on which a configuration gives nothing, with their satellites where the label does not say them. */
export function struckPeaks({ peaks, satellites }: WeighRecord["struckOut"][number]): string[] {
  return peaks.map((label, index) => {
    const satellite = satellites[index] ?? label;
    return satellite === label ? label : `${label} ${satellite}`;
  });
}

/** Fractions of the domains, by the operator that makes each of the first. */
export function domainText({ domains }: WeighedRecord, fitted: boolean): string {
  const shares = domains.map(
    ({ operator, fraction, su }) =>
      `${su === null || su === 0 ? decimals(fraction, 3) : withUncertainty(fraction, su)} (${operator})`,
  );
  const open = domains.some(({ su }) => su === null);
  return `Domains: ${namesOf(shares, shownDomains)}.${open && fitted ? " Fractions without an uncertainty are not determined by these data." : ""}`;
}

/** What the numbers of the list are. */
export function numbersText({ lorentz, sample, wavelengthAngstrom, scatteringAngleDeg }: WeighDataRecord): string {
  if (!lorentz) return "|F|², without Lorentz factor";
  if (scatteringAngleDeg !== null)
    return `integrated intensities by time of flight with the Lorentz factor d⁴ sin θ, 2θ = ${plain(scatteringAngleDeg)}°`;
  const factor = sample === "powder" ? "1/(sin θ sin 2θ)" : "1/sin 2θ";
  return `integrated intensities with the Lorentz factor ${factor}, λ = ${plain(wavelengthAngstrom ?? 0)} Å`;
}

/** What the sizes of moments rest on. */
export function scaleText({ relative, data, ranking }: WeighRecord): string {
  if (relative) return "not known: moments are relative";
  const [best] = ranking;
  const scale = data.scale ?? best?.scale ?? null;
  const su = best?.scaleSu ?? 0;
  const number = scale === null ? "" : su > 0 ? withUncertainty(scale, su) : short(scale);
  const text = scale === null ? "" : `${number} per |F|² of 10⁻²⁴ cm²`;
  return data.scale === null ? `from nuclear lines${text === "" ? "" : `: ${text}`}` : text;
}

/** One line for each configuration, best first. */
export function rankingTable({ ranking }: WeighRecord, rows: number): string[] {
  const [best] = ranking;
  if (best === undefined) return paragraph("No configuration is left.");
  const lines = table(
    [
      { title: "", align: "right" },
      { title: "id" },
      { title: "irreps" },
      { title: "χ²", align: "right" },
      { title: "χ²/dof", align: "right" },
      { title: "R", align: "right" },
      { title: "parameters", align: "right" },
      { title: "BIC", align: "right" },
      { title: "not told from" },
    ],
    ranking.slice(0, rows).map((one, index) => rankingRow(one, index, ranking)),
  );
  const more = ranking.length - rows;
  return [...lines, ...(more > 0 ? paragraph(`and ${counted(more, "more configuration")}`) : [])];
}

/** Names in the last column. */
const shownSame = 4;

/** One line of the ranking; those that cannot be told from a better one share its rank. */
export function rankingRow(one: WeighedRecord, _index: number, ranking: readonly WeighedRecord[]): string[] {
  const shared = ranking.some(({ id, rank }) => id !== one.id && rank === one.rank);
  return [
    `${one.rank}${shared ? "=" : ""}`,
    one.id,
    one.irreps.join("+"),
    short(one.chiSquared),
    one.reducedChiSquared === null ? "–" : short(one.reducedChiSquared),
    percent(one.rFactor),
    String(one.parameters),
    decimals(one.criterion, 1),
    namesOf(one.sameAs, shownSame),
  ];
}

function struckSection(record: WeighRecord): string[] {
  return section(
    `Struck out (${counted(record.struckOut.length, "configuration")})`,
    record.struckOut.length === 0
      ? []
      : [
          ...table(
            [{ title: "id" }, { title: "irreps" }, { title: "zero, but observed" }],
            record.struckOut.map((one) => [one.id, one.irreps.join("+"), namesOf(struckPeaks(one), 6)]),
          ),
          "",
          ...paragraph("These give nothing on the lines named, whatever their amplitudes are."),
        ],
  );
}

function struckLines({ struckOut }: WeighRecord): string[] {
  return struckOut.length === 0
    ? []
    : paragraph(
        `Struck out: ${struckOut.map((one) => `${one.id} (zero on ${namesOf(struckPeaks(one).map(unbroken), 2)})`).join(", ")}.`,
      );
}

function momentSection({ relative, data }: WeighRecord, one: WeighedRecord): string[] {
  const unit = relative ? "relative" : "μB";
  const notes = notesOn(one, relative);
  const constant = one.moments.every(({ size }) => size !== null);
  return section(
    `Moments of ${one.id} (${unit})`,
    table(
      [
        { title: "atom" },
        { title: "x, y, z" },
        { title: "along a", align: "right" },
        { title: "along b", align: "right" },
        { title: "along c", align: "right" },
        { title: constant ? "size" : "largest size", align: "right" },
        { title: "limit/μB", align: "right" },
        { title: "" },
      ],
      one.moments.slice(0, shownAtoms).map(momentRow),
    ),
    one.moments.length > shownAtoms ? paragraph(`and ${counted(one.moments.length - shownAtoms, "more atom")}`) : [],
    one.domains.length > 1 ? ["", ...paragraph(domainText(one, data.domains === "free"))] : [],
    notes.length === 0 ? [] : ["", ...notes.flatMap((text) => paragraph(text))],
  );
}

export function sizeText({ largest, largestSu }: WeighMomentRecord): string {
  return largestSu !== null && largestSu > 0 ? withUncertainty(largest, largestSu) : decimals(largest, 2);
}

function momentRow(moment: WeighMomentRecord): string[] {
  return [
    moment.label,
    moment.position.map((entry) => plain(Number(entry.toFixed(4)))).join(", "),
    ...moment.momentCrystal.map((entry) => decimals(entry, 2)),
    sizeText(moment),
    moment.limit === null ? "–" : plain(moment.limit),
    moment.aboveLimit ? "above the limit" : "",
  ];
}

function tieSection(record: WeighRecord): string[] {
  const [best] = record.ranking;
  if (best === undefined || best.sameAs.length === 0) return [];
  return section(
    `Not told apart: ${namesOf([best.id, ...best.sameAs], 8)}`,
    tieTexts(record).flatMap((text) => paragraph(text, 2, 2)),
  );
}

function comparisonSection({ data, ranking }: WeighRecord): string[] {
  const shown = ranking.slice(0, shownColumns);
  if (shown.length === 0) return [];
  const powder = data.sample === "powder";
  const polarized = data.list.some(({ polarization }) => polarization !== null);
  return section(
    "Observed and calculated",
    table(
      [
        { title: powder ? "peak" : "h k l" },
        ...(powder ? [{ title: "lines" }, { title: "Q / Å⁻¹", align: "right" as const }] : []),
        ...(polarized ? [{ title: "P", align: "right" as const }] : []),
        { title: "observed", align: "right" },
        ...shown.map(({ id }) => ({ title: id, align: "right" as const })),
      ],
      data.list.map(({ label, lines, q, observed, su, polarization }, index) => [
        label,
        ...(powder ? [linesText(lines), decimals(q, 4)] : []),
        ...(polarized ? [polarization === null ? "–" : plain(polarization)] : []),
        withUncertainty(observed, su),
        ...shown.map(({ calculated }) => calculatedText(calculated[index] ?? 0, su)),
      ]),
    ),
  );
}

/** The first line of a peak, and how many more lie under it. */
export function linesText(lines: readonly string[]): string {
  const [first] = lines;
  return first === undefined ? "–" : unbroken(`${first}${lines.length > 1 ? `, ${lines.length - 1} more` : ""}`);
}

/** As many decimals as the uncertainty of the observed value has. */
export function calculatedText(value: number, su: number): string {
  return decimals(value, Math.max(0, Math.min(6, 1 - Math.floor(Math.log10(su)))));
}

/** The remarks of the weighing, and what was not looked at. */
export function remarksOn(record: WeighRecord): string[] {
  return [
    ...record.remarks,
    ...defaultsText(record.data),
    ...record.bounded.map((what) => `Left out because of the limit: ${what}.`),
  ];
}

/** What rests on uncertainties that nobody measured. */
function defaultsText({ uncertaintySource }: WeighDataRecord): string[] {
  return uncertaintySource.includes("by default")
    ? ["Uncertainties are taken by default: χ², the BIC and all that rests on them are only as good as these."]
    : [];
}
