import type { AtlasRecord } from "../records/atlas.js";
import type { CompatibilityRecord } from "../records/compatibility.js";
import {
  type ConfigurationsRecord,
  commensurateOnes,
  modulatedOnes,
  type PropertyRecord,
} from "../records/configurations.js";
import type { ModesRecord } from "../records/modes.js";
import type { OverlapRecord, SatellitesRecord } from "../records/satellites.js";
import type { SearchRecord } from "../records/search.js";
import { type CsvCell, csvText } from "./csv-text.js";

/** One row a line. */
export function satellitesCsv(record: SatellitesRecord): string {
  const header = ["h", "k", "l", "sign", "arm", "q_inverse_angstrom", "d_angstrom", "two_theta_deg", "multiplicity"];
  return csvText(
    [...header, "multiplicity_all_arms", "overlaps", "more_overlaps", "zero_for"],
    record.reflections.map((line) => [
      ...line.h,
      line.sign,
      line.arm,
      line.q,
      line.d,
      line.twoThetaDeg,
      line.multiplicity,
      line.multiplicityAllArms,
      line.overlaps.map(overlapCell).join("; "),
      line.moreOverlaps,
      line.extinctFor === null ? null : line.extinctFor.join(" "),
    ]),
  );
}

/** `nuclear 2 0 0`, `half wavelength 1 0 0 extinct`: what a glide plane or screw axis forbids is marked. */
function overlapCell({ with: kind, h, allowed }: OverlapRecord): string {
  return `${kind} ${h.join(" ")}${allowed ? "" : " extinct"}`;
}

/** One row for each peak of each candidate; `h` to `residual` are empty where the peak is not matched. */
export function searchCsv(record: SearchRecord): string {
  const header = ["candidate", "k", "evidence", "peak", "position", "q_observed", "uncertainty"];
  return csvText(
    [...header, "h", "k_index", "l", "sign", "arm", "q_computed", "residual", "alternatives"],
    record.candidates.flatMap((candidate, index) => {
      const byPeak = new Map(candidate.assignments.map((one) => [one.peak, one]));
      return record.peaks.list.map((peak): CsvCell[] => {
        const found = byPeak.get(peak.index);
        const position = peak.position ?? (peak.hkl ?? []).join(" ");
        return [
          index,
          numericOr(candidate.k.numeric, candidate.k.components),
          candidate.evidence.value,
          peak.index,
          position,
          peak.q,
          peak.uncertainty,
          ...(found ? found.h : [null, null, null]),
          found?.sign ?? null,
          found?.arm ?? null,
          found?.q ?? null,
          found?.residual ?? null,
          found?.alternatives.length ?? null,
        ];
      });
    }),
  );
}

function numericOr(numeric: readonly number[] | null, components: readonly string[]): string {
  return (numeric ?? components).join(" ");
}

/**
 * One row for each atom of each basis vector, on every arm where they are listed; numbers are empty while a letter of k
 * is open. The exact columns are in lattice components, the numbers in those of the convention.
 */
export function modesCsv(record: ModesRecord): string {
  const header = ["site", "arm", "irrep", "copy", "partner", "atom", "x", "y", "z", "exact_a", "exact_b", "exact_c"];
  const axes = record.convention.components === "cartesian" ? ["mx", "my", "mz"] : ["a", "b", "c"];
  const { exponent, phase, factor, components } = record.convention;
  const convention = `exponent ${exponent}; phase ${phase}; factor ${factor}; components ${components}`;
  return csvText(
    [...header, ...axes.flatMap((axis) => [`re_${axis}`, `im_${axis}`]), "convention"],
    record.sites.flatMap((site) =>
      (site.starModes ?? [{ irreps: site.irreps }]).flatMap(({ irreps }, arm) =>
        irreps.flatMap(({ label, modes }) =>
          modes.flatMap((mode) =>
            site.orbit.map((position, atom): CsvCell[] => [
              site.label,
              arm,
              label,
              mode.copy,
              mode.partner,
              atom,
              ...position,
              ...(mode.exact[atom] ?? []),
              ...(mode.moments?.[atom]?.flat() ?? [null, null, null, null, null, null]),
              convention,
            ]),
          ),
        ),
      ),
    ),
  );
}

