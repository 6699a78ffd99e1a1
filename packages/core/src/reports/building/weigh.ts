import type { ConfigurationSet } from "../../configurations/index.js";
import type { MagneticFormFactor, MomentSpace } from "../../diffraction/index.js";
import { waveVectorToJson } from "../../kvectors/index.js";
import { roundNumber } from "../../numbers/index.js";
import { qToTwoThetaDeg } from "../../reflections/index.js";
import { type Cell, formatTriplet, type SpaceGroup } from "../../spacegroups/index.js";
import type { IntensityDatum, WeighedCandidate, Weighing } from "../../weighing/index.js";
import type { WeighDataRecord, WeighedRecord, WeighPatternRecord, WeighRecord } from "../records/weigh.js";
import { fittedSites } from "./fitted-sites.js";
import { cellRecord, groupRecord } from "./names.js";

/** What was weighed and how, for the record. */
export interface WeighedInput {
  readonly set: ConfigurationSet;
  readonly cell: Cell;
  readonly spaces: readonly MomentSpace[];
  readonly ions: readonly { readonly label: string; readonly formFactor: MagneticFormFactor }[];
  readonly data: Omit<WeighDataRecord, "list"> & { readonly intensities: readonly IntensityDatum[] };
  readonly pattern: WeighPatternRecord | null;
}

export function weighRecord({ set, cell, spaces, ions, data, pattern }: WeighedInput, found: Weighing): WeighRecord {
  const { intensities, ...how } = data;
  const left = new Set(found.leftOut.map(({ label }) => label));
  const irrepsOf = (id: string) => formOf(set, id).irreps;
  return {
    group: groupRecord(set.group),
    cell: cellRecord(cell),
    k: waveVectorToJson(set.k),
    ions: ions.map(({ label, formFactor: { ion, text, largestMoment } }) => ({
      label,
      ion: ion ?? "",
      formFactor: text,
      limit: largestMoment,
    })),
    data: {
      ...how,
      list: intensities
        .filter(({ label }) => !left.has(label))
        .map(({ label, q, hkl, observed, uncertainty, holds = "satellites", polarization = null }, index) => ({
          label,
          q: q === null ? null : roundNumber(q),
          twoThetaDeg: q === null || how.wavelengthAngstrom === null ? null : twoTheta(q, how.wavelengthAngstrom),
          lines: found.lines[index] ?? [],
          hkl,
          observed,
          su: roundNumber(uncertainty),
          holds,
          polarization,
        })),
    },
    ranking: found.ranking.map((one) => weighedRecord(set, cell, spaces, one)),
    struckOut: found.struckOut.map(({ id, peaks, satellites }) => ({ id, irreps: irrepsOf(id), peaks, satellites })),
    pattern,
    leftOut: found.leftOut,
    leftOutShare: found.leftOutShare,
    relative: found.relative,
    criterion: found.criterion,
    remarks: found.remarks,
    bounded: [...set.bounded],
  };
}

function weighedRecord(
  set: ConfigurationSet,
  cell: Cell,
  spaces: readonly MomentSpace[],
  one: WeighedCandidate,
): WeighedRecord {
  return {
    id: one.id,
    rank: one.rank,
    ...formOf(set, one.id),
    chiSquared: one.chiSquared,
    reducedChiSquared: one.reducedChiSquared,
    rFactor: one.rFactor,
    parameters: one.parameters,
    criterion: one.criterion,
    amplitudes: one.amplitudes.map(({ label, value, uncertainty, determined }) => ({
      label,
      value,
      su: uncertainty,
      determined,
    })),
    freePhase: one.freePhase,
    moments: one.moments.map(({ sizeUncertainty, largestUncertainty, components, position, ...moment }) => ({
      ...moment,
      position: position.map((entry) => roundNumber(entry)),
      sizeSu: sizeUncertainty,
      largestSu: largestUncertainty,
      fourierCrystal: components.map(({ real, imaginary }) =>
        real.map((entry, axis) => [entry, imaginary[axis as 0 | 1 | 2]] as const),
      ),
    })),
    sites: fittedSites(
      set,
      cell,
      one,
      spaces.find(({ id }) => id === one.id),
    ),
    factorToLimit: one.factorToLimit,
    scale: one.scale,
    scaleSu: one.scaleUncertainty,
    domains: one.domains.map(({ operator, fraction, uncertainty }) => ({
      operator: operatorText(set.group, operator),
      fraction,
      su: uncertainty,
    })),
    calculated: one.calculated,
    sameAs: one.sameAs,
    identicalTo: one.identicalTo,
    separations: one.separations.map(({ from, by, hkl, q, text }) => ({
      from,
      relation: relationOf(set, one.id, from),
      by,
      hkl,
      q,
      text,
    })),
    minima: one.minima.map(({ chiSquared, amplitudes, largest, aboveLimit }) => ({
      chiSquared,
      amplitudes,
      largest,
      aboveLimit,
    })),
    starts: one.starts,
    hits: one.hits,
  };
}

function twoTheta(q: number, wavelengthAngstrom: number): number | null {
  const angle = qToTwoThetaDeg(q, wavelengthAngstrom);
  return angle === null ? null : roundNumber(angle);
}

/** What another configuration is of one: the groups of special cases hold those of more general ones. */
function relationOf(set: ConfigurationSet, id: string, other: string): "special case" | "more general" | null {
  const all = [...set.configurations, ...set.modulated];
  const groupsAbove = (one: string) => all.find((entry) => entry.id === one)?.subgroupOf ?? [];
  if (groupsAbove(id).includes(other)) return "special case";
  return groupsAbove(other).includes(id) ? "more general" : null;
}

function formOf(set: ConfigurationSet, id: string): { readonly irreps: string[]; readonly direction: string } {
  const found = [...set.configurations, ...set.modulated].find((one) => one.id === id);
  return { irreps: [...(found?.irreps ?? [])], direction: found?.direction ?? "" };
}

function operatorText({ operators }: SpaceGroup, index: number): string {
  const operator = operators[index];
  return operator === undefined ? "" : formatTriplet(operator);
}
