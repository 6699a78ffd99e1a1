import { withUncertainty } from "../../numbers/index.js";
import type {
  MeasuredRecord,
  MovingKRecord,
  OnsetRecord,
  PeakOnsetRecord,
  PowerLawRecord,
  TransitionRecord,
} from "../records/onset.js";
import { fields, paragraph, section, table, unbroken } from "./layout.js";
import { counted, plain } from "./names.js";

export function onsetText(record: OnsetRecord): string[] {
  const fitted = record.peaks.filter(({ fit }) => fit !== null);
  return [
    ...section(
      "Temperature scan",
      fields([
        ["File", record.file],
        ["Columns", columnsText(record)],
        ["Rows", String(record.rows)],
        ["Peaks", String(record.peaks.length)],
      ]),
    ),
    ...transitionSection(record),
    ...(fitted.length === 0
      ? []
      : section("Fits of I = I₀ (1 − T/T_N)^2β + background", fitTable(fitted), [""], rangeNotes(fitted))),
    ...otherSection(record.peaks),
    ...kSections(record.k),
  ];
}

/** What each column was taken as: `T; I1 with s.u. su; I2; k: u with s.u. su2`. */
export function columnsText({ columns }: OnsetRecord): string {
  const texts = columns.flatMap(({ name, as }) => {
    if (as === "uncertainty") return [];
    const su = columns.find(({ of }) => of === name);
    return [unbroken(`${as === "k" ? "k: " : ""}${name}${su === undefined ? "" : ` with s.u. ${su.name}`}`)];
  });
  return texts.join("; ");
}

/** The transitions alone, for the short report of the whole job. */
export function transitionSection({ peaks, transitions }: OnsetRecord): string[] {
  if (peaks.length === 0) return [];
  if (transitions.length === 0)
    return section(
      "Transitions",
      paragraph("No peak has an onset within the range, or only one that a smooth curve describes as well."),
    );
  return section(
    `Transitions (${transitions.length})`,
    table(
      [{ title: "T_N/K", align: "right" }, { title: "peaks" }, { title: "common onset" }],
      transitions.map((one) => [
        measuredText(one.temperature),
        one.peaks.map((index) => peaks[index]?.name ?? "").join(", "),
        commonText(one),
      ]),
    ),
    [""],
    paragraph(
      transitions.length === 1
        ? "One transition explains all onsets."
        : `${counted(transitions.length, "transition")}: a common T_N is improbable (below 0.1 %) for peaks in different rows.`,
    ),
  );
}

/** How well the peaks of a transition agree. */
export function commonText({ probability, peaks }: TransitionRecord): string {
  if (probability === null || peaks.length === 1) return "one peak";
  return `probability of this scatter ${probability < 0.001 ? "below 0.1 %" : `${Number((100 * probability).toPrecision(2))} %`}`;
}

function fitTable(peaks: readonly PeakOnsetRecord[]): string[] {
  return table(
    [
      { title: "peak" },
      { title: "T_N/K", align: "right" },
      { title: "β", align: "right" },
      { title: "I₀", align: "right" },
      { title: "background", align: "right" },
      { title: "χ²/dof", align: "right" },
      { title: "points below T_N", align: "right" },
      { title: "(T_N−T)/T_N to", align: "right" },
    ],
    peaks.map(({ name, fit }) => {
      const law = fit as PowerLawRecord;
      return [
        name,
        measuredText(law.transition),
        measuredText(law.beta),
        measuredText(law.amplitude),
        measuredText(law.background),
        law.uncertaintySource === "given"
          ? plain(Number((law.chiSquared / Math.max(1, law.degreesOfFreedom)).toPrecision(3)))
          : "–",
        `${law.pointsBelow} of ${law.points}`,
        plain(Number(law.reducedRange.toFixed(3))),
      ];
    }),
  );
}

function rangeNotes(peaks: readonly PeakOnsetRecord[]): string[] {
  const bad = peaks.filter(({ fit }) => fit?.fits === false);
  const losing = peaks.filter(({ behaviour }) => behaviour === "loss");
  const based = peaks.filter(({ onBackground }) => onBackground);
  const scatter = peaks.some(({ fit }) => fit?.uncertaintySource === "scatter");
  return [
    ...paragraph(
      `The law holds near T_N only: each fit takes the widest range of (T_N−T)/T_N that it describes, and T_N, β and their s.u. depend on this law and range. A β far from the transition is no critical exponent.${scatter ? " χ²/dof is not tested where uncertainties come from the scatter." : ""}`,
    ),
    ...(bad.length === 0
      ? []
      : paragraph(`The law fits badly even in a narrow range, so that T_N and β are doubtful: ${namesOf(bad)}.`)),
    ...(losing.length === 0 ? [] : paragraph(`Intensity is lost below T_N: ${namesOf(losing)}.`)),
    ...(based.length === 0
      ? []
      : paragraph(
          `Intensity remains above T_N, which may be background or a part that does not order there (nuclear, or k = 0 on a nuclear line): ${namesOf(based)}.`,
        )),
  ];
}

/** What peaks without an onset do. */
export const sentences: { readonly [behaviour: string]: string } = {
  constant:
    "the same at all temperatures: not magnetic, or ordered beyond the range (nuclear, structural, λ/2, sample holder)",
  gradual:
    "changes smoothly without an onset: thermal motion of a nuclear peak, an onset beyond the range, or an onset that a smooth curve describes as well",
  absent: "no intensity at any temperature",
  undecided: "too few points",
};

function otherSection(peaks: readonly PeakOnsetRecord[]): string[] {
  const others = peaks.filter(({ fit }) => fit === null);
  if (others.length === 0) return [];
  return section(
    "Peaks without an onset",
    table(
      [{ title: "peak" }, { title: "what it does" }],
      others.map(({ name, behaviour }) => [name, sentences[behaviour] ?? behaviour]),
    ),
  );
}

/** What k does with temperature. */
export function kSections(components: readonly MovingKRecord[]): string[] {
  if (components.length === 0) return [];
  return section(
    "k against temperature",
    table(
      [
        { title: "component" },
        { title: "it" },
        { title: "level" },
        { title: "slope elsewhere, per K", align: "right" },
      ],
      components.map((one) => [
        one.name,
        behaviourText(one),
        plateauText(one),
        one.slope === null ? "–" : measuredText(one.slope),
      ]),
    ),
  );
}

/** What a component of k does. */
export function behaviourText({ behaviour, plateaus }: MovingKRecord): string {
  if (behaviour !== "lock-in")
    return behaviour === "undecided" ? "too few points" : behaviour === "constant" ? "is constant" : "slides";
  return `slides and locks in at ${plateaus.flatMap(({ fraction }) => fraction ?? []).join(", ")}`;
}

/** Where it is level. */
export function plateauText({ plateaus }: MovingKRecord): string {
  return plateaus
    .map(
      ({ from, to, mean, fraction }) =>
        `${unbroken(`${measuredText(mean)} from ${plain(from)} to ${plain(to)} K`)}${fraction === null ? " (no simple fraction)" : unbroken(` (${fraction})`)}`,
    )
    .join("; ");
}

function namesOf(peaks: readonly PeakOnsetRecord[]): string {
  return peaks.map(({ name }) => name).join(", ");
}

/** `38.50(15)`. */
export function measuredText({ value, su }: MeasuredRecord): string {
  return withUncertainty(value, su);
}
