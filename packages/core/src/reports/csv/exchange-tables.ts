import type { ExchangeRecord } from "../records/exchange.js";
import type { OnsetRecord } from "../records/onset.js";
import { csvText } from "./csv-text.js";

/** The phase diagram where there is one, a row for each point; else the bonds. */
export function exchangeCsv(record: ExchangeRecord): string {
  const { diagram } = record;
  if (diagram !== null)
    return csvText(
      [...diagram.axes.map(({ name }) => `j${name}`), "energy_per_spin", "phase", "dimension", "k", "forms"],
      diagram.points.map(({ values, energy, phase, k }) => [
        ...values,
        energy,
        phase,
        diagram.phases[phase]?.dimension ?? null,
        k.map(({ numeric }) => (numeric ?? []).join(" ")).join("; "),
        (diagram.phases[phase]?.forms ?? []).join("; "),
      ]),
    );
  return csvText(
    ["bonds", "shell", "length_angstrom", "from", "to", "bonds_per_primitive_cell", "neighbours", "j", "vector"],
    record.shells.flatMap(({ number, distance, classes }) =>
      classes.map(({ name, labels, bonds, neighbours, j, vector }) => [
        name,
        number,
        distance,
        labels[0] ?? "",
        labels[1] ?? "",
        bonds,
        neighbours.map(({ label, count }) => `${label} ${count}`).join("; "),
        j,
        vector.join(" "),
      ]),
    ),
  );
}

/** A row for each peak. */
export function onsetCsv(record: OnsetRecord): string {
  const transitionOf = (peak: number) => record.transitions.findIndex(({ peaks }) => peaks.includes(peak));
  return csvText(
    [
      "peak",
      "behaviour",
      "transition",
      "t_n_kelvin",
      "t_n_su",
      "beta",
      "beta_su",
      "amplitude",
      "amplitude_su",
      "background",
      "background_su",
      "chi_squared",
      "degrees_of_freedom",
      "reduced_range",
      "evidence",
    ],
    record.peaks.map(({ name, behaviour, fit, evidence }, index) => [
      name,
      behaviour,
      fit === null ? null : transitionOf(index),
      fit?.transition.value ?? null,
      fit?.transition.su ?? null,
      fit?.beta.value ?? null,
      fit?.beta.su ?? null,
      fit?.amplitude.value ?? null,
      fit?.amplitude.su ?? null,
      fit?.background.value ?? null,
      fit?.background.su ?? null,
      fit?.chiSquared ?? null,
      fit?.degreesOfFreedom ?? null,
      fit?.reducedRange ?? null,
      evidence,
    ]),
  );
}
