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
      `Ranking (${counted(record.ranking.length, "configuration")})`,
      rankingTable(record, shownRanks),
      [""],
      paragraph(
        "Criterion: χ² + parameters · ln(intensities); of two that lie less than 6 apart the data prefer neither. Parameters: those that the data see.",
      ),
    ),
    ...struckSection(record),
    ...family.slice(0, shownMoments).flatMap((one) => momentSection(record, one)),
    ...separationSection(family),
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
      ["File", `${data.file}: ${counted(data.list.length + record.unassigned.length, "intensity", "intensities")}`],
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
export function domainText({ domains }: WeighedRecord): string {
  const shares = domains.map(
    ({ operator, fraction, su }) =>
      `${su === null || su === 0 ? decimals(fraction, 3) : withUncertainty(fraction, su)} (${operator})`,
  );
  return `Domains: ${namesOf(shares, shownDomains)}.`;
}

function numbersText({ lorentz, sample, wavelengthAngstrom, scatteringAngleDeg }: WeighDataRecord): string {
  if (!lorentz) return "|F|², without Lorentz factor";
  if (scatteringAngleDeg !== null)
    return `integrated intensities by time of flight with the Lorentz factor d⁴ sin θ, 2θ = ${plain(scatteringAngleDeg)}°`;
  const factor = sample === "powder" ? "1/(sin θ sin 2θ)" : "1/sin 2θ";
  return `integrated intensities with the Lorentz factor ${factor}, λ = ${plain(wavelengthAngstrom ?? 0)} Å`;
}

/** What the sizes of moments rest on. */
export function scaleText({ relative, data, ranking }: WeighRecord): string {
  if (relative) return "not known: moments are relative";
  const scale = data.scale ?? ranking[0]?.scale ?? null;
  const text = scale === null ? "" : `${short(scale)} per |F|² of 10⁻²⁴ cm²`;
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
      { title: "criterion", align: "right" },
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
export function rankingRow(one: WeighedRecord, index: number, ranking: readonly WeighedRecord[]): string[] {
  const first = ranking.findIndex(({ id }) => id === one.id || one.sameAs.includes(id));
  return [
    `${Math.min(first, index) + 1}${one.sameAs.length > 0 ? "=" : ""}`,
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

/** Names, the first ones and how many more. */
export function namesOf(names: readonly string[], most: number): string {
  const more = names.length - most;
  return `${names.slice(0, most).join(", ")}${more > 0 ? ` ${unbroken(`and ${more} more`)}` : ""}`;
}

export function short(value: number): string {
  return value >= 1000 ? value.toFixed(0) : String(Number(value.toPrecision(4)));
}

export function percent(share: number): string {
  return `${(100 * share).toFixed(1)} %`;
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

/** The best configuration and those that the data do not tell from it, best first. */
function familyOf({ ranking }: WeighRecord, best: WeighedRecord): WeighedRecord[] {
  return ranking.filter((one) => one === best || best.sameAs.includes(one.id));
}

function momentSection({ relative }: WeighRecord, one: WeighedRecord): string[] {
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
    one.domains.length > 1 ? ["", ...paragraph(domainText(one))] : [],
    notes.length === 0 ? [] : ["", ...notes.flatMap((text) => paragraph(text))],
  );
}

function momentRow(moment: WeighMomentRecord): string[] {
  return [
    moment.label,
    moment.position.map((entry) => plain(Number(entry.toFixed(4)))).join(", "),
    ...moment.momentCrystal.map((entry) => decimals(entry, 2)),
    moment.size !== null && moment.sizeSu !== null && moment.sizeSu > 0
      ? withUncertainty(moment.size, moment.sizeSu)
      : decimals(moment.largest, 2),
    moment.limit === null ? "–" : plain(moment.limit),
    moment.aboveLimit ? "above the limit" : "",
  ];
}

/** What must be known beside the moments of one candidate. */
export function notesOn(one: WeighedRecord, relative: boolean): string[] {
  const unknown = one.amplitudes.filter(({ determined }) => !determined).map(({ label }) => label);
  const others = one.minima.length - 1;
  return [
    ...(relative && one.factorToLimit !== null
      ? [`Times ${short(one.factorToLimit)} the largest moment is what its ion can have.`]
      : []),
    ...(unknown.length > 0
      ? [
          `Not determined by these data: ${unknown.join(", ")}. The moments shown are one choice of many that fit equally well.`,
        ]
      : []),
    ...(one.freePhase ? ["The common phase of the wave is free: no diffraction sees it."] : []),
    ...(others > 0
      ? [
          `${counted(others, "other arrangement")} of this configuration ${others === 1 ? "fits" : "fit"} as well: one of them is shown.`,
        ]
      : []),
    ...(one.moments.some(({ aboveLimit }) => aboveLimit)
      ? ["A moment is above what its ion can have: the scale, the ion or the arrangement is wrong."]
      : []),
  ];
}

function separationSection(family: readonly WeighedRecord[]): string[] {
  const [best] = family;
  if (best === undefined || family.length === 1) return [];
  return section(
    `Not told apart: ${namesOf(
      family.map(({ id }) => id),
      8,
    )}`,
    best.separations.flatMap(({ from, text }) => paragraph(`${best.id} and ${from}: ${text}`, 2, 2)),
    best.identicalTo.length === 0
      ? []
      : paragraph(`The very same intensities as ${best.id}: ${namesOf(best.identicalTo, 8)}.`),
  );
}

function comparisonSection({ data, ranking }: WeighRecord): string[] {
  const shown = ranking.slice(0, shownColumns);
  if (shown.length === 0) return [];
  return section(
    "Observed and calculated",
    table(
      [
        { title: data.sample === "powder" ? "peak" : "h k l" },
        ...(data.sample === "powder" ? [{ title: "Q / Å⁻¹", align: "right" as const }] : []),
        { title: "observed", align: "right" },
        ...shown.map(({ id }) => ({ title: id, align: "right" as const })),
      ],
      data.list.map(({ label, q, observed, su }, index) => [
        label,
        ...(data.sample === "powder" ? [decimals(q, 4)] : []),
        withUncertainty(observed, su),
        ...shown.map(({ calculated }) => calculatedText(calculated[index] ?? 0, su)),
      ]),
    ),
  );
}

/** As many decimals as the uncertainty of the observed value has. */
export function calculatedText(value: number, su: number): string {
  return decimals(value, Math.max(0, Math.min(6, 1 - Math.floor(Math.log10(su)))));
}

/** The remarks of the weighing, and what was left out. */
export function remarksOn(record: WeighRecord): string[] {
  return [...record.remarks, ...record.bounded.map((what) => `Left out because of the limit: ${what}.`)];
}