/** One row a kind, in both classifications. */
export function atlasCsv(record: AtlasRecord): string {
  const header = ["classification", "kind", "k1", "k2", "k3", "dimension", "dimension_pm", "little_co_group", "order"];
  const rows = (classification: string, kinds: AtlasRecord["kinds"]) =>
    kinds.map((kind, index): CsvCell[] => [
      classification,
      index,
      ...kind.k.components,
      kind.dimension,
      kind.dimensionPM,
      kind.littleCoGroup.symbol,
      kind.littleCoGroup.order,
      kind.arms,
      kind.minusK,
      kind.halfLattice.map(({ components }) => components.join(" ")).join("; "),
    ]);
  return csvText(
    [...header, "arms", "minus_k", "half_lattice"],
    [...rows("point group", record.kinds), ...rows("point group and -1", record.kindsPM)],
  );
}

/** One row for each irrep of the k and each of the line or plane, with the multiplicity, 0 included. */
export function compatibilityCsv(record: CompatibilityRecord): string {
  const header = ["from", "irrep", "dimension", "to", "part", "part_dimension", "multiplicity"];
  const [from, to] = [record.from.arm.components.join(" "), record.to.k.components.join(" ")];
  return csvText(
    header,
    record.splitting.flatMap(({ label, dimension, parts }) =>
      record.to.irreps.map((part): CsvCell[] => [
        from,
        label,
        dimension,
        to,
        part.label,
        part.dimension,
        parts.find((one) => one.label === part.label)?.multiplicity ?? 0,
      ]),
    ),
  );
}

/** One row for each site of each configuration: what a refinement starts from. */
export function configurationsCsv(record: ConfigurationsRecord): string {
  if (record.kind === "incommensurate") return modulatedCsv(record);
  const header = ["configuration", "irreps", "direction", "bns_number", "bns_symbol", "og_number", "cell_from_parent"];
  const site = ["site", "parent_site", "x", "y", "z", "moment_lattice", "form_lattice", "form_crystal"];
  return csvText(
    [
      ...header,
      ...["index", "parameters_irreps", "parameters_group", "net_moment", "polarization", "magnetoelectric"],
      ...site,
      ...["example_a", "example_b", "example_c"],
    ],
    commensurateOnes(record).flatMap((one) =>
      one.sites.map((atom): CsvCell[] => [
        one.id,
        one.irreps.join(" "),
        one.direction,
        one.magneticGroup.bns.number,
        one.magneticGroup.bns.symbol,
        one.magneticGroup.og.number,
        one.magneticGroup.cellFromParent,
        one.index,
        one.freeParameters.irreps,
        one.freeParameters.group,
        ...[one.netMoment, one.polarization, one.magnetoelectric].map(formOfProperty),
        atom.label,
        atom.parentSite,
        ...atom.positionLattice,
        atom.momentLattice,
        atom.symmformLattice,
        atom.symmformCrystal,
        ...atom.exampleLattice,
      ]),
    ),
  );
}

/** Cartesian components as symbols, `0` where the group forbids it, nothing where it was not worked out. */
function formOfProperty(property: PropertyRecord | null): string {
  if (property === null) return "";
  return property.form.every((entry) => entry === "0") ? "0" : `(${property.form.join(", ")})`;
}

/** One row for each site of each modulated configuration. */
function modulatedCsv(record: ConfigurationsRecord): string {
  const header = [
    "configuration",
    "irreps",
    "direction",
    "index",
    "parameters_irreps",
    "parameters_group",
    "free_phases",
  ];
  const site = ["site", "parent_site", "x", "y", "z", "cosine_lattice", "sine_lattice", "cosine_form", "sine_form"];
  const examples = ["cosine", "sine"].flatMap((wave) => ["a", "b", "c"].map((axis) => `example_${wave}_${axis}`));
  return csvText(
    [...header, ...site, ...examples, "operators"],
    modulatedOnes(record).flatMap((one) =>
      one.sites.map((atom): CsvCell[] => [
        one.id,
        one.irreps.join(" "),
        one.direction,
        one.index,
        one.freeParameters.irreps,
        one.freeParameters.group,
        one.freePhases,
        atom.label,
        atom.parentSite,
        ...atom.positionLattice,
        atom.cosineLattice,
        atom.sineLattice,
        atom.symmformCosine,
        atom.symmformSine,
        ...atom.exampleCosine,
        ...atom.exampleSine,
        one.magneticGroup.superspace.operators.join("; "),
      ]),
    ),
  );
}
