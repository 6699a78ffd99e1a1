import type { KRecord } from "../records/common.js";
import type { DiagramRecord, ExchangeRecord } from "../records/exchange.js";
import type { OnsetRecord } from "../records/onset.js";
import { phaseLetter } from "../text/exchange-diagram-text.js";
import { kForm } from "../text/names.js";
import { type CsvCell, csvText } from "./csv-text.js";

/** The phase diagram where there is one, a row for each point; else the energies of the model; else the bonds. */
export function exchangeCsv(record: ExchangeRecord): string {
  const { diagram, ground } = record;
  if (diagram !== null) return diagramCsv(diagram);
  return ground === null ? bondsCsv(record) : energiesCsv(record);
}

/** Phases have the letters of the text and the drawing. */
function diagramCsv({ axes, points, phases }: DiagramRecord): string {
  return csvText(
    [...axes.map(({ name }) => `j${name}`), "energy_per_spin", "phase", "dimension", "k", "forms"],
    points.map(({ values, energy, phase, k }) => [
      ...values,
      energy,
      phaseLetter(phase),
      phases[phase]?.dimension ?? null,
      k.map(numbersText).join("; "),
      (phases[phase]?.forms ?? []).join("; "),
    ]),
  );
}

/**
 * Energies of the eigenvectors of J(k), then those of the arrangements, lowest first: each from lowest to highest where
 * amplitudes are free.
 */
function energiesCsv({ atK, configurations }: ExchangeRecord): string {
  return csvText(
    ["what", "k", "k_numeric", "id", "irreps", "direction", "free_amplitudes", "energy_lowest", "energy_highest"],
    [
      ...atK.flatMap(({ k, from, levels }) =>
        levels.map(({ energy, magneticIrreps }): CsvCell[] => [
          from === "minimum" ? "eigenvalue at the minimum" : "eigenvalue at the given k",
          kForm(k),
          numbersText(k),
          null,
          magneticIrreps
            .map(({ label, multiplicity }) => (multiplicity === 1 ? label : `${multiplicity} ${label}`))
            .join("+"),
          null,
          null,
          energy,
          energy,
        ]),
      ),
      ...configurations.map(({ id, k, irreps, direction, amplitudes, lowest, highest }): CsvCell[] => [
        "arrangement",
        kForm(k),
        numbersText(k),
        id,
        irreps.join("+"),
        direction,
        amplitudes,
        lowest,
        highest,
      ]),
    ],
  );
}

function numbersText({ numeric }: KRecord): string {
  return (numeric ?? []).join(" ");
}

function bondsCsv({ shells }: ExchangeRecord): string {
  return csvText(
    ["bonds", "shell", "length_angstrom", "from", "to", "bonds_per_primitive_cell", "neighbours", "j", "vector"],
    shells.flatMap(({ number, distance, classes }) =>
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
